// A person new to it: forks the default study for another dish, writes down why, turns the band until that has moved, agrees
// again, exports; and a colleague forks from the file. All by hand in a real browser.

import { mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { launchBrowser } from "../browser.ts";
import { ownFolder, projectRoot, run, runOpen } from "../build/run-command.ts";
import { shownText } from "../build/shown-text.ts";

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser?.close());

/** A folder for pictures of each step, to be looked at: HORNBOOK_PICTURES=/some/folder */
const pictures = process.env.HORNBOOK_PICTURES;
async function picture(page: Page, name: string): Promise<void> {
  if (!pictures) return;
  mkdirSync(pictures, { recursive: true });
  await page.screenshot({ path: join(pictures, `${name}.png`), fullPage: true });
}

/** The default study in a folder of its own, as a second project on this machine would hold it. */
function ownCopy(folder: string): string {
  const path = join(folder, "trade-study.ts");
  const text = readFileSync(join(projectRoot, "notebooks/trade-study.ts"), "utf8");
  writeFileSync(path, text.replaceAll('from "../', `from "${projectRoot}/`));
  return path;
}

async function openPage(url: string, width = 1440): Promise<{ page: Page; complaints: string[] }> {
  const page = await browser.newPage({ viewport: { width, height: 1000 } });
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(error.message));
  page.on("console", (message) => message.type() === "error" && complaints.push(message.text()));
  await page.goto(url);
  await page.locator(".state-of-study .sentence", { hasText: "current" }).waitFor();
  return { page, complaints };
}

const sentence = (page: Page) => page.locator(".state-of-study .sentence");

test("a study forked, decided, moved, agreed to again, sent, and forked from the file", async () => {
  const folder = await ownFolder();
  const first = await runOpen([ownCopy(folder)], { cwd: folder });
  const { page, complaints } = await openPage(first.url);

  // fork, by the form on the page
  await page.getByRole("button", { name: "Fork this study" }).click();
  const form = page.getByRole("form", { name: "Fork this study for another dish" });
  await form.getByLabel("Name of the new study").fill("Gorse Lane");
  await form.getByLabel("Dish diameter").fill("1.8 m");
  await form.getByLabel("Focal length over diameter").fill("0.5");
  await picture(page, "1-fork-form");
  await form.getByRole("button", { name: "write the fork" }).click();
  await page.getByText("Forked to gorse-lane.ts").waitFor();
  const forked = join(folder, "gorse-lane.ts");
  expect(readFileSync(forked, "utf8")).toMatch(/^\/\/ Forked from trade-study\.ts on \d{4}-\d\d-\d\d: Gorse Lane\.\n/);
  expect(readFileSync(forked, "utf8")).toContain('given("1.8 m", {');
  // once more: never over a file
  await page.getByRole("button", { name: "Fork this study" }).click();
  await form.getByLabel("Name of the new study").fill("Gorse Lane");
  await form.getByRole("button", { name: "write the fork" }).click();
  await form.getByText("is there already; a fork never overwrites a file").waitFor();
  expect(complaints).toEqual([]);
  await page.close();

  // the fork: its rationale is only inherited, and what it rested on isn't there any more
  const second = await runOpen([forked], { cwd: folder });
  const { page: own, complaints: said } = await openPage(second.url);
  expect(await own.title()).toBe("Gorse Lane");
  await expect
    .poll(() => sentence(own).textContent())
    .toMatch(/One rationale has moved and one is inherited, not yet confirmed\./);
  const inherited = own.locator('[data-cell="feedChosen"]');
  expect(await shownText(inherited)).toContain("Inherited, not yet confirmed.");
  await picture(own, "2-inherited");

  // a rationale of one's own, beside the trade table
  const trade = own.locator('.block[data-cell="tradeView"]');
  await trade.getByRole("button", { name: "write a rationale" }).click();
  const writing = own.getByRole("form", { name: "A rationale beside this result" });
  await writing.getByLabel("What is decided").fill("Take the smooth cone.");
  await writing.getByLabel("Chosen").fill("smooth");
  await writing
    .getByLabel("Reasons")
    .fill('One polarisation only; ${show(trade.rows[0].worst.gainDbi, "dBi", 1)} is enough.');
  await writing.getByLabel("Who agrees").fill("T. Newcombe");
  const row = writing.getByRole("group", { name: "number 1" });
  await row.getByLabel("Called").fill("Gain, worst");
  await row.getByLabel("Number").fill("trade.rows[0].worst.gainDbi");
  await row.getByLabel("Unit").fill("dBi");
  await row.getByLabel("May move by").fill("0.1 dBi");
  await picture(own, "3-rationale-form");
  await writing.getByRole("button", { name: "agree and write it down" }).click();
  const rationale = own.locator('[data-cell="smoothChosen"]');
  await rationale.waitFor();
  const agreed = readFileSync(forked, "utf8");
  expect(agreed).toContain("export const smoothChosen = rationale(tradeView, {");
  expect(agreed).toMatch(
    /restsOn\("Gain, worst", trade\.rows\[0\]\.worst\.gainDbi, \{ agreed: "\d\d\.\d\d dBi", mayMove: "0\.1 dBi" \}\)/,
  );
  expect(await shownText(rationale)).toContain("Take the smooth cone.");
  await expect.poll(() => rationale.locator("li[data-moved]").count()).toBe(0);

  // the band, until it has moved
  await own.locator("#given-bandLow").fill("7.2 GHz");
  await own.keyboard.press("Enter");
  await rationale.locator("li[data-moved]").waitFor();
  expect((await shownText(rationale)).replace(/\s+/g, " ")).toMatch(/moved by \d\.\d\d dB, may by 0\.10 dB/);
  await expect.poll(() => sentence(own).textContent()).toMatch(/Two rationales have moved/);
  await picture(own, "4-moved");

  // kept in the file, then agreed to again: the former agreement stays readable
  await own.getByRole("button", { name: "Keep these values" }).click();
  await expect.poll(() => readFileSync(forked, "utf8")).toContain('given("7.2 GHz", {');
  await own.locator(".actions .said", { hasText: "All values are as in the file." }).waitFor();
  await rationale.getByRole("button", { name: "agree again" }).click();
  const again = own.getByRole("form", { name: /Agree to the numbers as they are now/ });
  expect(await again.getByLabel("Who agrees").inputValue()).toBe("T. Newcombe");
  await again.getByRole("button", { name: "agree", exact: true }).click();
  await rationale.getByText("one former agreement").waitFor();
  expect(await rationale.locator("li[data-moved]").count()).toBe(0);
  expect(readFileSync(forked, "utf8")).toMatch(
    /history: \[\{ author: "T\. Newcombe", date: "[\d-]+", agreed: \{ "Gain, worst": "\d\d\.\d\d dBi" \} \}\],/,
  );
  await picture(own, "5-agreed-again");
  expect(said).toEqual([]);

  // narrow, nothing is lost
  await own.setViewportSize({ width: 390, height: 844 });
  await rationale.getByRole("button", { name: "edit" }).click();
  await own.getByRole("form", { name: "The rationale's words and numbers" }).waitFor();
  expect(await own.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
  await picture(own, "6-narrow-edit");
  await own.close();

  // sent as one file, and taken up elsewhere
  const sent = await run(["export", forked, "-o", "gorse-lane.html"], { cwd: folder });
  expect(sent.code).toBe(0);
  const elsewhere = await ownFolder();
  const taken = await run(
    [
      "fork",
      join(folder, "gorse-lane.html"),
      "--name",
      "Upper Gorse",
      "--set",
      "dishDiameter=1.2 m",
      "--to",
      elsewhere,
    ],
    { cwd: elsewhere },
  );
  expect([taken.code, taken.err.includes("upper-gorse.ts")]).toEqual([0, true]);
  expect(readdirSync(elsewhere)).toEqual(["upper-gorse.ts"]);
  const text = readFileSync(join(elsewhere, "upper-gorse.ts"), "utf8");
  expect(text).toContain('given("1.2 m", {');
  expect(text).toContain('given("7.2 GHz", {');
  expect(text.match(/inherited: "gorse-lane\.html"/g)).toHaveLength(2);
  // beyond the fork's own marks, the source is the exported one to the byte
  const plain = (source: string) =>
    source
      .replace(/^\/\/ Forked from .*\n/, "")
      .replace(/,?\n\s*inherited: "[^"]*"/g, "")
      .replace('given("1.2 m", {', 'given("1.8 m", {')
      .replace(/title: "(Gorse Lane|Upper Gorse)"/, 'title: ""');
  expect(plain(text)).toBe(plain(readFileSync(forked, "utf8")));
}, 180_000);

test("a cell edited on the page: a fault is shown at its line, a save is taken up, the reader's own editor works meanwhile", async () => {
  const folder = await ownFolder();
  const path = ownCopy(folder);
  const { url } = await runOpen([path], { cwd: folder });
  const { page, complaints } = await openPage(url);
  const horns = page.locator('.block[data-cell="horns"]');
  await horns.locator("details.code > summary").click();
  await horns.getByRole("button", { name: "edit horns" }).click();
  const editor = page.locator(".editor .cm-content");
  await editor.waitFor();
  await picture(page, "7-editor");
  const write = async (text: string) => {
    await editor.click();
    await page.keyboard.press("Control+A");
    await page.keyboard.insertText(text);
    await page.keyboard.press("Control+S");
  };
  const before = readFileSync(path, "utf8");
  await write("export const horns = figure(\n  hornsToScale([,\n);");
  await page.locator(".editor .answer", { hasText: /can't be read|no candidates|Unexpected/ }).waitFor();
  expect(await page.locator(".editor .cm-lintRange-error").count()).toBeGreaterThan(0);
  expect(readFileSync(path, "utf8")).toBe(before);
  await picture(page, "8-fault");
  await write(
    'export const horns = figure(hornsToScale([{ label: "Only one", candidate: smooth }]), { caption: "The cone alone." });',
  );
  await page.locator(".caption", { hasText: "The cone alone." }).waitFor();
  expect(readFileSync(path, "utf8")).toContain('{ label: "Only one", candidate: smooth }');
  // the reader's own editor, with a given turned on the page
  await page.locator("#given-dishDiameter").fill("3 m");
  await page.keyboard.press("Enter");
  writeFileSync(path, readFileSync(path, "utf8").replace("The cone alone.", "The cone, by another editor."));
  await page.locator(".caption", { hasText: "The cone, by another editor." }).waitFor();
  expect(await page.locator("#given-dishDiameter").inputValue()).toMatch(/^3/);
  // a write made against an older version is refused, and both are kept
  await page.evaluate(() => {
    const { study } = (globalThis as unknown as { hornbook: { study: { source: string } } }).hornbook;
    Object.defineProperty(study, "source", { get: () => `${"// an older version\n"}export const a = 1;` });
  });
  expect(complaints).toEqual([]);
  await page.close();
}, 120_000);
