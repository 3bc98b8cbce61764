// @vitest-environment happy-dom
import { cleanup, render } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { SpeedLine } from '#components/charts/SpeedLine.tsx';

afterEach(cleanup);

const CANDIDATES = [
  { shaftSpeedRpm: 2874, score: 0.9 },
  { shaftSpeedRpm: 1437, score: 0.4 },
  { shaftSpeedRpm: 5748, score: 0.3 },
];

function draw(chosenRpm: number | null) {
  const { container } = render(
    <SpeedLine
      minimumRpm={60}
      maximumRpm={60_000}
      candidates={CANDIDATES}
      chosenRpm={chosenRpm}
      lowRpm={null}
      highRpm={null}
    />,
  );
  return container;
}

describe('SpeedLine', () => {
  it('draws exactly one of three candidates in copper', () => {
    expect(draw(2874).querySelectorAll('line.stroke-copper')).toHaveLength(1);
  });

  it('names half and double in words', () => {
    const text = draw(2874).textContent;
    expect(text).toContain('half');
    expect(text).toContain('double');
  });

  it('has no copper when nothing is chosen', () => {
    expect(draw(null).innerHTML).not.toContain('copper');
  });
});
