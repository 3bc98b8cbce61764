import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { readingsQuery } from '#client/queries/readings.ts';
import { LocalTime } from '#components/session/LocalTime.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { byteText } from '#lib/format/byteText.ts';
import { numberText, plainNumberText } from '#lib/format/numberText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { ReadingHistory } from './ReadingHistory.tsx';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
  /** Newest first. */
  readonly readings: readonly ReadingView[];
}

/** Where the figure comes from: the file, its hash, how it was read, by which engine, and all readings so far. */
export function Origin({ recording, readings }: Props) {
  return (
    <ClientProvider>
      <LiveOrigin initial={recording} initialReadings={readings} />
    </ClientProvider>
  );
}

interface LiveProps {
  readonly initial: RecordingView;
  readonly initialReadings: readonly ReadingView[];
}

function LiveOrigin({ initial, initialReadings }: LiveProps) {
  const recording = useRecording(initial);
  const { data } = useQuery({
    ...readingsQuery(initial.id),
    initialData: { items: [...initialReadings], nextCursor: null },
  });
  return <OriginTable recording={recording} readings={data.items} />;
}

function OriginTable({ recording, readings }: Props) {
  const { fileName, byteCount, sha256, uploadedBy, createdAt, reading, duplicateOf } = recording;
  return (
    <section aria-labelledby="origin" className="mt-6 border-t border-line pt-4 desk:mt-10">
      <h2 id="origin" className="mb-3">
        Origin
      </h2>
      <table className="w-full max-w-[52rem] table-fixed text-small">
        <tbody>
          <Row name="File">
            <span className="break-all">{fileName}</span>, {byteText(byteCount)}{' '}
            <a
              className="inline-flex items-center touch print:hidden"
              href={`/api/v1/recordings/${recording.id}/original`}
              download
            >
              Download the original
            </a>
          </Row>
          <Row name="SHA-256">
            <code className="figures break-all">{sha256}</code>
          </Row>
          {duplicateOf !== null && (
            <Row name="Same bytes">
              as <a href={`/recordings/${duplicateOf}`}>an earlier recording</a>
            </Row>
          )}
          <Row name="Sound">
            <GroupedText text={soundText(recording)} />
          </Row>
          <Row name="Uploaded">
            {uploadedBy.name}, <LocalTime moment={createdAt} />
          </Row>
          {reading !== null && (
            <>
              <Row name="Engine">
                {reading.engine}, {numberText(reading.elapsedMs, 0)} ms of work
              </Row>
              <Row name="Settings">
                <GroupedText text={settingsText(reading)} />
              </Row>
            </>
          )}
        </tbody>
      </table>
      {readings.length > 1 && <ReadingHistory readings={readings} currentId={reading?.id ?? null} />}
    </section>
  );
}

function Row({ name, children }: { name: string; children: ReactNode }) {
  return (
    <tr className="border-t border-line align-baseline first:border-t-0">
      <th scope="row" className="w-24 py-2 pr-4 desk:w-32">
        {name}
      </th>
      <td className="py-2">{children}</td>
    </tr>
  );
}

/** What the sound is made of: what the file says, then what the reading found. */
function soundText({ media, reading }: RecordingView): string {
  const sampleRateHz = reading?.sampleRate ?? media.sampleRateHz;
  const durationSeconds = reading?.durationSeconds ?? media.durationSeconds;
  const { channelCount } = media;
  return [
    media.codec === null ? media.container : `${media.codec} in ${media.container}`,
    sampleRateHz !== null && `${plainNumberText(sampleRateHz)} Hz`,
    channelCount !== null && (channelCount === 1 ? 'one channel' : `${String(channelCount)} channels`),
    durationSeconds !== null && `${numberText(durationSeconds, 2)} s`,
  ]
    .filter((part) => part !== false)
    .join(', ');
}

function settingsText({ settings }: ReadingView): string {
  const { eventsPerTurn, orders, rpmMin, rpmMax, channel, fromSeconds, toSeconds } = settings;
  return [
    `${plainNumberText(eventsPerTurn)} ${eventsPerTurn === 1 ? 'event' : 'events'} a turn`,
    orders.length > 1 && `orders ${orders.map(plainNumberText).join(', ')}`,
    `${plainNumberText(rpmMin)} to ${plainNumberText(rpmMax)} rpm`,
    channel !== 'auto' && `channel ${String(channel + 1)}`,
    (fromSeconds !== null || toSeconds !== null) &&
      `from ${plainNumberText(fromSeconds ?? 0)} s to ${toSeconds === null ? 'the end' : `${plainNumberText(toSeconds)} s`}`,
  ]
    .filter((part) => part !== false)
    .join('; ');
}
