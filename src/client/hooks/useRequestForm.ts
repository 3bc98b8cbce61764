import { useRef, useState, type SubmitEvent } from 'react';
import type * as z from 'zod/mini';
import { ApiError, unreachableError, type FieldErrors } from '#client/api/ApiError.ts';

interface Options<Texts, Schema extends z.ZodMiniType> {
  readonly initial: Texts;
  /** The schema that the server checks by, so that most mistakes are told before anything is sent. */
  readonly schema: Schema;
  readonly requestOf: (texts: Texts) => unknown;
  readonly send: (request: z.infer<Schema>) => Promise<unknown>;
}

/**
 * A form whose fields are texts and whose submission is one API call. Mistakes stand at their fields,
 * whether this page or the server found them, and the first of them gets the focus.
 */
export function useRequestForm<Texts, Schema extends z.ZodMiniType>(options: Options<Texts, Schema>) {
  const [texts, setTexts] = useState(options.initial);
  const [fieldErrors, setFieldErrors] = useState<FieldErrors>({});
  const [error, setError] = useState<ApiError | null>(null);
  const [isSending, setIsSending] = useState(false);
  const formRef = useRef<HTMLFormElement>(null);

  const fail = (refusal: ApiError | null, errors: FieldErrors) => {
    setError(refusal);
    setFieldErrors(errors);
    // After the errors are drawn.
    setTimeout(() => formRef.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus());
  };

  const submit = async (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (isSending) return;
    const parsed = options.schema.safeParse(options.requestOf(texts));
    if (!parsed.success) {
      fail(null, firstMessages(parsed.error.issues));
      return;
    }
    setIsSending(true);
    try {
      await options.send(parsed.data);
      fail(null, {});
    } catch (reason) {
      const refusal = reason instanceof ApiError ? reason : unreachableError(reason);
      fail(refusal, refusal.fieldErrors);
    } finally {
      setIsSending(false);
    }
  };

  return {
    texts,
    /** Changes some fields. */
    change: (changes: Partial<Texts>) => {
      setTexts((now) => ({ ...now, ...changes }));
    },
    errorOf: (field: string): string | undefined => fieldErrors[field],
    /** Why the server refused, when it did. */
    error,
    isSending,
    /** For the form element. */
    formProps: {
      ref: formRef,
      noValidate: true,
      onSubmit: (event: SubmitEvent<HTMLFormElement>) => void submit(event),
    },
  };
}

function firstMessages(issues: readonly z.core.$ZodIssue[]): FieldErrors {
  const messages: Record<string, string> = {};
  for (const { path, message } of issues) messages[path.join('.')] ??= message;
  return messages;
}
