import {
  Field,
  FixedSizeList,
  Float32,
  Float64,
  RecordBatch,
  Schema,
  Struct,
  Table,
  makeData,
  tableToIPC,
} from 'apache-arrow';
import type { StimulusVelocity } from '@/lib/intake/session-data';

/** The stimulus part: an Arrow IPC file, one row a trial, each a fixed-size list of locations × axes × frames (deg/s). */
export function writeStimulusPart(
  stimulus: StimulusVelocity,
  nTrials: number,
  metadata: ReadonlyMap<string, string>,
): Uint8Array {
  const { velocity, nLocations, nAxes, nFrames, frameMs } = stimulus;
  const size = nLocations * nAxes * nFrames;
  if (velocity.length !== nTrials * size)
    throw new Error(
      `${velocity.length} velocities do not fill ${nTrials} × ${nLocations} × ${nAxes} × ${nFrames}`,
    );
  const type = velocity instanceof Float32Array ? new Float32() : new Float64();
  const list = new FixedSizeList(size, new Field('velocity', type, false));
  const fields = [new Field('velocity', list, false)];
  const child = makeData({ type, length: velocity.length, nullCount: 0, data: velocity } as Parameters<
    typeof makeData
  >[0]);
  const children = [
    makeData({ type: list, length: nTrials, nullCount: 0, child } as Parameters<typeof makeData>[0]),
  ];
  const schema = new Schema(
    fields,
    new Map([
      ...metadata,
      ['outfold.nLocations', String(nLocations)],
      ['outfold.nAxes', String(nAxes)],
      ['outfold.nFrames', String(nFrames)],
      ['outfold.frameMs', String(frameMs)],
    ]),
  );
  const struct = makeData({ type: new Struct(fields), length: nTrials, nullCount: 0, children });
  return tableToIPC(new Table(schema, [new RecordBatch(schema, struct)]), 'file');
}
