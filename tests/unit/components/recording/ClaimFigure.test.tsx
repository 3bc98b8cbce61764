// @vitest-environment happy-dom
import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { ClaimFigure } from '#components/recording/ClaimFigure.tsx';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { readingView, recordingView, reviewView } from '#tests/factories/recordingView.ts';

afterEach(cleanup);

/** A no-break space reads as a space. */
const spaced = (text: string) => text.replaceAll('\u00a0', ' ');

function claimOf(changes: Partial<RecordingView>) {
  const { container } = render(<ClaimFigure recording={recordingView(changes)} />);
  const heading = screen.getByRole('heading', { level: 1 }).textContent;
  return { heading: spaced(heading), text: spaced(container.textContent) };
}

const NO_ROTATION = readingView({
  status: 'no-rotation',
  motion: 'none',
  rpm: null,
  rpmLow: null,
  rpmHigh: null,
  confidence: null,
  eventHz: null,
  reason: 'hum',
  candidates: [],
});

describe('ClaimFigure', () => {
  it('says the figure with its interval and its meaning', () => {
    const { heading, text } = claimOf({});
    expect(heading).toBe('2874 rpm');
    expect(text).toContain('between 2868 and 2880 (95 %)');
    expect(text).toContain('Steady. Very likely right (97 in 100). Six ripples a turn: 3 segments × 2 poles.');
    expect(text).toContain('10 a turn: 1724 rpm');
  });

  it('puts no figure where it is unsure, but both speeds and what would decide', () => {
    const { heading, text } = claimOf({ reading: readingView({ confidence: 0.31 }) });
    expect(heading).toBe('Unsure');
    expect(text).toContain('2874 rpm or 1437 rpm');
    expect(text).toContain('would decide');
  });

  it('shows the figure of an unsure reading once a person has confirmed it', () => {
    const { heading, text } = claimOf({ reading: readingView({ confidence: 0.31 }), review: reviewView() });
    expect(heading).toBe('2874 rpm');
    expect(text).toContain('Looked at by a person');
  });

  it('shows the speed that a person chose, its interval scaled', () => {
    const { heading, text } = claimOf({ review: reviewView({ decision: 'choose', rpm: 1437 }) });
    expect(heading).toBe('1437 rpm');
    expect(text).toContain('between 1434 and 1440');
  });

  it('says that nothing turned, why, and what would decide', () => {
    const { heading, text } = claimOf({ reading: NO_ROTATION });
    expect(heading).toBe('Nothing turning heard');
    expect(text).toContain('hum of the mains');
    expect(text).toContain('record closer');
  });

  it('names the code of a failure and what to do', () => {
    const { heading, text } = claimOf({
      status: 'failed',
      reading: null,
      error: { code: 'truncated', message: 'It breaks off.' },
    });
    expect(heading).toBe('Not analysed');
    expect(text).toContain('It breaks off.');
    expect(text).toContain('Code: truncated');
  });

  it.each([
    ['queued', 'Waiting'],
    ['working', 'Being analysed'],
  ] as const)('says that a %s recording may be left alone', (status, words) => {
    const { heading, text } = claimOf({ status, reading: null });
    expect(heading).toBe(words);
    expect(text).toContain('You can leave this page');
  });

  it('tells what was wrong with the sound', () => {
    expect(claimOf({ reading: readingView({ warnings: ['clipped'] }) }).text).toContain('too loud for the microphone');
  });
});
