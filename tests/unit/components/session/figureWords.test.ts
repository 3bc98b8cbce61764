import { describe, expect, it } from 'vitest';
import { figureName, mainFigure } from '#components/session/figureWords.ts';
import type { SessionResultView } from '#lib/schemas/session.ts';

const figure = { value: 320, low: 315, high: 325, unit: 'rpm/V' };
const result = (purpose: SessionResultView['purpose'], figures: SessionResultView['figures']): SessionResultView => ({
  sessionId: '0198f6a0-0000-7000-8000-000000000001',
  purpose,
  sentence: '',
  missing: [],
  measuredCount: 0,
  points: [],
  figures,
});

describe('mainFigure', () => {
  it('is the speed constant of a sweep, whatever comes first', () => {
    expect(mainFigure(result('voltage-sweep', { meanSpeed: figure, speedConstant: figure }))?.[0]).toBe(
      'speedConstant',
    );
  });

  it('is any figure when the expected one is missing', () => {
    expect(mainFigure(result('coast-down', { frictionTorque: figure }))?.[0]).toBe('frictionTorque');
  });

  it('is null without figures', () => {
    expect(mainFigure(result('speed-check', {}))).toBeNull();
  });
});

describe('figureName', () => {
  it.each([
    ['speedConstant', 'Speed constant'],
    ['frictionTorqueAtRest', 'Friction torque at rest'],
  ])('of %s is %s', (key, name) => {
    expect(figureName(key)).toBe(name);
  });
});
