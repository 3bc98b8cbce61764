import { readFileSync } from 'node:fs';
import { inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';

const css = readFileSync(new URL('../../../src/styles/global.css', import.meta.url), 'utf8');

type Theme = 'light' | 'dark';

function token(name: string, theme: Theme): string {
  const [, light, dark] = new RegExp(`--color-${name}: light-dark\\((#\\w+), (#\\w+)\\)`, 'u').exec(css) ?? [];
  const colour = theme === 'light' ? light : dark;
  if (colour === undefined) throw new Error(`no token ${name}`);
  return colour;
}

/** Relative luminance and contrast ratio as defined in WCAG 2.2, "Terms". */
function luminance(colour: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((start) => {
    const share = Number.parseInt(colour.slice(start, start + 2), 16) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(one: string, other: string): number {
  const [bright = 0, dim = 0] = [luminance(one), luminance(other)].toSorted((a, b) => b - a);
  return (bright + 0.05) / (dim + 0.05);
}

describe('global.css', () => {
  it('computes 21 between black and white, as WCAG 2.2 says', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
  });

  const pairs = (['light', 'dark'] as const).flatMap((theme) =>
    (['ground', 'sheet'] as const).map((surface) => ({ theme, surface })),
  );

  it.each(pairs)('has text of at least 4.5 on the $theme $surface (WCAG 1.4.3)', ({ theme, surface }) => {
    for (const name of ['ink', 'muted', 'copper', 'within', 'outside']) {
      expect(contrast(token(name, theme), token(surface, theme)), name).toBeGreaterThanOrEqual(4.5);
    }
  });

  it.each(pairs)('has borders of inputs of at least 3 on the $theme $surface (WCAG 1.4.11)', ({ theme, surface }) => {
    expect(contrast(token('control', theme), token(surface, theme))).toBeGreaterThanOrEqual(3);
  });

  it('has a shipped face for each glyph that the text faces lack', () => {
    const cmap = characterMap(
      new URL('../../../node_modules/@fontsource/dejavu-sans/files/dejavu-sans-latin-400-normal.woff', import.meta.url),
    );
    for (const glyph of 'ΩΔ≤≥√σ→✓') {
      const codePoint = glyph.codePointAt(0) ?? 0;
      expect(cmap.has(codePoint), `${glyph} in the face`).toBe(true);
      expect(isInUnicodeRange(codePoint), `${glyph} in unicode-range`).toBe(true);
    }
  });
});

function isInUnicodeRange(codePoint: number): boolean {
  const declared = /unicode-range:([^;]+);/u.exec(css)?.[1] ?? '';
  return [...declared.matchAll(/U\+([\dA-F]+)(?:-([\dA-F]+))?/gu)].some(
    ([, from = '', to = from]) => codePoint >= Number.parseInt(from, 16) && codePoint <= Number.parseInt(to, 16),
  );
}

/** Code points of a WOFF 1.0 file: its table directory, then a format 4 subtable of cmap (OpenType 1.9). */
function characterMap(file: URL): Set<number> {
  const woff = readFileSync(file);
  const entry = Array.from({ length: woff.readUInt16BE(12) }, (_, index) => 44 + index * 20).find(
    (offset) => woff.toString('latin1', offset, offset + 4) === 'cmap',
  );
  if (entry === undefined) throw new Error('no cmap');
  const [start, length, fullLength] = [4, 8, 12].map((offset) => woff.readUInt32BE(entry + offset)) as [
    number,
    number,
    number,
  ];
  const packed = woff.subarray(start, start + length);
  const cmap = length < fullLength ? inflateSync(packed) : packed;
  const subtable = Array.from({ length: cmap.readUInt16BE(2) }, (_, index) => cmap.readUInt32BE(8 + index * 8)).find(
    (offset) => cmap.readUInt16BE(offset) === 4,
  );
  if (subtable === undefined) throw new Error('no format 4 subtable');
  const segmentBytes = cmap.readUInt16BE(subtable + 6);
  const codePoints = new Set<number>();
  for (let segment = 0; segment < segmentBytes; segment += 2) {
    const last = cmap.readUInt16BE(subtable + 14 + segment);
    const first = cmap.readUInt16BE(subtable + 16 + segmentBytes + segment);
    for (let codePoint = first; codePoint <= last && codePoint < 0xffff; codePoint += 1) codePoints.add(codePoint);
  }
  return codePoints;
}
