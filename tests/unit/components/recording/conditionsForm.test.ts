import { describe, expect, it } from 'vitest';
import { checkForm, formOf, isSameForm } from '#components/recording/conditionsForm.ts';
import { recordingView } from '#tests/factories/recordingView.ts';

const RECORDING = recordingView({ supplyVolts: 6.5, note: 'brushes cleaned' });

describe('checkForm', () => {
  it('round-trips the conditions of a recording', () => {
    expect(checkForm(formOf(RECORDING))).toEqual({
      isValid: true,
      changes: { buildId: RECORDING.build?.id, supplyVolts: 6.5, currentAmps: null, note: 'brushes cleaned' },
    });
  });

  it('clears what was emptied', () => {
    const checked = checkForm({ buildId: '', supplyVolts: '', currentAmps: '', note: '  ' });
    expect(checked).toEqual({
      isValid: true,
      changes: { buildId: null, supplyVolts: null, currentAmps: null, note: null },
    });
  });

  it('takes a decimal comma and refuses words', () => {
    const checked = checkForm({ ...formOf(RECORDING), supplyVolts: '7,2', currentAmps: 'little' });
    expect(checked.isValid ? [] : Object.keys(checked.errors)).toEqual(['currentAmps']);
  });
});

describe('isSameForm', () => {
  it('sees one changed blank', () => {
    const form = formOf(RECORDING);
    expect([isSameForm(form, { ...form }), isSameForm(form, { ...form, note: '' })]).toEqual([true, false]);
  });
});
