import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { REOPEN_AFTER_MILLISECONDS, updatesStream, type StreamState } from '#client/updatesStream.ts';
import type { UpdateEvent } from '#lib/schemas/update.ts';

/** Stands in for the browser's EventSource: the test plays the server. */
class HeldEventSource extends EventTarget {
  static opened: HeldEventSource[] = [];
  readonly url: string;
  isClosed = false;

  constructor(url: string) {
    super();
    this.url = url;
    HeldEventSource.opened.push(this);
  }

  close() {
    this.isClosed = true;
  }

  static get last(): HeldEventSource {
    const source = HeldEventSource.opened.at(-1);
    if (!source) throw new Error('no source was opened');
    return source;
  }
}

const change: UpdateEvent = {
  topic: 'recording',
  recordingId: '0198f6a0-0000-7000-8000-000000000001',
  sessionId: null,
  benchId: '0198f6a0-0000-7000-8000-000000000002',
  status: 'done',
};
const message = (data: string) => new MessageEvent('change', { data });

beforeEach(() => {
  vi.useFakeTimers();
  HeldEventSource.opened = [];
  vi.stubGlobal('EventSource', HeldEventSource);
  vi.stubGlobal('window', new EventTarget());
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.useRealTimers();
});

describe('updatesStream', () => {
  it('opens one source for all listeners and closes it after the last', () => {
    const stopFirst = updatesStream.listen({});
    const stopSecond = updatesStream.listen({});
    expect(HeldEventSource.opened.map(({ url }) => url)).toEqual(['/api/v1/updates']);
    stopFirst();
    expect(HeldEventSource.last.isClosed).toBe(false);
    stopSecond();
    expect(HeldEventSource.last.isClosed).toBe(true);
  });

  it('passes known events on and passes unknown ones over', () => {
    const heard: UpdateEvent[] = [];
    const stop = updatesStream.listen({ onChange: (event) => heard.push(event) });
    HeldEventSource.last.dispatchEvent(message(JSON.stringify(change)));
    HeldEventSource.last.dispatchEvent(message('{"topic":"weather"}'));
    HeldEventSource.last.dispatchEvent(message('not JSON'));
    expect(heard).toEqual([change]);
    stop();
  });

  it('opens again 2 s after a break and tells the gap once it is live', () => {
    const onGap = vi.fn();
    const states: StreamState[] = [];
    const stop = updatesStream.listen({ onGap, onState: (state) => states.push(state) });
    HeldEventSource.last.dispatchEvent(new Event('open'));
    expect(onGap).not.toHaveBeenCalled();
    HeldEventSource.last.dispatchEvent(new Event('error'));
    vi.advanceTimersByTime(REOPEN_AFTER_MILLISECONDS - 1);
    expect(HeldEventSource.opened).toHaveLength(1);
    vi.advanceTimersByTime(1);
    expect(HeldEventSource.opened).toHaveLength(2);
    HeldEventSource.last.dispatchEvent(new Event('open'));
    expect(onGap).toHaveBeenCalledTimes(1);
    expect(states).toEqual(['live', 'lost', 'live']);
    stop();
  });

  it('opens again at once when the network is back', () => {
    const stop = updatesStream.listen({});
    window.dispatchEvent(new Event('online'));
    expect(HeldEventSource.opened.map(({ isClosed }) => isClosed)).toEqual([true, false]);
    stop();
  });

  it('does not open again after the last listener left during a break', () => {
    const stop = updatesStream.listen({});
    HeldEventSource.last.dispatchEvent(new Event('error'));
    stop();
    vi.advanceTimersByTime(60_000);
    expect(HeldEventSource.opened).toHaveLength(1);
  });
});
