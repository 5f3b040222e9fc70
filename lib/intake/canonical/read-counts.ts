import type { CountsArray } from '@/lib/intake/counts-array';
import type { PartSource } from '@/lib/intake/canonical/part-source';

/**
 * The counts of bins binFrom … binTo − 1 of all trials and units, row-major trials × units × (binTo − binFrom); all bins
 * if none are named. Reads one range a part, so a window costs its own bytes alone; parts are read four at a time.
 */
export async function readCounts(
  source: PartSource,
  bins: { binFrom?: number; binTo?: number } = {},
): Promise<{ counts: CountsArray; shape: [number, number, number] }> {
  const parts = source.parts.flatMap((part) => (part.counts ? [{ name: part.name, ...part.counts }] : []));
  const first = parts[0];
  if (first === undefined) throw new Error('the data version has no counts part');
  const { nUnits, nBins, bytesPerCount } = first;
  const binFrom = bins.binFrom ?? 0;
  const binTo = bins.binTo ?? nBins;
  if (
    !Number.isInteger(binFrom) ||
    !Number.isInteger(binTo) ||
    binFrom < 0 ||
    binTo > nBins ||
    binFrom >= binTo
  )
    throw new RangeError(`bins ${binFrom} to ${binTo} do not lie within 0 to ${nBins}`);
  const width = binTo - binFrom;
  const nTrials = parts.reduce((sum, part) => sum + part.nTrials, 0);
  const counts = newCounts(bytesPerCount, nTrials * nUnits * width);

  const readOne = async (part: (typeof parts)[number]): Promise<void> => {
    const cells = part.nTrials * nUnits;
    const length = (width - 1) * part.binStrideBytes + cells * bytesPerCount;
    const bytes = await source.read(part.name, part.dataOffset + binFrom * part.binStrideBytes, length);
    // A copy where the bytes do not start on a multiple of the element's size.
    const aligned = bytes.byteOffset % bytesPerCount === 0 ? bytes : bytes.slice();
    const base = part.trialFrom * nUnits * width;
    for (let bin = 0; bin < width; bin++) {
      const values = viewCounts(aligned, bin * part.binStrideBytes, cells, bytesPerCount);
      for (let cell = 0, to = base + bin; cell < cells; cell++, to += width) counts[to] = values[cell];
    }
  };
  for (let at = 0; at < parts.length; at += 4) await Promise.all(parts.slice(at, at + 4).map(readOne));
  return { counts, shape: [nTrials, nUnits, width] };
}

function newCounts(bytesPerCount: 1 | 2 | 4, length: number): CountsArray {
  if (bytesPerCount === 1) return new Uint8Array(length);
  return bytesPerCount === 2 ? new Uint16Array(length) : new Int32Array(length);
}

function viewCounts(
  bytes: Uint8Array,
  offset: number,
  length: number,
  bytesPerCount: 1 | 2 | 4,
): CountsArray {
  const at = bytes.byteOffset + offset;
  if (bytesPerCount === 1) return new Uint8Array(bytes.buffer, at, length);
  return bytesPerCount === 2
    ? new Uint16Array(bytes.buffer, at, length)
    : new Int32Array(bytes.buffer, at, length);
}
