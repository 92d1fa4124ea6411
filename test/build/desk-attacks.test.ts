// Attacks on the writes of a page, by the real `open`: who isn't its own page writes nothing. And on `fork`, by exported files that
// were tampered with: nothing lands outside the folder, nothing hidden, nothing over a file.

import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { mkdir, symlink } from "node:fs/promises";
import { request } from "node:http";
import { join } from "node:path";
import { expect, test } from "vitest";
import { makeRecord, recordElement } from "../../build/export-record.ts";
import { fixtures, isOneSentence, ownFolder, run, runOpen, runtimeImport } from "./run-command.ts";

const sound = readFileSync(join(fixtures, "decided.ts"), "utf8").replace('"../../../runtime/index.ts"', runtimeImport);

interface Sent {
  status: number;
  body: string;
}

/** Sends a write with exactly these headers. */
function send(port: string, path: string, headers: Record<string, string>, body: string): Promise<Sent> {
  return new Promise((resolve, reject) => {
    const length = { "content-length": String(Buffer.byteLength(body)) };
    const sending = request(
      { host: "127.0.0.1", port, path, method: "POST", headers: { ...length, ...headers } },
      (response) => {
        let text = "";
        response.on("data", (part) => {
          text += part;
        });
        response.on("end", () => resolve({ status: response.statusCode ?? 0, body: text }));
      },
    );
    sending.on("error", reject);
    sending.end(body);
  });
}

test("the desk behind `open`: every write asks for host, origin, token and JSON; the page's own is done", async () => {
  const folder = await ownFolder();
  const path = join(folder, "decided.ts");
  writeFileSync(path, sound);
  const { url } = await runOpen([path], { cwd: folder });
  const { port } = new URL(url);
  const token = /"token":"([\w-]+)"/.exec(await (await fetch(url)).text())![1]!;
  const own = {
    ...{ host: `127.0.0.1:${port}`, origin: `http://127.0.0.1:${port}` },
    ...{ "content-type": "application/json", "x-hornbook-token": token },
  };
  const { origin: _origin, ...withoutOrigin } = own;
  const { "x-hornbook-token": _token, ...withoutToken } = own;
  const flipped = token.slice(0, -1) + (token.endsWith("A") ? "B" : "A");
  const attacks: [string, Record<string, string>, number][] = [
    ["foreign host", { ...own, host: `evil.example:${port}` }, 421],
    ["host of a rebound name", { ...own, host: `127.0.0.1.evil.example:${port}` }, 421],
    ["foreign origin", { ...own, origin: "https://evil.example" }, 403],
    ["origin of another port", { ...own, origin: "http://127.0.0.1:1" }, 403],
    ["origin of a sandboxed frame", { ...own, origin: "null" }, 403],
    ["no origin", withoutOrigin, 403],
    ["cross-site fetch", { ...own, "sec-fetch-site": "cross-site" }, 403],
    ["no token", withoutToken, 403],
    ["empty token", { ...own, "x-hornbook-token": "" }, 403],
    ["one character else", { ...own, "x-hornbook-token": flipped }, 403],
    ["token twice", { ...own, "x-hornbook-token": `${token}, ${token}` }, 403],
    ["a form", { ...own, "content-type": "text/plain" }, 415],
  ];
  const bodies: Record<string, object> = {
    keepGivens: { base: sound, texts: { side: "2 m" } },
    addNote: { base: sound, after: "area", markdown: "x" },
    agreeAgain: { base: sound, cell: "squareChosen", author: "a", now: { Area: 1, Side: 1 } },
    replaceCell: { base: sound, cell: "area", source: "export const area = 1;" },
    undo: { base: sound },
    fork: { name: "Taken", texts: {} },
  };
  for (const [words, headers, status] of attacks)
    for (const [name, body] of Object.entries(bodies)) {
      const answer = await send(port, `/do/${name}`, headers, JSON.stringify(body));
      expect([words, name, answer.status]).toEqual([words, name, status]);
      expect(answer.body).not.toContain(token);
    }
  for (const name of ["", "constructor", "__proto__", "toString", "keepGivens/", "../do/keepGivens", "keepgivens"])
    expect((await send(port, `/do/${name}`, own, JSON.stringify(bodies.keepGivens))).status, name).toBe(404);
  for (const body of ["", "null", "[]", '"x"', "{", '{"base":1}', '{"__proto__":{"base":"x"}}'])
    expect((await send(port, "/do/keepGivens", own, body)).status, body).toBe(400);
  expect(readFileSync(path, "utf8")).toBe(sound);
  expect(readdirSync(folder)).toEqual(["decided.ts"]);
  // what its own page sends is done, so it was these faults that were refused
  const done = await send(port, "/do/keepGivens", own, JSON.stringify(bodies.keepGivens));
  expect([done.status, JSON.parse(done.body).ok]).toEqual([200, true]);
  expect(readFileSync(path, "utf8")).toContain('given("2 m"');
});

test("the desk: names from a page stay names, never paths or properties of objects", async () => {
  const folder = await ownFolder();
  const path = join(folder, "decided.ts");
  writeFileSync(path, sound);
  const { url } = await runOpen([path], { cwd: folder });
  const { port } = new URL(url);
  const token = /"token":"([\w-]+)"/.exec(await (await fetch(url)).text())![1]!;
  const own = {
    ...{ host: `127.0.0.1:${port}`, origin: `http://127.0.0.1:${port}` },
    ...{ "content-type": "application/json", "x-hornbook-token": token },
  };
  const refused = async (name: string, body: string) => {
    const answer = await send(port, `/do/${name}`, own, body);
    expect([200, 400], body).toContain(answer.status);
    if (answer.status === 200) expect(JSON.parse(answer.body), body).toMatchObject({ ok: false });
  };
  for (const cell of ["../decided", "__proto__", "constructor", "/etc/passwd", "side; evil()", "import 1", ""]) {
    const name = JSON.stringify(cell);
    await refused("keepGivens", `{"base":${JSON.stringify(sound)},"texts":{${name}:"2 m"}}`);
    await refused("addNote", `{"base":${JSON.stringify(sound)},"after":${name},"markdown":"x"}`);
    await refused("replaceCell", `{"base":${JSON.stringify(sound)},"cell":${name},"source":"export const a = 1;"}`);
    await refused("agreeAgain", `{"base":${JSON.stringify(sound)},"cell":${name},"author":"a","now":{}}`);
  }
  for (const to of ["..", "/", "/tmp", "./..", "a/../..", "..\\..", "~", "%2e%2e"])
    await refused("fork", JSON.stringify({ name: "Away", folder: to, texts: {} }));
  expect(readFileSync(path, "utf8")).toBe(sound);
  expect(readdirSync(folder)).toEqual(["decided.ts"]);
});

/** An export as someone with bad intent would write it: the digests fit. */
function tampered(files: { path: string; text: string }[], notebook = "notebooks/a.ts"): string {
  const record = makeRecord({ version: "0", exported: "2026-12-01T00:00:00.000Z", notebook, files, givens: {} });
  return `<!doctype html><title>x</title>${recordElement(record, { still: true })}`;
}

test("fork: files beside the notebook of a tampered export land nowhere but in the folder, and never hidden", async () => {
  const home = await ownFolder();
  const folder = join(home, "to");
  const outside = await ownFolder();
  await mkdir(folder);
  await symlink(outside, join(folder, "linked"));
  const file = join(home, "sent.html");
  for (const path of [
    ...["../escaped.ts", "a/../../escaped.ts", join(outside, "escaped.ts"), "..\\escaped.ts", "C:\\escaped.ts"],
    ...[".bashrc", ".git/hooks/post-checkout", "a/.hidden/x.ts", "node_modules/marked/index.js", "package.json"],
    ...["linked/escaped.ts", "", ".", "a//b.ts", "nul\0.ts", "line\nbreak.ts"],
  ]) {
    writeFileSync(
      file,
      tampered([
        { path: "a.ts", text: sound },
        { path, text: "export const taken = 1;\n" },
      ]),
    );
    const { code, err } = await run(["fork", file, "--name", "Taken", "--to", folder], { cwd: home });
    expect([path, code, isOneSentence(err)], err).toEqual([path, 2, true]);
    expect(readdirSync(outside), path).toEqual([]);
    expect(readdirSync(folder), path).toEqual(["linked"]);
    expect(readdirSync(home).sort(), path).toEqual(["sent.html", "to"]);
  }
}, 120_000);

test("fork: a notebook's place in a tampered export doesn't lead its imports out of the project", async () => {
  const folder = await ownFolder();
  const file = join(folder, "sent.html");
  for (const notebook of ["../../etc/a.ts", "/etc/a.ts", "notebooks\\..\\..\\a.ts", "notebooks/\0a.ts"]) {
    writeFileSync(file, tampered([{ path: "a.ts", text: sound }], notebook));
    const { code, err } = await run(["fork", file, "--name", "Taken", "--to", folder], { cwd: folder });
    expect([notebook, code, isOneSentence(err)], err).toEqual([notebook, 2, true]);
    expect(readdirSync(folder)).toEqual(["sent.html"]);
  }
}, 60_000);
