import type { Column } from '@/lib/intake/column';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { binSpikes } from '@/lib/intake/mapping/bin-spikes';
import { CountsBuilder } from '@/lib/intake/mapping/counts-builder';
import { findArray } from '@/lib/intake/mapping/find-array';
import type { SourceFiles } from '@/lib/intake/mapping/source-files';
import { requireSpikeArrays } from '@/lib/intake/mapping/spike-arrays';
import { toColumn } from '@/lib/intake/mapping/to-column';

const MAX_UNIT_SPIKES = 20_000_000;

/** How spike times are cut into bins: around which event, from when to when. */
export interface SpikeMapping {
  align: string;
  startMs: number;
  endMs: number;
  latencyMs?: number;
}

/**
 * Cuts spike times into half-open bins around each trial's alignment event. The event's times (seconds) are the trial
 * column `align`, or that column of the file's own trials; a display latency is added to them.
 */
export async function countsFromSpikes(
  files: SourceFiles,
  fileId: string,
  spikes: SpikeMapping,
  binWidthMs: number,
  trials: readonly Column[],
): Promise<CountsBuilder> {
  const { times, ends, name } = requireSpikeArrays(files, fileId);
  const place = { file: name };
  const nBins = Math.round((spikes.endMs - spikes.startMs) / binWidthMs);
  if (nBins < 1 || Math.abs(spikes.startMs + nBins * binWidthMs - spikes.endMs) > 1e-6)
    throw new IntakeRefusal(
      'window-edge',
      `From ${spikes.startMs} to ${spikes.endMs} ms no whole number of bins of ${binWidthMs} ms fits.`,
      'Choose a window whose length is a multiple of the bin width.',
      place,
    );
  const events = await eventTimes(files, fileId, spikes.align, trials);
  const index = await toColumn(ends, { name: 'spike_times_index', path: ends.path, type: 'number' }, name);
  const unitEnds = index.values as Float64Array;
  const nSpikes = times.shape.reduce((product, length) => product * length, 1);
  let before = 0;
  unitEnds.forEach((end, unit) => {
    if (!Number.isInteger(end) || end < before || end > nSpikes)
      throw new IntakeRefusal(
        'spike-times-index',
        'The index of the spike times goes backwards or past their end; the unit is given.',
        'Export the file again.',
        { ...place, path: ends.path, unit },
      );
    if (end - before > MAX_UNIT_SPIKES)
      throw new IntakeRefusal(
        'spike-times-many',
        `A unit has ${end - before} spikes, more than ${MAX_UNIT_SPIKES}.`,
        'Check the index of the spike times.',
        { ...place, path: ends.path, unit },
      );
    before = end;
  });
  const builder = new CountsBuilder([events.length, unitEnds.length, nBins], place);
  const edges = events.map((event) => event + (spikes.latencyMs ?? 0) / 1000);
  const bins = { startSeconds: spikes.startMs / 1000, widthSeconds: binWidthMs / 1000, nBins };

  let unit = 0;
  let own = new Float64Array(unitEnds.length === 0 ? 0 : unitEnds[0]);
  let filled = 0;
  const finishUnits = (): void => {
    while (unit < unitEnds.length && filled === own.length) {
      const bad = own.findIndex((time) => !Number.isFinite(time));
      if (bad !== -1)
        throw new IntakeRefusal(
          'spike-time-missing',
          'A spike time is missing or infinite; the unit is given.',
          'Correct the export.',
          { ...place, path: times.path, unit },
        );
      binSpikes(own.sort(), edges, bins, (trial, bin, count) => {
        builder.set((trial * unitEnds.length + unit) * nBins + bin, count);
      });
      unit += 1;
      own = new Float64Array(unit < unitEnds.length ? unitEnds[unit] - unitEnds[unit - 1] : 0);
      filled = 0;
    }
  };
  finishUnits();
  for await (const chunk of times.chunks())
    for (const value of chunk) {
      if (unit === unitEnds.length) break;
      own[filled++] = Number(value);
      if (filled === own.length) finishUnits();
    }
  return builder;
}

async function eventTimes(
  files: SourceFiles,
  fileId: string,
  align: string,
  trials: readonly Column[],
): Promise<Float64Array> {
  const column =
    trials.find((one) => one.name === align) ??
    (await (async () => {
      const { array, name } = findArray(files, fileId, align, 'the alignment event', 'trial');
      return toColumn(array, { name: align, path: align, type: 'number' }, name);
    })());
  if (column.type === 'category')
    throw new IntakeRefusal(
      'align-not-numeric',
      `“${align}” holds text; an alignment event has a time in seconds.`,
      'Choose a column of times.',
      { path: align },
    );
  const missing = column.values.findIndex((time) => !Number.isFinite(time));
  if (missing !== -1)
    throw new IntakeRefusal(
      'align-missing',
      `The alignment event “${align}” has no time in a trial.`,
      'Fill in the time, or leave the trial out of the file.',
      { path: align, trial: missing },
    );
  return column.values;
}
