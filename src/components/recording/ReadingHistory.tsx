import { LocalTime } from '#components/session/LocalTime.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { plainNumberText } from '#lib/format/numberText.ts';
import { uncertainSentence } from '#lib/format/uncertainText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';

interface Props {
  /** Newest first. */
  readonly readings: readonly ReadingView[];
  readonly currentId: string | null;
}

/** All readings of the recording. A reading is never changed; another analysis makes another. */
export function ReadingHistory({ readings, currentId }: Props) {
  return (
    <div className="mt-4">
      <h3 className="text-body">History</h3>
      <ol className="text-small">
        {readings.map((reading) => (
          <li
            key={reading.id}
            className={`border-t border-line py-2 ${reading.id === currentId ? 'border-l-[3px] border-l-ink pl-3' : 'pl-[15px]'}`}
          >
            <LocalTime moment={reading.createdAt} />, engine {reading.engine}, {plainNumberText(reading.eventsPerTurn)}{' '}
            a turn: <GroupedText text={resultText(reading)} />
            {reading.id === currentId && ' (shown)'}
          </li>
        ))}
      </ol>
    </div>
  );
}

function resultText({ rpm, rpmLow, rpmHigh }: ReadingView): string {
  if (rpm === null || rpmLow === null || rpmHigh === null) return 'nothing turning heard';
  return uncertainSentence({ value: rpm, low: rpmLow, high: rpmHigh }, 'rpm');
}
