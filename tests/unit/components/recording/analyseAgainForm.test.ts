import { describe, expect, it } from 'vitest';
import { checkSettings, formOfReading } from '#components/recording/analyseAgainForm.ts';
import { readingView } from '#tests/factories/recordingView.ts';

const FORM = formOfReading(readingView());

describe('formOfReading', () => {
  it('round-trips the settings of a reading', () => {
    expect(checkSettings(FORM)).toEqual({
      isValid: true,
      settings: { eventsPerTurn: 6, orders: [6], rpmMin: 60, rpmMax: 60_000, channel: 'auto' },
    });
  });

  it('is empty without a reading, and asks for nothing then', () => {
    expect(checkSettings(formOfReading(null))).toEqual({ isValid: true, settings: { channel: 'auto' } });
  });
});

describe('checkSettings', () => {
  it('takes orders with decimal commas between semicolons', () => {
    const checked = checkSettings({ ...FORM, orders: '6; 0,5; 12' });
    expect(checked.isValid && checked.settings.orders).toEqual([6, 0.5, 12]);
  });

  it('takes orders between commas and spaces', () => {
    const checked = checkSettings({ ...FORM, orders: '6, 12' });
    expect(checked.isValid && checked.settings.orders).toEqual([6, 12]);
  });

  it('refuses a range turned around', () => {
    expect(checkSettings({ ...FORM, rpmMin: '5000', rpmMax: '100' })).toEqual({
      isValid: false,
      errors: { rpmMax: 'Must be above the slowest speed.' },
    });
  });

  it('refuses an end before the start', () => {
    expect(checkSettings({ ...FORM, fromSeconds: '5', toSeconds: '2' })).toMatchObject({ isValid: false });
  });

  it.each(['0', '-1', 'six', '1e3'])('refuses %s events per turn and names the field', (eventsPerTurn) => {
    const checked = checkSettings({ ...FORM, eventsPerTurn });
    expect(checked.isValid ? [] : Object.keys(checked.errors)).toEqual(['eventsPerTurn']);
  });
});
