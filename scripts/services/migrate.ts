/** Brings the database of DATABASE_URL to the newest schema. Run with `node --import tsx`. */
import { fileURLToPath } from 'node:url';
import knex from 'knex';
import config from '../../knexfile';

const database = knex({
  ...config,
  migrations: {
    ...config.migrations,
    directory: fileURLToPath(new URL('../../db/migrations', import.meta.url)),
  },
});
try {
  const [, applied] = (await database.migrate.latest()) as [number, string[]];
  if (applied.length > 0) console.log(`Applied ${applied.length} migration(s) to the database.`);
} finally {
  await database.destroy();
}
