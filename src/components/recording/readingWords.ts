import type { Motion, NoRotationReason, ReadingWarning } from '#lib/analysis/reading.ts';
import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { numberText } from '#lib/format/numberText.ts';

const LIKELY_FROM_CONFIDENCE = 0.8;
const VERY_LIKELY_FROM_CONFIDENCE = 0.95;
const IN_A_HUNDRED = 100;

export const MOTION_WORDS: Record<Motion, string> = {
  steady: 'Steady',
  varying: 'The speed changes',
  intermittent: 'Turns with pauses',
  none: 'Nothing turns',
};

/** How far a reading can be trusted, in words and as a count: "Very likely right (97 in 100)". */
export function confidenceWords(confidence: number): string {
  return `${trustWords(confidence)} (${countInHundred(confidence)} in 100)`;
}

/** How far the first of several candidates can be trusted. */
export function firstChanceWords(confidence: number): string {
  return `The first is right in about ${countInHundred(confidence)} of 100 such recordings.`;
}

/** 100 in 100 would be a promise. */
function countInHundred(confidence: number): string {
  return String(Math.min(IN_A_HUNDRED - 1, Math.round(confidence * IN_A_HUNDRED)));
}

function trustWords(confidence: number): string {
  if (confidence >= VERY_LIKELY_FROM_CONFIDENCE) return 'Very likely right';
  if (confidence >= LIKELY_FROM_CONFIDENCE) return 'Likely right';
  return confidence >= UNSURE_BELOW_CONFIDENCE ? 'Perhaps right' : 'Unsure';
}

interface Explanation {
  /** What was heard, or not. */
  readonly why: string;
  /** What would decide. */
  readonly whatDecides: string;
}

export const NO_ROTATION_EXPLANATIONS: Record<NoRotationReason, Explanation> = {
  silence: {
    why: 'The recording is silent.',
    whatDecides: 'Check that the microphone is on and not covered, then record again from 10 cm away.',
  },
  hum: {
    why: 'Only the hum of the mains is in it, which no motor on a battery makes.',
    whatDecides: 'Go away from transformers and chargers and record closer to the motor.',
  },
  'nothing-periodic': {
    why: 'There is sound, but nothing in it repeats as a turning shaft does.',
    whatDecides: 'If it did turn: record closer, for ten seconds, with less noise around, and check the speed range.',
  },
  'too-short': {
    why: 'The stretch with sound is too short to count turns in.',
    whatDecides: 'Record at least five seconds while it runs.',
  },
  clipped: {
    why: 'The sound is cut off: it was too loud for the microphone, so its lines cannot be told apart.',
    whatDecides: 'Record from further away, or lay a cloth over the microphone.',
  },
  speech: {
    why: 'What repeats in it is speech.',
    whatDecides: 'Record while nobody talks.',
  },
};

export const UNSURE_ADVICE =
  'A second recording at another voltage would decide: the right speed moves with it. So would knowing the events per turn for certain.';

export const WARNING_WORDS: Record<ReadingWarning, string> = {
  clipped: 'Parts are too loud for the microphone and cut off.',
  'low-level': 'The sound is very quiet.',
  'dead-channel': 'One channel is empty; the other was used.',
  'opposite-channels': 'The two channels cancel each other; the louder one was used.',
  'header-mismatch': 'The file says another length than it has; what is there was used.',
  partial: 'The file breaks off; what is there was used.',
};

/**
 * A warning, with how much of the sound there is where that is known.
 *
 * @param usableSeconds what could be read
 * @param declaredSeconds what the file says of itself; null when it says nothing that holds
 */
export function warningWords(
  warning: ReadingWarning,
  { usableSeconds, declaredSeconds }: { usableSeconds: number; declaredSeconds: number | null },
): string {
  const isShort = warning === 'partial' && declaredSeconds !== null && usableSeconds < declaredSeconds;
  if (!isShort) return WARNING_WORDS[warning];
  return `The file breaks off: ${numberText(usableSeconds, 1)} of ${numberText(declaredSeconds, 1)} s usable.`;
}

const FAILURE_ADVICE: Record<string, string> = {
  'cannot-decode': 'Record again, or save the sound in another format (WAV, M4A) and upload that.',
  truncated: 'Record again and stop the recorder before the phone locks or the app closes.',
  'not-finite': 'The program that wrote the file has broken it: export it again, as 16-bit WAV if it can.',
  'out-of-range': 'The program that wrote the file has broken it: export it again, as 16-bit WAV if it can.',
  'file-missing': 'The stored file is gone. Upload it again; whoever runs this server should look into it.',
  'worker-lost': 'Analyse it again. If it fails once more, whoever runs this server should look into it.',
};

/** What to do about an analysis that failed with this code. */
export function failureAdvice(code: string): string {
  return FAILURE_ADVICE[code] ?? 'Analyse it again, or record again.';
}
