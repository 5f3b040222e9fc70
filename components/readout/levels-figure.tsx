'use client';
import { Figure } from '@/components/charts/figure';
import { LevelBias } from '@/components/charts/level-bias';
import { numbers } from '@/components/ui/numbers';
import type { ReadoutResult } from '@/lib/contracts/readout';
import { formatNumber } from '@/lib/format/format-number';

/** Bias at each level of the label, with the table of level means. */
export function LevelsFigure({
  result,
  label,
  fileName,
}: {
  result: ReadoutResult;
  label: string;
  fileName: string;
}) {
  const { perLevel, heldOut } = result;
  const drawn = perLevel.flatMap(({ level, nTrials, bias, sdPredicted, meanInterval }) =>
    bias === null ? [] : [{ level, nTrials, bias, sd: sdPredicted, meanInterval }],
  );
  const rows = perLevel.map((row) => [
    row.level,
    row.nTrials,
    row.meanPredicted,
    row.sdPredicted,
    row.bias,
    row.meanInterval?.low ?? null,
    row.meanInterval?.high ?? null,
  ]);
  const hasInterval = perLevel.some((row) => row.meanInterval !== null);
  const caption =
    `Mean of the held-out predictions minus the true label, at each level. Thin line: ±1 SD over trials${hasInterval ? '; thick line: 95 % interval of the mean over those trials' : ''}. ` +
    `Regression to the middle is expected of any readout with R² below 1; the calibration slope (true on held-out) is ${formatNumber(heldOut.calibrationSlope)}.`;
  return (
    <Figure
      title="Bias at each level"
      caption={numbers(caption)}
      columns={[
        { name: 'level', decimals: 3 },
        { name: 'trials' },
        { name: 'mean held-out', decimals: 3 },
        { name: 'SD', decimals: 3 },
        { name: 'bias', decimals: 3 },
        { name: 'mean, 95 % low', decimals: 3 },
        { name: 'mean, 95 % high', decimals: 3 },
      ]}
      rows={rows}
      fileName={`${fileName}-levels`}
    >
      <LevelBias levels={drawn} label={label} />
    </Figure>
  );
}
