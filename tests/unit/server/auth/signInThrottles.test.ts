import { describe, expect, it } from 'vitest';
import { createFailureThrottle } from '#server/auth/failureThrottle.ts';
import { accountThrottle, addressThrottle } from '#server/auth/signInThrottles.ts';

describe('accountThrottle', () => {
  it('forgives four mistakes, then waits 1, 2, 4 … and at most 60 s', () => {
    const waits: number[] = [];
    for (let failure = 1; failure <= 12; failure += 1) {
      accountThrottle.noteFailure('a@b.example', 1000);
      waits.push(accountThrottle.waitSeconds('a@b.example', 1000));
    }
    expect(waits).toEqual([0, 0, 0, 0, 1, 2, 4, 8, 16, 32, 60, 60]);
    expect(accountThrottle.waitSeconds('a@b.example', 1059)).toBe(1);
    expect(accountThrottle.waitSeconds('c@d.example', 1000)).toBe(0);
  });

  it('forgets everything at the right password', () => {
    for (let failure = 1; failure <= 9; failure += 1) accountThrottle.noteFailure('e@f.example', 0);
    accountThrottle.noteSuccess('e@f.example');
    expect(accountThrottle.waitSeconds('e@f.example', 0)).toBe(0);
  });
});

describe('addressThrottle', () => {
  it('lets a class make 299 mistakes in 15 minutes from one address, and closes at the 300th until the window ends', () => {
    for (let failure = 1; failure <= 299; failure += 1) addressThrottle.noteFailure('192.0.2.1', failure);
    expect(addressThrottle.waitSeconds('192.0.2.1', 300)).toBe(0);
    addressThrottle.noteFailure('192.0.2.1', 300);
    // The window of 900 s opened with the first failure, at 1 s.
    expect(addressThrottle.waitSeconds('192.0.2.1', 300)).toBe(601);
    expect(addressThrottle.waitSeconds('192.0.2.1', 901)).toBe(0);
  });
});

describe('createFailureThrottle', () => {
  it('keeps at most 20,000 keys and forgets the oldest first', () => {
    const rules = { memorySeconds: 1000, isMemoryRenewed: true, delaySecondsAfter: () => 10 };
    const throttle = createFailureThrottle(rules);
    for (let key = 0; key <= 20_000; key += 1) throttle.noteFailure(`invented ${String(key)}`, 0);
    expect(throttle.waitSeconds('invented 0', 0)).toBe(0);
    expect(throttle.waitSeconds('invented 1', 0)).toBe(10);
    expect(throttle.waitSeconds('invented 20000', 0)).toBe(10);
  });
});
