import { describe, expect, it } from 'vitest';
import { createGate } from '#server/media/createGate.ts';

describe('createGate', () => {
  it('runs 2 of 5 tasks at once, in the order they came', async () => {
    const gate = createGate(2);
    const started: number[] = [];
    let running = 0;
    let most = 0;
    const task = (index: number) => async () => {
      started.push(index);
      most = Math.max(most, ++running);
      await new Promise((resume) => setImmediate(resume));
      running--;
      return index;
    };
    const results = await Promise.all([0, 1, 2, 3, 4].map((index) => gate(task(index))));
    expect({ results, started, most }).toEqual({ results: [0, 1, 2, 3, 4], started: [0, 1, 2, 3, 4], most: 2 });
  });

  it('frees the place of a task that throws', async () => {
    const gate = createGate(1);
    await expect(gate(() => Promise.reject(new Error('failed')))).rejects.toThrow('failed');
    expect(await gate(() => Promise.resolve('next'))).toBe('next');
  });
});
