import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { ApiError } from '#client/api/ApiError.ts';
import { seriesQuery } from '#client/queries/readings.ts';
import { Button } from '#components/ui/Button.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import type { SeriesName } from '#lib/analysis/series.ts';
import type { SeriesView } from '#lib/schemas/reading.ts';

interface Props {
  readonly readingId: string;
  readonly name: SeriesName;
  /** Height of what will stand here, so that nothing jumps when it comes, px. */
  readonly heightPx: number;
  readonly children: (series: SeriesView) => ReactNode;
}

/** Fetches one series and keeps its place until it is there. */
export function SeriesSlot({ readingId, name, heightPx, children }: Props) {
  const { data, error, refetch, isFetching } = useQuery(seriesQuery(readingId, name));
  if (data) return children(data);
  return (
    <div style={{ minHeight: `${String(heightPx)}px` }} className="grid content-center justify-items-start gap-3">
      {error === null ? (
        <>
          <p className="text-muted">The evidence is on its way.</p>
          <noscript>Charts are drawn by a script; this browser runs none.</noscript>
        </>
      ) : (
        <>
          <Notice shape="outside" title="Not loaded">
            {error instanceof ApiError ? error.detail : 'The evidence could not be loaded.'}
          </Notice>
          <Button isBusy={isFetching} onClick={() => void refetch()}>
            Try again
          </Button>
        </>
      )}
    </div>
  );
}
