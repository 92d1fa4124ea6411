// `export`, by the real command, looked at in a real browser: from file://, with the network off, scripts off and on.

import { readdir, readFile, symlink, writeFile } from "node:fs/promises";
import { join } from "node:path";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { readRecord } from "../../build/export-record.ts";
import { launchBrowser } from "../browser.ts";
import { expectAlike, openFile, pageValues, type Values } from "./exported-page.ts";
import { fixtures, isOneSentence, ownFolder, projectRoot, run, smallNotebook, writeNotebook } from "./run-command.ts";
import { shownText } from "./shown-text.ts";

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

async function headless(args: string[]): Promise<Values> {
  const { out, err } = await run(["values", smallNotebook, ...args]);
  expect(err).toBe("");
  return JSON.parse(out);
}

test("export: with scripts off the results can be read", async () => {
  const folder = await ownFolder();
  const { code, out, err } = await run(["export", smallNotebook], { cwd: folder });
  expect([code, out]).toEqual([0, ""]);
  expect(err).toMatch(/^small\.html: \d+ kB, live\n$/);
  const { page, complaints, close } = await openFile(browser, join(folder, "small.html"), { scripts: false });
  const text = await shownText(page);
  const { cells } = await headless([]);
  expect(await page.title()).toBe("A ring of sheet metal");
  for (const words of [
    "A ring of sheet metal",
    "Outer radius",
    "the plate at hand",
    "The ring, to scale.",
    "Deburr the edges",
  ]) {
    expect(text).toContain(words);
  }
  const fields = await page
    .locator("input")
    .evaluateAll((inputs) => inputs.map((input) => input.getAttribute("value")?.replace(/\s/g, " ")));
  expect(fields).toEqual(expect.arrayContaining(["1.2 m", "300 mm"]));
  expect(text).toContain((cells.area as number).toFixed(6));
  await expect(page.locator("svg circle").count()).resolves.toBeGreaterThanOrEqual(2);
  expect(text).not.toMatch(/NaN|undefined|Infinity/);
  expect(complaints).toEqual([]);
  await close();
});

test("export: with scripts a turned given gives the numbers of `values`", async () => {
  const folder = await ownFolder();
  await run(["export", smallNotebook, "-o", "ring.html"], { cwd: folder });
  const { page, complaints, close } = await openFile(browser, join(folder, "ring.html"), { scripts: true });
  expectAlike(await pageValues(page), await headless([]));
  const outcome = await page.evaluate(() =>
    (globalThis as unknown as { hornbook: { study: { set(name: string, text: string): unknown } } }).hornbook.study.set(
      "outer",
      "2.5 m",
    ),
  );
  expect(outcome).toEqual({ ok: true });
  const turned = await headless(["--set", "outer=2.5 m"]);
  expectAlike(await pageValues(page), turned);
  const cell = page.locator("body");
  await expect.poll(() => shownText(cell), { timeout: 20_000 }).toContain((turned.cells.area as number).toFixed(6));
  expect(complaints).toEqual([]);
  await close();
});

test("export: givens that were set are the page's givens; the address of a view wins over them", async () => {
  const folder = await ownFolder();
  await run(["export", smallNotebook, "--set", "outer=2 m", "--set", "remark=<i>&\"'</i> </script>"], { cwd: folder });
  const path = join(folder, "small.html");
  const asExported = await openFile(browser, path, { scripts: true });
  expect((await pageValues(asExported.page)).givens).toMatchObject({ outer: 2, remark: "<i>&\"'</i> </script>" });
  expect(asExported.complaints).toEqual([]);
  await asExported.close();
  const viewed = await openFile(browser, path, { scripts: true }, "#inner=0.5%20m");
  expect((await pageValues(viewed.page)).givens).toMatchObject({ outer: 1.2, inner: 0.5 });
  await viewed.close();
});

test("export: a still file has no script at all and reads the same", async () => {
  const folder = await ownFolder();
  const { code, err } = await run(["export", smallNotebook, "--still", "-o", "still.html"], { cwd: folder });
  expect(code).toBe(0);
  expect(err).toMatch(/^still\.html: \d+ kB, without script\n$/);
  const html = await readFile(join(folder, "still.html"), "utf8");
  expect(html).not.toMatch(/<script|javascript:|\son[a-z]+=/i);
  expect(html).toContain("script-src 'none'");
  const { page, complaints, close } = await openFile(browser, join(folder, "still.html"), { scripts: true });
  expect(await shownText(page)).toContain("Deburr the edges");
  expect(await page.locator("input, button, select").count()).toBe(0);
  expect(complaints).toEqual([]);
  await close();
});

test.each([[], ["--still"]])(
  "export %j: carries its sources, givens, version and date, each with its digest",
  async (...args) => {
    const folder = await ownFolder();
    const env = { SOURCE_DATE_EPOCH: "1000000000" };
    await run(["export", smallNotebook, "--set", "outer=2 m", ...args], { cwd: folder, env });
    const html = await readFile(join(folder, "small.html"), "utf8");
    const record = readRecord(html);
    const { version } = JSON.parse(await readFile(join(projectRoot, "package.json"), "utf8"));
    // 10⁹ s after 1970-01-01 is 2001-09-09T01:46:40Z (POSIX).
    expect(record).toMatchObject({
      version,
      exported: "2001-09-09T01:46:40.000Z",
      notebook: "test/build/fixtures/small.ts",
    });
    expect(record.files.map(({ path }) => path)).toEqual(["small.ts", "ring.ts"]);
    for (const { path, text } of record.files) expect(text).toBe(await readFile(join(fixtures, path), "utf8"));
    expect(record.givens.outer).toBe("2 m");
    expect(html).not.toContain(projectRoot);
    expect(html).toContain("9 September 2001");
    await run(["export", smallNotebook, "--set", "outer=2 m", ...args, "-o", "again.html"], { cwd: folder, env });
    expect(await readFile(join(folder, "again.html"), "utf8")).toBe(html);
  },
);

test("export: text that looks like markup never becomes markup, and nothing runs", async () => {
  const folder = await ownFolder();
  const attack = "</script><script>globalThis.ran=1</script><img src=x onerror='globalThis.ran=1'><!-- <script>";
  const path = await writeNotebook(
    folder,
    "attack.ts",
    `import { given, head, note, table } from "VOCABULARY";
export const words = given.text(${JSON.stringify(attack)}, { label: ${JSON.stringify(`L${attack}`)}, why: ${JSON.stringify(`W${attack}`)} });
export const top = head({ document: words, title: words, facts: [[words, words]] });
note\`## Words \${words}

<img src=x onerror="globalThis.ran=1"> [link](javascript:globalThis.ran=1) \${words}\`;
export const cells = table({ title: words, columns: [words], rows: [{ label: words, cells: [words] }], data: [[words]] });
// ${attack}
`,
  );
  for (const still of [[], ["--still"]]) {
    const { code } = await run(["export", path, ...still], { cwd: folder });
    expect(code).toBe(0);
    const { page, complaints, close } = await openFile(browser, join(folder, "attack.html"), { scripts: true });
    if (still.length === 0) expect((await pageValues(page)).givens.words).toBe(attack);
    expect(await page.evaluate(() => (globalThis as { ran?: number }).ran)).toBeUndefined();
    expect(await page.locator("img, a[href^='javascript']").count()).toBe(0);
    expect(complaints).toEqual([]);
    expect(readRecord(await readFile(join(folder, "attack.html"), "utf8")).files[0]!.text).toContain(attack);
    await close();
  }
});

test("export: a failed cell is told, the rest is written, exit 1", async () => {
  const folder = await ownFolder();
  const { code, err } = await run(["export", smallNotebook, "--set", "inner=1.5 m"], { cwd: folder });
  expect(code).toBe(1);
  expect(err).toContain("area failed: ringArea: inner must be below outer (1.2 m); got 1.5 m");
  const { page, close } = await openFile(browser, join(folder, "small.html"), { scripts: false });
  const text = await shownText(page);
  expect(text).toContain("ringArea: inner must be below outer");
  expect(text).toContain("Deburr the edges");
  await close();
});

test("export: an earlier export is replaced, any other file only with --force, and never half", async () => {
  const folder = await ownFolder();
  const notes = join(folder, "notes.html");
  await writeFile(notes, "<p>my own notes</p>");
  const refused = await run(["export", smallNotebook, "-o", "notes.html"], { cwd: folder });
  expect(refused.code).toBe(2);
  expect(refused.err).toMatch(/notes\.html is there already and isn't an exported study; --force overwrites it/);
  expect(await readFile(notes, "utf8")).toBe("<p>my own notes</p>");
  expect((await run(["export", smallNotebook, "-o", "notes.html", "--force"], { cwd: folder })).code).toBe(0);
  expect((await run(["export", smallNotebook, "-o", "notes.html", "--still"], { cwd: folder })).code).toBe(0);
  expect(await readFile(notes, "utf8")).toContain("script-src 'none'");
  // A notebook that can't be used leaves the earlier export as it was.
  const torn = await writeNotebook(folder, "torn.ts", "const a = (;\n");
  const before = await readFile(notes, "utf8");
  expect((await run(["export", torn, "-o", "notes.html"], { cwd: folder })).code).toBe(2);
  expect(await readFile(notes, "utf8")).toBe(before);
  expect((await readdir(folder)).sort()).toEqual(["notes.html", "torn.ts"]);
});

test("export: where it can't be written is one sentence, exit 2", async () => {
  const folder = await ownFolder();
  const nowhere = await run(["export", smallNotebook, "-o", "no/such/folder.html"], { cwd: folder });
  expect([nowhere.code, isOneSentence(nowhere.err)]).toEqual([2, true]);
  expect(nowhere.err).toContain("there is no folder to hold it");
  const onFolder = await run(["export", smallNotebook, "-o", "."], { cwd: folder });
  expect(onFolder.err).toContain("it is a folder");
  expect(onFolder.code).toBe(2);
  await symlink(smallNotebook, join(folder, "linked.ts"));
  const onItself = await run(["export", smallNotebook, "-o", smallNotebook, "--force"], { cwd: folder });
  expect(onItself.err).toContain("is the notebook itself");
  expect(onItself.code).toBe(2);
});

test("export: -o - writes to standard output", async () => {
  const { code, out, err } = await run(["export", smallNotebook, "--still", "-o", "-"]);
  expect(code).toBe(0);
  expect(out.startsWith("<!doctype html>")).toBe(true);
  expect(out.trimEnd().endsWith("</html>")).toBe(true);
  expect(err).toContain("standard output");
});
