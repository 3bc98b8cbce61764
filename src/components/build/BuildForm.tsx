import { useMutation, useQueryClient } from '@tanstack/react-query';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { useRequestForm } from '#client/hooks/useRequestForm.ts';
import { createBuildMutation, updateBuildMutation } from '#client/queries/builds.ts';
import { Button } from '#components/ui/Button.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import { TextArea } from '#components/ui/TextArea.tsx';
import { TextField } from '#components/ui/TextField.tsx';
import { parseNumber } from '#lib/format/parseNumber.ts';
import { createBuildRequest, updateBuildRequest, type BuildView } from '#lib/schemas/build.ts';
import { BuildRing } from './BuildRing.tsx';
import { buildOf, buildTexts, geometryOf, NO_BUILD_TEXTS, type BuildTexts } from './buildTexts.ts';
import { GeometryFields } from './GeometryFields.tsx';
import { liveEvents } from './liveEvents.ts';

interface Props {
  readonly benchId: string;
  /** Null for a new one. */
  readonly build: BuildView | null;
}

/** Describes a motor; the ring shows live what its parts mean for the count. */
export function BuildForm({ benchId, build }: Props) {
  return (
    <ClientProvider>{build === null ? <NewBuild benchId={benchId} /> : <ChangedBuild build={build} />}</ClientProvider>
  );
}

function NewBuild({ benchId }: { benchId: string }) {
  const { mutateAsync } = useMutation(createBuildMutation(useQueryClient()));
  const form = useRequestForm({
    initial: NO_BUILD_TEXTS,
    schema: createBuildRequest,
    requestOf: (texts) => ({ benchId, ...buildOf(texts) }),
    send: async (request) => {
      const build = await mutateAsync(request);
      location.assign(`/builds/${build.id}`);
    },
  });
  return <Fields form={form} submitLabel="Add the build" />;
}

function ChangedBuild({ build }: { build: BuildView }) {
  const { mutateAsync } = useMutation(updateBuildMutation(useQueryClient(), build.id));
  const form = useRequestForm({
    initial: buildTexts(build),
    schema: updateBuildRequest,
    requestOf: buildOf,
    send: async (request) => {
      await mutateAsync(request);
      // The page around the form shows the build too.
      location.reload();
    },
  });
  return <Fields form={form} submitLabel="Save as it is now" />;
}

type Form = ReturnType<typeof useRequestForm<BuildTexts, typeof createBuildRequest>>;

function Fields({ form, submitLabel }: { form: Form; submitLabel: string }) {
  const { texts, change, errorOf } = form;
  const given = parseNumber(texts.eventsPerTurn);
  const text = (name: keyof BuildTexts) => ({
    value: texts[name],
    error: errorOf(name),
    autoComplete: 'off',
    onChange: (event: { target: { value: string } }) => {
      change({ [name]: event.target.value });
    },
  });
  return (
    <form {...form.formProps} className="columns-12">
      <div className="desk:order-2 desk:col-span-5">
        <BuildRing
          events={liveEvents(geometryOf(texts))}
          givenEventsPerTurn={given !== null && given > 0 ? given : null}
        />
      </div>
      <div className="grid content-start gap-6 desk:col-span-7">
        <TextField label="Name" hint="How people at the bench call this motor." required {...text('name')} />
        <GeometryFields texts={texts} onChange={change} errorOf={errorOf} />
        <fieldset className="grid gap-4 desk:grid-cols-3">
          <legend className="mb-2 font-bold">Only if you know better</legend>
          <TextField label="Events per turn" inputMode="decimal" {...text('eventsPerTurn')} />
          <TextField label="Slowest possible" unit="rpm" inputMode="decimal" {...text('rpmMin')} />
          <TextField label="Fastest possible" unit="rpm" inputMode="decimal" {...text('rpmMax')} />
        </fieldset>
        <TextArea label="Notes" hint="Wire, turns, brushes, what was changed." {...text('notes')} />
        {form.error !== null && (
          <Notice shape="outside" title="Not saved">
            {form.error.detail}
          </Notice>
        )}
        <div>
          <Button type="submit" weight="main" isBusy={form.isSending}>
            {form.isSending ? 'Saving' : submitLabel}
          </Button>
        </div>
      </div>
    </form>
  );
}
