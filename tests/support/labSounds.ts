import type { MediaFolder } from '#tests/fixtures/media/makeMedia.ts';

/** A buzz of 97 events a second (no multiple of the mains), which sox vouches for: 970 rpm at six events a turn. */
export const BUZZ = { eventsPerTurn: 6, rpmMin: 800, rpmMax: 1200 } as const;
export const BUZZ_RPM = 970;

const MONO_16_BIT = ['-n', '-r', '48000', '-b', '16', '-c', '1'];

/** @returns the path of a mono 16-bit WAV at 48 kHz */
export function makeBuzz(folder: MediaFolder, name: string, durationSeconds: number): Promise<string> {
  return folder.sox(name, MONO_16_BIT, ['synth', String(durationSeconds), 'sawtooth', '97', 'gain', '-12']);
}

/** @returns the path of a mono 16-bit WAV of zeros */
export function makeSilence(folder: MediaFolder, name: string, durationSeconds: number): Promise<string> {
  return folder.sox(name, MONO_16_BIT, ['trim', '0', String(durationSeconds)]);
}

/** The same sound in another format, by ffmpeg. @returns its path */
export function encode(folder: MediaFolder, path: string, name: string, codec?: string): Promise<string> {
  const chosen = codec === undefined ? [] : ['-c:a', codec];
  return folder.ffmpeg(name, '-i', path, ...chosen);
}
