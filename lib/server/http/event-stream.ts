import 'server-only';
import { logger } from '@/lib/server/log/logger';
import { beforeStop } from '@/lib/server/settings/shutdown';

export interface ServerEvent {
  readonly event: string;
  readonly data: unknown;
}

/** Silence longer than this makes proxies hang up. */
const heartbeat_ms = 15_000;

/**
 * Server-sent events from an iteration, with a heartbeat while it is silent. The signal that the iteration gets fires
 * when the client has gone or the server stops. Events are numbered, but hold the whole present state: whoever comes
 * back with Last-Event-ID has missed nothing that the first event does not tell.
 */
export async function eventStream(
  request: Request,
  start: (signal: AbortSignal) => Promise<AsyncIterable<ServerEvent>>,
): Promise<Response> {
  const ending = new AbortController();
  // Refusals come before the first byte, as problem details.
  const events = await start(ending.signal);
  const encoder = new TextEncoder();
  const end = (): void => ending.abort();
  let isOpen = true;
  const body = new ReadableStream<Uint8Array>({
    start(controller) {
      const send = (text: string): void => {
        if (isOpen) controller.enqueue(encoder.encode(text));
      };
      const timer = setInterval(() => send(': still here\n\n'), heartbeat_ms);
      // An open stream would keep the server from stopping.
      const forget = beforeStop(end);
      request.signal.addEventListener('abort', end, { once: true });
      send('retry: 2000\n\n');
      void pump(events, ending.signal, send)
        .catch((error: unknown) => logger().error({ err: error }, 'an event stream broke'))
        .finally(() => {
          clearInterval(timer);
          forget();
          request.signal.removeEventListener('abort', end);
          if (isOpen) controller.close();
          isOpen = false;
        });
    },
    cancel() {
      isOpen = false;
      end();
    },
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/event-stream; charset=utf-8',
      'cache-control': 'no-cache, no-transform',
      'x-accel-buffering': 'no',
    },
  });
}

async function pump(
  events: AsyncIterable<ServerEvent>,
  signal: AbortSignal,
  send: (text: string) => void,
): Promise<void> {
  let number = 0;
  for await (const { event, data } of events) {
    if (signal.aborted) return;
    number += 1;
    send(`id: ${number}\nevent: ${event}\ndata: ${JSON.stringify(data)}\n\n`);
  }
}
