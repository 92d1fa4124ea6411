// Attacks on the local server, and what it may answer. The rules are those of RFC 9110 (Host, status codes), the Fetch standard
// (Origin, Sec-Fetch-*) and common practice against DNS rebinding and cross-site requests.

import { request as httpRequest } from "node:http";
import { connect } from "node:net";
import { networkInterfaces } from "node:os";
import { afterEach, expect, test } from "vitest";
import { BODY_LIMIT } from "../../../runtime/server/guard.ts";
import { type LocalServer, startLocalServer } from "../../../runtime/server/local-server.ts";

const secret = "line one of the notebook";
let running: LocalServer[] = [];
let written: unknown[] = [];

async function start(port?: number): Promise<LocalServer> {
  written = [];
  const server = await startLocalServer({
    port,
    page: (token) => `<!doctype html><title>study</title><p data-token="${token}">`,
    asset: (path) =>
      path === "/assets/notebook-1a.js" ? { type: "text/javascript; charset=utf-8", body: secret } : undefined,
    hello: () => ({ notebook: "/assets/notebook-1a.js" }),
    actions: {
      keep: async (body) => {
        written.push(body);
        return { kept: true };
      },
    },
  });
  running.push(server);
  return server;
}

afterEach(async () => {
  await Promise.all(running.map((server) => server.close()));
  running = [];
});

/** Sends bytes as they are and gives the whole answer: no client tidies the address on the way. */
function raw(port: number, text: string, { host = "127.0.0.1" } = {}): Promise<string> {
  return new Promise((resolve, reject) => {
    const socket = connect(port, host, () => socket.write(text));
    let answer = "";
    socket.on("data", (part) => {
      answer += part;
    });
    socket.on("close", () => resolve(answer));
    socket.on("error", (error) => (answer ? resolve(answer) : reject(error)));
    socket.setTimeout(5000, () => socket.destroy());
  });
}

const status = (answer: string) => Number(answer.match(/^HTTP\/1\.1 (\d+)/)?.[1]);

const get = (server: LocalServer, path: string, more: string[] = [], host = `127.0.0.1:${server.port}`) =>
  raw(server.port, [`GET ${path} HTTP/1.1`, `Host: ${host}`, "Connection: close", ...more, "", ""].join("\r\n"));

const post = (server: LocalServer, path: string, body: string, headers: Record<string, string | undefined>) => {
  const all: Record<string, string | undefined> = {
    Host: `127.0.0.1:${server.port}`,
    Connection: "close",
    Origin: `http://127.0.0.1:${server.port}`,
    "Content-Type": "application/json",
    "Content-Length": String(Buffer.byteLength(body)),
    "x-hornbook-token": server.token,
    ...headers,
  };
  const lines = Object.entries(all).flatMap(([name, value]) => (value === undefined ? [] : [`${name}: ${value}`]));
  return raw(server.port, [`POST ${path} HTTP/1.1`, ...lines, "", body].join("\r\n"));
};

test("local server: the page comes with a strict policy and without a way to frame, guess or embed it", async () => {
  const server = await start();
  const answer = await get(server, "/");
  expect(status(answer)).toBe(200);
  const head = answer.split("\r\n\r\n")[0]!.toLowerCase();
  expect(head).toContain("content-security-policy: default-src 'none'; script-src 'self'");
  expect(head).not.toContain("'unsafe-");
  expect(head).toContain("frame-ancestors 'none'");
  for (const line of [
    "x-content-type-options: nosniff",
    "x-frame-options: deny",
    "cross-origin-resource-policy: same-origin",
    "cross-origin-opener-policy: same-origin",
    "referrer-policy: no-referrer",
    "cache-control: no-store",
  ]) {
    expect(head).toContain(line);
  }
  expect(answer).toContain(`data-token="${server.token}"`);
  expect(server.token.length).toBeGreaterThanOrEqual(43);
});

test("local server: an asset is answered by its exact name", async () => {
  const server = await start();
  const answer = await get(server, "/assets/notebook-1a.js");
  expect(status(answer)).toBe(200);
  expect(answer).toContain(secret);
  expect(answer.toLowerCase()).toContain("x-content-type-options: nosniff");
});

test.each([
  ["a foreign name", "evil.example"],
  ["a foreign name with our port", "evil.example:PORT"],
  ["our address without the port", "127.0.0.1"],
  ["another port", "127.0.0.1:1"],
  ["a name that begins like ours", "127.0.0.1:PORT.evil.example"],
  ["a name with user part", "127.0.0.1:PORT@evil.example"],
  ["the machine's any-address", "0.0.0.0:PORT"],
  ["an empty one", ""],
])("local server: Host with %s is refused", async (_words, host) => {
  const server = await start();
  const answer = await get(server, "/", [], host.replace("PORT", String(server.port)));
  expect(status(answer)).toBeGreaterThanOrEqual(400);
  expect(answer).not.toContain(server.token);
});

test("local server: two Host headers, or none, are refused", async () => {
  const server = await start();
  const twice = await get(server, "/", ["Host: evil.example"]);
  expect(status(twice)).toBeGreaterThanOrEqual(400);
  const none = await raw(server.port, "GET / HTTP/1.0\r\n\r\n");
  expect(status(none)).toBeGreaterThanOrEqual(400);
  expect(twice + none).not.toContain(server.token);
});

test.each([
  "http://evil.example",
  "null",
  "https://127.0.0.1:PORT",
  "http://127.0.0.1:1",
  "http://127.0.0.1:PORT.evil.example",
])("local server: Origin %s is refused", async (origin) => {
  const server = await start();
  const answer = await get(server, "/assets/notebook-1a.js", [
    `Origin: ${origin.replace("PORT", String(server.port))}`,
  ]);
  expect(status(answer)).toBe(403);
  expect(answer).not.toContain(secret);
});

test("local server: a part of the page loaded by another site is refused, a link followed to it is not", async () => {
  const server = await start();
  const script = await get(server, "/assets/notebook-1a.js", ["Sec-Fetch-Site: cross-site", "Sec-Fetch-Mode: no-cors"]);
  expect(status(script)).toBe(403);
  const frame = await get(server, "/", [
    "Sec-Fetch-Site: cross-site",
    "Sec-Fetch-Mode: navigate",
    "Sec-Fetch-Dest: iframe",
  ]);
  expect(status(frame)).toBe(403);
  const otherPort = await get(server, "/events", ["Sec-Fetch-Site: same-site", "Sec-Fetch-Mode: cors"]);
  expect(status(otherPort)).toBe(403);
  const link = await get(server, "/", [
    "Sec-Fetch-Site: cross-site",
    "Sec-Fetch-Mode: navigate",
    "Sec-Fetch-Dest: document",
  ]);
  expect(status(link)).toBe(200);
});

test.each([
  "/../package.json",
  "/assets/../../package.json",
  "/assets/..%2f..%2fpackage.json",
  "/assets/%2e%2e/%2e%2e/package.json",
  "/assets/%252e%252e%252fpackage.json",
  "/assets/..\\..\\package.json",
  "/assets/..%5c..%5cpackage.json",
  "/assets/%c0%ae%c0%ae/package.json",
  "/assets/notebook-1a.js%00.html",
  "/assets/notebook-1a.js/",
  "//etc/passwd",
  "/etc/passwd",
  "/assets",
  "/assets/",
  "/notebooks/trade-study.ts",
  "/package.json",
  "/.git/config",
  "/constructor",
  "/__proto__",
  "http://evil.example/",
  "file:///etc/passwd",
  "*",
])("local server: nothing stands at %s, and no folder is listed", async (path) => {
  const server = await start();
  const answer = await get(server, path);
  expect([400, 404]).toContain(status(answer));
  expect(answer.split("\r\n\r\n")[1]!.length).toBeLessThan(120);
});

test("local server: listens on the loopback address only", async () => {
  const server = await start();
  const others = Object.values(networkInterfaces())
    .flatMap((list) => list ?? [])
    .filter(({ internal, family }) => !internal && family === "IPv4");
  for (const { address } of others) {
    await expect(raw(server.port, "GET / HTTP/1.1\r\n\r\n", { host: address })).rejects.toThrow();
  }
  expect(server.url).toBe(`http://127.0.0.1:${server.port}/`);
});

test("local server: a write with token and origin is done", async () => {
  const server = await start();
  const answer = await post(server, "/do/keep", '{"dishDiameter":"1.8 m"}', {});
  expect(status(answer)).toBe(200);
  expect(answer).toContain('{"kept":true}');
  expect(written).toEqual([{ dishDiameter: "1.8 m" }]);
});

test.each<[string, number, Record<string, string | undefined>]>([
  ["without the token", 403, { "x-hornbook-token": undefined }],
  ["with a wrong token", 403, { "x-hornbook-token": "x".repeat(43) }],
  ["with a shorter token", 403, { "x-hornbook-token": "x" }],
  ["without an origin", 403, { Origin: undefined }],
  ["from another site", 403, { Origin: "http://evil.example" }],
  ["as a form", 415, { "Content-Type": "application/x-www-form-urlencoded" }],
  ["as plain text", 415, { "Content-Type": "text/plain" }],
  ["that announces too much", 413, { "Content-Length": String(BODY_LIMIT + 1) }],
])("local server: a write %s is refused", async (_words, wanted, headers) => {
  const server = await start();
  const answer = await post(server, "/do/keep", "{}", headers);
  expect(status(answer)).toBe(wanted);
  expect(written).toEqual([]);
});

test("local server: a write that isn't JSON, or that nobody knows, is refused", async () => {
  const server = await start();
  expect(status(await post(server, "/do/keep", "{", {}))).toBe(400);
  expect(status(await post(server, "/do/constructor", "{}", {}))).toBe(404);
  expect(status(await post(server, "/", "{}", {}))).toBe(404);
  expect(written).toEqual([]);
});

test("local server: a body that grows past the limit without announcing it is cut off", async () => {
  const server = await start();
  const answer = await new Promise<number>((resolve, reject) => {
    const request = httpRequest(
      {
        port: server.port,
        host: "127.0.0.1",
        path: "/do/keep",
        method: "POST",
        headers: {
          origin: `http://127.0.0.1:${server.port}`,
          "content-type": "application/json",
          "x-hornbook-token": server.token,
          "transfer-encoding": "chunked",
        },
      },
      (response) => {
        resolve(response.statusCode ?? 0);
        response.resume();
        request.destroy();
      },
    );
    // The server may hang up before all is sent: that is the point.
    request.on("error", (error: NodeJS.ErrnoException) =>
      error.code === "EPIPE" || error.code === "ECONNRESET" ? resolve(413) : reject(error),
    );
    const part = Buffer.alloc(64 * 1024, 0x20);
    let left = BODY_LIMIT * 4;
    const more = () => {
      while (left > 0 && !request.destroyed) {
        left -= part.length;
        if (!request.write(part)) return request.once("drain", more);
      }
      if (!request.destroyed) request.end();
      return undefined;
    };
    more();
  });
  expect(answer).toBe(413);
  expect(written).toEqual([]);
  expect(status(await get(server, "/"))).toBe(200);
});

test("local server: a head or an address beyond all measure is refused, and the server goes on", async () => {
  const server = await start();
  const longAddress = await get(server, `/?${"a".repeat(40_000)}`);
  expect(status(longAddress)).toBe(414);
  const hugeHead = await get(server, "/", [`X-Filler: ${"a".repeat(200_000)}`]);
  expect(status(hugeHead)).toBeGreaterThanOrEqual(400);
  const noise = await raw(server.port, "\u0016\u0003\u0001 not http at all\r\n\r\n");
  expect(status(noise)).toBe(400);
  expect(status(await get(server, "/"))).toBe(200);
});

test.each(["PUT", "DELETE", "PATCH", "OPTIONS", "TRACE"])("local server: %s is not answered", async (method) => {
  const server = await start();
  const answer = await raw(
    server.port,
    `${method} / HTTP/1.1\r\nHost: 127.0.0.1:${server.port}\r\nConnection: close\r\n\r\n`,
  );
  expect(status(answer)).toBe(405);
  expect(answer.toLowerCase()).not.toContain("access-control-allow");
});

test("local server: events begin with what a page must know, then tell each change", async () => {
  const server = await start();
  const abort = new AbortController();
  const response = await fetch(`${server.url}events`, { signal: abort.signal });
  expect(response.headers.get("content-type")).toContain("text/event-stream");
  const reader = response.body!.pipeThrough(new TextDecoderStream()).getReader();
  let text = "";
  const until = async (wanted: string) => {
    while (!text.includes(wanted)) {
      const { value, done } = await reader.read();
      if (done) throw new Error(`the stream ended before ${wanted}`);
      text += value;
    }
  };
  await until('event: hello\ndata: {"notebook":"/assets/notebook-1a.js"}\n\n');
  server.events.send("notebook", { notebook: "/assets/notebook-2b.js\nevent: forged" });
  await until("2b.js");
  expect(text).toContain('event: notebook\ndata: {"notebook":"/assets/notebook-2b.js\\nevent: forged"}\n\n');
  expect(server.events.count).toBe(1);
  abort.abort();
});

test("local server: a port that is taken is the system's error; a preferred one gives way", async () => {
  const first = await start();
  await expect(start(first.port)).rejects.toMatchObject({ code: "EADDRINUSE" });
  const second = await startLocalServer({
    preferredPort: first.port,
    page: () => "",
    asset: () => undefined,
    hello: () => null,
  });
  running.push(second);
  expect(second.port).not.toBe(first.port);
});
