'use client';

import { Dialog as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';

/**
 * A dialog over the sheet: for short forms and for acts that need a reason. Esc and the close word let go; the focus returns to the opener.
 * The library's own overlay is not used because it writes a style element, which the content security policy refuses.
 */
export function Dialog({
  open,
  onOpenChange,
  title,
  why,
  trigger,
  children,
}: {
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
  title: string;
  why?: ReactNode;
  trigger?: ReactNode;
  children: ReactNode;
}) {
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      {trigger ? <Primitive.Trigger asChild>{trigger}</Primitive.Trigger> : null}
      <Primitive.Portal>
        <div className="backdrop" aria-hidden="true" />
        <Primitive.Content className="dialog" {...(why ? {} : { 'aria-describedby': undefined })}>
          <div className="dialog-head">
            <Primitive.Title>{title}</Primitive.Title>
            <Primitive.Close className="linklike">Close</Primitive.Close>
          </div>
          {why ? <Primitive.Description className="why">{why}</Primitive.Description> : null}
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
