import { plainNumberText } from '#lib/format/numberText.ts';
import { CommutatorRing } from './CommutatorRing.tsx';
import type { LiveEvents } from './liveEvents.ts';

interface Props {
  /** Null while the typed counts make no motor. */
  readonly events: LiveEvents | null;
  /** What a person set instead of the computed number. */
  readonly givenEventsPerTurn: number | null;
}

const NO_PARTS = { poles: null, segments: null, blades: null, teeth: null, magnets: null };

/** The ring at its largest, where counting it explains the events per turn. */
export function BuildRing({ events, givenEventsPerTurn }: Props) {
  const count = givenEventsPerTurn ?? events?.eventsPerTurn;
  return (
    <figure className="grid justify-items-start gap-3" aria-live="polite">
      <CommutatorRing
        geometry={events?.geometry ?? NO_PARTS}
        size={240}
        {...(events !== null && { eventsPerTurn: events.eventsPerTurn })}
      />
      <figcaption className="max-w-sentence">
        {count !== undefined && (
          <p className="text-lead">
            {plainNumberText(count)} sound {count === 1 ? 'event' : 'events'} a turn
          </p>
        )}
        {events === null ? (
          <p>These counts do not make a motor yet: whole numbers from 1, magnets in pairs.</p>
        ) : (
          <p className="text-muted">{events.explanation}</p>
        )}
        {givenEventsPerTurn !== null && events !== null && givenEventsPerTurn !== events.eventsPerTurn && (
          <p>
            Set by hand; the parts say {plainNumberText(events.eventsPerTurn)}. Speeds are counted by the number set by
            hand.
          </p>
        )}
      </figcaption>
    </figure>
  );
}
