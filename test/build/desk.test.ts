// The desk behind the page: every write against the version it was made for, whole or not at all, and nothing outside its folder.

import { spawn } from "node:child_process";
import { chmod, mkdir, readdir, readFile, rename, stat, symlink, utimes, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { build } from "esbuild";
import { expect, test } from "vitest";
import { createDesk } from "../../build/desk.ts";
import type { DeskAnswer } from "../../runtime/desk.ts";
import type { Action } from "../../runtime/server/local-server.ts";
import { seededRandom } from "../assert-close.ts";
import { fixtures, ownFolder, projectRoot, runtimeImport } from "./run-command.ts";

async function decided(): Promise<{ folder: string; path: string; source: string; desk: Record<string, Action> }> {
  const folder = await ownFolder();
  const path = join(folder, "decided.ts");
  const text = await readFile(join(fixtures, "decided.ts"), "utf8");
  const source = text.replace('"../../../runtime/index.ts"', runtimeImport);
  await writeFile(path, source);
  return { folder, path, source, desk: createDesk({ path, label: "decided.ts" }) };
}

const ask = (desk: Record<string, Action>, name: string, body: unknown) => desk[name]!(body) as Promise<DeskAnswer>;

test("desk: keeps givens, and takes the write back", async () => {
  const { path, source, desk } = await decided();
  await chmod(path, 0o640);
  expect(await ask(desk, "keepGivens", { base: source, texts: { side: "2 m" } })).toEqual({
    ok: true,
    sentence: "Kept in decided.ts.",
  });
  const kept = await readFile(path, "utf8");
  expect(kept).toBe(source.replace('given("1.2 m"', 'given("2 m"'));
  expect((await stat(path)).mode & 0o777).toBe(0o640);
  expect(await ask(desk, "keepGivens", { base: kept, texts: { side: "2 m" } })).toMatchObject({
    ok: true,
    sentence: "decided.ts says so already.",
  });
  expect(await ask(desk, "undo", { base: kept })).toEqual({ ok: true, sentence: "Taken back: kept in decided.ts." });
  expect(await readFile(path, "utf8")).toBe(source);
  expect(await ask(desk, "undo", { base: source })).toMatchObject({ ok: false });
});

test("desk: a file that changed meanwhile is left alone and both versions are kept", async () => {
  const { folder, path, source, desk } = await decided();
  const theirs = source.replace("as cut", "as sawn");
  await writeFile(path, theirs);
  const answer = await ask(desk, "keepGivens", { base: source, texts: { side: "2 m" } });
  expect(answer).toMatchObject({ ok: false, kept: expect.stringMatching(/^decided\.kept-.*\.ts\.txt$/) });
  expect(answer.sentence).toMatch(/changed on disk meanwhile and was left as it is\. .* take up the file's version/);
  expect(await readFile(path, "utf8")).toBe(theirs);
  const kept = (answer as { kept: string }).kept;
  expect(await readFile(join(folder, kept), "utf8")).toBe(source.replace('given("1.2 m"', 'given("2 m"'));
  // what can't be taken back is said, and nothing is lost by asking
  expect(await ask(desk, "undo", { base: theirs })).toMatchObject({ ok: false });
});

test("desk: a rationale is written, agreed to again, edited; a cell is replaced; errors have their line", async () => {
  const { path, desk } = await decided();
  const now = async () => readFile(path, "utf8");
  const draft = {
    ...{ decision: "Paint it.", chosen: "painted", reasons: "It rusts.", author: "P. Inter" },
    numbers: [{ label: "Area", expression: "area", unit: "m^2", tolerance: "0.1 m^2" }],
  };
  const done = async (name: string, body: object) => {
    const answer = await ask(desk, name, { base: await now(), ...body });
    expect(answer, name).toMatchObject({ ok: true });
  };
  await done("addRationale", { beside: "areas", draft, now: [1.44] });
  expect(await now()).toContain("export const paintedChosen = rationale(areas, {");
  await done("agreeAgain", { cell: "squareChosen", author: "B. Cutter", now: { Area: 1.44, Side: 1.2 } });
  expect(await now()).toContain("history: [{");
  await done("editRationale", { cell: "paintedChosen", draft: { ...draft, decision: "Paint it red." }, now: [1.44] });
  await done("addNote", { after: "areas", markdown: "Red it is." });
  await done("replaceCell", { cell: "area", source: "export const area = side ** 2;" });
  expect(await now()).toContain('decision: "Paint it red."');
  const before = await now();
  const answer = await ask(desk, "replaceCell", { base: before, cell: "area", source: "export const area = (" });
  expect(answer).toMatchObject({
    ok: false,
    line: before.split("\n").findIndex((line) => line.startsWith("export const area")) + 1,
  });
  expect(await now()).toBe(before);
});

test("desk: forks into its folder, never over a file, never out of it", async () => {
  const { folder, source, desk } = await decided();
  await mkdir(join(folder, "own"));
  const outside = await ownFolder();
  await symlink(outside, join(folder, "away"));
  const fork = (body: object) => ask(desk, "fork", { texts: { side: "0.5 m" }, ...body });
  expect(await fork({ name: "Small one" })).toMatchObject({ ok: true, file: "small-one.ts" });
  expect(await fork({ name: "Small one" })).toMatchObject({
    ok: false,
    sentence: expect.stringMatching(/is there already/),
  });
  expect(await fork({ name: "Small one", folder: "own" })).toMatchObject({ ok: true, file: "own/small-one.ts" });
  for (const path of ["..", "../..", outside, "away", "own/../..", "/etc", "\u0000", "no such"])
    expect(await fork({ name: "Far", folder: path }), path).toMatchObject({ ok: false });
  expect(await fork({ name: "../../escaped" })).toMatchObject({ ok: true, file: "escaped.ts" });
  expect(await fork({ name: "///" })).toMatchObject({
    ok: false,
    sentence: expect.stringMatching(/letters or digits/),
  });
  expect(await readdir(outside)).toEqual([]);
  expect((await readdir(folder)).sort()).toEqual(["away", "decided.ts", "escaped.ts", "own", "small-one.ts"]);
  expect(await readFile(join(folder, "decided.ts"), "utf8")).toBe(source);
  expect(await readFile(join(folder, "small-one.ts"), "utf8")).toMatch(
    /^\/\/ Forked from decided\.ts on [\d-]+: Small one\.\n/,
  );
});

test("desk: a link put in the file's place isn't followed", async () => {
  const { folder, path, source, desk } = await decided();
  const other = join(folder, "other.ts");
  await rename(path, other);
  await symlink(other, path);
  const answer = await ask(desk, "keepGivens", { base: source, texts: { side: "2 m" } });
  expect(answer).toMatchObject({ ok: false, sentence: expect.stringMatching(/no longer the plain file/) });
  expect(await readFile(other, "utf8")).toBe(source);
});

test("desk: a request of the wrong shape is refused and nothing is written", async () => {
  const { folder, path, source, desk } = await decided();
  const shapes = [undefined, null, 1, "x", [], {}, { base: 1 }, { base: source }, { base: source, texts: [] }];
  for (const name of Object.keys(desk).filter((one) => one !== "undo"))
    for (const body of shapes) await expect(ask(desk, name, body), `${name} ${JSON.stringify(body)}`).rejects.toThrow();
  await expect(ask(desk, "keepGivens", { base: source, texts: { side: 2 } })).rejects.toThrow("side must be text");
  expect(await ask(desk, "keepGivens", { base: source, texts: { __proto__x: "1" } })).toMatchObject({ ok: false });
  expect(await readFile(path, "utf8")).toBe(source);
  expect(await readdir(folder)).toEqual(["decided.ts"]);
});

test("desk: two conflicts within one second keep two versions", async () => {
  const { folder, path, source, desk } = await decided();
  await writeFile(path, `${source}// theirs\n`);
  const keep = (side: string) => ask(desk, "keepGivens", { base: source, texts: { side } });
  const answers = (await Promise.all(["2 m", "3 m", "4 m"].map(keep))) as { kept: string }[];
  const versions = await Promise.all(answers.map(({ kept }) => readFile(join(folder, kept), "utf8")));
  expect(versions.map((text) => /given\("(\d m)"/.exec(text)?.[1])).toEqual(["2 m", "3 m", "4 m"]);
});

test("desk: a file with the line ends and the mark of another system keeps them", async () => {
  const { path, source, desk } = await decided();
  const theirs = `\ufeff${source.replaceAll("\n", "\r\n")}`;
  await writeFile(path, theirs);
  const now = async () => readFile(path, "utf8");
  const done = async (name: string, body: object) =>
    expect(await ask(desk, name, { base: await now(), ...body }), name).toMatchObject({ ok: true });
  await done("keepGivens", { texts: { side: "2 m" } });
  expect(await now()).toBe(theirs.replace('given("1.2 m"', 'given("2 m"'));
  await done("replaceCell", { cell: "area", source: "export const area =\n  side ** 2;" });
  await done("addNote", { after: "areas", markdown: "Two\n\nparagraphs." });
  await done("agreeAgain", { cell: "squareChosen", author: "B. Cutter", now: { Area: 4, Side: 2 } });
  await done("keepGivens", { texts: { remark: "z,r\n0,1\n" } });
  const text = await now();
  expect(text.startsWith("\ufeff//")).toBe(true);
  expect(text.match(/(?<!\r)\n|\r(?!\n)/g)).toBeNull();
  expect(await ask(desk, "fork", { name: "Other ends", texts: {} })).toMatchObject({ ok: true });
  expect(await readFile(path.replace("decided", "other-ends"), "utf8")).toMatch(
    /^\ufeff\/\/ Forked from [^\n]*\r\n\/\//,
  );
});

test("desk: half a surrogate pair in a text is written as what the file can hold, and can be taken back", async () => {
  const { path, source, desk } = await decided();
  const note = await ask(desk, "addNote", { base: source, after: "areas", markdown: "half \ud83d of a face" });
  expect(note).toMatchObject({ ok: true });
  const written = await readFile(path, "utf8");
  expect(written).toContain("note`half \ufffd of a face`;");
  expect(await ask(desk, "undo", { base: written })).toMatchObject({ ok: true });
  expect(await readFile(path, "utf8")).toBe(source);
});

test("desk: what a killed write left beside the file is taken away, and nothing else", async () => {
  const { folder, path, source } = await decided();
  const hour = new Date(Date.now() - 3_600_000);
  const names = [".decided.ts.0123456789ab", ".decided.ts.0123456789zz", ".other.ts.0123456789ab", ".decided.ts.fresh"];
  for (const name of names) {
    await writeFile(join(folder, name), "half");
    await utimes(join(folder, name), hour, hour);
  }
  await writeFile(join(folder, ".decided.ts.ba9876543210"), "being written just now");
  const desk = createDesk({ path, label: "decided.ts" });
  expect(await ask(desk, "keepGivens", { base: source, texts: { side: "2 m" } })).toMatchObject({ ok: true });
  expect((await readdir(folder)).sort()).toEqual([...names.slice(1), ".decided.ts.ba9876543210", "decided.ts"].sort());
});

test("desk: killed two hundred times while it keeps, the file is the old or the new one, whole", async () => {
  const { folder, source } = await decided();
  const script = join(folder, "keeper.mjs");
  const entry = `import { createDesk } from ${JSON.stringify(join(projectRoot, "build/desk.ts"))};
import { readFileSync } from "node:fs";
const path = process.argv[2];
const desk = createDesk({ path, label: "decided.ts" });
for (let i = 0; ; i++) {
  const base = readFileSync(path, "utf8");
  const long = base.includes("1.2 m");
  await desk.keepGivens({ base, texts: { side: long ? "2.5 m" : "1.2 m", remark: "x".repeat(long ? 100000 : 4) } });
  if (i === 0) process.stdout.write("writing\\n");
}`;
  await build({
    stdin: { contents: entry, resolveDir: projectRoot, loader: "ts" },
    ...{ bundle: true, minify: true, platform: "node", format: "esm", outfile: script, logLevel: "silent" },
    banner: { js: 'import { createRequire } from "node:module"; const require = createRequire(import.meta.url);' },
  });
  const [short, long] = ["xxxx", "x".repeat(100_000)].map((remark, i) =>
    source.replace("1.2 m", i === 0 ? "1.2 m" : "2.5 m").replace('given.text("none"', `given.text("${remark}"`),
  );
  const found = new Map([source, short!, long!].map((text) => [text, 0]));
  const random = seededRandom(20261203);
  /** one process after the other on a file of its own, each killed at some moment of its writing */
  const lane = async (name: string, kills: number): Promise<void> => {
    const path = join(folder, name);
    await writeFile(path, source);
    for (let kill = 0; kill < kills; kill++) {
      const child = spawn(process.execPath, [script, path], { stdio: ["ignore", "pipe", "inherit"] });
      await new Promise<void>((resolve) => child.stdout!.once("data", () => resolve()));
      await new Promise((resolve) => setTimeout(resolve, random() * 60));
      child.kill("SIGKILL");
      await new Promise((resolve) => child.once("close", resolve));
      const text = await readFile(path, "utf8");
      expect(found.has(text), `after kill ${kill}: ${text.length} characters`).toBe(true);
      found.set(text, found.get(text)! + 1);
    }
  };
  await Promise.all(["a.ts", "b.ts", "c.ts", "d.ts"].map((name) => lane(name, 50)));
  // it was really writing: both versions were found
  expect([...found.values()].reduce((sum, count) => sum + count)).toBe(200);
  expect(found.get(short!)).toBeGreaterThan(10);
  expect(found.get(long!)).toBeGreaterThan(10);
}, 300_000);
