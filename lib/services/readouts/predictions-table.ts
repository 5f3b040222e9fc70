import { Float64, Int32, Table, makeVector, tableFromIPC, tableToIPC } from 'apache-arrow';
import type { PredictionColumns } from '@/lib/engine/readout/types';

/** Held-out predictions as an Arrow IPC stream: one row a held-out trial, repeat and window. */
export function writePredictions(columns: PredictionColumns): Uint8Array {
  const table = new Table({
    window: makeVector({ data: columns.window, type: new Int32() }),
    repeat: makeVector({ data: columns.repeat, type: new Int32() }),
    fold: makeVector({ data: columns.fold, type: new Int32() }),
    trial: makeVector({ data: columns.trial, type: new Int32() }),
    label: makeVector({ data: columns.label, type: new Float64() }),
    predicted: makeVector({ data: columns.predicted, type: new Float64() }),
  });
  return tableToIPC(table, 'stream');
}

/** The columns again. */
export function readPredictions(bytes: Uint8Array): PredictionColumns {
  const table = tableFromIPC(bytes);
  const column = (name: string) => {
    const vector = table.getChild(name);
    if (!vector) throw new Error(`the predictions have no column ${name}`);
    return vector.toArray() as never;
  };
  return {
    window: column('window'),
    repeat: column('repeat'),
    fold: column('fold'),
    trial: column('trial'),
    label: column('label'),
    predicted: column('predicted'),
  };
}
