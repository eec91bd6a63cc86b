import type { z } from 'zod';
import type { Page } from '@masswright/contracts';
import { AppError } from './app-error';

/** A page's cursor is the key of its last row. Clients pass it back and don't look inside. */
export function encodeCursor(key: readonly (string | number)[]): string {
  return Buffer.from(JSON.stringify(key)).toString('base64url');
}

/** Reads a cursor of ours. @throws AppError when it is none */
export function decodeCursor<Shape extends z.ZodType>(shape: Shape, cursor: string | undefined): z.infer<Shape> | undefined {
  if (cursor === undefined) return undefined;
  const refuse = () => new AppError('invalid-input', 'after: this is not a place in this list. Leave it out to begin anew.');
  let key: unknown;
  try {
    key = JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
  } catch {
    throw refuse();
  }
  const parsed = shape.safeParse(key);
  if (!parsed.success) throw refuse();
  return parsed.data;
}

/** Makes a page of rows of which one more than the limit was asked for: the one too many only says that there are more. */
export function toPage<Row, Item>(
  rows: readonly Row[],
  limit: number,
  present: (row: Row) => Item,
  keyOf: (row: Row) => readonly (string | number)[],
): Page<Item> {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  return { items: shown.map(present), next: rows.length > limit && last !== undefined ? encodeCursor(keyOf(last)) : null };
}
