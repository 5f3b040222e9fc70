import { readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { Knex } from 'knex';

const folder = fileURLToPath(new URL('../../db/migrations', import.meta.url));

/** The product's migrations, loaded through the test runner: knex itself imports files, and plain Node takes no TypeScript. */
export const migrationSource: Knex.MigrationSource<string> = {
  getMigrations: () => Promise.resolve(readdirSync(folder).sort()),
  getMigrationName: (name) => name,
  getMigration: (name) =>
    import(
      /* @vite-ignore */ `../../db/migrations/${name.replace(/\.ts$/, '')}.ts`
    ) as Promise<Knex.Migration>,
};
