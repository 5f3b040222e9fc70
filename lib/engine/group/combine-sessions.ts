import { EngineError } from '@/lib/engine/engine-error';
import { randomEffectsMean, type RandomEffectsMean } from '@/lib/engine/group/random-effects-mean';
import { requireEstimates } from '@/lib/engine/group/require-estimates';

/** One session's number (R², or a z) with its squared standard error, and the animal that it comes from. */
export interface SessionEstimate {
  animal: string;
  estimate: number;
  variance: number;
}

/** Stage 1: an animal's own mean. */
export interface AnimalEstimate {
  animal: string;
  nSessions: number;
  estimate: number;
  variance: number;
  /** The random-effects mean over this animal's sessions; null for one session. */
  within: RandomEffectsMean | null;
}

/** Both stages. */
export interface CombinedSessions {
  animals: AnimalEstimate[];
  /** Stage 2; null with one animal, which `statement` says. */
  overall: RandomEffectsMean | null;
  /** The mean over the other animals, for each animal; empty below 3 animals. */
  leaveOneAnimalOut: { animal: string; overall: RandomEffectsMean }[];
  /** Each session's share in the overall estimate, in the order given; they sum to 1. */
  sessionShares: Float64Array;
  /** What the numbers speak for, in words. */
  statement: string;
}

/**
 * Two-stage random-effects summary of many sessions: within each animal, then over animals.
 *
 * Stage 1: an animal's mean and variance 1/Σw by REML over its sessions (one session: its own numbers). Stage 2: REML over the
 * animals' means with Knapp and Hartung's interval, floored. A session's share = its share within the animal × the animal's share.
 * Shapes: `sessions` at least 1; variances > 0. Mutates nothing. Animals come in the order of their first session.
 * Throws EngineError for no sessions or bad values. Cost: animals + 1 (and one more an animal) random-effects means.
 * Source: two-stage individual-data meta-analysis, Burke, Ensor & Riley, Stat. Med. 2017 (from memory); parts as in
 * random-effects-mean.
 */
export function combineSessions(sessions: readonly SessionEstimate[], level = 0.95): CombinedSessions {
  if (sessions.length === 0) throw new EngineError('notEstimable', 'There is no session to combine');
  requireEstimates(
    sessions.map((session) => session.estimate),
    sessions.map((session) => session.variance),
  );
  const byAnimal = new Map<string, number[]>();
  sessions.forEach((session, s) => {
    const rows = byAnimal.get(session.animal);
    if (rows) rows.push(s);
    else byAnimal.set(session.animal, [s]);
  });
  const withinShares = new Float64Array(sessions.length).fill(1);
  const animals = Array.from(byAnimal, ([animal, rows]): AnimalEstimate => {
    const [first] = rows;
    if (rows.length === 1) {
      return {
        animal,
        nSessions: 1,
        estimate: sessions[first].estimate,
        variance: sessions[first].variance,
        within: null,
      };
    }
    const within = randomEffectsMean(
      rows.map((s) => sessions[s].estimate),
      rows.map((s) => sessions[s].variance),
      level,
    );
    rows.forEach((s, i) => (withinShares[s] = within.shares[i]));
    return {
      animal,
      nSessions: rows.length,
      estimate: within.mean,
      variance: within.standardError ** 2,
      within,
    };
  });
  const over = (chosen: readonly AnimalEstimate[]): RandomEffectsMean =>
    randomEffectsMean(
      chosen.map((one) => one.estimate),
      chosen.map((one) => one.variance),
      level,
    );
  const overall = animals.length < 2 ? null : over(animals);
  const position = new Map(animals.map((one, a) => [one.animal, a]));
  return {
    animals,
    overall,
    leaveOneAnimalOut:
      animals.length < 3
        ? []
        : animals.map((left) => ({
            animal: left.animal,
            overall: over(animals.filter((one) => one !== left)),
          })),
    sessionShares: withinShares.map(
      (share, s) => share * (overall?.shares[position.get(sessions[s].animal) ?? 0] ?? 1),
    ),
    statement: statementFor(animals),
  };
}

function statementFor(animals: readonly AnimalEstimate[]): string {
  const nSessions = animals.reduce((sum, one) => sum + one.nSessions, 0);
  if (animals.length > 1)
    return `${nSessions} sessions of ${animals.length} animals; the interval speaks for animals like these`;
  const sessions = nSessions === 1 ? 'One session' : `${nSessions} sessions`;
  return `${sessions} of one animal: nothing here speaks for other animals`;
}
