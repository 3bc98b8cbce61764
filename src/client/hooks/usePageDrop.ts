import { useEffect, useState } from 'react';

/**
 * Takes files dropped anywhere on the page.
 *
 * @param onFiles called with the dropped files; must keep its identity between renders
 * @returns whether files hover over the page right now
 */
export function usePageDrop(onFiles: (files: File[]) => void): boolean {
  const [isOver, setIsOver] = useState(false);
  useEffect(() => {
    const events = new AbortController();
    const on = (name: 'dragover' | 'dragleave' | 'drop', handle: (event: DragEvent) => void) => {
      document.addEventListener(name, handle, { signal: events.signal });
    };
    on('dragover', (event) => {
      if (!carriesFiles(event)) return;
      event.preventDefault();
      setIsOver(true);
    });
    on('dragleave', (event) => {
      // Only leaving the window has no element to go to.
      if (event.relatedTarget === null) setIsOver(false);
    });
    on('drop', (event) => {
      if (!carriesFiles(event)) return;
      event.preventDefault();
      setIsOver(false);
      onFiles([...(event.dataTransfer?.files ?? [])]);
    });
    return () => {
      events.abort();
    };
  }, [onFiles]);
  return isOver;
}

function carriesFiles(event: DragEvent): boolean {
  return event.dataTransfer?.types.includes('Files') ?? false;
}
