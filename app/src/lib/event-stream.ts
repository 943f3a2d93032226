export interface CaptureEvent {
  readonly captureId: string;
  readonly state: 'queued' | 'analysing' | 'done' | 'failed' | 'cancelled';
  readonly progress: number | null;
  readonly recordId?: string | null;
}

export interface EventStreamHooks {
  readonly onCapture: (event: CaptureEvent) => void;
  /** Called while the stream is down: what was missed has to be asked for. */
  readonly onPoll: () => void;
  /** Called once a stream that was down is up again. */
  readonly onResume: () => void;
}

/** A server or a proxy that cuts the stream is asked again after this long, doubled each time up to the last. */
const FIRST_RETRY_MS = 1_000;
const LAST_RETRY_MS = 30_000;
const POLL_MS = 5_000;

/**
 * Follows what happens to the captures. The browser reconnects a stream that merely broke off; one that was refused
 * (a restart answered 502, say) it gives up, so that is tried again here, and meanwhile the page polls.
 *
 * @returns the way to stop
 */
export function followEvents(url: string, hooks: EventStreamHooks): () => void {
  let source: EventSource | null = null;
  let retryMs = FIRST_RETRY_MS;
  let retryTimer: ReturnType<typeof setTimeout> | undefined;
  let pollTimer: ReturnType<typeof setInterval> | undefined;

  const startPolling = () => {
    pollTimer ??= setInterval(hooks.onPoll, POLL_MS);
  };
  const stopPolling = () => {
    if (pollTimer === undefined) return;
    clearInterval(pollTimer);
    pollTimer = undefined;
    hooks.onResume();
  };
  const connect = () => {
    source = new EventSource(url);
    source.onopen = () => {
      retryMs = FIRST_RETRY_MS;
      stopPolling();
    };
    source.onerror = () => {
      startPolling();
      if (source?.readyState !== EventSource.CLOSED) return;
      retryTimer = setTimeout(connect, retryMs);
      retryMs = Math.min(retryMs * 2, LAST_RETRY_MS);
    };
    source.addEventListener('capture', (message: MessageEvent<string>) => {
      hooks.onCapture(JSON.parse(message.data) as CaptureEvent); // our own server's event
    });
  };

  if (typeof EventSource === 'undefined') startPolling();
  else connect();
  return () => {
    source?.close();
    clearTimeout(retryTimer);
    clearInterval(pollTimer);
  };
}
