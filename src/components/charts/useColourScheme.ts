import { useSyncExternalStore } from 'react';

/**
 * Changes whenever the colours of the page may have changed: theme switch, device setting, print.
 * What is drawn on a canvas is drawn anew for it.
 */
export function useColourScheme(): string {
  return useSyncExternalStore(subscribe, currentScheme, () => 'server');
}

const QUERIES = ['(prefers-color-scheme: dark)', 'print'];

function currentScheme(): string {
  const media = QUERIES.map((query) => String(matchMedia(query).matches)).join(' ');
  return `${document.documentElement.dataset.theme ?? 'system'} ${media}`;
}

function subscribe(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange);
  observer.observe(document.documentElement, { attributeFilter: ['data-theme'] });
  const lists = QUERIES.map((query) => matchMedia(query));
  for (const list of lists) list.addEventListener('change', onChange);
  return () => {
    observer.disconnect();
    for (const list of lists) list.removeEventListener('change', onChange);
  };
}
