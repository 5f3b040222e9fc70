'use client';
import type { RecipeCheck } from '@/components/recipe/recipe-checks';
import type { EstimateState } from '@/components/recipe/use-recipe-estimate';
import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import { SeverityMark } from '@/components/ui/severity-mark';
import { formatBytes } from '@/lib/format/format-bytes';
import { formatDuration } from '@/lib/format/format-duration';

/** The bar at the foot: checks counted, time and memory, the one action. */
export function RunBar({
  checks,
  estimate,
  work,
  why,
  error,
  onRun,
}: {
  checks: readonly RecipeCheck[];
  estimate: EstimateState;
  /** What will be computed: "1 000 shuffles × 5 folds". */
  work: string;
  /** Why it cannot be run yet; null when it can. */
  why: string | null;
  error: string | null;
  onRun: () => void;
}) {
  const count = (severity: RecipeCheck['severity']): number =>
    checks.filter((check) => check.severity === severity).length;
  const first = (severity: RecipeCheck['severity']): string =>
    `#row-${checks.find((check) => check.severity === severity)?.row ?? 'label'}`;
  const stops = count('stops');
  const warns = count('warns');
  const { seconds, bytes } = estimate.estimate ?? { seconds: null, bytes: null };
  return (
    <div className="runbar">
      <div className="in">
        <p style={{ margin: 0, fontSize: 13 }}>
          {stops > 0 && (
            <>
              <SeverityMark severity="stops" /> <a href={first('stops')}>{numbers(`${stops} stops`)}</a>{' '}
              ·{' '}
            </>
          )}
          {warns > 0 && (
            <>
              <SeverityMark severity="warns" />{' '}
              <a href={first('warns')}>{numbers(`${warns} ${warns === 1 ? 'warns' : 'warn'}`)}</a> ·{' '}
            </>
          )}
          <span className="quiet">
            {numbers(
              `${count('notes') > 0 ? `${count('notes')} ${count('notes') === 1 ? 'notes' : 'note'} · ` : ''}${count('fine')} fine`,
            )}
          </span>
        </p>
        <div className="r">
          <p style={{ fontSize: 14 }} aria-live="polite">
            {error ? (
              <span className="err">{error}</span>
            ) : seconds !== null && !estimate.isOld ? (
              numbers(
                `about ${formatDuration(Math.max(0.1, seconds))}${bytes === null ? '' : ` and ${formatBytes(bytes)}`}; ${work}.`,
              )
            ) : estimate.error ? (
              <span className="say">{`The estimate is away: ${estimate.error.message}`}</span>
            ) : (
              <span className="quiet">
                {estimate.isOld && stops === 0 ? 'checking' : numbers(`${work}.`)}
              </span>
            )}
          </p>
          <div className="acts">
            <Button onClick={onRun} why={why}>
              Run readout
            </Button>
          </div>
        </div>
      </div>
    </div>
  );
}
