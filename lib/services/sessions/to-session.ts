import type { SessionRow } from '@/db/repositories/recording-sessions';
import type { Session } from '@/lib/contracts/session';

export function toSession(row: SessionRow): Session {
  return {
    id: row.id,
    studyId: row.study_id,
    animalId: row.animal_id,
    animalCode: row.animal_code,
    name: row.name,
    startedAt: row.started_at.toISOString(),
    createdAt: row.created_at.toISOString(),
    version: row.version,
    state: row.state,
    dataVersion: row.data_version,
    dataHash: row.data_hash,
    countsHash: row.counts_hash,
    trials: row.n_trials,
    units: row.n_units,
    bins: row.n_bins,
    binWidthMs: row.bin_width_ms,
    windowStartMs: row.window_start_ms,
    trialColumns: row.trial_columns ?? [],
    unitColumns: row.unit_columns ?? [],
    labels: row.labels ?? [],
    problems: row.problems,
  };
}
