import { useId, type ReactNode } from 'react';

/**
 * A progress bar with words: what it is doing, done of all, time so far and left. `share` is 0 to 1; null while nothing has been counted.
 * Held work is striped in ochre. Put the cancel button into `act`.
 */
export function Progress({
  label,
  share,
  held = false,
  words,
  act,
}: {
  label: string;
  share: number | null;
  held?: boolean;
  words?: ReactNode;
  act?: ReactNode;
}) {
  const stripesId = useId();
  const percent = share === null ? 0 : Math.min(100, Math.max(0, share * 100));
  return (
    <div className="progress">
      <div
        className={held ? 'bar-p held' : 'bar-p'}
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={share === null ? undefined : Math.round(percent)}
      >
        <svg aria-hidden="true" preserveAspectRatio="none">
          {held ? (
            <pattern id={stripesId} width="7" height="6" patternUnits="userSpaceOnUse">
              <path d="M2 0v6" stroke="var(--ochre)" strokeWidth="4" />
            </pattern>
          ) : null}
          <rect height="100%" width={`${percent}%`} fill={held ? `url(#${stripesId})` : 'var(--verdigris)'} />
        </svg>
      </div>
      {words || act ? (
        <div className="progress-words">
          <span className="quiet">{words}</span>
          {act}
        </div>
      ) : null}
    </div>
  );
}
