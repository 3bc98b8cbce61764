import { useSyncExternalStore } from 'react';
import { momentText } from '#lib/format/momentText.ts';

interface Props {
  /** ISO 8601 with offset. */
  readonly moment: string;
}

const nothingChanges = () => () => undefined;

/** A moment in the reader's own time once the script runs, in UTC before. */
export function LocalTime({ moment }: Props) {
  const text = useSyncExternalStore(
    nothingChanges,
    () => momentText(moment, Intl.DateTimeFormat().resolvedOptions().timeZone),
    () => momentText(moment, 'UTC'),
  );
  return <time dateTime={moment}>{text}</time>;
}
