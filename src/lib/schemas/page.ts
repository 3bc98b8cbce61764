import * as z from 'zod/mini';

export const PAGE_DEFAULT_COUNT = 50;
export const PAGE_MAXIMUM_COUNT = 200;

/** One page of a list; `nextCursor` is null on the last one. */
export const pageOf = <Item extends z.core.$ZodType>(item: Item) =>
  z.object({ items: z.array(item), nextCursor: z.nullable(z.string()) });

export interface Page<Item> {
  items: Item[];
  nextCursor: string | null;
}
