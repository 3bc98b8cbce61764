/** Stands for this site while an address is taken apart; no address leads out of it unless it names another site. */
const SITE = 'http://site.invalid';

/**
 * Where to go after signing in, if that is a page of this site.
 *
 * @param address as it stands in `?next=`; anybody may have written it
 * @returns path and query; null for anything that could lead elsewhere, and for addresses that are no pages
 */
export function localPath(address: string | null): string | null {
  if (address === null || !address.startsWith('/') || /[\\\p{Cc}]/u.test(address)) return null;
  if (!URL.canParse(address, SITE)) return null;
  const { origin, pathname, search } = new URL(address, SITE);
  if (origin !== SITE || pathname.startsWith('//') || pathname.startsWith('/api/')) return null;
  return pathname + search;
}
