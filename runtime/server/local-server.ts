// The local server of `open`: one page, what it loads, a stream of events, and a table of writes. It reads no file: whatever it
// may answer is in memory under its exact name, so no address can lead out of a folder.

import { randomBytes } from "node:crypto";
import { createServer, type IncomingMessage, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { createEventHub, type EventHub } from "./events.ts";
import { BODY_LIMIT, type Refusal, refusalOf } from "./guard.ts";
import { COMMON_HEADERS, pagePolicy } from "./headers.ts";

export interface Asset {
  type: string;
  body: string | Uint8Array;
}

/** A write: gets the JSON that the page sent, gives the JSON of the answer. */
export type Action = (body: unknown) => Promise<unknown>;

/** An action's way to say no: the page shows the sentence. */
export class ActionRefused extends Error {
  override name = "ActionRefused";
  readonly status: number;
  constructor(message: string, status = 409) {
    super(message);
    this.status = status;
  }
}

export interface LocalServerOptions {
  /** 0 or left out: `preferredPort` if free, else any that is */
  port?: number;
  preferredPort?: number;
  /** the page at "/"; gets the token for its writes */
  page: (token: string) => string;
  /** what the page loads, by its whole path: "/assets/page-1a2b.js" */
  asset: (path: string) => Asset | undefined;
  /** what a page that begins to listen must know */
  hello: () => unknown;
  /** writes by name: POST /do/<name> */
  actions?: Record<string, Action>;
  styleHashes?: readonly string[];
}

export interface LocalServer {
  url: string;
  port: number;
  token: string;
  events: EventHub;
  close(): Promise<void>;
}

/**
 * Starts the server on 127.0.0.1.
 * @throws the system's error (EADDRINUSE, EACCES) when a port that was asked for can't be had
 */
export async function startLocalServer(options: LocalServerOptions): Promise<LocalServer> {
  const token = randomBytes(32).toString("base64url");
  const events = createEventHub(options.hello);
  let port = 0;
  const server = createServer(
    { maxHeaderSize: 64 * 1024, requestTimeout: 30_000, headersTimeout: 10_000 },
    (request, response) => {
      answer(request, response, { ...options, token, port, events }).catch((error: unknown) => {
        if (!response.headersSent) say(response, 500, error instanceof Error ? error.message : String(error));
        response.destroy();
      });
    },
  );
  server.maxConnections = 128;
  server.on("clientError", (_error, socket) => {
    if (socket.writable) socket.end("HTTP/1.1 400 Bad Request\r\nConnection: close\r\n\r\n");
  });
  const listen = (wanted: number) =>
    new Promise<void>((resolve, reject) => {
      server.once("error", reject);
      server.listen({ port: wanted, host: "127.0.0.1", exclusive: true }, () => {
        server.off("error", reject);
        resolve();
      });
    });
  if (options.port) await listen(options.port);
  else await listen(options.preferredPort ?? 0).catch(() => listen(0));
  port = (server.address() as AddressInfo).port;
  return {
    url: `http://127.0.0.1:${port}/`,
    port,
    token,
    events,
    close: () =>
      new Promise((resolve) => {
        events.close();
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

type Running = LocalServerOptions & { token: string; port: number; events: EventHub };

async function answer(request: IncomingMessage, response: ServerResponse, running: Running): Promise<void> {
  for (const [name, value] of Object.entries(COMMON_HEADERS)) response.setHeader(name, value!);
  const refusal = refusalOf(request, running);
  if (refusal) return refuse(request, response, refusal);
  const path = (request.url ?? "/").split(/[?#]/, 1)[0]!;
  if (request.method === "POST") return act(request, response, path, running);
  if (path === "/") {
    response.setHeader("content-security-policy", pagePolicy(running.styleHashes));
    return send(request, response, 200, "text/html; charset=utf-8", running.page(running.token), "no-store");
  }
  if (path === "/events" && request.method === "GET") return running.events.join(response);
  if (path === "/favicon.ico") return send(request, response, 204, undefined, "", "max-age=86400");
  const asset = running.asset(path);
  if (!asset) return say(response, 404, "There is nothing at this address.");
  // Names carry a hash of the content, so that a browser may keep them.
  return send(request, response, 200, asset.type, asset.body, "max-age=31536000, immutable");
}

function send(
  request: IncomingMessage,
  response: ServerResponse,
  status: number,
  type: string | undefined,
  body: string | Uint8Array,
  cache: string,
): void {
  if (type) response.setHeader("content-type", type);
  response.setHeader("cache-control", cache);
  if (status !== 204) response.setHeader("content-length", Buffer.byteLength(body));
  response.writeHead(status);
  response.end(request.method === "HEAD" || status === 204 ? undefined : body);
}

function say(response: ServerResponse, status: number, message: string): void {
  response.setHeader("content-type", "text/plain; charset=utf-8");
  response.setHeader("cache-control", "no-store");
  response.writeHead(status).end(`${message}\n`);
}

/** Refuses and hangs up, so that an unread body can't be used as the next request. */
function refuse(request: IncomingMessage, response: ServerResponse, { status, message }: Refusal): void {
  response.setHeader("connection", "close");
  say(response, status, message);
  response.on("finish", () => request.destroy());
}

async function act(request: IncomingMessage, response: ServerResponse, path: string, running: Running): Promise<void> {
  const name = path.startsWith("/do/") ? path.slice(4) : "";
  const actions = running.actions ?? {};
  if (!Object.hasOwn(actions, name))
    return refuse(request, response, { status: 404, message: "There is no such write." });
  const text = await readBody(request);
  if (text === undefined) {
    return refuse(request, response, { status: 413, message: `A write may have at most ${BODY_LIMIT} bytes.` });
  }
  let body: unknown;
  try {
    body = JSON.parse(text);
  } catch {
    return refuse(request, response, { status: 400, message: "The write isn't valid JSON." });
  }
  try {
    const result = JSON.stringify((await actions[name]!(body)) ?? null);
    return send(request, response, 200, "application/json; charset=utf-8", result, "no-store");
  } catch (error) {
    if (error instanceof ActionRefused) return say(response, error.status, error.message);
    throw error;
  }
}

/** The body as text, or undefined when it grows over the limit: then the rest isn't read. */
async function readBody(request: IncomingMessage): Promise<string | undefined> {
  const parts: Buffer[] = [];
  let size = 0;
  for await (const part of request) {
    size += (part as Buffer).length;
    if (size > BODY_LIMIT) return undefined;
    parts.push(part as Buffer);
  }
  return Buffer.concat(parts).toString("utf8");
}
