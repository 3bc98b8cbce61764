import { useCallback, useRef, useState, type ComponentProps } from 'react';

interface Listening {
  /** For the <audio> that plays it. */
  readonly audioProps: Pick<ComponentProps<'audio'>, 'ref' | 'onPlaying' | 'onPause' | 'onEnded' | 'onTimeUpdate'>;
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
  const rest = () => {
    setIsPlaying(false);
  };
  return {
    audioProps: {
      ref: audio,
      onPlaying: () => {
        setIsPlaying(true);
      },
      onPause: rest,
      onEnded: rest,
      onTimeUpdate: ({ currentTarget }) => {
        setAtSeconds(currentTarget.currentTime);
      },
    },
    isPlaying,
    atSeconds,
    hasFailed,
    hearFrom,
    stop,
  };
}
