import { parseNumber } from '#lib/format/parseNumber.ts';
import type { Geometry } from '#lib/schemas/build.ts';
import type { SessionPurpose } from '#lib/schemas/session.ts';

/** From here on touching a contact may hurt: the lower of the direct-voltage bounds of IEC 60364-4-41, 414. */
const TOUCH_CAUTION_VOLTS = 30;
/** From here on a loose contact heats and burns. */
const HEAT_CAUTION_AMPS = 10;

export interface CautionOccasion {
  readonly geometry: Geometry | null;
  readonly purpose: SessionPurpose | null;
  /** As typed; what is not a number asks for no caution of its own. */
  readonly supplyVolts: string;
  readonly currentAmps: string;
}

/** What to mind before this recording, shortest list that fits; never says that something is safe. */
export function cautionsFor({ geometry, purpose, supplyVolts, currentAmps }: CautionOccasion): string[] {
  const cautions = [
    'Hold the motor down, not in the hand. Fingers, hair and sleeves stay away from what turns; eyes are covered.',
  ];
  if (geometry?.blades) cautions.push('Blades: guard on, and nobody in the plane in which they turn.');
  if ((parseNumber(supplyVolts) ?? 0) >= TOUCH_CAUTION_VOLTS) {
    cautions.push('At this voltage bare contacts can hurt: switch off before you touch anything.');
  }
  if ((parseNumber(currentAmps) ?? 0) >= HEAT_CAUTION_AMPS) {
    cautions.push('At this current wires, brushes and loose contacts burn: short runs, and a switch within reach.');
  }
  if (purpose === 'run-time') {
    cautions.push('Stored charge and lithium cells: no shorts, no damaged cell, somebody stays with it.');
  }
  if (purpose === 'class') cautions.push('One motor runs at a time at each table, and an adult switches it on.');
  cautions.push('The rules of your site and the qualified person there come first.');
  return cautions;
}
