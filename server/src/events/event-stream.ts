import type { Response } from 'express';

export const HEARTBEAT_MS = 15_000;

/** One server-sent-event stream: a name and JSON a message; line breaks can't get in, JSON has none. */
export class EventStream {
  constructor(private readonly response: Response) {
    response.writeHead(200, {
      'Content-Type': 'text/event-stream; charset=utf-8',
      'Cache-Control': 'no-store',
      'X-Accel-Buffering': 'no',
    });
    response.write('retry: 2000\n: open\n\n');
  }

  send(event: string, payload: unknown): void {
    this.response.write(`event: ${event}\ndata: ${JSON.stringify(payload)}\n\n`);
  }

  /** Keeps proxies from closing a stream on which nothing happens. */
  beat(): void {
    this.response.write(': still here\n\n');
  }

  end(): void {
    this.response.end();
  }
}
