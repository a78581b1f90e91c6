import { z } from 'zod';
import { readCursor } from './cursor';

/** One of the things that a list is sorted by: as SQL, and as a cursor keeps it. */
export interface SortKey<Item> {
  readonly by: string;
  /** Of a value of a cursor, the bound parameter being `?`. */
  readonly read: string;
  readonly value: z.ZodType<string | number>;
  readonly of: (item: Item) => string | number;
}

/** Names by their numbers: H-2 before H-10. */
export const nameKey = <Item extends { readonly name: string }>(column: string): SortKey<Item> => ({
  by: `${column} collate by_number`,
  read: 'cast(? as text) collate by_number',
  value: z.string().max(100),
  of: ({ name }) => name,
});

export const numberKey = <Item>(column: string, of: (item: Item) => number): SortKey<Item> => ({
  by: column,
  read: 'cast(? as double precision)',
  value: z.number(),
  of,
});

interface SortedList<Sort extends string, Item> {
  /** Of each the first key decides, the next between equals. */
  readonly sorts: Readonly<Record<Sort, readonly SortKey<Item>[]>>;
  /** Decides at last. */
  readonly idBy: string;
}

interface Asked<Sort extends string> {
  readonly sort: Sort;
  readonly order: 'asc' | 'desc';
  readonly cursor?: string | undefined;
}

/**
 * A list's order and, behind a cursor, the condition for what comes after it, with the values that it names.
 * @throws ProblemError 400 for a cursor that no page of this sort gave.
 */
export function sortedPage<Sort extends string, Item extends { readonly id: string }>(
  { sorts, idBy }: SortedList<Sort, Item>,
  { sort, order, cursor }: Asked<Sort>,
) {
  const keys = sorts[sort];
  const after = readCursor(cursorSchema(sort, keys), cursor);
  const bys = [...keys.map(({ by }) => by), idBy];
  const ats = [
    ...keys.map(({ read }, place) => read.replace('?', `:after${place}`)),
    'cast(:afterId as uuid)',
  ];
  return {
    orderBy: `order by ${bys.map((by) => `${by} ${order}`).join(', ')}`,
    condition:
      after === null ? null : `(${bys.join(', ')}) ${order === 'asc' ? '>' : '<'} (${ats.join(', ')})`,
    values:
      after === null
        ? {}
        : { ...Object.fromEntries(after.at.map((at, place) => [`after${place}`, at])), afterId: after.id },
    /** The cursor behind the last item of a page. */
    cursorAfter: (last: Item): string => {
      const place: z.input<typeof placeSchema> = { sort, at: keys.map(({ of }) => of(last)), id: last.id };
      return Buffer.from(JSON.stringify(place)).toString('base64url');
    },
  };
}

const placeSchema = z.strictObject({
  sort: z.string(),
  at: z.array(z.union([z.string(), z.number()])),
  id: z.uuid(),
});

function cursorSchema<Item>(sort: string, keys: readonly SortKey<Item>[]) {
  return z.string().transform((text, context) => {
    const place = placeSchema.safeParse(readJson(text)).data;
    const isOurs =
      place?.sort === sort &&
      place.at.length === keys.length &&
      keys.every(({ value }, k) => value.safeParse(place.at[k]).success);
    if (place !== undefined && isOurs) return place;
    context.addIssue({ code: 'custom', message: 'no cursor' });
    return z.NEVER;
  });
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(Buffer.from(text, 'base64url').toString());
  } catch {
    // No JSON is no cursor: the schema says so.
    return null;
  }
}
