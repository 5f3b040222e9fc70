import { portableLinalg } from '@/lib/engine/linalg/portable';
import { runReadout } from '@/lib/engine/readout/run-readout';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeBenchInput } from '@/scripts/bench/make-bench-input';

/* How time grows with n, p, B and windows: one thread, a doubling of one at a time. Prints a Markdown table. */
const linalg = openNativeLinalg() ?? portableLinalg;
const base = { n: 400, p: 120, windows: 1, draws: 500 };

function secondsOf(size: typeof base): number {
  const input = makeBenchInput({ name: '', sample: 0, batchedDraws: 0, ...size }, size.windows);
  let best = Infinity;
  for (let i = 0; i < 3; i++) {
    const start = performance.now();
    const result = runReadout(input, linalg);
    if (!result.ok) throw new Error(JSON.stringify(result.problems));
    best = Math.min(best, performance.now() - start);
  }
  return best / 1000;
}

const rows: [string, typeof base][] = [
  ['base', base],
  ['n × 2', { ...base, n: 800 }],
  ['n × 4', { ...base, n: 1600 }],
  ['p × 2', { ...base, p: 240 }],
  ['p × 4 (p > n)', { ...base, p: 480 }],
  ['draws × 2', { ...base, draws: 1000 }],
  ['draws × 4', { ...base, draws: 2000 }],
  ['4 windows', { ...base, windows: 4 }],
  ['8 windows', { ...base, windows: 8 }],
];
secondsOf(base); // compiles the hot functions
const times = rows.map(([name, size]) => ({ name, size, seconds: secondsOf(size) }));
console.log('Whole readouts (intervals included) on one thread:\n');
console.log('| | n × p × windows, draws | s | × base |\n|---|---|---|---|');
for (const { name, size, seconds } of times) {
  const shape = `${size.n} × ${size.p} × ${size.windows}, ${size.draws}`;
  console.log(`| ${name} | ${shape} | ${seconds.toFixed(3)} | ${(seconds / times[0].seconds).toFixed(1)} |`);
}
