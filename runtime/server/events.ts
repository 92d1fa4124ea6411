// Server-sent events: how the page learns that the notebook was saved.

import type { ServerResponse } from "node:http";

export interface EventHub {
  /** Answers a request with the stream of events; `hello` is the first of them. */
  join(response: ServerResponse): void;
  send(event: string, data: unknown): void;
  /** listeners now */
  readonly count: number;
  close(): void;
}

const LISTENER_LIMIT = 64;

/** @param hello what a page that joins (or joins again) must know to see what it missed */
export function createEventHub(hello: () => unknown, { beatMs = 15_000 } = {}): EventHub {
  const listeners = new Set<ServerResponse>();
  const write = (response: ServerResponse, event: string, data: unknown) => {
    // JSON has no raw line breaks, so that one `data:` line holds it all.
    response.write(`event: ${event}\ndata: ${JSON.stringify(data)}\n\n`);
  };
  const beat = setInterval(() => {
    for (const response of listeners) response.write(": still here\n\n");
  }, beatMs);
  beat.unref();
  return {
    join(response) {
      if (listeners.size >= LISTENER_LIMIT) {
        response.writeHead(503).end("Too many pages are listening.");
        return;
      }
      response.writeHead(200, { "content-type": "text/event-stream; charset=utf-8", "cache-control": "no-store" });
      listeners.add(response);
      response.on("close", () => listeners.delete(response));
      response.on("error", () => listeners.delete(response));
      response.write("retry: 1000\n\n");
      write(response, "hello", hello());
    },
    send(event, data) {
      for (const response of listeners) write(response, event, data);
    },
    get count() {
      return listeners.size;
    },
    close() {
      clearInterval(beat);
      for (const response of listeners) response.end();
      listeners.clear();
    },
  };
}
