/** The name that a column gets from its array's path; a file of one nameless array gives its own name. */
export function columnName(path: string, fileName: string): string {
  const last = path.split('/').filter(Boolean).at(-1);
  return last ?? fileName.replace(/\.[^.]+$/, '');
}
