import { GroupedText } from '#components/ui/GroupedText.tsx';
import { StateMark } from '#components/ui/StateMark.tsx';
import { uncertainText } from '#lib/format/uncertainText.ts';
import { LocalTime } from './LocalTime.tsx';
import type { SessionRow } from './sessionRows.ts';
import type { SpeedAxis } from './speedAxis.ts';
import { SpeedDots } from './SpeedDots.tsx';
import { SpeedScale } from './SpeedScale.tsx';

interface Props {
  readonly rows: readonly SessionRow[];
  /** The chart's axis; null while nothing is measured. */
  readonly axis: SpeedAxis | null;
  /** Copper until it was seen. */
  readonly newestId: string | null;
}

/** A table on the desk; on the phone each row becomes a block of lines, so that nothing scrolls sideways. */
const ROW =
  'grid grid-cols-[2.5rem_minmax(0,1fr)_auto] items-center gap-x-4 border-b border-line py-2 desk:grid-cols-[2.5rem_minmax(0,3fr)_7rem_minmax(0,4fr)_minmax(0,4fr)]';

/** The recordings of a session. Its dot-and-interval column stands on the chart's axis. */
export function RecordingsTable({ rows, axis, newestId }: Props) {
  return (
    <div role="table" aria-label="Recordings of this session" aria-rowcount={rows.length}>
      <div role="row" className={`${ROW} text-small text-muted`}>
        <span role="columnheader">No.</span>
        <span role="columnheader">Recording</span>
        <span role="columnheader" className="text-right">
          Speed, rpm
        </span>
        <span role="columnheader" className="col-span-3 px-2 desk:col-span-1">
          <span className="sr-only">Dot and 95 % interval</span>
          {axis !== null && <SpeedScale axis={axis} />}
        </span>
        <span role="columnheader" className="hidden desk:block">
          Standing
        </span>
      </div>
      {rows.map((row) => (
        <RecordingRow key={row.recordingId} row={row} axis={axis} isNewest={row.recordingId === newestId} />
      ))}
    </div>
  );
}

function RecordingRow({ row, axis, isNewest }: { row: SessionRow; axis: SpeedAxis | null; isNewest: boolean }) {
  const { recordingId, order, fileName, recordedAt, circumstances, speed, standing } = row;
  return (
    <div role="row" className={ROW}>
      <span role="cell" className="figures text-small text-muted">
        {order}
      </span>
      <span role="cell" className="min-w-0">
        <a href={`/recordings/${recordingId}`} className="flex items-center touch">
          <span className="truncate">{circumstances || fileName}</span>
        </a>
        <span className="flex flex-wrap gap-x-3 text-small text-muted">
          {circumstances !== '' && <span className="truncate">{fileName}</span>}
          <LocalTime moment={recordedAt} />
        </span>
      </span>
      <span role="cell" className={`text-right figures ${isNewest ? 'font-medium text-copper' : ''}`}>
        {speed === null ? '—' : <GroupedText text={speedText(speed)} />}
      </span>
      <span role="cell" className="col-span-3 px-2 desk:col-span-1">
        {axis !== null && speed !== null && (
          <SpeedDots
            axis={axis}
            dots={[{ ...speed, recordingId, isUnsure: row.isUnsure }]}
            newestId={isNewest ? recordingId : null}
          />
        )}
      </span>
      <span role="cell" className="col-span-3 text-small desk:col-span-1">
        {standing.shape === null ? (
          <GroupedText text={standing.sentence} />
        ) : (
          <StateMark shape={standing.shape}>
            <GroupedText text={standing.sentence} />
          </StateMark>
        )}
      </span>
    </div>
  );
}

function speedText(speed: NonNullable<SessionRow['speed']>): string {
  return uncertainText({
    value: speed.rpm,
    low: speed.rpmLow,
    high: speed.rpmHigh,
  }).value;
}
