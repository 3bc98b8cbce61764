import { updatesStream } from '#client/updatesStream.ts';

/** Updates come in bursts while a batch is analysed; the page is fetched once a burst. */
const SETTLE_MILLISECONDS = 500;

/**
 * Keeps server-drawn regions true: when something changed, the page is fetched again and the content of
 * every element with `data-live` and an id is replaced by its newer self. Such a region holds no island.
 */
export function keepRegionsLive(): void {
  let timer: ReturnType<typeof setTimeout> | null = null;
  const refreshSoon = () => {
    timer ??= setTimeout(() => {
      timer = null;
      // What cannot be fetched now comes with the next update or the next visit.
      refreshRegions().catch(() => undefined);
    }, SETTLE_MILLISECONDS);
  };
  updatesStream.listen({ onChange: refreshSoon, onGap: refreshSoon });
}

async function refreshRegions(): Promise<void> {
  const response = await fetch(location.href, { headers: { accept: 'text/html' } });
  // Redirected means signed out: the page stays as it is until somebody acts.
  if (!response.ok || response.redirected) return;
  const newer = new DOMParser().parseFromString(await response.text(), 'text/html');
  for (const region of document.querySelectorAll<HTMLElement>('[data-live][id]')) {
    const replacement = newer.getElementById(region.id);
    if (replacement && replacement.innerHTML !== region.innerHTML) replaceContent(region, replacement);
  }
}

/** The link that has the focus keeps it, as far as it is still there. */
function replaceContent(region: HTMLElement, replacement: HTMLElement): void {
  const focused = document.activeElement;
  const focusedAddress = region.contains(focused) ? (focused?.getAttribute('href') ?? null) : null;
  region.replaceChildren(...[...replacement.childNodes].map((node) => document.importNode(node, true)));
  if (focusedAddress === null) return;
  const links = region.querySelectorAll('a');
  [...links].find((link) => link.getAttribute('href') === focusedAddress)?.focus();
}
