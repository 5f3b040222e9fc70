import type { z } from 'zod';
import type { FieldFault } from '@/lib/errors/app-error';

type Issue = z.core.$ZodIssue;

/** Every issue of a failed parse as a fault with a JSON pointer (RFC 6901) into the value that was parsed. */
export function faultsOf(error: z.ZodError): FieldFault[] {
  return error.issues.flatMap((issue) => faultsOfIssue(issue, []));
}

function faultsOfIssue(issue: Issue, parents: PropertyKey[]): FieldFault[] {
  const path = [...parents, ...issue.path];
  if (issue.code === 'unrecognized_keys')
    return issue.keys.map((key) => ({
      pointer: pointerOf([...path, key]),
      code: 'unknown-field',
      detail: 'there is no such field here',
    }));
  if (issue.code === 'invalid_union' && issue.errors.length > 0) {
    const branch = nearestBranch(issue.errors);
    if (branch !== null) return branch.flatMap((inner) => faultsOfIssue(inner, path));
  }
  return [{ pointer: pointerOf(path), code: issue.code.replaceAll('_', '-'), detail: issue.message }];
}

/** The alternative that the value comes nearest to: the one whose first fault lies deepest, then with fewest faults. */
function nearestBranch(branches: Issue[][]): Issue[] | null {
  const depth = (issues: Issue[]) => Math.min(...issues.map((issue) => issue.path.length));
  const unknownKeys = (issues: Issue[]) =>
    issues.filter((issue) => issue.code === 'unrecognized_keys').length;
  const scored = branches.filter((issues) => issues.length > 0);
  scored.sort((a, b) => depth(b) - depth(a) || unknownKeys(a) - unknownKeys(b) || a.length - b.length);
  return scored[0] ?? null;
}

function pointerOf(path: PropertyKey[]): string {
  return path.map((part) => `/${String(part).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');
}
