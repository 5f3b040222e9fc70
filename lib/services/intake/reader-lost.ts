/** A reader process that ended without an answer, and why: it took too long, too much memory, or crashed. */
export class ReaderLost extends Error {
  readonly reason: 'time' | 'memory' | 'crash';

  constructor(reason: 'time' | 'memory' | 'crash', message: string) {
    super(message);
    this.name = 'ReaderLost';
    this.reason = reason;
  }
}
