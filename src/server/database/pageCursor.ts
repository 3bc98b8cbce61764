import { Op, type Order, type WhereOptions } from 'sequelize';
import { identifier } from '#lib/schemas/fields.ts';
import type { Page } from '#lib/schemas/page.ts';
import { invalidFields } from '../errors.ts';

/** The place of a row in a list that is sorted newest first, with the id as the tie-break. */
interface Place {
  readonly id: string;
  readonly createdAt: Date;
}

export const NEWEST_FIRST: Order = [
  ['createdAt', 'DESC'],
  ['id', 'DESC'],
];

const SEPARATOR = '~';

/** @returns the condition that selects what comes after the cursor; no condition on the first page. */
export function afterCursor(cursor: string | undefined): WhereOptions<Place> {
  if (cursor === undefined) return {};
  const { createdAt, id } = parseCursor(cursor);
  return {
    [Op.or]: [{ createdAt: { [Op.lt]: createdAt } }, { createdAt, id: { [Op.lt]: id } }],
  };
}

/**
 * One page out of rows that were asked for with `limit + 1`: the surplus row tells that there is more.
 */
export function pageOfRows<Row extends Place>(rows: readonly Row[], limit: number): Page<Row> {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  return {
    items,
    nextCursor: rows.length > limit && last !== undefined ? cursorOf(last) : null,
  };
}

function cursorOf({ createdAt, id }: Place): string {
  return Buffer.from(`${createdAt.toISOString()}${SEPARATOR}${id}`).toString('base64url');
}

function parseCursor(cursor: string): Place {
  const [time = '', id = ''] = Buffer.from(cursor, 'base64url').toString().split(SEPARATOR);
  const createdAt = new Date(time);
  if (Number.isNaN(createdAt.getTime()) || !identifier.safeParse(id).success) {
    throw invalidFields([
      {
        field: 'cursor',
        message: 'Must be the nextCursor of the page before.',
      },
    ]);
  }
  return { createdAt, id };
}
