import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { parseEnv } from 'node:util';

/**
 * The settings: the environment, completed from a `.env` file in the project folder where there is one. An empty
 * variable counts as not set.
 *
 * @param {string} root
 * @param {Record<string, string | undefined>} [environment]
 * @returns {Record<string, string>}
 */
export function readSettings(root, environment = process.env) {
  let fromFile = {};
  try {
    fromFile = parseEnv(readFileSync(resolve(root, '.env'), 'utf8'));
  } catch (error) {
    if (error.code !== 'ENOENT') throw new Error(`.env cannot be read: ${error.message}`, { cause: error });
  }
  const given = Object.entries(environment).filter(([, value]) => value !== '');
  return Object.fromEntries([...Object.entries(fromFile).filter(([, value]) => value !== ''), ...given]);
}
