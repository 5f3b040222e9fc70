import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { makeBenchInput } from '@/scripts/bench/make-bench-input';
import { benchSizes } from '@/scripts/bench/sizes';

/* Writes one size's data as raw arrays for the Python halves. usage: write-data SIZE FOLDER [window of W, default 0] */
const size = benchSizes.find(({ name }) => name === process.argv[2]);
if (size === undefined) throw new Error(`there is no size ${process.argv[2]}`);
const folder = process.argv[3];
const window = Number(process.argv[4] ?? 0);
mkdirSync(folder, { recursive: true });
const input = makeBenchInput(size, size.windows);
const { n, p, windows, draws, sample, batchedDraws } = size;
const x = new Float64Array(n * p);
for (let i = 0; i < n * p; i++) x[i] = input.counts[i * windows + window] * 10; // spikes/s in bins of 100 ms
const put = (name: string, array: Float64Array | Int32Array): void =>
  writeFileSync(join(folder, name), new Uint8Array(array.buffer, array.byteOffset, array.byteLength));
put('x.f64', x);
put('y.f64', input.y);
if (input.folds.kind !== 'given' || input.nullScheme.kind !== 'given')
  throw new Error('given folds are wanted');
put('fold.i32', input.folds.assignment[0]);
const perms = new Int32Array(draws * n);
input.nullScheme.permutations.forEach((row, b) => perms.set(row, b * n));
put('perms.i32', perms);
writeFileSync(join(folder, 'shape.json'), JSON.stringify({ n, p, B: draws, sample, batchedDraws }));
