// @vitest-environment happy-dom
import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { TextField } from '#components/ui/TextField.tsx';

afterEach(cleanup);

describe('TextField', () => {
  it('names the unit with the label', () => {
    render(<TextField label="Supply voltage" unit="V" />);
    expect(screen.getByLabelText('Supply voltage (V)')).toBeDefined();
  });

  it('ties hint and error to the box', () => {
    render(<TextField label="Name" hint="As on the motor" error="Must not be empty." />);
    const box = screen.getByLabelText('Name');
    const texts = (box.getAttribute('aria-describedby') ?? '')
      .split(' ')
      .map((id) => document.getElementById(id)?.textContent);
    expect(texts).toEqual(['As on the motor', '✕ Must not be empty.']);
    expect(box.getAttribute('aria-invalid')).toBe('true');
  });

  it('describes nothing when there is nothing to say', () => {
    render(<TextField label="Name" />);
    expect(screen.getByLabelText('Name').hasAttribute('aria-describedby')).toBe(false);
  });
});
