import { numberText } from '#lib/format/numberText.ts';
import type { ReviewRequest } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { isUnsure } from './recordingStanding.ts';

type Reviewed = Pick<RecordingView, 'reading' | 'review'>;

/** Confirming says what the machine said: its speed, or that nothing turned. */
export function confirmationOf({ reading }: Reviewed): ReviewRequest {
  return {
    decision: reading?.status === 'no-rotation' ? 'nothing-turning' : 'confirm',
    reason: '',
  };
}

/** What the button says: where the page shows several speeds or none, it names what is confirmed. */
export function confirmWords(recording: Reviewed): string {
  const { reading } = recording;
  if (reading?.status === 'no-rotation') return 'Nothing turned';
  if (reading?.rpm == null || !isUnsure(recording)) return 'Confirm';
  return `Confirm ${numberText(reading.rpm, 0)} rpm`;
}
