/**
 * What a recording may be, in one place: the upload panel says these before a file is chosen, the
 * endpoint refuses by them, and the decoder stops at them.
 */

/** Largest upload, bytes (200 MB). */
export const MAXIMUM_UPLOAD_BYTES = 200_000_000;

/** Shortest recording that can carry a reading, seconds. */
export const MINIMUM_DURATION_SECONDS = 0.5;
/** Longest recording, seconds (10 minutes). */
export const MAXIMUM_DURATION_SECONDS = 600;

/** Lowest sample rate, Hz: telephone sound, as AMR records it. */
export const MINIMUM_SAMPLE_RATE_HZ = 8000;
/** Highest sample rate, Hz. */
export const MAXIMUM_SAMPLE_RATE_HZ = 192_000;

/** Most channels in one sound track. */
export const MAXIMUM_CHANNELS = 8;

/** File name extensions of the containers that are read, lower case with the dot. */
export const ACCEPTED_FILE_EXTENSIONS = [
  '.wav',
  '.w64',
  '.m4a',
  '.mp4',
  '.mov',
  '.3gp',
  '.3g2',
  '.amr',
  '.aac',
  '.mp3',
  '.webm',
  '.mkv',
  '.mka',
  '.ogg',
  '.oga',
  '.opus',
  '.flac',
  '.caf',
  '.aiff',
  '.aif',
] as const;

/** Media types for a file chooser. Phones offer their recorder and gallery for these; the content decides, not the name. */
const ACCEPTED_MEDIA_TYPES = ['audio/*', 'video/*'] as const;

/** Value for the `accept` attribute of a file chooser. */
export const FILE_CHOOSER_ACCEPT = [...ACCEPTED_MEDIA_TYPES, ...ACCEPTED_FILE_EXTENSIONS].join(',');
