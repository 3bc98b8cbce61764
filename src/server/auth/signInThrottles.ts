import { createFailureThrottle } from './failureThrottle.ts';

const FREE_FAILURE_COUNT = 4;
const DELAY_MAXIMUM_SECONDS = 60;
const ACCOUNT_MEMORY_SECONDS = 24 * 3600;

/** A typing mistake costs nothing; from the fifth failure in a row on, the wait doubles: 1, 2, 4 … 60 s. */
export const accountThrottle = createFailureThrottle({
  memorySeconds: ACCOUNT_MEMORY_SECONDS,
  isMemoryRenewed: true,
  delaySecondsAfter: (failureCount) =>
    failureCount <= FREE_FAILURE_COUNT
      ? 0
      : Math.min(2 ** (failureCount - FREE_FAILURE_COUNT - 1), DELAY_MAXIMUM_SECONDS),
});

/** A whole class shares one address, so only many failures count against it. */
const ADDRESS_FAILURE_MAXIMUM_COUNT = 300;
const ADDRESS_WINDOW_SECONDS = 15 * 60;

export const addressThrottle = createFailureThrottle({
  memorySeconds: ADDRESS_WINDOW_SECONDS,
  isMemoryRenewed: false,
  delaySecondsAfter: (failureCount) => (failureCount < ADDRESS_FAILURE_MAXIMUM_COUNT ? 0 : ADDRESS_WINDOW_SECONDS),
});
