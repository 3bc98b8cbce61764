import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { useSearchState } from '#client/hooks/useSearchState.ts';
import { useSeenMark } from '#client/hooks/useSeenMark.ts';
import { useUpdates } from '#client/hooks/useUpdates.ts';
import { recordingsQuery } from '#client/queries/recordings.ts';
import { sessionQuery, sessionResultQuery } from '#client/queries/sessions.ts';
import { speedOf, type MeasuredSpeed } from '#components/recording/recordingStanding.ts';
import { Notice } from '#components/ui/Notice.tsx';
import type { Page } from '#lib/schemas/page.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import type { SessionResultView, SessionView } from '#lib/schemas/session.ts';
import { DerivedFigures } from './DerivedFigures.tsx';
import { SessionClaim } from './SessionClaim.tsx';
import { SessionConditionsLine } from './SessionConditionsLine.tsx';
import { SessionRecordings } from './SessionRecordings.tsx';
import { SessionTrend } from './SessionTrend.tsx';
import type { RowOrder } from './sessionRows.ts';
import { linearSpeedAxis } from './speedAxis.ts';
import type { TrendBy } from './trendPlot.ts';

interface Props {
  readonly session: SessionView;
  readonly result: SessionResultView;
  readonly recordings: Page<RecordingView>;
  /** From the address. */
  readonly order: RowOrder;
  readonly by: TrendBy | null;
}

/** Claim, conditions, chart with derived values, table: one session, kept true while it is looked at. */
export function SessionBoard(props: Props) {
  return (
    <ClientProvider>
      <Board {...props} />
    </ClientProvider>
  );
}

function speedsOf(recording: RecordingView): MeasuredSpeed[] {
  const speed = speedOf(recording);
  return speed === null ? [] : [speed];
}

function Board(props: Props) {
  const updates = useUpdates();
  const { data: session } = useQuery({ ...sessionQuery(props.session.id), initialData: props.session });
  const { data: result } = useQuery({ ...sessionResultQuery(session.id), initialData: props.result });
  const list = useInfiniteQuery({
    ...recordingsQuery({ sessionId: session.id }),
    initialData: { pages: [props.recordings], pageParams: [null] },
  });
  const recordings = useMemo(() => list.data.pages.flatMap((page) => page.items), [list.data]);
  const axis = useMemo(
    () => linearSpeedAxis([...result.points, ...recordings.flatMap(speedsOf)]),
    [result.points, recordings],
  );
  const newest = result.points.at(-1)?.recordingId ?? null;
  const isNewestNew = useSeenMark(session.id, newest);
  const newestId = isNewestNew ? newest : null;
  const naturalBy = session.purpose === 'voltage-sweep' ? 'supply' : 'order';
  const [by, chooseBy] = useSearchState<TrendBy>('x', props.by ?? naturalBy, naturalBy);

  return (
    <div className="grid gap-8">
      <SessionClaim result={result} />
      <SessionConditionsLine session={session} />
      {updates === 'lost' && (
        <Notice shape="undecided" title="No connection for live updates">
          What stands here may be older than what is known. Trying again.
        </Notice>
      )}
      <div className="columns-12">
        <div className="desk:col-span-7">
          <SessionTrend points={result.points} axis={axis} by={by} onBy={chooseBy} newestId={newestId} />
        </div>
        <div className="desk:col-span-5">
          <DerivedFigures result={result} />
        </div>
      </div>
      <SessionRecordings
        recordings={recordings}
        recordingCount={session.recordingCount}
        axis={axis}
        newestId={newestId}
        order={props.order}
        hasMore={list.hasNextPage}
        isLoadingMore={list.isFetchingNextPage}
        onMore={() => void list.fetchNextPage()}
      />
    </div>
  );
}
