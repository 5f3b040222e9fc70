import {
  Field,
  FixedSizeList,
  Int32,
  RecordBatch,
  Schema,
  Struct,
  Table,
  Uint16,
  Uint8,
  makeData,
  tableFromIPC,
  tableToIPC,
  type Data,
} from 'apache-arrow';
import type { CountsArray } from '@/lib/intake/counts-array';
import type { PartRecord } from '@/lib/intake/canonical/part-record';

interface CountsSlab {
  /** Row-major nTrials × nUnits × nBins: the slab's trials only. */
  counts: CountsArray;
  nTrials: number;
  nUnits: number;
  nBins: number;
  trialFrom: number;
}

/**
 * One counts part: an Arrow IPC file with a column a bin (`b0`, `b1` …), each a fixed-size list of nUnits counts, one row
 * a trial. All of a bin's counts lie together, bins in order, so a window is one contiguous range of the file.
 */
export function writeCountsPart(
  slab: CountsSlab,
  metadata: ReadonlyMap<string, string>,
): { bytes: Uint8Array; layout: NonNullable<PartRecord['counts']> } {
  const { counts, nTrials, nUnits, nBins, trialFrom } = slab;
  const type =
    counts instanceof Uint8Array ? new Uint8() : counts instanceof Uint16Array ? new Uint16() : new Int32();
  const fields: Field[] = [];
  const children: Data[] = [];
  for (let bin = 0; bin < nBins; bin++) {
    const data = newCounts(counts, nTrials * nUnits);
    for (let cell = 0, from = bin; cell < data.length; cell++, from += nBins) data[cell] = counts[from];
    const list = new FixedSizeList(nUnits, new Field('count', type, false));
    fields.push(new Field(`b${bin}`, list, false));
    const child = makeData({ type, length: data.length, nullCount: 0, data } as Parameters<
      typeof makeData
    >[0]);
    children.push(
      makeData({ type: list, length: nTrials, nullCount: 0, child } as Parameters<typeof makeData>[0]),
    );
  }
  const schema = new Schema(fields, new Map([...metadata, ['outfold.trialFrom', String(trialFrom)]]));
  const struct = makeData({ type: new Struct(fields), length: nTrials, nullCount: 0, children });
  const bytes = tableToIPC(new Table(schema, [new RecordBatch(schema, struct)]), 'file');
  const offsets = binOffsets(bytes, nBins);
  const binStrideBytes = nBins > 1 ? offsets[1] - offsets[0] : 0;
  if (offsets.some((offset, bin) => offset !== offsets[0] + bin * binStrideBytes))
    throw new Error('the bins of a counts part do not lie at equal distances');
  const bytesPerCount = counts.BYTES_PER_ELEMENT as 1 | 2 | 4;
  return {
    bytes,
    layout: { trialFrom, nTrials, nUnits, nBins, bytesPerCount, dataOffset: offsets[0], binStrideBytes },
  };
}

/** Reading an IPC file back gives views into its own bytes: their places are the bins' offsets. */
function binOffsets(bytes: Uint8Array, nBins: number): number[] {
  const table = tableFromIPC(bytes);
  return Array.from({ length: nBins }, (_, bin) => {
    const values = table.getChildAt(bin)?.data[0]?.children[0]?.values as Uint8Array | undefined;
    if (values === undefined || values.buffer !== bytes.buffer)
      throw new Error('the counts part cannot be read back in place');
    return values.byteOffset - bytes.byteOffset;
  });
}

function newCounts(like: CountsArray, length: number): CountsArray {
  if (like instanceof Uint8Array) return new Uint8Array(length);
  return like instanceof Uint16Array ? new Uint16Array(length) : new Int32Array(length);
}
