import type { ReactNode } from 'react';
import type { Upload } from '#client/uploads/upload.ts';
import type { UploadQueue } from '#client/uploads/uploadQueue.ts';
import { Button } from '#components/ui/Button.tsx';
import { ProgressBar } from '#components/ui/ProgressBar.tsx';
import { StateMark, type StateShape } from '#components/ui/StateMark.tsx';
import { byteText } from '#lib/format/byteText.ts';
import { ReceivedState } from './ReceivedState.tsx';

interface Props {
  readonly upload: Upload;
  readonly queue: UploadQueue;
}

/** One file on its way, until its speed is known. */
export function UploadRow({ upload, queue }: Props) {
  return (
    <li className="grid gap-x-6 border-t border-line py-3 desk:grid-cols-[minmax(0,1fr)_minmax(0,2fr)_16rem] desk:items-center">
      <span className="truncate" title={upload.file.name}>
        {upload.file.name}
      </span>
      <div className="min-w-0">
        <UploadStateWords upload={upload} />
      </div>
      <div className="flex gap-3 desk:justify-end">
        <UploadActions upload={upload} queue={queue} />
      </div>
    </li>
  );
}

function UploadStateWords({ upload: { state, file } }: { upload: Upload }) {
  switch (state.phase) {
    case 'waiting':
      return <Told shape="waiting" word="Waiting for its turn" />;
    case 'sending':
      return (
        <>
          <span className="text-small">{sentBytesText(state.sentBytes, file.size)}</span>
          <ProgressBar label={`Sending ${file.name}`} fraction={state.sentBytes / file.size} />
        </>
      );
    case 'paused':
      return (
        <Told shape="undecided" word="Not sent yet">
          {state.error.detail} Trying again in {state.pauseSeconds} s.
        </Told>
      );
    case 'received':
      return <ReceivedState recordingId={state.recordingId} duplicateOf={state.duplicateOf} />;
    case 'refused':
      return (
        <Told shape="outside" word="Not taken">
          {state.error.detail}
        </Told>
      );
    case 'cancelled':
      return <Told shape="waiting" word="Cancelled" />;
  }
}

/** All bytes have left, yet the server has not said that they are safe. */
function sentBytesText(sentBytes: number, totalBytes: number): string {
  if (sentBytes >= totalBytes) return `${byteText(totalBytes)} sent; being checked`;
  return `${byteText(sentBytes)} of ${byteText(totalBytes)}`;
}

function Told({ shape, word, children }: { shape: StateShape; word: string; children?: ReactNode }) {
  return (
    <>
      <StateMark shape={shape}>{word}</StateMark>
      {children !== undefined && <p className="max-w-sentence text-small">{children}</p>}
    </>
  );
}

function UploadActions({ upload: { key, file, state }, queue }: Props) {
  const word = (label: string, act: (key: string) => void) => (
    <Button
      weight="word"
      aria-label={`${label}: ${file.name}`}
      onClick={() => {
        act(key);
      }}
    >
      {label}
    </Button>
  );
  const cancel = word('Cancel', (uploadKey) => {
    queue.cancel(uploadKey);
  });
  const retry = (label: string) =>
    word(label, (uploadKey) => {
      queue.retry(uploadKey);
    });
  const dismiss = word('Remove from list', (uploadKey) => {
    queue.dismiss(uploadKey);
  });
  switch (state.phase) {
    case 'waiting':
    case 'sending':
      return cancel;
    case 'paused':
      return (
        <>
          {retry('Try now')}
          {cancel}
        </>
      );
    case 'refused':
      return (
        <>
          {retry('Try again')}
          {dismiss}
        </>
      );
    case 'cancelled':
      return (
        <>
          {retry('Send after all')}
          {dismiss}
        </>
      );
    case 'received':
      return dismiss;
  }
}
