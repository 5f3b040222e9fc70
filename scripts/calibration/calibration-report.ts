import {
  cells,
  type CoverageCell,
  type GroupCell,
  type InjectionCell,
  type LabelCell,
  type NullCell,
  nullSchemes,
} from '@/scripts/calibration/cells';
import type { Results } from '@/scripts/calibration/results';
import type { Tally } from '@/scripts/calibration/tally';

const rate = (part: number, whole: number): string => (part / whole).toFixed(3).replace(/^0/, '');
const plain = (value: number, digits = 3): string => value.toFixed(digits);
const row = (values: (string | number)[]): string => `| ${values.join(' | ')} |`;
const table = (head: string[], rows: (string | number)[][]): string =>
  [row(head), row(head.map(() => '---')), ...rows.map(row)].join('\n');

/** Markdown report of everything that was run, with the number of sessions behind each number. */
export function calibrationReport(results: Results): string {
  const tallyOf = (id: string): Tally | null => results.cells[id]?.tally ?? null;
  const sessions = Object.values(results.cells).map(({ tally }) => tally.sessions ?? 0);
  const fewest = cells.some(({ id }) => !results.cells[id]) ? 0 : Math.min(...sessions);
  return `# Calibration

Written by \`npm run test:calibration\` from simulated sessions run through engine ${results.engineVersion}. Seeds count from 0; every cell
is meant to have 4,000 sessions. **Run so far: ${fewest} to ${Math.max(0, ...sessions)} sessions a cell** (n in the tables). A rate of .05 over n sessions has a
standard error of √(.05·.95/n): .0034 at 4,000, .011 at 400, .031 at 50: with fewer than about 400 sessions only large failures show.
Running the command again goes on where it stopped.

## False positives of the shuffled control at .05

Null sessions: 120 trials in 12 blocks of 10, 20 Poisson units with a shared gain, ridge with its penalty chosen by closed-form
leave-one-out in every one of 99 draws, 5 folds. "Drift" is a random walk of each unit's rate. "within" shuffles within blocks,
"groups" exchanges whole blocks. Where the rate lies within three standard errors of .05 it is **bold**; a dash means that the scheme has
only one arrangement of such labels.

${nullTable(tallyOf)}

What follows for the choice of a scheme:

- Independent labels: a free shuffle holds, whatever the units do.
- Units that do not drift at all: every scheme holds. No one can be sure of that from a recording, so the advice goes by the label alone.
- Labels biased or constant by block: with drifting units a free shuffle does not hold. Shuffle within blocks where labels vary in them,
  exchange whole blocks where they don't.
- Autocorrelated labels: with drifting units a free shuffle does not hold. Here shuffles within blocks did, for blocks of ten trials and a
  label memory of about ten; exchanging blocks did not. Circular shifts need stationary units.
- A trend over the session: free shuffles, block exchange and circular shifts fail with drifting units. Shuffles within blocks keep the
  trend's own rise and may hold where it is slow against the blocks, but nothing in one session tells whether it is. The product says
  "cannot tell".
- Contiguous folds do not replace any of this.

## Coverage of the 95 % intervals of held-out R²

Sessions with signal: independent labels of five levels, tuned Poisson units with a shared gain; populations differ from session to session.
The truth is the R² that the fitted readouts of that very session would reach on new trials like its own, worked out exactly from their
weights and the moments of the counts. "Nested" is the nested-cross-validation interval, "test-trial" BCa with the readouts held fixed.

${coverageTable(tallyOf)}

The nested interval is the one to report. The test-trial interval leaves out how readouts change with their training trials and covers too
little wherever that matters. For contiguous folds and drifting units the numbers above are what was measured, not a promise.

## Shared-motion fraction from the stimulus

Ornstein–Uhlenbeck motion of 5 locations on 2 axes, frames of 25 ms, time constant 0.1 s, one trial a seed. "Drift" is a constant
velocity that all locations share, with the standard deviation of the motion itself. Interval: 95 %, one trial.

${labelTable(tallyOf)}

## The mean over animals

Five sessions an animal, sessions of an animal differ by .03, each measured with an error of .05; true mean .2. "Two-stage" is the
product's interval (Knapp–Hartung, floored), beside it the unfloored; "flat" treats sessions as if each came from its own animal.

${groupTable(tallyOf)}

## Signal injection

Null sessions as above (independent labels, steady units, stratified folds, free shuffle). "Stated" is the power that the injection control
works out from one session, averaged over sessions; "fresh" the share of new sessions of the same units, with a signal of the same size
put in, in which the readout's p is at most .05.

${injectionTable(tallyOf)}
`;
}

type Lookup = (id: string) => Tally | null;

function nullTable(tallyOf: Lookup): string {
  const nulls = cells.filter((cell): cell is NullCell => cell.kind === 'null');
  return table(
    ['label', 'units', 'folds', 'n', ...nullSchemes],
    nulls.map((cell) => {
      const tally = tallyOf(cell.id) ?? {};
      const rates = nullSchemes.map((scheme) => {
        const n = tally[`${scheme} tests`] ?? 0;
        if (n === 0) return '–';
        const found = (tally[`${scheme} positives`] ?? 0) / n;
        const text = rate(found, 1);
        return Math.abs(found - 0.05) <= 3 * Math.sqrt((0.05 * 0.95) / n) ? `**${text}**` : text;
      });
      return [cell.design, cell.hasDrift ? 'drift' : 'steady', cell.folds, tally.sessions ?? 0, ...rates];
    }),
  );
}

function coverageTable(tallyOf: Lookup): string {
  const list = cells.filter((cell): cell is CoverageCell => cell.kind === 'coverage');
  return table(
    ['trials', 'units', 'folds', 'units are', 'n', 'mean R²', 'nested', 'width', 'test-trial', 'width'],
    list.map((cell) => {
      const folds = `${cell.k} ${cell.folds}${cell.repeats > 1 ? `, ${cell.repeats} repeats` : ''}`;
      const head = [cell.nTrials, cell.nUnits, folds, cell.hasDrift ? 'drifting' : 'steady'];
      const tally = tallyOf(cell.id);
      if (tally === null) return [...head, 0, '', '', '', '', ''];
      const { sessions } = tally;
      const of = (name: string): string[] => [
        rate(tally[`${name} covered`] ?? 0, tally[`${name} intervals`] ?? 1),
        plain((tally[`${name} width`] ?? 0) / (tally[`${name} intervals`] ?? 1)),
      ];
      return [...head, sessions, plain(tally.truth / sessions, 2), ...of('nested'), ...of('bca')];
    }),
  );
}

function labelTable(tallyOf: Lookup): string {
  const list = cells.filter((cell): cell is LabelCell => cell.kind === 'label');
  return table(
    ['centring', 'frames', 'common drift', 'true', 'n', 'mean of trials', 'pooled', 'coverage'],
    list.map((cell) => {
      const head = [cell.centring, cell.nFrames, cell.driftSd > 0 ? 'yes' : 'no', cell.fraction];
      const tally = tallyOf(cell.id);
      if (tally === null) return [...head, 0, '', '', ''];
      const { sessions } = tally;
      const coverage = rate(tally.covered ?? 0, tally.intervals ?? 1);
      return [...head, sessions, plain(tally.fraction / sessions), plain(tally.shared / tally.all), coverage];
    }),
  );
}

function groupTable(tallyOf: Lookup): string {
  const list = cells.filter((cell): cell is GroupCell => cell.kind === 'group');
  return table(
    ['animals', 'animals differ by', 'n', 'two-stage', 'unfloored', 'flat'],
    list.map((cell) => {
      const tally = tallyOf(cell.id);
      if (tally === null) return [cell.nAnimals, cell.animalSd, 0, '', '', ''];
      const of = (name: string): string => rate(tally[`${name} covered`] ?? 0, tally.sessions);
      return [cell.nAnimals, cell.animalSd, tally.sessions, of('floored'), of('unfloored'), of('flat')];
    }),
  );
}

function injectionTable(tallyOf: Lookup): string {
  const [cell] = cells.filter((one): one is InjectionCell => one.kind === 'injection');
  const tally = tallyOf(cell.id);
  return table(
    ['population R²', 'n', 'stated power', 'fresh sessions found'],
    cell.sizes.map((size) => {
      if (tally === null) return [size, 0, '', ''];
      const fresh = rate(tally[`${size} found`] ?? 0, tally.sessions);
      return [size, tally.sessions, rate(tally[`${size} stated`] ?? 0, tally.sessions), fresh];
    }),
  );
}
