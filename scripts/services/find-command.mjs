import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

/** The full path of a program, or undefined. Looks into the sbin folders too, which a plain user's PATH leaves out. */
export function findCommand(name) {
  const folders = [
    ...(process.env.PATH ?? '').split(delimiter),
    '/usr/local/sbin',
    '/usr/sbin',
    '/sbin',
    '/usr/bin',
  ];
  for (const folder of folders) {
    const path = join(folder, name);
    try {
      accessSync(path, constants.X_OK);
      return path;
    } catch {
      continue;
    }
  }
  return undefined;
}
