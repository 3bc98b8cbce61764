/** Whether the answer is read by a program: everything below /api and the probes; the rest are pages. */
const CALLS = /^\/(?:api\/|healthz$|readyz$|metrics$)/;

export function isCallOfApi({ routePattern }: { readonly routePattern: string }): boolean {
  return CALLS.test(routePattern);
}
