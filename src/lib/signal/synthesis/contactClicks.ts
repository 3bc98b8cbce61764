import type { Random } from './random.ts';
import { excite } from './resonance.ts';
import type { Resonance } from './resonance.ts';
import type { ShaftMotion } from './speedProfile.ts';

/** Clicks of contacts, brush gaps or teeth that pass a fixed point. */
export interface ContactOptions {
  /** Contacts around the shaft, each making one click a turn; a positive integer. */
  readonly perTurn: number;
  /** Amplitude of a click before the resonances, full scale ±1. */
  readonly amplitude: number;
  /** Fixed differences of strength between the contacts, [0, 1): 0.5 lets them range from 0.5 to 1. */
  readonly strengthUnevenness: number;
  /** Fixed displacement of each contact from even spacing, fraction of the spacing, [0, 0.3]. */
  readonly spacingUnevenness: number;
  /** Random displacement of every click, fraction of the spacing, root mean square, [0, 0.2]. */
  readonly jitter: number;
  /** Chance that a click fails to sound, [0, 1). */
  readonly missingFraction: number;
  /** What a click makes ring. */
  readonly resonances: readonly Resonance[];
}

/** Random variation of the strength of single clicks, root mean square: contact bounce. */
const STRENGTH_SCATTER = 0.15;

/** Adds the clicks of `options` for the given motion to `output`, shape [sampleCount]. */
export function addContactClicks(
  output: Float64Array,
  motion: ShaftMotion,
  options: ContactOptions & {
    readonly sampleRateHz: number;
    readonly random: Random;
  },
): void {
  const { perTurn, random } = options;
  const impulses = new Float64Array(output.length);
  const contacts = Array.from({ length: perTurn }, (_, contact) => ({
    turn: (contact + options.spacingUnevenness * random.between(-1, 1)) / perTurn,
    strength: options.amplitude * (1 - options.strengthUnevenness * random.uniform()),
  }));
  for (const contact of contacts) {
    // Each pass has its own jitter; it is at most a fraction of the spacing, so passes stay in order.
    let pass = Math.ceil((motion.turns[0] ?? 0) - contact.turn);
    let due = pass + contact.turn;
    for (let sample = 1; sample < output.length; sample++) {
      const before = motion.turns[sample - 1] as number;
      const after = motion.turns[sample] as number;
      if (after < due) continue;
      if (random.uniform() >= options.missingFraction && after > before) {
        placeImpulse(
          impulses,
          sample - (after - due) / (after - before),
          contact.strength * (1 + STRENGTH_SCATTER * random.normal()),
        );
      }
      pass++;
      due = pass + contact.turn + (options.jitter / perTurn) * random.normal();
    }
  }
  excite(output, impulses, options.resonances, options.sampleRateHz);
}

/** Splits an impulse between the two samples around a fractional position. */
function placeImpulse(impulses: Float64Array, position: number, amplitude: number): void {
  const left = Math.max(0, Math.floor(position));
  const part = position - left;
  impulses[left] = (impulses[left] ?? 0) + amplitude * (1 - part);
  if (left + 1 < impulses.length) impulses[left + 1] = (impulses[left + 1] as number) + amplitude * part;
}
