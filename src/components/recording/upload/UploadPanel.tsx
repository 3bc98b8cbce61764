import { useCallback, useMemo, useState } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { usePageDrop } from '#client/hooks/usePageDrop.ts';
import { useUpdates } from '#client/hooks/useUpdates.ts';
import { useUploadQueue } from '#client/hooks/useUploadQueue.ts';
import { Button } from '#components/ui/Button.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import type { Geometry } from '#lib/schemas/build.ts';
import type { SessionPurpose } from '#lib/schemas/session.ts';
import { cautionsFor } from './cautions.ts';
import { ConditionsSentence, type Choice } from './ConditionsSentence.tsx';
import { FileChoices } from './FileChoices.tsx';
import { LimitsSentence } from './LimitsSentence.tsx';
import { checkConditions, NO_CONDITIONS, type UploadConditions } from './uploadConditions.ts';
import { UploadRow } from './UploadRow.tsx';

export interface BuildChoice extends Choice {
  readonly geometry: Geometry;
}

interface Props {
  readonly benchId: string;
  readonly builds: readonly BuildChoice[];
  /** Sessions to choose from; null on the page of one session. */
  readonly sessions: readonly Choice[] | null;
  /** What is probably true of the next recording. */
  readonly conditions?: Partial<UploadConditions>;
  readonly purpose?: SessionPurpose | null;
}

/** Files into the bench: dropped, chosen, or recorded on the phone. */
export function UploadPanel(props: Props) {
  return (
    <ClientProvider>
      <Panel {...props} />
    </ClientProvider>
  );
}

const NO_FILES: readonly File[] = [];

function Panel({ benchId, builds, sessions, conditions: likely, purpose = null }: Props) {
  const updates = useUpdates();
  const { uploads, queue } = useUploadQueue();
  const [conditions, setConditions] = useState<UploadConditions>({ ...NO_CONDITIONS, ...likely });
  /** Files that came while a blank was wrong. */
  const [heldFiles, setHeldFiles] = useState(NO_FILES);
  const checked = useMemo(() => checkConditions(benchId, conditions), [benchId, conditions]);

  const takeFiles = useCallback(
    (files: readonly File[]) => {
      if (checked.isValid) queue.add(files, checked.fields);
      else setHeldFiles((held) => [...held, ...files]);
    },
    [checked, queue],
  );
  const isDropOver = usePageDrop(takeFiles);
  const geometry = builds.find(({ id }) => id === conditions.buildId)?.geometry ?? null;

  return (
    <div className={`grid gap-4 ${isDropOver ? 'outline-2 outline-offset-8 outline-ink outline-dashed' : ''}`}>
      <ConditionsSentence
        conditions={conditions}
        errors={checked.isValid ? {} : checked.errors}
        builds={builds}
        sessions={sessions}
        onChange={(changes) => {
          setConditions((now) => ({ ...now, ...changes }));
        }}
      />
      <p className="max-w-sentence border-l-[3px] border-ink pl-3">
        {cautionsFor({ geometry, purpose, ...conditions }).join(' ')}
      </p>
      <FileChoices onFiles={takeFiles} isDropOver={isDropOver} />
      <LimitsSentence />
      {heldFiles.length > 0 && (
        <Notice shape="undecided" title={filesWait(heldFiles.length)}>
          <p>Something in the conditions cannot be right. Mend it, then send.</p>
          <Button
            isBusy={!checked.isValid}
            onClick={() => {
              takeFiles(heldFiles);
              setHeldFiles(NO_FILES);
            }}
          >
            Send
          </Button>
        </Notice>
      )}
      {updates === 'lost' && uploads.length > 0 && (
        <Notice shape="undecided" title="No connection for live updates">
          Files that were received are safe. This page asks again every few seconds.
        </Notice>
      )}
      {uploads.length > 0 && (
        <ul aria-label="Files of this visit" className="border-b border-line">
          {uploads.map((upload) => (
            <UploadRow key={upload.key} upload={upload} queue={queue} />
          ))}
        </ul>
      )}
    </div>
  );
}

function filesWait(count: number): string {
  return count === 1 ? 'One file waits' : `${String(count)} files wait`;
}
