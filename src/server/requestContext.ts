import { AsyncLocalStorage } from 'node:async_hooks';

interface RequestContext {
  readonly requestId: string;
}

/** Carries the id of the request to log lines and audit rows without threading it through every call. */
const storage = new AsyncLocalStorage<RequestContext>();

export const requestContext = {
  run: <Result>(context: RequestContext, work: () => Result): Result => storage.run(context, work),
  /** null outside a request: in the worker and in scripts. */
  requestId: (): string | null => storage.getStore()?.requestId ?? null,
};
