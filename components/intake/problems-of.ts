import type { StoredFile } from '@/lib/contracts/file';
import type { Problem } from '@/lib/contracts/problem';
import type { Session } from '@/lib/contracts/session';

/**
 * Everything known to be wrong: with the files, and with the mapping. The preview speaks for the present mapping; until
 * there is one, the session's last intake does.
 */
export function problemsOf(facts: {
  files: readonly StoredFile[];
  preview: readonly Problem[] | undefined;
  session: Session;
}): Problem[] {
  const ofFiles = facts.files.flatMap((file) =>
    file.problems.map((problem) => ({ ...problem, place: { file: file.name, ...problem.place } })),
  );
  const ofMapping = facts.preview ?? (facts.session.state === 'ready' ? [] : facts.session.problems);
  const seen = new Set<string>();
  return [...ofFiles, ...ofMapping].filter((problem) => {
    const key = JSON.stringify([problem.code, problem.message, problem.place]);
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}
