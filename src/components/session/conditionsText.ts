import { plainNumberText } from '#lib/format/numberText.ts';
import type { SessionConditions } from '#lib/schemas/session.ts';

/**
 * The conditions of a session as one sentence; what nobody wrote down is left out.
 *
 * @example conditionsText({ supplyVolts: 6, load: 'no load', ambientCelsius: 21, note: null }) // 'At 6 V, no load, 21 °C.'
 */
export function conditionsText({ supplyVolts, load, ambientCelsius, note }: SessionConditions): string {
  const parts = [
    supplyVolts === null ? null : `at ${plainNumberText(supplyVolts)} V`,
    load,
    ambientCelsius === null ? null : `${plainNumberText(ambientCelsius)} °C`,
  ].filter((part) => part !== null);
  const sentence = parts.join(', ');
  const conditions = sentence === '' ? 'No conditions were written down.' : `${capitalised(sentence)}.`;
  return note === null ? conditions : `${conditions} ${note}`;
}

function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
