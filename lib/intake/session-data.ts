import type { Column } from '@/lib/intake/column';
import type { CountsArray } from '@/lib/intake/counts-array';

/** Which column is a label, and whether it was designed (`nominal`), worked out from the stimulus (`realised`) or neither. */
export interface LabelChoice {
  column: string;
  kind: 'nominal' | 'realised' | 'other';
  /** How it was worked out, where it was; kept with the column. */
  made?: {
    from: 'stimulus' | 'strengths';
    centring?: 'location' | 'axis' | 'none';
    isClipped?: boolean;
    /** Σσ²_shared / Σ(σ²_shared + σ²_own) over all trials. */
    pooled?: number | null;
  };
}

/** Velocities in deg/s, row-major over trials × locations × axes × frames. */
export interface StimulusVelocity {
  velocity: Float32Array | Float64Array;
  nLocations: number;
  nAxes: number;
  nFrames: number;
  frameMs: number;
}

/** A recording session's data in memory: what intake makes from a member's files and the canonical form keeps. */
export interface SessionData {
  /** Row-major nTrials × nUnits × nBins. */
  counts: CountsArray;
  nTrials: number;
  nUnits: number;
  nBins: number;
  binWidthMs: number;
  /** Left edge of bin 0 relative to the alignment event. */
  windowStartMs: number;
  /** Trial table: each column has nTrials values, in session order. */
  trials: Column[];
  /** Unit table: each column has nUnits values. */
  units: Column[];
  labels: LabelChoice[];
  stimulus?: StimulusVelocity;
}
