'use client';

import { useId, type ButtonHTMLAttributes, type MouseEvent } from 'react';

const kinds = {
  filled: 'btn',
  plain: 'btn plain',
  danger: 'btn danger',
  link: 'linklike',
  pick: 'pick',
} as const;

/**
 * A button. One filled button a view. With `why` it cannot be used yet: dashed, still focusable, and the reason stands beside it
 * (pass `showWhy={false}` where the page already says it in sight; it is then only read out).
 */
export function Button({
  kind = 'filled',
  small = false,
  why,
  showWhy = true,
  type = 'button',
  className,
  onClick,
  ...rest
}: ButtonHTMLAttributes<HTMLButtonElement> & {
  kind?: keyof typeof kinds;
  small?: boolean;
  why?: string | null;
  showWhy?: boolean;
}) {
  const whyId = useId();
  const classes = [kinds[kind], small ? 'small' : '', className ?? ''].filter(Boolean).join(' ');
  const guard = (event: MouseEvent<HTMLButtonElement>) => {
    if (why) event.preventDefault();
    else onClick?.(event);
  };
  return (
    <>
      <button
        {...rest}
        type={type}
        className={classes}
        onClick={guard}
        aria-disabled={why ? true : undefined}
        aria-describedby={why ? whyId : rest['aria-describedby']}
      />
      {why ? (
        <span id={whyId} className={showWhy ? 'btn-why' : 'vh'}>
          {why}
        </span>
      ) : null}
    </>
  );
}
