// `open`, by the real command, in a real browser: a save is taken up with the givens as they are and without loading the page again.

import { readFile, rename, rm, writeFile } from "node:fs/promises";
import { createServer } from "node:net";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { openingCommand } from "../../build/browser.ts";
import { launchBrowser } from "../browser.ts";
import { copySmall, isOneSentence, ownFolder, run, runOpen, smallNotebook, writeNotebook } from "./run-command.ts";
import { shownText } from "./shown-text.ts";

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

/** Patient, for a machine that does other things too. */
const eventually = <T>(read: () => T) => expect.poll(read, { timeout: 20_000 });

interface Handle {
  hornbook?: {
    study: {
      set(name: string, text: string): unknown;
      cells: { name: string; evaluations: number }[];
      givens: { name: string; text: string }[];
    };
    values(): Promise<
      { cells: Record<string, unknown>; failed: unknown[]; givens: Record<string, unknown> } | undefined
    >;
  };
}

async function openPage(url: string): Promise<{ page: Page; complaints: string[] }> {
  const page = await browser.newPage();
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(`error: ${error.message}`));
  page.on("console", (message) => {
    if (["error", "warning"].includes(message.type())) complaints.push(`console: ${message.text()}`);
  });
  page.on("request", (request) => {
    if (!request.url().startsWith(url) && !/^(blob|data):/.test(request.url()))
      complaints.push(`request: ${request.url()}`);
  });
  await page.goto(url);
  return { page, complaints };
}

const values = (page: Page) => page.evaluate(async () => (globalThis as Handle).hornbook?.values());
const cell = async (page: Page, name: string) => (await values(page))?.cells[name];
const evaluations = (page: Page, name: string) =>
  page.evaluate(
    (wanted) => (globalThis as Handle).hornbook!.study.cells.find((one) => one.name === wanted)?.evaluations,
    name,
  );

/** Saves as many editors do: a new file is renamed over the old one. */
async function save(path: string, change: (text: string) => string): Promise<void> {
  const text = await readFile(path, "utf8");
  const changed = change(text);
  expect(changed).not.toBe(text);
  await writeFile(`${path}.tmp`, changed);
  await rename(`${path}.tmp`, path);
}

test("open: the page shows the study, works in the background, keeps to its policy", async () => {
  const { url } = await runOpen([smallNotebook]);
  const { page, complaints } = await openPage(url);
  await eventually(() => shownText(page)).toContain("The ring, to scale.");
  const headless = JSON.parse((await run(["values", smallNotebook])).out);
  expect((await values(page))?.cells).toEqual(headless.cells);
  expect(await page.evaluate(() => crossOriginIsolated)).toBe(true);
  expect(complaints).toEqual([]);
  await page.close();
});

test("open: a save is taken up; givens stay, untouched cells aren't evaluated again", async () => {
  const folder = await ownFolder();
  const path = await copySmall(folder);
  const { url } = await runOpen([path]);
  const { page, complaints } = await openPage(url);
  await values(page);
  await page.evaluate(() => {
    (globalThis as Handle).hornbook!.study.set("outer", "2 m");
    Object.assign(globalThis, { sameDocument: true });
  });
  await eventually(() => cell(page, "area")).toBeCloseTo(Math.PI * (4 - 0.09), 12);
  const sums = await evaluations(page, "sum");
  await save(path, (text) => text.replace("mass: area * 2.7", "mass: area * 10"));
  await eventually(async () => ((await cell(page, "weight")) as { mass: number }).mass).toBeCloseTo(
    10 * Math.PI * (4 - 0.09),
    10,
  );
  expect((await values(page))?.givens).toMatchObject({ outer: 2, inner: 0.3 });
  expect(await evaluations(page, "sum")).toBe(sums);
  expect(await page.evaluate(() => (globalThis as { sameDocument?: boolean }).sameDocument)).toBe(true);
  await eventually(() => shownText(page)).toMatch(/122\.84\skg/);
  expect(complaints).toEqual([]);
  await page.close();
});

test("open: a save of an imported file is taken up by the cells that use it, in the workers too", async () => {
  const folder = await ownFolder();
  const path = await copySmall(folder);
  const { url } = await runOpen([path]);
  const { page } = await openPage(url);
  await page.evaluate(async () => {
    while (!(globalThis as Handle).hornbook?.study) await new Promise((resolve) => setTimeout(resolve, 10));
    (globalThis as Handle).hornbook!.study.set("inner", "0.1 m");
  });
  await eventually(() => cell(page, "area")).toBeCloseTo(Math.PI * (1.44 - 0.01), 12);
  await save(join(folder, "ring.ts"), (text) =>
    text.replace("sum += 1 / k ** 2", "sum += 2 / k ** 2").replace("Math.PI *", "2 * Math.PI *"),
  );
  await eventually(() => cell(page, "area")).toBeCloseTo(2 * Math.PI * (1.44 - 0.01), 12);
  await eventually(() => cell(page, "sum")).toBeCloseTo(Math.PI ** 2 / 3, 5);
  await page.close();
});

test("open: a file that can't be used is told on the page, which stays on the last good version", async () => {
  const folder = await ownFolder();
  const path = await copySmall(folder);
  const good = await readFile(path, "utf8");
  const { url, said } = await runOpen([path]);
  const { page } = await openPage(url);
  await eventually(() => cell(page, "area")).toBeGreaterThan(4);
  await writeFile(path, good.replace("export const area =", "export const area = = <script>"));
  const panel = page.locator("#hornbook-problems");
  await eventually(() => shownText(panel)).toMatch(/small\.ts:14/);
  expect(await panel.getAttribute("role")).toBe("alert");
  expect(await shownText(page)).toContain("The ring, to scale.");
  expect(await cell(page, "area")).toBeGreaterThan(4);
  expect(said()).toMatch(/small\.ts:14: /);
  await writeFile(path, good.replace('"./ring.ts"', '"./gone.ts"'));
  await eventually(() => shownText(panel)).toMatch(/small\.ts:3 imports "\.\/gone\.ts", and there is no such file/);
  await writeFile(path, good.replace("area * 2.7", "area * 3"));
  await eventually(async () => ((await cell(page, "weight")) as { mass: number }).mass).toBeCloseTo(
    3 * Math.PI * (1.44 - 0.09),
    10,
  );
  expect(await panel.count()).toBe(0);
  await page.close();
});

test("open: a notebook that is torn from the start, or away for a moment, is shown once it is whole", async () => {
  const folder = await ownFolder();
  const path = await copySmall(folder);
  const good = await readFile(path, "utf8");
  await writeFile(path, `${good}\nconst torn = (`);
  const { url } = await runOpen([path]);
  const { page } = await openPage(url);
  await eventually(() => shownText(page.locator("#hornbook-problems"))).toContain("can’t be used yet");
  await writeFile(path, good);
  await eventually(() => cell(page, "area")).toBeGreaterThan(4);
  await rm(path);
  await eventually(() => shownText(page.locator("#hornbook-problems"))).toContain("small.ts");
  await writeFile(path, good.replace("area * 2.7", "area * 3"));
  await eventually(async () => ((await cell(page, "weight")) as { mass: number }).mass).toBeCloseTo(
    3 * Math.PI * (1.44 - 0.09),
    10,
  );
  expect(await page.locator("#hornbook-problems").count()).toBe(0);
  await page.close();
});

test("open: a page that comes back after missing saves catches up; a stopped server is told", async () => {
  const folder = await ownFolder();
  const path = await copySmall(folder);
  const { url, child, ended } = await runOpen([path]);
  const { page } = await openPage(url);
  await eventually(() => cell(page, "area")).toBeGreaterThan(4);
  child.kill("SIGINT");
  expect(await ended).toBe(0);
  await eventually(() => page.locator("#hornbook-away").count()).toBe(1);
  await save(path, (text) => text.replace("area * 2.7", "area * 5"));
  const port = new URL(url).port;
  await runOpen([path, "--port", port]);
  await eventually(async () => ((await cell(page, "weight")) as { mass: number }).mass).toBeCloseTo(
    5 * Math.PI * (1.44 - 0.09),
    10,
  );
  expect(await page.locator("#hornbook-away").count()).toBe(0);
  await page.close();
});

test("open: a link with givens reproduces the view", async () => {
  const { url } = await runOpen([smallNotebook]);
  const { page } = await openPage(`${url}#outer=2%20m&finish=painted`);
  await eventually(async () => (await values(page))?.givens).toMatchObject({ outer: 2, finish: "painted" });
  await page.close();
});

test("open: a port that is taken, a bad port, a missing file: one sentence, exit 2", async () => {
  const other = createServer();
  await new Promise<void>((resolve) => other.listen(0, "127.0.0.1", resolve));
  const { port } = other.address() as { port: number };
  const taken = await run(["open", smallNotebook, "--no-browser", "--port", String(port)]);
  expect(taken.err).toMatch(new RegExp(`port ${port} is taken by another program`));
  expect([taken.code, taken.out, isOneSentence(taken.err)]).toEqual([2, "", true]);
  await new Promise((resolve) => other.close(resolve));
  for (const bad of ["0", "65536", "http", "80.5", "-1"]) {
    const { code, err } = await run(["open", smallNotebook, "--no-browser", `--port=${bad}`]);
    expect([code, err]).toEqual([
      2,
      expect.stringContaining(`--port must be a whole number from 1 to 65535; got "${bad}"`),
    ]);
  }
  const missing = await run(["open", "no-such.ts", "--no-browser"]);
  expect([missing.code, isOneSentence(missing.err)]).toEqual([2, true]);
});

test("open: ends at once and cleanly on Ctrl-C, also while a page listens", async () => {
  const folder = await ownFolder();
  const path = await writeNotebook(folder, "tiny.ts", 'import { note } from "VOCABULARY";\nnote`Hello`;\n');
  const { url, child, ended, said } = await runOpen([path]);
  const { page } = await openPage(url);
  await eventually(() => shownText(page)).toContain("Hello");
  child.kill("SIGINT");
  expect(await ended).toBe(0);
  expect(said()).toBe("Ctrl-C stops it.\n");
  await page.close();
});

test("openingCommand: the system's own way, and none without a screen", () => {
  const url = "http://127.0.0.1:4676/";
  expect(openingCommand(url, "darwin", {})).toEqual(["open", [url]]);
  expect(openingCommand(url, "win32", {})?.[0]).toBe("cmd");
  expect(openingCommand(url, "linux", { DISPLAY: ":0" })).toEqual(["xdg-open", [url]]);
  expect(openingCommand(url, "linux", { WAYLAND_DISPLAY: "wayland-0" })).toEqual(["xdg-open", [url]]);
  expect(openingCommand(url, "linux", {})).toBeUndefined();
});
