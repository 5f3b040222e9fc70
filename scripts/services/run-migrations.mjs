import { runStep } from './run-step.mjs';

/** Runs migrate.ts on the database of `env.DATABASE_URL`. */
export async function runMigrations({ root, env }) {
  await runStep({
    what: 'The database could not be brought to the newest schema',
    command: process.execPath,
    args: ['--import', 'tsx', 'scripts/services/migrate.ts'],
    root,
    env,
  });
}
