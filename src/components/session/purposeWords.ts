import type { SessionPurpose } from '#lib/schemas/session.ts';

interface PurposeWords {
  readonly name: string;
  /** What one records, and what comes out. */
  readonly explanation: string;
}

/** The purposes of a session in words. */
export const PURPOSE_WORDS: Record<SessionPurpose, PurposeWords> = {
  'speed-check': {
    name: 'Speed check',
    explanation: 'One motor, one or more recordings: its mean speed, and how well the recordings agree.',
  },
  'voltage-sweep': {
    name: 'Voltage sweep',
    explanation: 'One motor at several supply voltages: its speed–voltage line and speed constant.',
  },
  'coast-down': {
    name: 'Coast-down',
    explanation: 'The supply is cut while it records: how fast the motor slows, and what friction that means.',
  },
  'run-time': {
    name: 'Run time',
    explanation: 'Long or repeated recordings on a cell or a stored charge: the speed over time until it stops.',
  },
  load: { name: 'Load', explanation: 'Several loads, gears or fans: how far the speed drops under each.' },
  batch: {
    name: 'Batch',
    explanation: 'Many motors against limits: those that pass, those that fail, those that need a person.',
  },
  class: { name: 'Class', explanation: 'Many builds under the same conditions: a fair comparison with intervals.' },
};
