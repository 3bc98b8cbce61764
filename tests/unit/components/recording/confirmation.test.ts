import { describe, expect, it } from 'vitest';
import { confirmationOf, confirmWords } from '#components/recording/confirmation.ts';
import { readingView } from '#tests/factories/recordingView.ts';

const silence = readingView({
  status: 'no-rotation',
  rpm: null,
  rpmLow: null,
  rpmHigh: null,
  confidence: null,
});

describe('confirmationOf', () => {
  it('confirms a speed, and that nothing turned where none was heard', () => {
    expect(confirmationOf({ reading: readingView(), review: null }).decision).toBe('confirm');
    expect(confirmationOf({ reading: silence, review: null }).decision).toBe('nothing-turning');
  });
});

describe('confirmWords', () => {
  it('is one word beside one speed', () => {
    expect(confirmWords({ reading: readingView(), review: null })).toBe('Confirm');
  });

  it('names the speed where the reading is unsure between several', () => {
    expect(
      confirmWords({
        reading: readingView({ confidence: 0.42 }),
        review: null,
      }),
    ).toBe('Confirm 2874 rpm');
  });

  it('says that nothing turned where no speed is shown', () => {
    expect(confirmWords({ reading: silence, review: null })).toBe('Nothing turned');
  });
});
