const nTrials = 640;
const nFolds = 5;
const heldOut = 2;

/** A fixed, made-up label for each trial, so that the drawing is the same at every visit. */
function labelOf(trial: number): number {
  return [0, 0.25, 0.5, 0.75, 1][((trial * 7919 + ((trial * trial) % 97) * 31) >>> 3) % 5];
}

/** Trials of a session in five contiguous folds as steps of a stair, the third pulled out: what the product is about. */
export function OutOfFoldDrawing({
  width,
  height,
  className,
}: {
  width: number;
  height: number;
  className: string;
}) {
  const perTrial = width / nTrials;
  const step = (height - 60) / nFolds;
  const at = (value: number) => value.toFixed(1);
  const folds = Array.from({ length: nFolds }, (_, fold) => {
    const first = (fold * nTrials) / nFolds;
    const trials = Array.from({ length: nTrials / nFolds }, (_, index) => first + index);
    const isOut = fold === heldOut;
    const y = isOut ? 0 : 46 + fold * step;
    const stems = trials
      .map((trial) => `M${at((trial + 0.5) * perTrial)} ${at(y + 26)}v-${at(3 + labelOf(trial) * 23)}`)
      .join('');
    return { isOut, y, stems, from: at(first * perTrial), to: at((first + trials.length) * perTrial) };
  });
  const gapBottom = at(46 + heldOut * step + 27);
  const out = folds[heldOut];
  return (
    <svg
      className={className}
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label="Trials of a session in five folds, one of them held out"
    >
      {folds.map((fold) => (
        <g key={fold.from}>
          <path
            d={fold.stems}
            fill="none"
            stroke={fold.isOut ? 'var(--verdigris)' : 'var(--ink-2)'}
            strokeWidth={Math.max(1, perTrial * 0.62)}
          />
          <path className={fold.isOut ? 'data' : 'ax'} d={`M${fold.from} ${at(fold.y + 27)}H${fold.to}`} />
        </g>
      ))}
      <path className="ax" strokeDasharray="2 3" d={`M${out.from} 32V${gapBottom}H${out.to}V32`} />
      <text className="lab v" x={Number(out.to) + 8} y="20">
        out of the fold
      </text>
    </svg>
  );
}
