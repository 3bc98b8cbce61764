import { Fragment, type ReactNode } from 'react';
import { LocalTime } from '#components/session/LocalTime.tsx';
import { numberText, plainNumberText } from '#lib/format/numberText.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

/** From here on tenths of a second tell nothing. */
const WHOLE_SECONDS_FROM = 10;

/** What was recorded, under which conditions, by whom and when: one quiet line above the claim. */
export function QuietLine({ recording }: { readonly recording: RecordingView }) {
  const { build, supplyVolts, currentAmps, media, uploadedBy, createdAt, fileName } = recording;
  const durationSeconds = recording.reading?.durationSeconds ?? media.durationSeconds;
  const parts: ReactNode[] = [
    build === null ? (
      fileName
    ) : (
      <a href={`/builds/${build.id}`}>
        {build.name}, revision {build.revision}
      </a>
    ),
    supplyVolts !== null && `${plainNumberText(supplyVolts)} V`,
    currentAmps !== null && `${plainNumberText(currentAmps)} A`,
    durationSeconds !== null && `${numberText(durationSeconds, durationSeconds < WHOLE_SECONDS_FROM ? 1 : 0)} s`,
    <>
      {uploadedBy.name}, <LocalTime moment={createdAt} />
    </>,
  ].filter((part) => part !== false);
  return (
    <p className="text-small text-muted">
      {parts.map((part, index) => (
        <Fragment key={index}>
          {index > 0 && <span aria-hidden="true"> · </span>}
          {part}
        </Fragment>
      ))}
    </p>
  );
}
