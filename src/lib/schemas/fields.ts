import * as z from 'zod/mini';

/** Field types that several schemas share; limits are written here once. */

export const NOTE_MAXIMUM_CHARACTERS = 2000;
export const NAME_MAXIMUM_CHARACTERS = 120;
export const FILE_NAME_MAXIMUM_CHARACTERS = 255;
export const EVENTS_PER_TURN_MAXIMUM = 1000;
export const EXPECTED_ORDERS_MAXIMUM_COUNT = 16;
export const SHAFT_SPEED_MAXIMUM_RPM = 1_000_000;
export const SUPPLY_MAXIMUM_VOLTS = 1000;
export const CURRENT_MAXIMUM_AMPS = 1000;

export const identifier = z.uuid('Must be an identifier (UUID).');

/** A text on one line; control characters and unpaired surrogates are refused because nothing can show them. */
export const oneLine = (maximumCharacters: number) =>
  z.string('Must be text.').check(
    z.trim(),
    z.minLength(1, 'Must not be empty.'),
    z.maxLength(maximumCharacters, `Must be at most ${String(maximumCharacters)} characters.`),
    z.refine((text) => !/\p{Cc}/u.test(text) && text.isWellFormed(), 'Must be one line of plain text.'),
  );

export const note = z.string('Must be text.').check(
  z.maxLength(NOTE_MAXIMUM_CHARACTERS, `Must be at most ${String(NOTE_MAXIMUM_CHARACTERS)} characters.`),
  z.refine(
    (text) => text.isWellFormed() && !/[^\P{Cc}\n\r\t]/u.test(text),
    'Must be plain text without control characters.',
  ),
);

const positiveUpTo = (maximum: number, unit: string) => {
  const message = `Must be a number above 0 and at most ${String(maximum)}${unit && ` ${unit}`}.`;
  return z.number(message).check(z.gt(0, message), z.lte(maximum, message));
};

const zeroUpTo = (maximum: number, unit: string) => {
  const message = `Must be a number from 0 to ${String(maximum)} ${unit}.`;
  return z.number(message).check(
    z.gte(0, message),
    z.lte(maximum, message),
    z.refine((value) => !Object.is(value, -0), message),
  );
};

export const eventsPerTurn = positiveUpTo(EVENTS_PER_TURN_MAXIMUM, '');
export const expectedOrders = z
  .array(eventsPerTurn, 'Must be a list of numbers.')
  .check(z.maxLength(EXPECTED_ORDERS_MAXIMUM_COUNT, `At most ${String(EXPECTED_ORDERS_MAXIMUM_COUNT)} orders.`));
export const shaftSpeedRpm = positiveUpTo(SHAFT_SPEED_MAXIMUM_RPM, 'rpm');
export const supplyVolts = zeroUpTo(SUPPLY_MAXIMUM_VOLTS, 'V');
export const currentAmps = zeroUpTo(CURRENT_MAXIMUM_AMPS, 'A');
