import { type Request, type Response } from 'express';

export interface EventStream {
  send(event: string, data: unknown): void;
  end(): void;
  readonly closed: boolean;
}

/** Opens a stream of server-sent events: no buffering on the way, a comment every 15 s so that proxies keep it open. */
export function openEventStream(request: Request, response: Response): EventStream {
  response.status(200).set({
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'no-cache, no-store, no-transform',
    'X-Accel-Buffering': 'no',
    Connection: 'keep-alive',
  });
  response.flushHeaders();
  let closed = false;
  const heartbeat = setInterval(() => response.write(': still here\n\n'), 15_000);
  const close = () => {
    closed = true;
    clearInterval(heartbeat);
  };
  request.on('close', close);
  return {
    send(event, data) {
      if (!closed) response.write(`event: ${event}\ndata: ${JSON.stringify(data)}\n\n`);
    },
    end() {
      close();
      response.end();
    },
    get closed() {
      return closed;
    },
  };
}
