import { useCallback, useEffect, useRef, useState, type RefObject } from 'react';

interface Listening {
  readonly audio: RefObject<HTMLAudioElement | null>;
  readonly isPlaying: boolean;
  readonly atSeconds: number;
  readonly hasFailed: boolean;
  readonly hearFrom: (timeSeconds: number) => void;
  readonly stop: () => void;
}

/** Plays a recording from a moment of it. */
export function useListening(): Listening {
  const audio = useRef<HTMLAudioElement>(null);
  const [isPlaying, setIsPlaying] = useState(false);
  const [atSeconds, setAtSeconds] = useState(0);
  const [hasFailed, setHasFailed] = useState(false);
  useEffect(() => {
    const element = audio.current;
    if (element === null) return undefined;
    const stop = new AbortController();
    const listen = (type: string, handle: () => void) => {
      element.addEventListener(type, handle, { signal: stop.signal });
    };
    listen('playing', () => {
      setIsPlaying(true);
    });
    listen('pause', () => {
      setIsPlaying(false);
    });
    listen('ended', () => {
      setIsPlaying(false);
    });
    listen('timeupdate', () => {
      setAtSeconds(element.currentTime);
    });
    return () => {
      stop.abort();
    };
  }, []);
  const hearFrom = useCallback((timeSeconds: number) => {
    const element = audio.current;
    if (element === null) return;
    setHasFailed(false);
    element.currentTime = Math.max(0, timeSeconds);
    element.play().catch((error: unknown) => {
      // A stop before the start is no failure.
      if (!(error instanceof DOMException && error.name === 'AbortError')) setHasFailed(true);
    });
  }, []);
  const stop = useCallback(() => {
    audio.current?.pause();
  }, []);
  return { audio, isPlaying, atSeconds, hasFailed, hearFrom, stop };
}
