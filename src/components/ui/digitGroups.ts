/** Digits in a group; ISO 80000-1, 7.3.1. */
const GROUP_SIZE = 3;
/** Whole numbers of four digits and more; not those inside words, and not the digits behind a decimal mark. */
const LONG_NUMBER = /(?<![\p{L}\d_#-]|\d[.,])\d{4,}(?![\p{L}\d_])/gu;

/** Splits a plain whole number into its groups of three, from the right. @example digitGroups('12345') // ['12', '345'] */
export function digitGroups(digits: string): string[] {
  const groups: string[] = [];
  for (let end = digits.length; end > 0; end -= GROUP_SIZE) {
    groups.unshift(digits.slice(Math.max(0, end - GROUP_SIZE), end));
  }
  return groups;
}

/** A unit stays on the line of its number. */
const SPACE_BEFORE_UNIT = /(?<=\d) (?=(?:rpm|Hz|dB|V|A|s|ms|kB|MB)\b|%)/gu;

/** The parts of a text in order: words as they are, long numbers as their groups. */
export function groupedParts(plainText: string): (string | readonly string[])[] {
  const text = plainText.replaceAll(SPACE_BEFORE_UNIT, '\u00a0');
  const parts: (string | readonly string[])[] = [];
  let position = 0;
  for (const match of text.matchAll(LONG_NUMBER)) {
    if (match.index > position) parts.push(text.slice(position, match.index));
    parts.push(digitGroups(match[0]));
    position = match.index + match[0].length;
  }
  if (position < text.length) parts.push(text.slice(position));
  return parts;
}

/** For canvas, where no margin exists: the same text with thin spaces between the groups. */
export function thinSpaced(text: string): string {
  return groupedParts(text)
    .map((part) => (typeof part === 'string' ? part : part.join('\u2009')))
    .join('');
}
