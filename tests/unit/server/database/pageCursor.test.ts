import { describe, expect, it } from 'vitest';
import { afterCursor, pageOfRows } from '#server/database/pageCursor.ts';

const ROWS = [3, 2, 1].map((second) => ({
  id: `018f0000-0000-7000-8000-00000000000${String(second)}`,
  createdAt: new Date(second * 1000),
}));

describe('pageOfRows', () => {
  it('has no next page when the rows fit', () => {
    expect(pageOfRows(ROWS, 3)).toEqual({ items: ROWS, nextCursor: null });
    expect(pageOfRows([], 3)).toEqual({ items: [], nextCursor: null });
  });

  it('keeps the surplus row back and continues after the last one shown', () => {
    const { items, nextCursor } = pageOfRows(ROWS, 2);
    expect(items).toEqual(ROWS.slice(0, 2));
    const condition = afterCursor(nextCursor ?? '') as Record<symbol, unknown[]>;
    const [symbol] = Object.getOwnPropertySymbols(condition);
    const [, sameMoment] = condition[symbol as symbol] ?? [];
    expect(sameMoment).toMatchObject({ createdAt: ROWS[1]?.createdAt });
  });
});

describe('afterCursor', () => {
  it('selects everything without a cursor', () => {
    expect(Reflect.ownKeys(afterCursor(undefined))).toEqual([]);
  });

  it.each(['x', '', 'bm90', Buffer.from('2026-01-01~1 OR 1=1').toString('base64url')])(
    'refuses the cursor %j',
    (cursor) => {
      expect(() => afterCursor(cursor)).toThrow('cursor: Must be the nextCursor of the page before.');
    },
  );
});
