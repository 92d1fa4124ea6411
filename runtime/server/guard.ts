// Who may speak to the local server. It listens on this machine only, but every page of every site that the reader has open can
// send requests to this machine too, and a foreign name can be made to point at it (DNS rebinding). So: the Host must be ours,
// an Origin must be ours, nothing may be loaded from another site, and whatever writes must show the token that only our own
// page was handed.

import { timingSafeEqual } from "node:crypto";
import type { IncomingMessage } from "node:http";

export interface GuardOptions {
  port: number;
  /** what a write must carry in the header `x-hornbook-token` */
  token: string;
}

/** Why a request is refused: the status and one sentence. */
export interface Refusal {
  status: number;
  message: string;
}

/** Largest body of a write, bytes. */
export const BODY_LIMIT = 2 * 1024 * 1024;

/** Longest address, characters: the givens of a view are written in it. */
export const ADDRESS_LIMIT = 32 * 1024;

/** Names under which a browser on this machine reaches the server. */
export function ownHosts(port: number): string[] {
  return [`127.0.0.1:${port}`, `localhost:${port}`];
}

function sameSecret(a: string, b: string): boolean {
  const left = Buffer.from(a);
  const right = Buffer.from(b);
  return left.length === right.length && timingSafeEqual(left, right);
}

/** The reason to refuse a request, or undefined when it may be answered. Looks at the head only. */
export function refusalOf(request: IncomingMessage, { port, token }: GuardOptions): Refusal | undefined {
  const { headers, method = "GET", url = "" } = request;
  const hosts = ownHosts(port);
  // Node joins doubled Host headers or keeps the first; a second one is an attempt at something.
  const hostCount = request.rawHeaders.filter((text, i) => i % 2 === 0 && text.toLowerCase() === "host").length;
  if (hostCount !== 1 || !headers.host || !hosts.includes(headers.host.toLowerCase())) {
    return { status: 421, message: "This server answers only to its own name on this machine." };
  }
  if (!url.startsWith("/")) return { status: 400, message: "The address must begin with a slash." };
  if (url.length > ADDRESS_LIMIT)
    return { status: 414, message: `The address is longer than ${ADDRESS_LIMIT} characters.` };
  const { origin } = headers;
  if (origin !== undefined && !hosts.some((host) => origin === `http://${host}`)) {
    return { status: 403, message: "Requests from another site are refused." };
  }
  // A browser says where a request comes from. Following a link from elsewhere to the page is fine; loading a part of it isn't.
  const from = headers["sec-fetch-site"];
  const navigates =
    headers["sec-fetch-mode"] === "navigate" && headers["sec-fetch-dest"] === "document" && method === "GET";
  if ((from === "cross-site" || from === "same-site") && !navigates) {
    return { status: 403, message: "Requests from another site are refused." };
  }
  if (method === "GET" || method === "HEAD") return undefined;
  if (method !== "POST") return { status: 405, message: `${method} isn't answered here.` };
  return writeRefusal(request, token);
}

function writeRefusal({ headers }: IncomingMessage, token: string): Refusal | undefined {
  if (headers.origin === undefined) return { status: 403, message: "A write must say its origin." };
  const shown = headers["x-hornbook-token"];
  if (typeof shown !== "string" || !sameSecret(shown, token)) {
    return { status: 403, message: "A write must carry this server's token; reload the page to get it." };
  }
  if (!/^application\/json(;|$)/i.test(headers["content-type"] ?? "")) {
    return { status: 415, message: "A write must be application/json." };
  }
  const length = headers["content-length"];
  if (length !== undefined && !(Number(length) <= BODY_LIMIT)) {
    return { status: 413, message: `A write may have at most ${BODY_LIMIT} bytes.` };
  }
  return undefined;
}
