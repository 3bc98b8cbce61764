import { invalidFields } from '../errors.ts';

/** @throws ServerError invalid-fields when nothing lies between the two speeds. */
export function refuseEmptySpeedRange(minimumRpm: number | null, maximumRpm: number | null): void {
  if (minimumRpm === null || maximumRpm === null || minimumRpm < maximumRpm) return;
  throw invalidFields([{ field: 'rpmMax', message: 'Must be above rpmMin.' }]);
}
