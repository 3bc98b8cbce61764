import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { ApiError } from '#client/api/ApiError.ts';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { buildsQuery } from '#client/queries/builds.ts';
import { updateRecordingMutation } from '#client/queries/recordings.ts';
import { Button } from '#components/ui/Button.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import { NOTE_MAXIMUM_CHARACTERS } from '#lib/schemas/fields.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { checkForm, formOf, isSameForm, type ConditionsForm } from './conditionsForm.ts';
import { ChoiceBlank, TypedBlank } from './upload/Blank.tsx';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

const NUMBER_CHARACTERS = 6;
const NOTE_CHARACTERS = 28;

/** The conditions of one recording as a sentence, with blanks for those who may fill them. */
export function Conditions({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveConditions initial={recording} />
    </ClientProvider>
  );
}

function LiveConditions({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  return (
    <section aria-labelledby="conditions" className="mt-6 border-t border-line pt-4 desk:mt-10">
      <h2 id="conditions" className="mb-3">
        Conditions
      </h2>
      {recording.abilities.canEdit ? (
        <>
          <Blanks recording={recording} />
          <p className="hidden max-w-sentence print:block">{conditionsWords(recording)}</p>
        </>
      ) : (
        <p className="max-w-sentence">{conditionsWords(recording)}</p>
      )}
    </section>
  );
}

function Blanks({ recording }: Props) {
  const queryClient = useQueryClient();
  const { data: builds } = useQuery(buildsQuery(recording.benchId));
  const { mutate, isPending, error, isSuccess } = useMutation(updateRecordingMutation(queryClient, recording.id));
  const saved = formOf(recording);
  const [typed, setTyped] = useState<ConditionsForm | null>(null);
  const form = typed ?? saved;
  const isChanged = !isSameForm(form, saved);
  const checked = checkForm(form);
  const blank = (name: keyof ConditionsForm) => ({
    value: form[name],
    error: checked.isValid ? undefined : checked.errors[name],
    onChange: (value: string) => {
      setTyped({ ...form, [name]: value });
    },
  });
  const choices = choicesWith(recording.build, builds?.items ?? []);
  return (
    <form
      className="grid gap-3 print:hidden"
      onSubmit={(event) => {
        event.preventDefault();
        if (checked.isValid)
          mutate(checked.changes, {
            onSuccess: () => {
              setTyped(null);
            },
          });
      }}
    >
      <div className="flex flex-wrap items-center gap-x-2 gap-y-3">
        <span>The motor is</span>
        <ChoiceBlank label="Build" noneName="not a build here" choices={choices} {...blank('buildId')} />
        <span>at</span>
        <TypedBlank
          label="Supply voltage in volts"
          widthCharacters={NUMBER_CHARACTERS}
          isNumber
          {...blank('supplyVolts')}
        />
        <span>V, drawing</span>
        <TypedBlank label="Current in amperes" widthCharacters={NUMBER_CHARACTERS} isNumber {...blank('currentAmps')} />
        <span>A. Note:</span>
        <TypedBlank
          label="Note"
          widthCharacters={NOTE_CHARACTERS}
          maximumCharacters={NOTE_MAXIMUM_CHARACTERS}
          {...blank('note')}
        />
      </div>
      {isChanged && (
        <div className="flex gap-3">
          <Button type="submit" weight="main" isBusy={isPending}>
            Save the conditions
          </Button>
          <Button
            onClick={() => {
              setTyped(null);
            }}
          >
            Undo
          </Button>
        </div>
      )}
      {isChanged && form.buildId !== saved.buildId && (
        <p className="max-w-sentence text-muted">Another build counts by its own geometry once it is analysed again.</p>
      )}
      {!isChanged && isSuccess && <Notice shape="within" title="Saved" />}
      {error !== null && (
        <Notice shape="outside" title="Not saved">
          {error instanceof ApiError ? error.detail : 'Try again in a moment.'}
        </Notice>
      )}
    </form>
  );
}

/** The builds to choose from; the present one even while the list is on its way or does not reach that far. */
function choicesWith(build: RecordingView['build'], listed: readonly { id: string; name: string }[]) {
  return build === null || listed.some(({ id }) => id === build.id) ? listed : [build, ...listed];
}

function conditionsWords({ build, supplyVolts, currentAmps, note }: RecordingView): string {
  const volts = supplyVolts === null ? 'a voltage that nobody wrote down' : `${String(supplyVolts)} V`;
  const amps = currentAmps === null ? '' : `, drawing ${String(currentAmps)} A`;
  return `The motor is ${build?.name ?? 'not a build here'} at ${volts}${amps}.${note === null ? '' : ` Note: ${note}`}`;
}
