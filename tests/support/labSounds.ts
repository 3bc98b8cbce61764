import { execa } from 'execa';
import { join } from 'node:path';

/** A buzz of 97 events a second (no multiple of the mains), which sox vouches for: 970 rpm at six events a turn. */
export const BUZZ = { eventsPerTurn: 6, rpmMin: 800, rpmMax: 1200 } as const;
export const BUZZ_RPM = 970;

const SAMPLE_RATE_HZ = 48_000;

/** @returns the path of a mono 16-bit WAV */
export async function makeBuzz(folder: string, name: string, durationSeconds: number): Promise<string> {
  const path = join(folder, name);
  const format = ['-r', String(SAMPLE_RATE_HZ), '-b', '16', '-c', '1'];
  await execa('sox', ['-R', '-n', ...format, path, 'synth', String(durationSeconds), 'sawtooth', '97', 'gain', '-12']);
  return path;
}

/** The same sound in a file that only ffmpeg can read. */
export async function encode(path: string, encodedPath: string): Promise<string> {
  await execa('ffmpeg', ['-v', 'error', '-nostdin', '-y', '-i', path, encodedPath]);
  return encodedPath;
}
