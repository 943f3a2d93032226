import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { followEvents } from './event-stream';

class FakeEventSource extends EventTarget {
  static readonly CLOSED = 2;
  static opened: FakeEventSource[] = [];
  readyState = 0;
  onopen: (() => void) | null = null;
  onerror: (() => void) | null = null;
  readonly close = vi.fn();
  constructor(readonly url: string) {
    super();
    FakeEventSource.opened.push(this);
  }
}

describe('the stream of events', () => {
  const hooks = { onCapture: vi.fn(), onPoll: vi.fn(), onResume: vi.fn() };

  beforeEach(() => {
    vi.useFakeTimers();
    vi.stubGlobal('EventSource', FakeEventSource);
    FakeEventSource.opened = [];
    vi.resetAllMocks();
  });
  afterEach(() => {
    vi.useRealTimers();
    vi.unstubAllGlobals();
  });

  it('hands on what happens to a capture', () => {
    const stop = followEvents('/api/events', hooks);
    const event = { captureId: 'c1', state: 'analysing', progress: 0.4 };
    FakeEventSource.opened[0]!.dispatchEvent(new MessageEvent('capture', { data: JSON.stringify(event) }));
    expect(hooks.onCapture).toHaveBeenCalledWith(event);
    stop();
    expect(FakeEventSource.opened[0]!.close).toHaveBeenCalledOnce();
  });

  it('polls while a refused stream is opened again, and stops polling once it is up', () => {
    const stop = followEvents('/api/events', hooks);
    const [first] = FakeEventSource.opened;
    first!.readyState = FakeEventSource.CLOSED;
    first!.onerror!();
    vi.advanceTimersByTime(5_000);
    expect(hooks.onPoll).toHaveBeenCalledOnce();
    expect(FakeEventSource.opened).toHaveLength(2);

    FakeEventSource.opened[1]!.onopen!();
    expect(hooks.onResume).toHaveBeenCalledOnce();
    vi.advanceTimersByTime(60_000);
    expect(hooks.onPoll).toHaveBeenCalledOnce();
    stop();
  });

  it('leaves it to the browser to open again a stream that only broke off', () => {
    const stop = followEvents('/api/events', hooks);
    FakeEventSource.opened[0]!.onerror!();
    vi.advanceTimersByTime(4_000);
    expect(FakeEventSource.opened).toHaveLength(1);
    stop();
  });
});
