import { readFileSync } from 'node:fs';
import { deflateRawSync } from 'node:zlib';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { expect, it } from 'vitest';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { memorySource } from '@/lib/intake/memory-source';
import { openFile } from '@/lib/intake/readers/open-file';
import { makeNpy } from '@/tests/unit/intake/make-npy';
import { makeZip } from '@/tests/unit/intake/make-zip';

const seed = 20_261_201;
const budgetMs = 4000;
const fixture = (path: string): Uint8Array =>
  new Uint8Array(readFileSync(new URL(`../../fixtures/${path}`, import.meta.url)));

/** Reads everything there is to read; gives the code of the refusal or null. Any other error is a fault of ours. */
async function readAll(bytes: Uint8Array): Promise<string | null> {
  try {
    const file = await openFile(memorySource(bytes));
    try {
      for (const array of file.arrays) {
        let n = 0;
        for await (const chunk of array.chunks()) n += chunk.length;
        expect(n).toBe(array.shape.reduce((product, length) => product * length, 1));
      }
    } finally {
      file.close();
    }
    return null;
  } catch (error) {
    if (error instanceof IntakeRefusal) return error.code;
    throw error;
  }
}

it('mutated files are read or refused, and never break a reader', { timeout: 30_000 }, async () => {
  const originals: Uint8Array[] = [
    makeNpy(),
    makeNpy({ version: [2, 0], descr: "'>f8'", shape: '(3,)' }),
    makeZip([
      { name: 'counts.npy', data: makeNpy() },
      { name: 'speed.npy', data: makeNpy({ descr: "'<f8'", shape: '(3,)' }), method: 0 },
    ]),
    makeZip([{ name: 'x.npy', data: makeNpy(), packed: deflateRawSync(makeNpy(), { level: 0 }) }]),
    fixture('files/npz_deflate.npz'),
    fixture('files/csv_trials.csv'),
    new TextEncoder().encode('trial,u0_b0,u0_b1\n0,1,2\n1,"3",4\n'),
  ];
  const generator = xoroshiro128plus(seed);
  const below = (n: number): number => Math.floor(((generator.next() >>> 0) / 2 ** 32) * n);
  const codes = new Set<string>();
  const endAt = Date.now() + budgetMs;
  let tried = 0;
  for (; Date.now() < endAt; tried++) {
    const original = originals[tried % originals.length];
    let bytes = Uint8Array.from(original);
    for (let times = 1 + below(4); times > 0; times--) {
      const at = below(bytes.length);
      switch (below(5)) {
        case 0:
          bytes[at] ^= 1 << below(8);
          break;
        case 1:
          bytes[at] = below(256);
          break;
        case 2:
          bytes = bytes.slice(0, Math.max(1, at));
          break;
        case 3:
          bytes = Uint8Array.from([...bytes.slice(0, at), ...bytes.slice(at + 1 + below(8))]);
          break;
        default:
          bytes.fill([0, 0xff, 0x22, 0x2c][below(4)], at, at + 1 + below(8));
      }
      if (bytes.length === 0) bytes = Uint8Array.from([0]);
    }
    const code = await readAll(bytes).catch((error: unknown) => {
      throw new Error(`mutation ${tried} of seed ${seed} broke the reader`, { cause: error });
    });
    if (code !== null) codes.add(code);
  }
  expect(tried).toBeGreaterThan(100);
  expect(codes.size).toBeGreaterThan(8);
});
