// @vitest-environment happy-dom
import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { CommutatorRing, ringInWords } from '#components/build/CommutatorRing.tsx';

afterEach(cleanup);

const NOTHING = { poles: null, segments: null, blades: null, teeth: null, magnets: null };

describe('CommutatorRing', () => {
  it('draws 3 segments and 2 poles', () => {
    const { container } = render(<CommutatorRing geometry={{ ...NOTHING, segments: 3, poles: 2 }} size={72} />);
    expect(container.querySelectorAll('path')).toHaveLength(5);
  });

  it('shows 15 segments at 24 px as a plain ring with the number inside', () => {
    const { container } = render(<CommutatorRing geometry={{ ...NOTHING, segments: 15 }} size={24} />);
    expect(container.querySelectorAll('path')).toHaveLength(1);
    expect(container.textContent).toBe('15');
  });

  it('cuts 14 segments at 24 px', () => {
    const { container } = render(<CommutatorRing geometry={{ ...NOTHING, segments: 14 }} size={24} />);
    expect(container.querySelectorAll('path')).toHaveLength(14);
  });

  it('numbers the 6 events of a turn at 240 px', () => {
    const geometry = { ...NOTHING, segments: 3, poles: 2 };
    const { container } = render(<CommutatorRing geometry={geometry} size={240} eventsPerTurn={6} />);
    expect([...container.querySelectorAll('text')].map((text) => text.textContent)).toEqual([
      '1',
      '2',
      '3',
      '4',
      '5',
      '6',
    ]);
  });

  it('is hidden from readers where the name stands beside it', () => {
    render(<CommutatorRing geometry={NOTHING} size={24} isNamed={false} />);
    expect(screen.queryByRole('img')).toBeNull();
  });
});

describe('ringInWords', () => {
  it('names what was counted', () => {
    expect(ringInWords({ ...NOTHING, segments: 3, poles: 2, blades: 1 })).toBe(
      'Ring with 3 segments, 2 poles, 1 blade',
    );
  });

  it('says when nothing was', () => {
    expect(ringInWords(NOTHING)).toBe('Ring of a motor whose parts nobody counted');
  });
});
