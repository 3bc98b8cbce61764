/** Seconds in a minute: the factor between revolutions per minute and turns per second. */
const SECONDS_PER_MINUTE = 60;

/**
 * Turns per second of a shaft.
 *
 * @param shaftRpm shaft speed, revolutions per minute
 * @returns the shaft frequency, Hz
 * @example hertzFromRpm(60) // 1
 */
export function hertzFromRpm(shaftRpm: number): number {
  return shaftRpm / SECONDS_PER_MINUTE;
}

/**
 * Shaft speed from turns per second.
 *
 * @param shaftHz shaft frequency, Hz
 * @returns the shaft speed, rpm
 * @example rpmFromHertz(5) // 300
 */
export function rpmFromHertz(shaftHz: number): number {
  return shaftHz * SECONDS_PER_MINUTE;
}

/**
 * Rate of the sound events of a shaft.
 *
 * @param shaftRpm shaft speed, rpm
 * @param eventsPerTurn sound events in one turn, > 0; may be a fraction
 * @returns the event rate, Hz
 * @example eventHertzFromRpm(2874, 6) // 287.4
 */
export function eventHertzFromRpm(shaftRpm: number, eventsPerTurn: number): number {
  return (shaftRpm * eventsPerTurn) / SECONDS_PER_MINUTE;
}

/**
 * Shaft speed that makes sound events at a given rate.
 *
 * @param eventHz event rate, Hz
 * @param eventsPerTurn sound events in one turn, > 0; may be a fraction
 * @returns the shaft speed, rpm
 * @example rpmFromEventHertz(287.4, 6) // 2874
 */
export function rpmFromEventHertz(eventHz: number, eventsPerTurn: number): number {
  return (eventHz * SECONDS_PER_MINUTE) / eventsPerTurn;
}
