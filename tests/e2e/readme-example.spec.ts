import { execFile } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { promisify } from 'node:util';
import { expect, test } from '@playwright/test';

const run = promisify(execFile);

test('the worked example of the README runs as it stands there', async () => {
  const readme = readFileSync('README.md', 'utf8');
  const block = /```bash\n([\s\S]*?)```/.exec(readme)?.[1];
  if (!block) throw new Error('README.md has no bash block');
  const script = block.replace(/^api=.*$/m, `api=${process.env.OUTFOLD_E2E_URL}/api/v1`);
  const { stdout } = await run('bash', ['-euo', 'pipefail', '-c', script], {
    env: process.env,
    timeout: 60_000,
  });
  const answer = JSON.parse(stdout.slice(stdout.lastIndexOf('{'))) as {
    verdict: string;
    r2: number;
    p: number;
  };
  expect(answer.verdict).toContain('carry the shared fraction');
  expect(answer.r2).toBeGreaterThan(0.2);
  expect(answer.p).toBeCloseTo(1 / 1001, 9);
});
