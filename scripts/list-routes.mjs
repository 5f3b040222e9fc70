/**
 * node scripts/list-routes.mjs [--check]
 *
 * Writes app/api/v1/openapi.json/registered-routes.ts, which lists every API route for the OpenAPI document and the
 * tests. With --check it only says whether that file is as it should be.
 */
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { format, resolveConfig } from 'prettier';

const root = fileURLToPath(new URL('..', import.meta.url));
const target = `${root}app/api/v1/openapi.json/registered-routes.ts`;
// The document's own route adds itself; Auth.js's and the one for unknown addresses are no part of the API.
const left = new Set([
  'app/api/v1/openapi.json/route.ts',
  'app/api/auth/[...nextauth]/route.ts',
  'app/api/[...unknown]/route.ts',
]);

const files = readdirSync(`${root}app/api`, { recursive: true })
  .map((name) => `app/api/${String(name)}`)
  .filter((name) => name.endsWith('/route.ts') && !left.has(name))
  .sort();
const entries = files.map((file, index) => {
  const source = readFileSync(root + file, 'utf8');
  const methods = [
    ...source.matchAll(/^export (?:const|async function|function) (GET|POST|PUT|PATCH|DELETE)\b/gm),
  ];
  const module = `route${index}`;
  return {
    imports: `import * as ${module} from '@/${file.replace(/\.ts$/, '')}';`,
    entry: `{ path: '${file
      .replace(/^app/, '')
      .replace(/\/route\.ts$/, '')
      .replaceAll(
        /\[(\w+)\]/g,
        '{$1}',
      )}', methods: { ${methods.map(([, method]) => `${method}: ${module}.${method}`).join(', ')} } },`,
  };
});
const text = await format(
  `// Written by scripts/list-routes.mjs; run it again when a route is added.
import type { RegisteredRoute } from '@/lib/http/openapi/registered-route';
${entries.map(({ imports }) => imports).join('\n')}

export const registeredRoutes: readonly RegisteredRoute[] = [
${entries.map(({ entry }) => entry).join('\n')}
];
`,
  { ...(await resolveConfig(target)), parser: 'typescript' },
);

if (!process.argv.includes('--check')) writeFileSync(target, text);
else {
  let present = '';
  try {
    present = readFileSync(target, 'utf8');
  } catch {
    // missing: not as it should be
  }
  if (present !== text) {
    console.error('The list of routes is out of date: run node scripts/list-routes.mjs');
    process.exit(1);
  }
}
