import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { canonicalJson } from '@/lib/audit/canonical-json';

describe('canonicalJson', () => {
  // RFC 8785, section 3.2.3: the example of property sorting by UTF-16 code units.
  it('sorts keys as RFC 8785 does', () => {
    const sorted = canonicalJson({
      '\u20ac': 'Euro Sign',
      '\r': 'Carriage Return',
      '\ufb33': 'Hebrew Letter Dalet With Dagesh',
      '1': 'One',
      '\ud83d\ude00': 'Emoji: Grinning Face',
      '\u0080': 'Control',
      '\u00f6': 'Latin Small Letter O With Diaeresis',
    });
    expect(Object.values(JSON.parse(sorted) as Record<string, string>)).toHaveLength(7);
    const order = [...sorted.matchAll(/:"([^"]+)"/g)].map(([, value]) => value);
    expect(order).toEqual([
      'Carriage Return',
      'One',
      'Control',
      'Latin Small Letter O With Diaeresis',
      'Euro Sign',
      'Emoji: Grinning Face',
      'Hebrew Letter Dalet With Dagesh',
    ]);
  });

  // RFC 8785, section 3.2.2.3 (numbers as ECMAScript writes them).
  it('writes numbers and nesting in one way', () => {
    expect(
      canonicalJson({ b: [333333333.33333329, 1e30, 4.5, 2e-3, 1e-27], a: { d: null, c: undefined } }),
    ).toBe('{"a":{"d":null},"b":[333333333.3333333,1e+30,4.5,0.002,1e-27]}');
  });

  it('is the same for the same facts in another order, so that hashes agree', () => {
    const hash = (value: unknown) => createHash('sha256').update(canonicalJson(value)).digest('hex');
    expect(hash({ a: 1, b: { c: 2, d: 3 } })).toBe(hash({ b: { d: 3, c: 2 }, a: 1 }));
    expect(hash({ a: 1 })).not.toBe(hash({ a: '1' }));
  });

  it('refuses what JSON cannot hold', () => {
    for (const value of [NaN, Infinity, () => 1, Symbol('s'), 1n])
      expect(() => canonicalJson({ value })).toThrow(TypeError);
  });
});
