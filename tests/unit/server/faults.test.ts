import { describe, expect, it } from 'vitest';
import { intakeSchema } from '@/lib/contracts/intake';
import { recipeInputSchema } from '@/lib/contracts/recipe';
import { createExclusionSchema } from '@/lib/contracts/session';
import { faultsOf } from '@/lib/http/faults-of';

const pointers = (
  schema: { safeParse(value: unknown): { error?: Parameters<typeof faultsOf>[0] } },
  value: unknown,
) => faultsOf(schema.safeParse(value).error!).map(({ pointer }) => pointer);

describe('faultsOf', () => {
  it('points into the nearest alternative of a union', () => {
    expect(
      pointers(recipeInputSchema, {
        label: 'shared',
        estimator: { kind: 'ridge', penalty: { choose: 'byEye' } },
        trials: { where: [{ column: 'speed', op: '~', value: 3 }] },
      }).sort(),
    ).toEqual(['/estimator/penalty/choose', '/trials/where/0/op']);
    expect(
      pointers(intakeSchema, {
        counts: {
          fileId: '0190a1b2-0000-7000-8000-000000000001',
          path: 'counts',
          axes: ['trial', 'cell', 'bin'],
        },
        binWidthMs: 0,
        windowStartMs: 0,
        trials: { fileId: 'x' },
        labels: [],
      }).sort(),
    ).toEqual(['/binWidthMs', '/counts/axes/1', '/labels', '/trials/fileId']);
  });

  it('points at the whole where the fault is one of the whole', () => {
    expect(pointers(createExclusionSchema, { reason: 'noise' })).toEqual(['']);
    expect(pointers(createExclusionSchema, { trials: [1], units: [1], reason: 'noise' })).toEqual(['']);
  });
});
