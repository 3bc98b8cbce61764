import { describe, expect, it } from 'vitest';
import { csvOfRange, tableRows, type ChartColumn } from '#components/charts/chartColumns.ts';

const columns = (levels: readonly (number | null)[]): ChartColumn[] => [
  { label: 'frequency', unit: 'Hz', decimals: 1, values: levels.map((_, index) => index * 1000) },
  { label: 'level', unit: 'dB', decimals: 2, values: levels },
];

describe('csvOfRange', () => {
  it('writes a decimal point, no grouping, CR LF and an empty field for a gap (RFC 4180)', () => {
    expect(csvOfRange(columns([1.5, null, -3]), { from: 0, to: 2000 })).toBe(
      '"frequency, Hz","level, dB"\r\n0.0,1.50\r\n1000.0,\r\n2000.0,-3.00\r\n',
    );
  });

  it('writes only the shown rows', () => {
    expect(csvOfRange(columns([1, 2, 3, 4]), { from: 900, to: 2100 }).split('\r\n')).toHaveLength(4);
  });
});

describe('tableRows', () => {
  it('shows every row while they are few', () => {
    expect(tableRows(columns([1, 2, 3]), { from: 0, to: 5000 })).toEqual([0, 1, 2]);
  });

  it('keeps a single peak among 8192 rows', () => {
    const levels = Array.from({ length: 8192 }, (_, row) => (row === 4711 ? 40 : Math.sin(row)));
    const rows = tableRows(columns(levels), { from: 0, to: 8_192_000 });
    expect(rows).toHaveLength(60);
    expect(rows).toContain(4711);
  });
});
