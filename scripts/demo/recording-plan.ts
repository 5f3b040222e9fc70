/** What a made-up recording session is like. */
export interface RecordingPlan {
  seed: number;
  nTrials: number;
  nBlocks: number;
  areas: { name: string; nUnits: number }[];
  /** Share of units whose gain follows the realised shared-motion fraction. */
  carriers: number;
  /** How the units see the stimulus: their own trial's, another trial's (no signal), or with speed tied to the label. */
  design: 'signal' | 'noise' | 'speedTied';
  /** SD over units of the log-rate slope across the session. */
  driftSd: number;
}
