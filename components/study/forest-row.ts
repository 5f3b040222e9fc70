import type { Animal } from '@/lib/contracts/lab';
import type { ReadoutSummary } from '@/lib/contracts/readout';
import type { SessionState } from '@/lib/contracts/session';

/** A session's line in the study's table: its facts, and its newest finished readout of each label. */
export interface ForestRow {
  sessionId: string;
  name: string;
  startedAt: string;
  state: SessionState;
  units: number | null;
  trials: number | null;
  nReadouts: number;
  readouts: ReadoutSummary[];
}

/** An animal and its sessions. */
export interface ForestGroup {
  animal: Animal;
  index: number;
  rows: ForestRow[];
}
