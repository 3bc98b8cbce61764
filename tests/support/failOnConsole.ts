import { afterEach, beforeEach, expect, type MockInstance, vi } from 'vitest';

/** Unexpected console output fails the test that caused it: a warning nobody reads is a defect nobody mends. */
const methods = ['error', 'warn', 'log'] as const;
let spies: MockInstance<(...values: unknown[]) => void>[] = [];

beforeEach(() => {
  spies = methods.map((method) => vi.spyOn(console, method));
});

afterEach(() => {
  const calls = spies.flatMap((spy) => spy.mock.calls);
  for (const spy of spies) spy.mockRestore();
  expect(calls, 'console output during the test').toEqual([]);
});
