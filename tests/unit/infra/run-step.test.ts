import { expect, it } from 'vitest';
import { identityOf, isRunning } from '@/scripts/services/process-identity.mjs';
import { runStep, stopSteps } from '@/scripts/services/run-step.mjs';

const bash = (script: string) => ({
  what: 'The step failed',
  command: 'bash',
  args: ['-c', script],
  root: process.cwd(),
});

it('gives the output of a step, and its end as an error with what it said', async () => {
  expect(await runStep(bash('echo done'))).toBe('done\n');
  await expect(runStep(bash('echo because >&2; exit 3'))).rejects.toThrow(
    'The step failed (code 3)\nbecause',
  );
  await expect(runStep({ ...bash(''), command: 'no-such-program' })).rejects.toThrow('ENOENT');
});

it('takes with it what a step leaves behind, even when that is deaf to SIGTERM', async () => {
  const output = await runStep(bash('(trap "" TERM; exec sleep 60) & echo $!'));
  const pid = Number(output);
  expect(pid).toBeGreaterThan(1);
  await expect.poll(() => isRunning(identityOf(pid))).toBe(false);
});

it('ends the running steps on request', async () => {
  const step = runStep(bash('sleep 60; sleep 60')).catch((error: Error) => error.message);
  await new Promise((resolve) => setTimeout(resolve, 100));
  await stopSteps();
  expect(await step).toBe('The step failed (stopped by SIGTERM)');
});
