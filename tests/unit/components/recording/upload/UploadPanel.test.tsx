// @vitest-environment happy-dom
import { act, cleanup, fireEvent, render, screen, within } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { UploadPanel } from '#components/recording/upload/UploadPanel.tsx';
import { recordingView } from '#tests/factories/recordingView.ts';
import { holdNetwork } from '#tests/support/heldNetwork.ts';

const benchId = '0198f6a0-0000-7000-8000-000000000005';
const heron = {
  id: '0198f6a0-0000-7000-8000-000000000007',
  name: 'Heron',
  geometry: { poles: 2, segments: 3, blades: 4, teeth: null, magnets: null },
};

let network: ReturnType<typeof holdNetwork>;
beforeEach(() => {
  network = holdNetwork();
});
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const file = (name: string, byteCount = 1000) => new File([new Uint8Array(byteCount)], name, { type: 'audio/mp4' });

function showPanel() {
  render(<UploadPanel benchId={benchId} builds={[heron]} sessions={null} />);
}

function choose(...files: File[]) {
  fireEvent.change(screen.getByLabelText('Choose files'), { target: { files } });
}

function upload(index: number) {
  const held = network.uploads[index];
  if (!held) throw new Error(`upload ${String(index)} was not begun`);
  return held;
}

const rows = () => within(screen.getByRole('list', { name: 'Files of this visit' })).getAllByRole('listitem');

describe('UploadPanel', () => {
  it('tells size, length and rate before anything is chosen', () => {
    showPanel();
    const limits = screen.getByText(/at most 200 MB a file/u).textContent;
    expect(limits).toContain('0.5 s to 10 min');
    expect(limits).toContain('8 to 192 kHz');
  });

  it('sends each file alone with its own key and the conditions of the sentence', () => {
    showPanel();
    fireEvent.change(screen.getByLabelText('Build'), { target: { value: heron.id } });
    fireEvent.change(screen.getByLabelText('Supply voltage in volts'), { target: { value: '4,5' } });
    choose(file('a.m4a'), file('b.m4a'));
    expect(network.uploads).toHaveLength(2);
    expect(upload(0).body.getAll('file')).toHaveLength(1);
    expect(upload(0).body.get('buildId')).toBe(heron.id);
    expect(upload(0).body.get('supplyVolts')).toBe('4.5');
    expect([...upload(0).body.keys()].at(-1)).toBe('file');
    expect(upload(0).headers['idempotency-key']).toMatch(/^[0-9a-f-]{36}$/u);
    expect(upload(0).headers['idempotency-key']).not.toBe(upload(1).headers['idempotency-key']);
  });

  it('shows true bytes, then that the server has the file, then its speed', async () => {
    const recording = recordingView();
    network.answers.set(`GET /api/v1/recordings/${recording.id}`, { status: 200, body: recording });
    showPanel();
    choose(file('a.m4a', 2_000_000));
    act(() => {
      upload(0).progress(500_000, 2_000_400);
    });
    expect(rows()[0]?.textContent).toContain('500 kB of 2.0 MB');
    expect(screen.getByRole('progressbar').getAttribute('aria-valuenow')).toBe('25');
    act(() => {
      upload(0).answer(201, {
        recordings: [{ id: recording.id, fileName: 'a.m4a', sha256: 'ab', status: 'queued', duplicateOf: null }],
      });
    });
    const link = await screen.findByRole('link');
    // The interface ties a figure to its unit with a space that does not break.
    expect(link.textContent.replaceAll(/\s/gu, ' ')).toBe('2874 rpm, between 2868 and 2880 (95 %)');
    expect(link.getAttribute('href')).toBe(`/recordings/${recording.id}`);
  });

  it('refuses in the words of the server and offers another try with the same key', async () => {
    showPanel();
    choose(file('a.mp4'));
    const detail = 'The file has no sound track. Record with the microphone on.';
    await act(async () => {
      upload(0).answer(422, { type: 'x', title: 'x', status: 422, code: 'no-audio', detail, requestId: 'r' });
      await Promise.resolve();
    });
    await screen.findByText(detail);
    fireEvent.click(screen.getByRole('button', { name: 'Try again: a.mp4' }));
    expect(upload(1).headers['idempotency-key']).toBe(upload(0).headers['idempotency-key']);
  });

  it('says that a broken connection is tried again by itself', async () => {
    showPanel();
    choose(file('a.m4a'));
    act(() => {
      upload(0).breakOff();
    });
    await screen.findByText(/Trying again in 1 s/u);
    fireEvent.click(screen.getByRole('button', { name: 'Cancel: a.m4a' }));
    expect(rows()[0]?.textContent).toContain('Cancelled');
  });

  it('keeps chosen files until a wrong voltage is mended', () => {
    showPanel();
    const volts = screen.getByLabelText('Supply voltage in volts');
    fireEvent.change(volts, { target: { value: 'six' } });
    choose(file('a.m4a'));
    expect(network.uploads).toHaveLength(0);
    expect(screen.getByText('One file waits')).toBeTruthy();
    expect(volts.getAttribute('aria-invalid')).toBe('true');
    fireEvent.change(volts, { target: { value: '6' } });
    fireEvent.click(screen.getByRole('button', { name: 'Send' }));
    expect(upload(0).body.get('supplyVolts')).toBe('6');
  });

  it('warns of blades before the recording', () => {
    showPanel();
    expect(screen.queryByText(/Blades:/u)).toBeNull();
    fireEvent.change(screen.getByLabelText('Build'), { target: { value: heron.id } });
    expect(screen.getByText(/Blades:/u)).toBeTruthy();
  });

  it('takes files dropped anywhere on the page', () => {
    showPanel();
    const drop = new Event('drop', { bubbles: true, cancelable: true });
    Object.assign(drop, { dataTransfer: { types: ['Files'], files: [file('a.m4a')] } });
    act(() => {
      document.dispatchEvent(drop);
    });
    expect(network.uploads).toHaveLength(1);
    expect(drop.defaultPrevented).toBe(true);
  });

  it('warns before a reload only while a file is on its way', async () => {
    showPanel();
    const isWarned = () => !window.dispatchEvent(new Event('beforeunload', { cancelable: true }));
    expect(isWarned()).toBe(false);
    choose(file('a.m4a'));
    expect(isWarned()).toBe(true);
    fireEvent.click(screen.getByRole('button', { name: 'Cancel: a.m4a' }));
    expect(isWarned()).toBe(false);
    await act(() => Promise.resolve());
  });
});
