import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { ApiError } from '#client/api/ApiError.ts';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { analyseAgainMutation } from '#client/queries/readings.ts';
import { Button } from '#components/ui/Button.tsx';
import { Disclosure } from '#components/ui/Disclosure.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import { SelectField } from '#components/ui/SelectField.tsx';
import { TextField } from '#components/ui/TextField.tsx';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { checkSettings, formOfReading, type AnalyseAgainForm } from './analyseAgainForm.ts';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

/** Another analysis of the same sound with other settings; closed until someone wants it. */
export function AnalyseAgain({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveAnalyseAgain initial={recording} />
    </ClientProvider>
  );
}

function LiveAnalyseAgain({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  if (!recording.abilities.canAnalyseAgain) return null;
  return (
    <div className="mt-6">
      <Disclosure summary="Analyse again with other settings">
        <SettingsForm key={recording.reading?.id ?? ''} recording={recording} />
      </Disclosure>
    </div>
  );
}

function SettingsForm({ recording }: Props) {
  const queryClient = useQueryClient();
  const { mutate, isPending, isSuccess, error } = useMutation(analyseAgainMutation(queryClient, recording.id));
  const [form, setForm] = useState(() => formOfReading(recording.reading));
  const checked = checkSettings(form);
  const field = (name: keyof AnalyseAgainForm) => ({
    value: form[name],
    error: checked.isValid ? undefined : checked.errors[name],
    onChange: (event: { target: { value: string } }) => {
      setForm({ ...form, [name]: event.target.value });
    },
  });
  const number = (name: keyof AnalyseAgainForm) => ({
    ...field(name),
    inputMode: 'decimal' as const,
    autoComplete: 'off',
  });
  return (
    <form
      className="grid gap-4"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        if (checked.isValid) mutate(checked.settings);
      }}
    >
      <p className="max-w-sentence text-muted">
        The reading above is kept; the new one stands before it in the history.
      </p>
      <div className="grid gap-4 desk:grid-cols-4">
        <TextField label="Events per turn" {...number('eventsPerTurn')} />
        <TextField label="Other strong orders" {...field('orders')} />
        <TextField label="Slowest speed" unit="rpm" {...number('rpmMin')} />
        <TextField label="Fastest speed" unit="rpm" {...number('rpmMax')} />
        <SelectField label="Channel" {...field('channel')}>
          <option value="auto">as fits best</option>
          {Array.from({ length: recording.media.channelCount ?? 1 }, (_, channel) => (
            <option key={channel} value={channel}>
              channel {channel + 1}
            </option>
          ))}
        </SelectField>
        <TextField label="From" unit="s" {...number('fromSeconds')} />
        <TextField label="To" unit="s" {...number('toSeconds')} />
      </div>
      <div>
        <Button type="submit" weight="main" isBusy={isPending}>
          Analyse again
        </Button>
      </div>
      {isSuccess && (
        <Notice shape="working" title="Taken on">
          The new reading appears on this page by itself.
        </Notice>
      )}
      {error !== null && (
        <Notice shape="outside" title="Not taken on">
          {error instanceof ApiError ? error.detail : 'Try again in a moment.'}
        </Notice>
      )}
    </form>
  );
}
