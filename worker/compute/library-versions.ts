import { createRequire } from 'node:module';

const named = ['ml-matrix', 'pure-rand', 'koffi', 'apache-arrow'];
const require = createRequire(import.meta.url);

/** Versions of what the numbers rest on, for the record. */
export function libraryVersions(): Record<string, string> {
  const versions: Record<string, string> = { node: process.versions.node };
  for (const name of named) versions[name] = versionOf(name);
  return versions;
}

function versionOf(name: string): string {
  for (const folder of require.resolve.paths(name) ?? [])
    try {
      return (require(`${folder}/${name}/package.json`) as { version: string }).version;
    } catch {
      // not in this node_modules: look further up
    }
  return 'unknown';
}
