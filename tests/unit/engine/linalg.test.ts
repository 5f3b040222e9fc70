import { describe, expect, it } from 'vitest';
import type { Linalg } from '@/lib/engine/linalg/port';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { openNativeLinalg } from '@/lib/native/open-linalg';

const native = openNativeLinalg();
const backends: [string, Linalg | null][] = [
  ['portable', portableLinalg],
  ['native', native],
];

function normals(count: number, stream: number): Float64Array {
  const generator = splitGenerator(7, 'test', stream);
  return Float64Array.from({ length: count }, () => randomNormal(generator));
}
const largestGap = (a: ArrayLike<number>, b: ArrayLike<number>): number => {
  expect(a.length).toBe(b.length);
  let gap = 0;
  for (let i = 0; i < a.length; i++) gap = Math.max(gap, Math.abs(a[i] - b[i]));
  return gap;
};

describe.each(backends)('%s linear algebra', (name, maybe) => {
  if (maybe === null) {
    it.skip(`${name}: libopenblas is not installed on this machine`, () => undefined);
    return;
  }
  const la = maybe;

  it('multiplies in all four transpositions as the definition says', () => {
    const [m, n, k] = [5, 7, 6];
    const a = normals(m * k, 1);
    const b = normals(k * n, 2);
    const at = new Float64Array(m * k);
    const bt = new Float64Array(k * n);
    for (let i = 0; i < m; i++) for (let l = 0; l < k; l++) at[l * m + i] = a[i * k + l];
    for (let l = 0; l < k; l++) for (let j = 0; j < n; j++) bt[j * k + l] = b[l * n + j];
    const c0 = normals(m * n, 3);
    const wanted = c0.map((c, at0) => {
      const i = Math.floor(at0 / n);
      const j = at0 % n;
      let sum = 0;
      for (let l = 0; l < k; l++) sum += a[i * k + l] * b[l * n + j];
      return 1.5 * sum - 0.5 * c;
    });
    for (const ta of ['none', 'transpose'] as const) {
      for (const tb of ['none', 'transpose'] as const) {
        const c = c0.slice();
        la.gemm(
          ta,
          tb,
          m,
          n,
          k,
          1.5,
          ta === 'none' ? a : at,
          ta === 'none' ? k : m,
          tb === 'none' ? b : bt,
          tb === 'none' ? n : k,
          -0.5,
          c,
          n,
        );
        expect(largestGap(c, wanted)).toBeLessThan(1e-14);
        const c32 = Float32Array.from(c0);
        la.gemm32(
          ta,
          tb,
          m,
          n,
          k,
          1.5,
          Float32Array.from(ta === 'none' ? a : at),
          ta === 'none' ? k : m,
          Float32Array.from(tb === 'none' ? b : bt),
          tb === 'none' ? n : k,
          -0.5,
          c32,
          n,
        );
        expect(largestGap(c32, wanted)).toBeLessThan(1e-5);
      }
    }
  });

  it('decomposes symmetric matrices: VᵀΛV = A, orthonormal rows, ascending values', () => {
    const n = 12;
    const x = normals(20 * n, 4);
    const g = la.gram('columns', 20, n, x);
    const { values, vectors } = la.symmetricEigen(n, g.slice());
    const back = new Float64Array(n * n);
    const scaled = vectors.map((v, at) => v * values[Math.floor(at / n)]);
    la.gemm('transpose', 'none', n, n, n, 1, vectors, n, scaled, n, 0, back, n);
    expect(largestGap(back, g)).toBeLessThan(1e-12);
    for (let j = 1; j < n; j++) expect(values[j]).toBeGreaterThanOrEqual(values[j - 1]);
  });

  it.each([
    [9, 4],
    [4, 9],
    [6, 6],
    [30, 1],
  ])('decomposes a %i × %i matrix into U·S·Vᵀ', (m, n) => {
    const a = normals(m * n, 5);
    const k = Math.min(m, n);
    const { u, s, vt } = la.thinSvd(m, n, a.slice());
    const scaled = vt.map((v, at) => v * s[Math.floor(at / n)]);
    const back = new Float64Array(m * n);
    la.gemm('none', 'none', m, n, k, 1, u, k, scaled, n, 0, back, n);
    expect(largestGap(back, a)).toBeLessThan(1e-13);
    for (let j = 1; j < k; j++) expect(s[j]).toBeLessThanOrEqual(s[j - 1]);
  });

  it('adds a Gram matrix to one that is given, and solves small problems after large ones', () => {
    const x = normals(30 * 8, 8);
    const halves = la.gram('columns', 15, 8, x.subarray(0, 120));
    expect(la.gram('columns', 15, 8, x.subarray(120), halves)).toBe(halves);
    const whole = la.gram('columns', 30, 8, x);
    expect(largestGap(halves, whole)).toBeLessThan(1e-13);
    const before = la.symmetricEigen(3, Float64Array.of(2, 0, 0, 0, 3, 0, 0, 0, 5)).values;
    la.symmetricEigen(8, whole);
    expect(la.symmetricEigen(3, Float64Array.of(2, 0, 0, 0, 3, 0, 0, 0, 5)).values).toEqual(before);
    expect(Array.from(before)).toEqual([2, 3, 5]);
  });

  it('refuses arrays that are too short instead of reading past them', () => {
    const short = new Float64Array(3);
    expect(() => la.gemm('none', 'none', 2, 2, 2, 1, short, 2, short, 2, 0, new Float64Array(4), 2)).toThrow(
      RangeError,
    );
    expect(() => la.symmetricEigen(2, short)).toThrow(RangeError);
    expect(() => la.thinSvd(2, 2, short)).toThrow(RangeError);
  });
});

describe('native and portable', () => {
  it.skipIf(native === null)('give the same eigenvalues and singular values to 1e-11', () => {
    const la = native as Linalg;
    const x = normals(40 * 25, 6);
    const g = la.gram('columns', 40, 25, x);
    const gap = largestGap(
      la.symmetricEigen(25, g.slice()).values,
      portableLinalg.symmetricEigen(25, g.slice()).values,
    );
    expect(gap).toBeLessThan(1e-11);
    expect(
      largestGap(la.thinSvd(40, 25, x.slice()).s, portableLinalg.thinSvd(40, 25, x.slice()).s),
    ).toBeLessThan(1e-12);
  });
});
