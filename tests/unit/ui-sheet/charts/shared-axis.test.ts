import { describe, expect, it } from 'vitest';
import { sharedAxis } from '@/components/charts/shared-axis';

describe('sharedAxis', () => {
  it('holds zero and every interval', () => {
    const axis = sharedAxis([{ value: 0.71, interval: { low: 0.66, high: 0.76 } }]);
    expect(axis.low).toBeLessThanOrEqual(-0.2);
    expect(axis.high).toBeGreaterThanOrEqual(0.76);
    expect(axis.ticks).toContain(0);
  });

  it('does not follow a disastrous attempt below -0.6', () => {
    expect(sharedAxis([{ value: -12, interval: { low: -20, high: -6 } }]).low).toBe(-0.6);
  });
});
