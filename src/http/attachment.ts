const NOT_IN_QUOTES = /[^\x20-\x7E]|["\\%]/gu;
const NOT_IN_EXTENDED_VALUE = /['()*]/g;

/**
 * Content-Disposition that saves a file under its name, whatever the name is.
 * Reference: RFC 6266 section 4.3 and appendix D; RFC 8187 section 3.2.
 *
 * @example attachment('lüfter.wav') // `attachment; filename="l_fter.wav"; filename*=UTF-8''l%C3%BCfter.wav`
 */
export function attachment(fileName: string): string {
  const plain = fileName.replaceAll(NOT_IN_QUOTES, '_');
  const extended = encodeURIComponent(fileName).replaceAll(
    NOT_IN_EXTENDED_VALUE,
    (character) => `%${character.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${extended}`;
}
