/**
 * A moment as people read it: "1 Dec 2026, 14:31".
 *
 * @param isoText ISO 8601 with offset, as the API gives it
 * @param timeZone IANA name; UTC is named in the text, the reader's own zone is not
 * @throws {RangeError} when the text is not a moment or the zone does not exist
 * @example momentText('2026-12-01T14:31:05.120Z', 'UTC') // '1 Dec 2026, 14:31 UTC'
 */
export function momentText(isoText: string, timeZone: string): string {
  // eslint-disable-next-line no-restricted-globals -- a given moment is taken apart; no clock is read
  const moment = new Date(isoText);
  const text = new Intl.DateTimeFormat('en-GB', {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZone,
  }).format(moment);
  return timeZone === 'UTC' ? `${text} UTC` : text;
}
