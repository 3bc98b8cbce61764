// @vitest-environment happy-dom
import { cleanup, fireEvent, render, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { NewSessionForm } from '#components/session/NewSessionForm.tsx';
import { holdNetwork } from '#tests/support/heldNetwork.ts';

let network: ReturnType<typeof holdNetwork>;
beforeEach(() => {
  network = holdNetwork();
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

function showForm() {
  render(
    <NewSessionForm benchId="0198f6a0-0000-7000-8000-000000000005" builds={[]} purpose="voltage-sweep" buildId="" />,
  );
}

const submit = () => fireEvent.click(screen.getByRole('button', { name: 'Begin the session' }));

describe('NewSessionForm', () => {
  it('begins with the purpose of the address and says what comes out of each', () => {
    showForm();
    expect(screen.getByRole<HTMLInputElement>('radio', { name: /^Voltage sweep/u }).checked).toBe(true);
    expect(screen.getAllByRole('radio')).toHaveLength(7);
  });

  it('puts mistakes at their fields and the focus on the first, without sending', async () => {
    showForm();
    fireEvent.change(screen.getByLabelText('Supply (V)'), { target: { value: 'six' } });
    submit();
    const title = screen.getByLabelText('Title');
    await waitFor(() => {
      expect(document.activeElement).toBe(title);
    });
    expect(title.getAttribute('aria-invalid')).toBe('true');
    expect(screen.getByText('Must be a number from 0 to 1000 V.')).toBeTruthy();
  });

  it('says what the server refused, at the field that it names', async () => {
    const body = {
      type: 'x',
      title: 'Some fields are not valid',
      status: 422,
      code: 'invalid-fields',
      detail: 'One field is not valid.',
      requestId: 'r',
      errors: [{ field: 'title', message: 'Is taken.' }],
    };
    network.answers.set('POST /api/v1/sessions', { status: 422, body });
    showForm();
    fireEvent.change(screen.getByLabelText('Title'), { target: { value: 'Heron' } });
    submit();
    await screen.findByText('One field is not valid.');
    expect(screen.getByText('Is taken.')).toBeTruthy();
  });

  it('keeps what was typed when the server cannot be reached', async () => {
    showForm();
    const title = screen.getByLabelText<HTMLInputElement>('Title');
    fireEvent.change(title, { target: { value: 'Heron' } });
    submit();
    await screen.findByText(/cannot be reached/u);
    expect(title.value).toBe('Heron');
  });
});
