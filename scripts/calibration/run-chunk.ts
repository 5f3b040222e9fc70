import { combineSessions, type SessionEstimate } from '@/lib/engine/group/combine-sessions';
import { randomEffectsMean } from '@/lib/engine/group/random-effects-mean';
import { realisedFraction } from '@/lib/engine/label/realised-fraction';
import type { Linalg } from '@/lib/engine/linalg/port';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import {
  type Cell,
  type CoverageCell,
  type GroupCell,
  type LabelCell,
  type NullCell,
  nullSchemes,
} from '@/scripts/calibration/cells';
import { addInjection } from '@/scripts/calibration/add-injection';
import { nullSession } from '@/scripts/calibration/null-session';
import { runNullSession } from '@/scripts/calibration/run-null-session';
import { runSignalSession } from '@/scripts/calibration/run-signal-session';
import { ouMotion } from '@/scripts/calibration/ou-motion';
import type { Add, Tally } from '@/scripts/calibration/tally';

/** Seeds a chunk: the unit of work and of what is kept. */
export const CHUNK_SEEDS = 50;

/** Runs seeds chunk·50 … chunk·50 + 49 of a cell. The same chunk always gives the same tally. */
export function runCalibrationChunk(cell: Cell, chunk: number, linalg: Linalg): Tally {
  const tally: Tally = {};
  const add: Add = (name, amount) => {
    tally[name] = (tally[name] ?? 0) + amount;
  };
  for (let seed = chunk * CHUNK_SEEDS; seed < (chunk + 1) * CHUNK_SEEDS; seed += 1) {
    add('sessions', 1);
    switch (cell.kind) {
      case 'null':
        addNull(cell, seed, linalg, add);
        break;
      case 'coverage':
        addCoverage(cell, seed, linalg, add);
        break;
      case 'label':
        addLabel(cell, seed, add);
        break;
      case 'injection':
        addInjection(cell, seed, linalg, add);
        break;
      case 'group':
        addGroup(cell, seed, add);
        break;
    }
  }
  return tally;
}

function addNull(cell: NullCell, seed: number, linalg: Linalg, add: Add): void {
  const session = nullSession(cell.design, cell.hasDrift, seed);
  for (const scheme of nullSchemes) {
    const found = runNullSession(session, scheme, cell.folds, seed, linalg);
    if (found === null || found.p === null) continue;
    add(`${scheme} tests`, 1);
    add(`${scheme} positives`, found.p <= 0.05 ? 1 : 0);
  }
}

function addCoverage(cell: CoverageCell, seed: number, linalg: Linalg, add: Add): void {
  const { heldOut, truth } = runSignalSession(cell, seed, linalg);
  add('truth', truth);
  add('r2', heldOut.r2 ?? 0);
  for (const [name, interval] of [
    ['nested', heldOut.r2Interval],
    ['bca', heldOut.testTrialInterval],
  ] as const) {
    if (interval === null) continue;
    add(`${name} intervals`, 1);
    add(`${name} covered`, interval.low <= truth && truth <= interval.high ? 1 : 0);
    add(`${name} width`, interval.high - interval.low);
  }
}

function addLabel(cell: LabelCell, seed: number, add: Add): void {
  const { centring, fraction, nFrames, driftSd } = cell;
  const shape = { nLocations: 5, nAxes: 2, nFrames };
  const random = randomSource(splitGenerator(seed, 'calibration label', Math.round(10 * fraction), nFrames));
  const velocity = ouMotion(random, { ...shape, fraction, frameS: 0.025, tauS: 0.1, driftSd });
  const found = realisedFraction(velocity, shape, { centring });
  if (found === null) return;
  add('fraction', found.fraction);
  add('shared', found.sharedVariance);
  add('all', found.sharedVariance + found.ownVariance);
  if (found.interval === null) return;
  add('intervals', 1);
  add('covered', found.interval.low <= fraction && fraction <= found.interval.high ? 1 : 0);
}

/** True mean .2; animals differ by `animalSd`, an animal's sessions by .03, and each is measured with a known error of .05. */
function addGroup(cell: GroupCell, seed: number, add: Add): void {
  const random = randomSource(splitGenerator(seed, 'calibration group', cell.nAnimals));
  const sessions: SessionEstimate[] = [];
  for (let a = 0; a < cell.nAnimals; a += 1) {
    const own = 0.2 + cell.animalSd * random.normal();
    for (let s = 0; s < cell.nSessions; s += 1) {
      const estimate = own + 0.03 * random.normal() + 0.05 * random.normal();
      sessions.push({ animal: `animal ${a}`, estimate, variance: 0.0025 });
    }
  }
  const { overall } = combineSessions(sessions);
  const flat = randomEffectsMean(
    sessions.map((session) => session.estimate),
    sessions.map((session) => session.variance),
  );
  for (const [name, interval] of [
    ['floored', overall?.interval],
    ['unfloored', overall?.intervalUnfloored],
    ['flat', flat.interval],
  ] as const) {
    if (interval) add(`${name} covered`, interval.low <= 0.2 && 0.2 <= interval.high ? 1 : 0);
  }
}
