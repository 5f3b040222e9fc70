/** What an upload needs of the service; the page gives the real one, tests their own. Failures are ApiErrors. */
export interface UploadTransport {
  create(file: { name: string; sizeBytes: number }): Promise<{ id: string; partSizeBytes: number }>;
  /** Numbers (from 1) of the parts that the service has. */
  arrivedParts(fileId: string): Promise<number[]>;
  /** Sends one part; `onSent` tells how many of its bytes are on their way. */
  putPart(
    fileId: string,
    part: { number: number; octets: Blob; sha256: string | null },
    onSent: (bytes: number) => void,
    signal: AbortSignal,
  ): Promise<void>;
  complete(fileId: string): Promise<void>;
}
