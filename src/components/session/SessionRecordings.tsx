import { useMemo } from 'react';
import { useSearchState } from '#client/hooks/useSearchState.ts';
import { Button } from '#components/ui/Button.tsx';
import { WordSwitch } from '#components/ui/WordSwitch.tsx';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { RecordingsTable } from './RecordingsTable.tsx';
import { orderedRows, sessionRows, type RowOrder } from './sessionRows.ts';
import type { SpeedAxis } from './speedAxis.ts';

interface Props {
  /** Newest first. */
  readonly recordings: readonly RecordingView[];
  readonly recordingCount: number;
  readonly axis: SpeedAxis | null;
  readonly newestId: string | null;
  /** From the address. */
  readonly order: RowOrder;
  readonly hasMore: boolean;
  readonly isLoadingMore: boolean;
  readonly onMore: () => void;
}

const CHOICES = [
  { key: 'newest', label: 'newest first' },
  { key: 'supply', label: 'by supply' },
  { key: 'speed', label: 'by speed' },
] as const;

/** The recordings of a session as a table with its order. */
export function SessionRecordings(props: Props) {
  const { recordings, recordingCount, axis, newestId } = props;
  const [order, chooseOrder] = useSearchState<RowOrder>('order', props.order, 'newest');
  const rows = useMemo(
    () => orderedRows(sessionRows(recordings, recordingCount), order),
    [recordings, recordingCount, order],
  );
  return (
    <section aria-labelledby="recordings-heading">
      <div className="flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id="recordings-heading">Recordings</h2>
        {rows.length > 1 && <WordSwitch label="Order" choices={CHOICES} chosen={order} onChoose={chooseOrder} />}
      </div>
      {rows.length === 0 ? (
        <p className="mt-2 max-w-sentence text-muted">
          No recording yet. Hold a phone 10 cm from the running motor for ten seconds, then add the file below.
        </p>
      ) : (
        <RecordingsTable rows={rows} axis={axis} newestId={newestId} />
      )}
      {props.hasMore && (
        <Button weight="word" isBusy={props.isLoadingMore} onClick={props.onMore}>
          {props.isLoadingMore ? 'Fetching older ones' : 'Show older ones'}
        </Button>
      )}
    </section>
  );
}
