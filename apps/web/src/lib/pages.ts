import type { Page } from '@masswright/contracts';

/** Reads a list to its end, page by page; for lists of people, which are short. */
export async function readAllPages<Item>(read: (after: string | undefined) => Promise<Page<Item>>): Promise<Item[]> {
  const items: Item[] = [];
  let after: string | undefined;
  do {
    const page = await read(after);
    items.push(...page.items);
    after = page.next ?? undefined;
  } while (after !== undefined);
  return items;
}
