/** Where each object lies in the bucket. Ids are ours (UUIDs and hex hashes), so no part needs escaping. */
export const keys = {
  file: (labId: string, sessionId: string, fileId: string) =>
    `labs/${labId}/sessions/${sessionId}/files/${fileId}`,
  /** `part` names a part of the canonical data, such as counts or trials. */
  dataPart: (labId: string, sessionId: string, dataHash: string, part: string) =>
    `labs/${labId}/sessions/${sessionId}/data/${dataHash}/${part}.arrow`,
  predictions: (labId: string, sessionId: string, readoutId: string) =>
    `labs/${labId}/sessions/${sessionId}/readouts/${readoutId}/predictions.arrow`,
  readoutInputs: (labId: string, sessionId: string, readoutId: string) =>
    `labs/${labId}/sessions/${sessionId}/readouts/${readoutId}/inputs.arrow`,
} as const;
