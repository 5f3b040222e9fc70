import { describe, expect, it } from 'vitest';
import { buildVerdict } from '@/lib/reports/verdict/build-verdict';
import type { VerdictControl, VerdictFacts } from '@/lib/reports/verdict/verdict-facts';

const shuffled = {
  scheme: 'within block',
  draws: 1000,
  p: 1 / 1001,
  smallestP: 1 / 1001,
  q025: -0.03,
  q95: 0.008,
  q975: 0.01,
  max: 0.02,
};
const facts: VerdictFacts = {
  animal: 'Sorrel',
  areas: ['MT', 'MST'],
  label: 'shared-motion fraction',
  window: { startMs: 80, endMs: 480 },
  nTrials: 628,
  nFeatures: 130,
  estimatorWords: 'ridge',
  r2: 0.45,
  interval: { low: 0.4, high: 0.5, level: 0.95, method: 'nested cross-validation' },
  null: shuffled,
  controls: [],
  smallestEffect: null,
  labelTrends: false,
};
const plain = (text: string): string => text.replaceAll('\u00a0', ' ');
const control = (over: Partial<VerdictControl>): VerdictControl => ({
  kind: 'totalRate',
  subjects: ['total rate'],
  outcome: 'survives',
  r2: 0,
  interval: null,
  ...over,
});

describe('buildVerdict', () => {
  it('says that the units carry the label, with the numbers in the sentence', () => {
    const verdict = buildVerdict(facts);
    expect(verdict.kind).toBe('carries');
    expect(plain(verdict.sentence)).toBe(
      'Sorrel’s MT and MST units carry the shared-motion fraction from 80 to 480 ms: held-out R² is 0.45 [0.40, 0.50], where 1 000 shuffles within block reached at most 0.02 (p = 0.001, the smallest that they allow).',
    );
  });

  it('adds what the controls say, and the one that failed before all others', () => {
    expect(
      plain(buildVerdict({ ...facts, controls: [control({}), control({ outcome: 'cannotTell' })] }).sentence),
    ).toContain('and none of 2 controls explains it, though 1 cannot tell.');
    const failed = buildVerdict({
      ...facts,
      controls: [control({ kind: 'generalise', subjects: ['low contrast'], outcome: 'fails' })],
    });
    expect(failed.kind).toBe('carries');
    expect(failed.strong).toContain('does not survive low contrast');
  });

  it('is explained where a nuisance control fails', () => {
    const verdict = buildVerdict({
      ...facts,
      controls: [
        control({
          kind: 'nuisanceOnly',
          subjects: ['speed'],
          outcome: 'fails',
          r2: 0.36,
          interval: { low: 0.29, high: 0.43, level: 0.95, method: '' },
        }),
        control({ kind: 'incremental', subjects: ['speed'], outcome: 'fails', r2: 0.01 }),
      ],
    });
    expect(verdict.kind).toBe('explained');
    expect(plain(verdict.sentence)).toContain(
      'but speed explains it: nuisance variables alone reach 0.36 [0.29, 0.43] and the units add 0.01.',
    );
  });

  it('names several nuisances in one list, and what an adjusted readout leaves', () => {
    const verdict = buildVerdict({
      ...facts,
      controls: [
        control({ kind: 'adjusted', subjects: ['speed', 'pupil', 'contrast'], outcome: 'fails', r2: 0.02 }),
      ],
    });
    expect(plain(verdict.sentence)).toContain(
      'but speed, pupil and contrast explain it: R² 0.02 is left once that is taken out.',
    );
  });

  it('calls a readout whose interval ends below zero worse than the mean, whatever its p', () => {
    const verdict = buildVerdict({
      ...facts,
      r2: -0.05,
      interval: { low: -0.1, high: -0.01, level: 0.95, method: '' },
    });
    expect(verdict.kind).toBe('worse');
    expect(plain(verdict.sentence)).toContain('held-out R² is −0.05 [−0.10, −0.01]');
  });

  it('cannot tell where p is large, where the interval takes in 0, where nothing was shuffled, and where the label trends', () => {
    const around = { low: -0.02, high: 0.11, level: 0.95, method: '' };
    const weak = { ...facts, r2: 0.04, interval: around };
    expect(buildVerdict({ ...weak, null: { ...shuffled, p: 0.31 } }).kind).toBe('cannotTell');
    expect(plain(buildVerdict({ ...weak, null: { ...shuffled, p: 0.02 } }).sentence)).toContain(
      'but the interval takes in 0.',
    );
    expect(buildVerdict({ ...facts, null: null }).sentence).toContain('no shuffled control was run');
    expect(buildVerdict({ ...facts, labelTrends: true }).kind).toBe('cannotTell');
    expect(buildVerdict({ ...facts, r2: null, interval: null }).sentence).toContain('cannot be worked out');
  });

  it('says "do not carry" only against the smallest effect that a plan named', () => {
    const none = {
      ...facts,
      r2: 0.01,
      interval: { low: -0.02, high: 0.04, level: 0.95, method: '' },
      null: { ...shuffled, p: 0.31 },
    };
    expect(buildVerdict(none).kind).toBe('cannotTell');
    expect(buildVerdict({ ...none, smallestEffect: 0.05 }).kind).toBe('doesNot');
    expect(buildVerdict({ ...none, smallestEffect: 0.03 }).kind).toBe('cannotTell');
  });

  it('writes bold words that stand in the sentence, and never claims use', () => {
    for (const p of [0.001, 0.4])
      for (const high of [-0.1, 0.2]) {
        const verdict = buildVerdict({
          ...facts,
          null: { ...shuffled, p },
          interval: { low: -0.3, high, level: 0.95, method: '' },
        });
        for (const strong of verdict.strong) expect(verdict.sentence).toContain(strong);
        expect(verdict.sentence).not.toMatch(/significant|encode|uses|drives|success/);
      }
  });
});
