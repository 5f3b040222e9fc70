import { decodeCursor, encodeCursor } from '@/lib/http/cursor';
import type { PageInput } from './page-input';

/**
 * One page of a list that runs by id, newest first. `load` gets the id to start before (null for the first page) and
 * how many rows to give at most: one more than the page holds, which tells whether there is a next page.
 */
export async function pageOfRows<Row extends { id: string }, Item>(
  input: PageInput,
  load: (beforeId: string | null, limit: number) => Promise<Row[]>,
  toItem: (row: Row) => Item,
): Promise<{ items: Item[]; nextCursor: string | null }> {
  const limit = input.limit ?? 50;
  const start = decodeCursor(input.cursor, 1);
  const rows = await load(start === null ? null : String(start[0]), limit + 1);
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return {
    items: page.map(toItem),
    nextCursor: rows.length > limit && last !== undefined ? encodeCursor([last.id]) : null,
  };
}
