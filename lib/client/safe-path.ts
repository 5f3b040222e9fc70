/** Where to go after signing in: only a path of this site; anything else leads to the lab page. */
export function safePath(next: string | null | undefined): string {
  if (!next || !next.startsWith('/') || next.startsWith('//') || next.includes('\\')) return '/';
  return next.startsWith('/sign-in') || next.startsWith('/api/') ? '/' : next;
}
