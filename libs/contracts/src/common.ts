import { z } from 'zod';

export const id = z.uuid();
export const timestamp = z.iso.datetime();

const keepable = (text: string): boolean => !/[\0\p{Surrogate}]/u.test(text);

/** Text that is kept, or that what is kept is searched by. The database holds neither the character NUL nor half of a surrogate pair. */
export function keptText() {
  return z.string().refine(keepable, 'There is a character in this text that can’t be kept, such as NUL. Take it out, or type the text anew.');
}

/** Three numbers along the x, y and z axes of the frame that the enclosing object states. */
export const vector3 = z.tuple([z.number(), z.number(), z.number()]);
export type Vector3 = z.infer<typeof vector3>;

/** The six independent elements of a symmetric 3×3 array; which sign the off-diagonals carry is said by the enclosing object. */
export const symmetric3 = z.object({
  xx: z.number(),
  yy: z.number(),
  zz: z.number(),
  xy: z.number(),
  yz: z.number(),
  zx: z.number(),
});
export type Symmetric3 = z.infer<typeof symmetric3>;

/** One page of a list that is read by key: pass `next` as `after` to get the page that follows; null ends the list. */
export function page<Item extends z.ZodType>(item: Item) {
  return z.object({ items: z.array(item), next: z.string().nullable() });
}
export type Page<Item> = { items: Item[]; next: string | null };

export const pageQuery = z.object({
  after: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(100),
});
export type PageQuery = z.infer<typeof pageQuery>;
