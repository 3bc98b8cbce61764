import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useRequestForm } from '#client/hooks/useRequestForm.ts';
import { updateSessionMutation } from '#client/queries/sessions.ts';
import { Button } from '#components/ui/Button.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import { updateSessionRequest, type SessionView } from '#lib/schemas/session.ts';
import { ConditionFields } from './ConditionFields.tsx';
import { conditionsOf, conditionTexts } from './conditionTexts.ts';
import { conditionsText } from './conditionsText.ts';

/** The conditions as a sentence; those who may change them open it into boxes. */
export function SessionConditionsLine({ session }: { session: SessionView }) {
  const [isOpen, setIsOpen] = useState(false);
  const close = () => {
    setIsOpen(false);
  };
  if (isOpen) return <ConditionsForm session={session} onDone={close} />;
  return (
    <div className="flex flex-wrap items-center gap-x-4">
      <p className="max-w-sentence">
        <GroupedText text={conditionsText(session.conditions)} />
      </p>
      {session.abilities.canEdit && (
        <Button
          weight="word"
          onClick={() => {
            setIsOpen(true);
          }}
        >
          Change the conditions
        </Button>
      )}
    </div>
  );
}

function ConditionsForm({ session, onDone }: { session: SessionView; onDone: () => void }) {
  const queryClient = useQueryClient();
  const { mutateAsync } = useMutation(updateSessionMutation(queryClient, session.id));
  const form = useRequestForm({
    initial: conditionTexts(session.conditions),
    schema: updateSessionRequest,
    requestOf: (texts) => ({ conditions: conditionsOf(texts) }),
    send: async (request) => {
      await mutateAsync(request);
      onDone();
    },
  });
  return (
    <form {...form.formProps} className="grid gap-4">
      <ConditionFields texts={form.texts} onChange={form.change} errorOf={form.errorOf} />
      {form.error !== null && (
        <Notice shape="outside" title="Not saved">
          {form.error.detail}
        </Notice>
      )}
      <div className="flex gap-3">
        <Button type="submit" weight="main" isBusy={form.isSending}>
          {form.isSending ? 'Saving' : 'Save the conditions'}
        </Button>
        <Button weight="word" onClick={onDone}>
          Leave as they were
        </Button>
      </div>
    </form>
  );
}
