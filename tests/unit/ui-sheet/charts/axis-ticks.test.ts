import { describe, expect, it } from 'vitest';
import { axisTicks } from '@/components/charts/axis-ticks';

describe('axisTicks', () => {
  it('encloses the range with round steps and no rounding dust', () => {
    const ticks = axisTicks(-0.12, 0.61, 6);
    expect(ticks.values[0]).toBeLessThanOrEqual(-0.12);
    expect(ticks.values.at(-1)).toBeGreaterThanOrEqual(0.61);
    expect(ticks.values).toContain(0);
    expect(ticks.values.every((value) => String(value).length <= 4)).toBe(true);
    expect(ticks.decimals).toBe(1);
  });

  it('keeps inside the range when asked', () => {
    const ticks = axisTicks(0.03, 0.97, 5, true);
    expect(ticks.values[0]).toBeGreaterThanOrEqual(0.03);
    expect(ticks.values.at(-1)).toBeLessThanOrEqual(0.97);
  });

  it('opens a range without width', () => {
    const ticks = axisTicks(3, 3);
    expect(ticks.values[0]).toBeLessThan(3);
    expect(ticks.values.at(-1)).toBeGreaterThan(3);
  });

  it('names enough decimals for small steps', () => {
    expect(axisTicks(0, 0.012, 4).decimals).toBe(3);
  });
});
