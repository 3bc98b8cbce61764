import { FILE_NAME_MAXIMUM_CHARACTERS } from './fields.ts';

/** Stands for a name that is empty or says nothing. */
export const UNNAMED_FILE = 'unnamed';

const FOLDERS = /^.*[/\\]/su;
/** Control characters, and those that turn the direction of text so that "fdp.exe" reads as "exe.pdf". */
const UNSHOWABLE = /[\p{Cc}\u061C\u200E\u200F\u202A-\u202E\u2066-\u2069\u2028\u2029]/gu;
const EXTENSION = /\.[^.\s]{1,12}$/u;
const CUT_MARK = '…';

/**
 * The name under which a file is shown. It is a label, never a path: bytes are stored under an id.
 *
 * @param given what the client calls the file; may hold folders of its own machine
 * @returns one line of 1 to 255 characters; a longer name is cut in front of its extension, with an ellipsis
 * @example shownFileName('C:\\motors\\run 3.wav') // 'run 3.wav'
 * @example shownFileName('..') // 'unnamed'
 */
export function shownFileName(given: string): string {
  const name = given.toWellFormed().replace(FOLDERS, '').replaceAll(UNSHOWABLE, '').trim();
  if (name === '' || name === '.' || name === '..') return UNNAMED_FILE;
  const characters = [...name];
  if (characters.length <= FILE_NAME_MAXIMUM_CHARACTERS) return name;
  const extension = EXTENSION.exec(name)?.[0] ?? '';
  const keptCharacters = FILE_NAME_MAXIMUM_CHARACTERS - [...extension].length - CUT_MARK.length;
  return characters.slice(0, keptCharacters).join('') + CUT_MARK + extension;
}
