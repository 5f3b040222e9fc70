import { createHash } from 'node:crypto';
import { tableFromIPC } from 'apache-arrow';
import { describe, expect, it } from 'vitest';
import { hashCounts } from '@/lib/intake/canonical/hash-counts';
import { memoryParts } from '@/lib/intake/canonical/memory-parts';
import { readColumns } from '@/lib/intake/canonical/read-columns';
import { readCounts } from '@/lib/intake/canonical/read-counts';
import { readPart } from '@/lib/intake/canonical/read-part';
import { readStimulus } from '@/lib/intake/canonical/read-stimulus';
import { writeCanonical } from '@/lib/intake/canonical/write-canonical';
import type { SessionData } from '@/lib/intake/session-data';

function example(counts: SessionData['counts'], shape: [number, number, number]): SessionData {
  const [nTrials, nUnits, nBins] = shape;
  return {
    counts,
    nTrials,
    nUnits,
    nBins,
    binWidthMs: 25,
    windowStartMs: -100,
    trials: [
      {
        name: 'shared_fraction',
        type: 'number',
        values: Float64Array.from({ length: nTrials }, (_, i) => (i === 1 ? NaN : i / 7)),
      },
      {
        name: 'direction',
        type: 'circular',
        periodDeg: 360,
        values: Float64Array.from({ length: nTrials }, (_, i) => i * 10),
      },
      {
        name: 'block',
        type: 'category',
        values: Array.from({ length: nTrials }, (_, i) => (i === 0 ? null : `b${i % 2}`)),
      },
    ],
    units: [
      {
        name: 'area',
        type: 'category',
        values: Array.from({ length: nUnits }, (_, i) => (i % 2 ? 'MT' : 'V1')),
      },
    ],
    labels: [{ column: 'shared_fraction', kind: 'nominal' }],
    stimulus: {
      velocity: Float32Array.from({ length: nTrials * 2 * 2 * 3 }, (_, i) => i / 3),
      nLocations: 2,
      nAxes: 2,
      nFrames: 3,
      frameMs: 25,
    },
  };
}

describe('the canonical form', () => {
  const shape: [number, number, number] = [5, 3, 4];
  const counts = Int32Array.from({ length: 60 }, (_, i) => (i * 7) % 11);

  it('gives back what was written', async () => {
    const data = example(counts, shape);
    const { parts } = await writeCanonical(data);
    const source = memoryParts(parts);
    const all = await readCounts(source);
    expect(all.shape).toEqual(shape);
    expect(Array.from(all.counts)).toEqual(Array.from(counts));
    const trials = readColumns((await readPart(source, 'trials'))!);
    expect(trials).toEqual(data.trials);
    expect(readColumns((await readPart(source, 'units'))!)).toEqual(data.units);
    expect(readStimulus((await readPart(source, 'stimulus'))!)).toEqual(data.stimulus);
    const label = tableFromIPC((await readPart(source, 'trials'))!).schema.fields[0].metadata.get(
      'outfold.label',
    );
    expect(label).toBe('nominal');
  });

  it('reads one window as the same cells that a whole read has', async () => {
    const { parts } = await writeCanonical(example(counts, shape));
    const window = await readCounts(memoryParts(parts), { binFrom: 1, binTo: 3 });
    const expected: number[] = [];
    for (let cell = 0; cell < 15; cell++) expected.push(counts[cell * 4 + 1], counts[cell * 4 + 2]);
    expect(Array.from(window.counts)).toEqual(expected);
    await expect(readCounts(memoryParts(parts), { binFrom: 3, binTo: 5 })).rejects.toThrow(RangeError);
  });

  it('is the same, byte by byte, whatever type the counts came in', async () => {
    const one = await writeCanonical(example(counts, shape));
    const two = await writeCanonical(example(Uint8Array.from(counts), shape));
    expect(two.dataHash).toBe(one.dataHash);
    expect(two.parts.map((part) => part.sha256)).toEqual(one.parts.map((part) => part.sha256));
  });

  it('hashes the bin width and the labels too', async () => {
    const one = await writeCanonical(example(counts, shape));
    const wider = await writeCanonical({ ...example(counts, shape), binWidthMs: 50 });
    const other = await writeCanonical({ ...example(counts, shape), labels: [] });
    expect(new Set([one.dataHash, wider.dataHash, other.dataHash]).size).toBe(3);
    expect(wider.countsHash).toBe(one.countsHash);
  });

  it('keeps counts of 16 and 32 bits, several parts and odd sizes', async () => {
    for (const largest of [300, 70_000]) {
      const big: [number, number, number] = [900, 1001, 7];
      const wide = Int32Array.from({ length: big[0] * big[1] * big[2] }, (_, i) =>
        i % 977 === 0 ? largest : i % 5,
      );
      const { parts } = await writeCanonical(example(wide, big));
      expect(parts.filter((part) => part.counts).length).toBeGreaterThan(1);
      const back = await readCounts(memoryParts(parts), { binFrom: 2, binTo: 5 });
      let different = 0;
      for (let cell = 0; cell < big[0] * big[1]; cell++)
        for (let bin = 0; bin < 3; bin++)
          if (back.counts[cell * 3 + bin] !== wide[cell * 7 + bin + 2]) different += 1;
      expect(different).toBe(0);
    }
  });

  it('refuses a part whose bytes changed', async () => {
    const { parts } = await writeCanonical(example(counts, shape));
    const trials = parts.find((part) => part.name === 'trials')!;
    trials.bytes = Uint8Array.from(trials.bytes);
    trials.bytes[40] ^= 1;
    await expect(readPart(memoryParts(parts), 'trials')).rejects.toThrow('hash');
  });

  it('hashes counts as the api says: shape, then cells, little-endian int32', () => {
    const buffer = Buffer.alloc(4 * (3 + 4));
    [1, 2, 2, 5, 0, 3, 258].forEach((value, at) => buffer.writeInt32LE(value, at * 4));
    const expected = createHash('sha256').update(buffer).digest('hex');
    expect(hashCounts(Int32Array.from([5, 0, 3, 258]), [1, 2, 2])).toBe(expected);
    expect(hashCounts(Uint16Array.from([5, 0, 3, 258]), [1, 2, 2])).toBe(expected);
  });
});
