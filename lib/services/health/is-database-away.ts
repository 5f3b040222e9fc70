import { db } from '@/db/connection';

/** A page asks at most this often; in between the last answer counts. */
const freshMs = 1_000;
const patienceMs = 3_000;

let last: { at: number; isAway: Promise<boolean> } | null = null;

/** Whether the database does not answer, at most a second old. A page that fails while it is made could only say 500. */
export function isDatabaseAway(): Promise<boolean> {
  const now = Date.now();
  if (last === null || now - last.at > freshMs) last = { at: now, isAway: ask() };
  return last.isAway;
}

async function ask(): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const tooLate = new Promise<boolean>((resolve) => {
    timer = setTimeout(() => resolve(true), patienceMs);
  });
  const answer = db()
    .raw('select 1')
    .then(
      () => false,
      () => true,
    );
  try {
    return await Promise.race([answer, tooLate]);
  } finally {
    clearTimeout(timer);
  }
}
