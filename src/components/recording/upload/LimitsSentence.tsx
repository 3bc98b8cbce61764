import { byteText } from '#lib/format/byteText.ts';
import {
  MAXIMUM_DURATION_SECONDS,
  MAXIMUM_SAMPLE_RATE_HZ,
  MAXIMUM_UPLOAD_BYTES,
  MINIMUM_DURATION_SECONDS,
  MINIMUM_SAMPLE_RATE_HZ,
} from '#lib/schemas/uploadLimits.ts';

const SECONDS_PER_MINUTE = 60;
const HERTZ_PER_KILOHERTZ = 1000;
/** What phones and recorders write; the file chooser knows the whole list. */
const FORMATS = 'm4a, mp4, mov, 3gp, webm, ogg, mp3, flac, wav and other common formats';

/** What a file may be, told before it is chosen. */
export function LimitsSentence() {
  return (
    <p className="max-w-sentence text-small text-muted">
      Sound or video with sound: {FORMATS}. {MINIMUM_DURATION_SECONDS} s to{' '}
      {MAXIMUM_DURATION_SECONDS / SECONDS_PER_MINUTE} min, at most {byteText(MAXIMUM_UPLOAD_BYTES)} a file,{' '}
      {MINIMUM_SAMPLE_RATE_HZ / HERTZ_PER_KILOHERTZ} to {MAXIMUM_SAMPLE_RATE_HZ / HERTZ_PER_KILOHERTZ} kHz. Ten seconds
      close to the motor are plenty.
    </p>
  );
}
