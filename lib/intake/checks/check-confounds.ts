import type { Problem } from '@/lib/contracts/problem';
import { correlation } from '@/lib/intake/checks/correlation';
import { summarise } from '@/lib/intake/checks/summarise-counts';
import type { SessionData } from '@/lib/intake/session-data';

const SAME = 0.999_999;
const STRONG = 0.5;
const NOTABLE = 0.2;

/**
 * What else runs with a label: trial order, total count, other columns (circular ones by cosine and sine), or a unit that
 * is the label itself. Strong company (|r| ≥ 0.5) warns, notable company is noted; both bounds are common practice without
 * a source, and the readout's own controls judge what matters.
 */
export function checkConfounds(data: SessionData): Problem[] {
  const labels = new Set(data.labels.map((label) => label.column));
  // The interval of a label that was worked out here runs with it by construction.
  const intervals = new Set(
    data.labels.flatMap(({ column, made }) => (made ? [`${column}_low`, `${column}_high`] : [])),
  );
  const { trialTotals } = summarise(data);
  const order = Float64Array.from({ length: data.nTrials }, (_, trial) => trial);
  const company: { name: string; path?: string; parts: Float64Array[] }[] = [
    { name: 'trial order', parts: [order] },
    { name: 'the trial’s total count', parts: [trialTotals] },
  ];
  for (const column of data.trials) {
    if (column.type === 'category' || labels.has(column.name) || intervals.has(column.name)) continue;
    const turn = (2 * Math.PI) / (column.type === 'circular' ? (column.periodDeg ?? 360) : 360);
    company.push({
      name: `“${column.name}”`,
      path: column.name,
      parts:
        column.type === 'circular'
          ? [
              column.values.map((value) => Math.cos(value * turn)),
              column.values.map((value) => Math.sin(value * turn)),
            ]
          : [column.values],
    });
  }
  const problems: Problem[] = [];
  for (const label of labels) {
    const column = data.trials.find((one) => one.name === label);
    if (column === undefined || column.type === 'category') continue;
    for (const other of company) {
      const best = other.parts
        .map((part) => correlation(column.values, part))
        .reduce((a, b) => (Math.abs(b.r) > Math.abs(a.r) || Number.isNaN(a.r) ? b : a));
      const problem = judge(label, other.name, best.r, best.n);
      if (problem) problems.push({ ...problem, place: { path: other.path ?? label } });
    }
    problems.push(...unitsThatAreTheLabel(data, label, column.values));
  }
  return problems;
}

function judge(label: string, other: string, r: number, n: number): Omit<Problem, 'place'> | null {
  const size = Math.abs(r);
  // Below about 2.6 standard errors of r = 0 the sample itself explains it.
  if (!(size >= NOTABLE) || size < 2.6 / Math.sqrt(n)) return null;
  const said = `r = ${r.toFixed(2)}`;
  if (size >= SAME)
    return {
      code: 'column-is-label',
      severity: 'warns',
      message: `${other.charAt(0).toUpperCase()}${other.slice(1)} is the label “${label}” itself, up to scale (r = ${r.toFixed(6)}).`,
      remedy: 'Never use it as a nuisance variable; leave it out if it is a copy.',
    };
  return {
    code: 'label-confounded',
    severity: size >= STRONG ? 'warns' : 'notes',
    message: `The label “${label}” runs with ${other}: ${said} over ${n} trials.`,
    remedy: 'Run the readout with this as a nuisance variable, or within its levels, before believing it.',
  };
}

function unitsThatAreTheLabel(data: SessionData, label: string, values: Float64Array): Problem[] {
  const { counts, nTrials, nUnits, nBins } = data;
  const totals = new Float64Array(nTrials);
  for (let unit = 0; unit < nUnits; unit++) {
    for (let trial = 0; trial < nTrials; trial++) {
      const from = (trial * nUnits + unit) * nBins;
      let total = 0;
      for (let bin = 0; bin < nBins; bin++) total += counts[from + bin];
      totals[trial] = total;
    }
    if (Math.abs(correlation(totals, values).r) >= 0.999)
      return [
        {
          code: 'unit-is-label',
          severity: 'warns',
          message: `A unit’s count follows the label “${label}” exactly, which no neuron does.`,
          remedy: 'Check that no stimulus channel was exported among the units; leave it out if one was.',
          place: { unit, path: label },
        },
      ];
  }
  return [];
}
