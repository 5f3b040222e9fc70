/** Names one array of one file within a session. */
export function arrayKey(fileId: string, path: string): string {
  return `${fileId} ${path}`;
}
