/** Follows a list's cursors to its end, or to `maxItems`; `isWhole` says which. */
export async function readAll<Item>(
  list: (cursor: string | undefined) => Promise<{ items: Item[]; nextCursor: string | null }>,
  maxItems = 2000,
): Promise<{ items: Item[]; isWhole: boolean }> {
  const items: Item[] = [];
  let cursor: string | undefined;
  for (;;) {
    const page = await list(cursor);
    items.push(...page.items);
    if (page.nextCursor === null) return { items, isWhole: true };
    if (items.length >= maxItems) return { items, isWhole: false };
    cursor = page.nextCursor;
  }
}
