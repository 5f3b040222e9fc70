/*
 * The speed table: the engine and three Python contestants on the same data, folds and permutations, one after the
 * other in one run. usage: npm run bench [-- --sizes S,M,W,L,XL] [--write]   --write also puts it into docs/benchmarks.md
 */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { cpus, tmpdir, totalmem } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('../..', import.meta.url));
const built = join(root, 'dist', 'bench');
const argument = (name) => {
  const at = process.argv.indexOf(name);
  return at < 0 ? undefined : process.argv[at + 1];
};
const sizes = (argument('--sizes') ?? 'S,M,W,L,XL').split(',');
const engineOnly = process.argv.includes('--engine-only');

await build({
  entryPoints: ['run-engine', 'bench-thread', 'write-data', 'growth'].map((name) =>
    join(root, 'scripts', 'bench', `${name}.ts`),
  ),
  outdir: built,
  bundle: true,
  platform: 'node',
  format: 'esm',
  packages: 'external',
  outExtension: { '.js': '.mjs' },
  tsconfig: join(root, 'tsconfig.json'),
  logLevel: 'error',
});

const lastLine = (text) => JSON.parse(text.trim().split('\n').at(-1));
const node = (file, ...args) =>
  execFileSync(process.execPath, [join(built, file), ...args], {
    cwd: root,
    encoding: 'utf8',
    maxBuffer: 1e8,
  });
const python = (mode, folder) =>
  lastLine(
    execFileSync('/usr/bin/python3', [join(root, 'scripts', 'bench', 'bench.py'), mode, folder], {
      encoding: 'utf8',
      env: { ...process.env, OPENBLAS_NUM_THREADS: '1' },
    }),
  );

/** The arithmetic that a size needs at the least, in seconds on two cores at the measured GEMM rates. */
function limitSeconds(size, rates) {
  const n = size.n * 0.8;
  const r = Math.min(n, size.p);
  // Projection and prediction in double, nine picked penalties in single, and the Gram matrix; eigenvectors at GEMM rate.
  const double = 2 * n * r * (size.draws + 1) * 1.25 + n * size.p * r + 9 * r ** 3;
  const single = 2 * n * r * (size.draws + 1) * 9;
  return (5 * size.windows * (double / rates.double + single / rates.single)) / 2;
}

const table = [];
const scratch = mkdtempSync(join(tmpdir(), 'bench-'));
try {
  let rates = null;
  for (const name of sizes) {
    const folder = join(scratch, name);
    node('write-data.mjs', name, folder);
    const shape = JSON.parse(readFileSync(join(folder, 'shape.json'), 'utf8'));
    const windows = name === 'W' ? 60 : 1;
    if (!engineOnly) rates ??= python('gemm', folder);
    const engine = lastLine(node('run-engine.mjs', name));
    const row = { name, windows, ...shape, engine };
    if (!engineOnly) {
      for (const mode of ['numpy', 'batched', 'plain']) {
        const result = python(mode, folder);
        const scale = mode === 'batched' && result.extrapolated ? (shape.B + 1) / (result.draws + 1) : 1;
        row[mode] = { ...result, seconds: result.seconds * windows * scale };
      }
      row.limit = limitSeconds({ ...shape, draws: shape.B, windows }, rates);
      if (
        windows === 1 &&
        (Math.abs(engine.r2 - row.numpy.r2) > 1e-9 || engine.exceedances !== row.numpy.exceedances)
      ) {
        throw new Error(`${name}: the engine and numpy disagree: ${JSON.stringify([engine, row.numpy])}`);
      }
    }
    table.push(row);
    console.error(`${name}: ${JSON.stringify(row)}`);
  }
} finally {
  rmSync(scratch, { recursive: true });
}

const seconds = (x) => (x < 10 ? x.toFixed(2) : x.toFixed(0));
const lines = [
  '| size | n × p × windows | engine, s | whole readout with intervals, s | peak MB | numpy by hand, s | engine ÷ numpy | batched scikit-learn, s | × faster | plain scikit-learn, s | × faster | arithmetic limit ÷ engine |',
  '|---|---|---|---|---|---|---|---|---|---|---|---|',
];
for (const { name, n, p, windows, engine, numpy, batched, plain, limit } of table) {
  const own = `| ${name} | ${n} × ${p} × ${windows} | ${seconds(engine.seconds)} | ${seconds(engine.wholeSeconds)} | ${engine.peakMegabytes}`;
  lines.push(
    numpy === undefined
      ? `${own} | | | | | | | |`
      : `${own} | ${seconds(numpy.seconds)} | ${(engine.seconds / numpy.seconds).toFixed(2)} | ${seconds(batched.seconds)} | ${(batched.seconds / engine.seconds).toFixed(1)} | ${seconds(plain.seconds)} | ${(plain.seconds / engine.seconds).toFixed(0)} | ${(limit / engine.seconds).toFixed(2)} |`,
  );
}
const growth = node('growth.mjs').trim();
const text = `${lines.join('\n')}\n\n${growth}\n`;
console.log(text);
if (process.argv.includes('--write')) {
  const file = join(root, 'docs', 'benchmarks.md');
  const page = readFileSync(file, 'utf8');
  const [head] = page.split('<!-- measured -->');
  const machine = `Measured ${new Date().toISOString().slice(0, 10)} on ${cpus().length} cores of ${cpus()[0].model.trim()}, ${Math.round(totalmem() / 2 ** 30)} GB, Node ${process.version}.`;
  writeFileSync(file, `${head}<!-- measured -->\n\n${machine}\n\n${text}`);
}
