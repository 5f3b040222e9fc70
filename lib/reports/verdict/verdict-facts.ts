import type { Interval } from '@/lib/contracts/readout';

/** The null as a verdict needs it. */
export interface VerdictNull {
  /** How labels were shuffled, in words that follow "shuffles": "", "within block", "by whole blocks". */
  scheme: string;
  draws: number;
  p: number;
  smallestP: number;
  q025: number;
  q95: number;
  q975: number;
  max: number;
}

/** A control's outcome as a verdict needs it. */
export interface VerdictControl {
  kind: string;
  /** What the control is about, as nouns: "speed", "firing rate". */
  subjects: string[];
  outcome: 'survives' | 'fails' | 'cannotTell';
  r2: number | null;
  interval: Interval | null;
}

/** Everything that a verdict says, as numbers. */
export interface VerdictFacts {
  animal: string;
  /** Areas of the units that were used; empty where the session names none. */
  areas: string[];
  /** The label in words, without article: "shared-motion fraction". */
  label: string;
  window: { startMs: number; endMs: number };
  nTrials: number;
  nFeatures: number;
  estimatorWords: string;
  r2: number | null;
  interval: Interval | null;
  null: VerdictNull | null;
  controls: VerdictControl[];
  /** The smallest effect of interest that an analysis plan named, as R²; null without a plan. */
  smallestEffect: number | null;
  /** Set where the label drifts over the session, so that no shuffle is a fair comparison. */
  labelTrends: boolean;
}
