import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync, cpSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { execFileSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const rules = (
  createRequire(import.meta.url)('../../../.dependency-cruiser.cjs') as { forbidden: { name: string }[] }
).forbidden;

/** For each rule, files that break it: path and what it imports. Each import alone must be reported. */
const breaches: Record<string, [path: string, imported: string][]> = {
  'engine-is-pure': [
    ['lib/engine/a.ts', '@/lib/contracts/target'],
    ['lib/engine/b.ts', 'node:fs'],
    ['lib/engine/c.ts', 'zod'],
    ['lib/engine/d.ts', '@/lib/env/target'],
    ['lib/engine/deep/e.ts', 'fs'],
  ],
  'contracts-know-only-zod': [
    ['lib/contracts/a.ts', '@/lib/format/target'],
    ['lib/contracts/b.ts', 'uuid'],
  ],
  'components-stay-in-the-browser': [
    ['components/ui/a.tsx', '@/lib/services/target'],
    ['components/ui/b.tsx', '@/db/target'],
    ['components/ui/c.tsx', '@/lib/engine/target'],
    ['components/ui/d.tsx', '@/lib/errors/target'],
  ],
  'browser-helpers-stay-in-the-browser': [
    ['lib/client/a.ts', '@/lib/services/target'],
    ['lib/format/b.ts', '@/lib/engine/target'],
  ],
  'no-node-in-the-browser': [
    ['components/ui/e.tsx', 'node:path'],
    ['lib/client/c.ts', 'crypto'],
    ['lib/format/d.ts', 'node:util'],
  ],
  'doors-go-through-services': [
    ['app/a/page.tsx', '@/db/target'],
    ['app/api/v1/a/route.ts', '@/storage/target'],
    ['app/b/page.tsx', '@/lib/engine/target'],
    ['app/c/page.tsx', '@/db/repositories/target'],
    ['proxy.ts', '@/db/target'],
  ],
  'adapters-are-strangers': [
    ['db/a.ts', '@/storage/target'],
    ['storage/a.ts', '@/db/target'],
    ['lib/jobs/a.ts', '@/db/target'],
    ['lib/mail/a.ts', '@/lib/jobs/target'],
    ['db/b.ts', '@/lib/jobs/target'],
  ],
  'pure-parts-are-pure': [
    ['lib/policy/a.ts', '@/db/target'],
    ['lib/reports/a.ts', '@/storage/target'],
    ['lib/reports/b.ts', '@/lib/env/target'],
  ],
  'adapters-know-no-verb': [
    ['db/c.ts', '@/lib/services/target'],
    ['lib/jobs/b.ts', '@/lib/http/target'],
    ['lib/intake/a.ts', '@/lib/services/target'],
  ],
  'nobody-imports-the-app': [
    ['worker/a.ts', '@/app/target'],
    ['lib/services/a.ts', '@/app/target'],
    ['scripts/a.ts', '@/app/target'],
  ],
  'nobody-imports-the-worker': [
    ['lib/services/b.ts', '@/worker/target'],
    ['app/d/page.tsx', '@/worker/target'],
  ],
  'no-tools-or-tests-in-the-product': [
    ['lib/services/c.ts', '@/tests/target'],
    ['worker/b.ts', '@/scripts/target'],
    ['lib/services/d.ts', 'vitest'],
    ['lib/http/a.ts', 's3rver'],
    ['app/e/page.tsx', '@testing-library/react'],
  ],
  'server-only-inside-app': [['lib/services/e.ts', 'server-only']],
  'sql-only-in-db': [
    ['lib/services/f.ts', 'knex'],
    ['worker/c.ts', 'mysql2'],
    ['lib/jobs/c.ts', 'knex'],
  ],
  's3-only-in-storage': [['lib/services/g.ts', '@aws-sdk/client-s3']],
  'queue-only-in-jobs': [
    ['worker/d.ts', 'bullmq'],
    ['lib/http/b.ts', 'ioredis'],
  ],
  'smtp-only-in-mail': [['lib/services/h.ts', 'nodemailer']],
  'foreign-functions-only-in-native': [['worker/e.ts', 'koffi']],
  'plots-only-in-charts': [
    ['components/readout/a.tsx', 'uplot'],
    ['app/f/page.tsx', 'uplot'],
  ],
  // Closed by the target below, which imports it back; a cycle is reported once.
  'no-cycles': [['lib/services/cycle.ts', '@/lib/services/target']],
  'everything-resolves': [['lib/services/i.ts', '@/lib/services/nowhere']],
};

/** What the design allows; none of it may be reported. */
const allowed: [path: string, imported: string][] = [
  ['lib/engine/ok.ts', '@/lib/engine/target'],
  ['lib/engine/ok2.ts', 'ml-matrix'],
  ['lib/engine/ok3.ts', 'pure-rand/generator/xoroshiro128plus'],
  ['lib/contracts/ok.ts', 'zod'],
  ['components/ui/ok.tsx', '@/lib/contracts/target'],
  ['components/ui/ok2.tsx', '@/lib/format/target'],
  ['components/charts/ok.tsx', 'uplot'],
  ['app/ok/page.tsx', '@/lib/services/target'],
  ['app/ok2/page.tsx', '@/components/ui/target'],
  ['lib/services/ok.ts', '@/db/repositories/target'],
  ['lib/services/ok2.ts', '@/storage/target'],
  ['lib/services/ok3.ts', '@/lib/engine/target'],
  ['db/ok.ts', 'knex'],
  ['db/repositories/ok.ts', '@/db/target'],
  ['storage/ok.ts', '@aws-sdk/client-s3'],
  ['lib/jobs/ok.ts', 'bullmq'],
  ['worker/ok.ts', '@/lib/services/target'],
  ['lib/native/ok.ts', '@/lib/engine/target'],
  ['lib/native/ok2.ts', 'koffi'],
  ['tests/ok.ts', '@/db/target'],
  ['tests/ok2.ts', 'vitest'],
  ['tests/ok3.ts', 'knex'],
];

const folders = 'app components lib db storage worker scripts tests'.split(' ');
const targets = [
  ...['app', 'components/ui', 'db', 'db/repositories', 'storage', 'worker', 'scripts', 'tests'],
  ...'contracts env errors engine format client services http jobs mail'
    .split(' ')
    .map((name) => `lib/${name}`),
];

describe('the layer rules', () => {
  let root: string;
  const reported: { rule: string; from: string }[] = [];

  beforeAll(() => {
    // A made-up tree of the same shape, with the real packages, cruised with the real rules.
    root = mkdtempSync(join(tmpdir(), 'outfold-layers-'));
    symlinkSync(join(process.cwd(), 'node_modules'), join(root, 'node_modules'));
    for (const file of ['.dependency-cruiser.cjs', 'tsconfig.json']) cpSync(file, join(root, file));
    writeFileSync(join(root, 'package.json'), readFileSync('package.json'));
    const write = (path: string, text: string) => {
      mkdirSync(dirname(join(root, path)), { recursive: true });
      writeFileSync(join(root, path), text);
    };
    for (const target of targets) write(`${target}/target.ts`, 'export const target = 1;\n');
    write('lib/services/target.ts', "import '@/lib/services/cycle';\nexport const target = 1;\n");
    for (const [path, imported] of [...Object.values(breaches).flat(), ...allowed])
      write(path, `import '${imported}';\nexport const own = 1;\n`);
    const output = execFileSync(
      process.execPath,
      [
        join(process.cwd(), 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs'),
        ...[
          ...folders,
          'proxy.ts',
          '--config',
          '.dependency-cruiser.cjs',
          '--preserve-symlinks',
          '--output-type',
          'json',
        ],
      ],
      { cwd: root, encoding: 'utf8', maxBuffer: 64 * 1024 * 1024 },
    );
    const { summary } = JSON.parse(output) as {
      summary: { violations: { rule: { name: string }; from: string }[] };
    };
    reported.push(...summary.violations.map(({ rule, from }) => ({ rule: rule.name, from })));
  }, 60_000);
  afterAll(() => rmSync(root, { recursive: true, force: true }));

  it('are each tried here', () => {
    expect(Object.keys(breaches).sort()).toEqual(rules.map(({ name }) => name).sort());
  });

  it.each(Object.entries(breaches).flatMap(([rule, files]) => files.map((file) => [rule, ...file] as const)))(
    '%s: reports %s importing %s',
    (rule, path) => {
      expect(reported.filter(({ from }) => from === path).map((entry) => entry.rule)).toContain(rule);
    },
  );

  it.each(allowed)('lets %s import %s', (path) => {
    expect(reported.filter(({ from }) => from === path)).toEqual([]);
  });
});
