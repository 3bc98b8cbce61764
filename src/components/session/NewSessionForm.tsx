import { useMutation, useQueryClient } from '@tanstack/react-query';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { useRequestForm } from '#client/hooks/useRequestForm.ts';
import { createSessionMutation } from '#client/queries/sessions.ts';
import { Button } from '#components/ui/Button.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import { SelectField } from '#components/ui/SelectField.tsx';
import { TextField } from '#components/ui/TextField.tsx';
import { createSessionRequest, type SessionPurpose } from '#lib/schemas/session.ts';
import { ConditionFields } from './ConditionFields.tsx';
import { conditionsOf, NO_CONDITION_TEXTS } from './conditionTexts.ts';
import { PurposeField } from './PurposeField.tsx';

interface Props {
  readonly benchId: string;
  readonly builds: readonly { readonly id: string; readonly name: string }[];
  /** From the address. */
  readonly purpose: SessionPurpose;
  readonly buildId: string;
}

/** Begins a session and goes to its page. */
export function NewSessionForm(props: Props) {
  return (
    <ClientProvider>
      <SessionForm {...props} />
    </ClientProvider>
  );
}

function SessionForm({ benchId, builds, purpose, buildId }: Props) {
  const { mutateAsync } = useMutation(createSessionMutation(useQueryClient()));
  const form = useRequestForm({
    initial: { title: '', purpose, buildId, ...NO_CONDITION_TEXTS },
    schema: createSessionRequest,
    requestOf: (texts) => ({
      benchId,
      title: texts.title,
      purpose: texts.purpose,
      buildId: texts.buildId || null,
      conditions: conditionsOf(texts),
    }),
    send: async (request) => {
      const session = await mutateAsync(request);
      location.assign(`/sessions/${session.id}`);
    },
  });
  const { texts, change, errorOf } = form;
  return (
    <form {...form.formProps} className="grid gap-6">
      <div className="grid max-w-sentence gap-4">
        <TextField
          label="Title"
          hint="What you will look for later: the motor and what was done to it."
          value={texts.title}
          error={errorOf('title')}
          autoComplete="off"
          required
          onChange={(event) => {
            change({ title: event.target.value });
          }}
        />
        <SelectField
          label="Build"
          hint={builds.length === 0 ? <NoBuildsHint /> : 'May stay open when several motors are measured.'}
          value={texts.buildId}
          error={errorOf('buildId')}
          onChange={(event) => {
            change({ buildId: event.target.value });
          }}
        >
          <option value="">None, or several</option>
          {builds.map((build) => (
            <option key={build.id} value={build.id}>
              {build.name}
            </option>
          ))}
        </SelectField>
      </div>
      <PurposeField
        chosen={texts.purpose}
        onChoose={(chosen) => {
          change({ purpose: chosen });
        }}
      />
      <ConditionFields texts={texts} onChange={change} errorOf={errorOf} />
      {form.error !== null && (
        <Notice shape="outside" title="Not begun">
          {form.error.detail}
        </Notice>
      )}
      <div>
        <Button type="submit" weight="main" isBusy={form.isSending}>
          {form.isSending ? 'Beginning' : 'Begin the session'}
        </Button>
      </div>
    </form>
  );
}

function NoBuildsHint() {
  return (
    <>
      No build here yet. <a href="/builds/new">Describe a motor</a> and its events per turn are computed for you.
    </>
  );
}
