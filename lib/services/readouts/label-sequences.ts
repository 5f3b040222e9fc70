import { createHash } from 'node:crypto';
import { Float64, Schema, Table, makeVector, tableFromIPC, tableToIPC } from 'apache-arrow';

/*
 * Label sequences of other sessions, for the shuffled control that uses them. They are kept with the readout, so that the
 * same readout can be made again whatever becomes of those sessions.
 */

function flatten(sequences: readonly Float64Array[]): Float64Array {
  const values = new Float64Array(sequences.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const sequence of sequences) {
    values.set(sequence, at);
    at += sequence.length;
  }
  return values;
}

export const labelSequences = {
  /** An Arrow IPC stream of one column, the sequences one after the other, with their lengths beside it. */
  write(sequences: readonly Float64Array[]): Uint8Array {
    const table = new Table({ label: makeVector({ data: flatten(sequences), type: new Float64() }) });
    const lengths = JSON.stringify(sequences.map(({ length }) => length));
    const schema = new Schema(table.schema.fields, new Map([['outfold.lengths', lengths]]));
    return tableToIPC(new Table(schema, table.batches), 'stream');
  },

  read(bytes: Uint8Array): Float64Array[] {
    const table = tableFromIPC(bytes);
    const values = table.getChild('label')?.toArray() as Float64Array | undefined;
    const lengths = JSON.parse(table.schema.metadata.get('outfold.lengths') ?? '[]') as number[];
    if (!values || values.length !== lengths.reduce((sum, length) => sum + length, 0))
      throw new Error('kept label sequences do not have the lengths that they claim');
    let at = 0;
    return lengths.map((length) => values.subarray(at, (at += length)));
  },

  /** SHA-256 (hex) over the lengths and the values as little-endian doubles. */
  hash(sequences: readonly Float64Array[]): string {
    const hash = createHash('sha256').update(`${sequences.map(({ length }) => length).join(' ')}\n`);
    return hash.update(new Uint8Array(flatten(sequences).buffer)).digest('hex');
  },
};
