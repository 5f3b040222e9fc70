import type { Intake } from '@/lib/contracts/intake';
import type { IntakePreview } from '@/lib/contracts/intake-answer';
import type { Problem } from '@/lib/contracts/problem';
import type { ColumnFact, LabelFact } from '@/lib/contracts/session';
import type { Inspection } from '@/lib/intake/inspect-file';
import type { IndexMatrix } from '@/lib/intake/read-matrix';
import type { PartRecord } from '@/lib/intake/canonical/part-record';

/** A file that a reader process may ask bytes of; it never learns where the file is stored. */
export interface ReaderFile {
  fileId: string;
  name: string;
  sizeBytes: number;
}

/** What a reader process is asked to do. */
export type ReaderTask =
  | { kind: 'inspect'; file: ReaderFile }
  | { kind: 'intake'; files: ReaderFile[]; intake: Intake }
  | { kind: 'preview'; files: ReaderFile[]; intake: Intake; nTrials: number }
  | { kind: 'matrix'; file: ReaderFile; path: string; maxEntries: number };

/** What came of an intake: stops (`made` null), or the canonical form's facts. */
export interface IntakeOutcome {
  problems: Problem[];
  made: {
    dataHash: string;
    countsHash: string;
    parts: PartRecord[];
    nTrials: number;
    nUnits: number;
    nBins: number;
    trialColumns: ColumnFact[];
    unitColumns: ColumnFact[];
    labels: LabelFact[];
  } | null;
}

export type ReaderAnswer =
  | { kind: 'inspected'; inspection: Inspection }
  | { kind: 'taken'; outcome: IntakeOutcome }
  | { kind: 'previewed'; preview: IntakePreview }
  | { kind: 'matrix'; matrix: IndexMatrix | null; problems: Problem[] };

/** From the reader to its parent: bytes wanted, an object to keep, the end. */
export type FromReader =
  | { kind: 'read'; request: number; fileId: string; offset: number; length: number }
  | { kind: 'keep'; request: number; dataHash: string; name: string; bytes: Uint8Array }
  | { kind: 'answer'; answer: ReaderAnswer }
  | { kind: 'failed'; message: string };

/** To the reader: its task, then answers to its requests. */
export type ToReader =
  | { kind: 'task'; task: ReaderTask }
  | { kind: 'bytes'; request: number; bytes: Uint8Array }
  | { kind: 'kept'; request: number };

/** The descriptor over which a reader process asks for bytes when it cannot wait for a message. */
export const syncDescriptor = 4;
