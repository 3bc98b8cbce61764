// @vitest-environment happy-dom
import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { Button } from '#components/ui/Button.tsx';

afterEach(cleanup);

describe('Button', () => {
  it('is no submit button unless it says so', () => {
    render(<Button>Confirm</Button>);
    expect(screen.getByRole('button').getAttribute('type')).toBe('button');
  });

  it('ignores presses while busy and stays focusable', () => {
    let presses = 0;
    render(
      <Button isBusy onClick={() => (presses += 1)}>
        Confirm
      </Button>,
    );
    const button = screen.getByRole('button');
    button.focus();
    fireEvent.click(button);
    expect(presses).toBe(0);
    expect(document.activeElement).toBe(button);
    expect(button.getAttribute('aria-disabled')).toBe('true');
  });

  it('passes one press on when it is not busy', () => {
    let presses = 0;
    render(<Button onClick={() => (presses += 1)}>Confirm</Button>);
    fireEvent.click(screen.getByRole('button'));
    expect(presses).toBe(1);
  });
});
