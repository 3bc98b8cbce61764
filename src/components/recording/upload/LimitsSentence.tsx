import { byteText } from '#lib/format/byteText.ts';
import {
  ACCEPTED_FILE_EXTENSIONS,
  MAXIMUM_DURATION_SECONDS,
  MAXIMUM_SAMPLE_RATE_HZ,
  MAXIMUM_UPLOAD_BYTES,
  MINIMUM_DURATION_SECONDS,
  MINIMUM_SAMPLE_RATE_HZ,
} from '#lib/schemas/uploadLimits.ts';

const SECONDS_PER_MINUTE = 60;
const HERTZ_PER_KILOHERTZ = 1000;
const FORMATS = ACCEPTED_FILE_EXTENSIONS.map((extension) => extension.slice(1)).join(', ');

/** What a file may be, told before it is chosen. */
export function LimitsSentence() {
  return (
    <p className="max-w-sentence text-small text-muted">
      Sound or video with sound, {MINIMUM_DURATION_SECONDS} s to {MAXIMUM_DURATION_SECONDS / SECONDS_PER_MINUTE} min, at
      most {byteText(MAXIMUM_UPLOAD_BYTES)} a file, {MINIMUM_SAMPLE_RATE_HZ / HERTZ_PER_KILOHERTZ} to{' '}
      {MAXIMUM_SAMPLE_RATE_HZ / HERTZ_PER_KILOHERTZ} kHz ({FORMATS}). Ten seconds close to the motor are plenty.
    </p>
  );
}
