// Script-injection by every text that a page takes, writes into the file and shows again, by the file's own name, and by what an
// export carries of it: in a real browser, whose policy would also tell of anything that tried.

import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { launchBrowser } from "../browser.ts";
import { openFile } from "./exported-page.ts";
import { fixtures, ownFolder, run, runOpen, runtimeImport } from "./run-command.ts";

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser?.close());

const sound = readFileSync(join(fixtures, "decided.ts"), "utf8").replace('"../../../runtime/index.ts"', runtimeImport);

/** Breaks out of an element, an attribute, a string, a template, a comment, a link. */
const attack = [
  "</script></textarea></title></template></noscript></style><script>globalThis.ran=1</script>",
  "<img src=x onerror='globalThis.ran=1'><svg onload=globalThis.ran=1>",
  "\"'`); globalThis.ran=1; (`'\"",
  "[l](javascript:globalThis.ran=1) <!-- --> */ // $",
].join(" ");

async function watched(url: string): Promise<{ page: Page; complaints: string[] }> {
  const page = await browser.newPage();
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(error.message));
  page.on("console", (message) => message.type() === "error" && complaints.push(message.text()));
  page.on("dialog", (dialog) => complaints.push(dialog.message()));
  await page.goto(url);
  await page.locator(".state-of-study .sentence", { hasText: "current" }).waitFor();
  return { page, complaints };
}

/** Nothing ran, and nothing in the page could. */
async function expectInert(page: Page, complaints: string[]): Promise<void> {
  expect(await page.evaluate(() => (globalThis as { ran?: number }).ran)).toBeUndefined();
  const alive = await page.evaluate(() =>
    [...document.querySelectorAll("body *")]
      .filter(
        ({ tagName, attributes }) =>
          /^(script|img|iframe|object|embed|base|meta)$/i.test(tagName) ||
          [...attributes].some(({ name, value }) => /^on/i.test(name) || /^\s*javascript:/i.test(value)),
      )
      .map(({ outerHTML }) => outerHTML.slice(0, 120)),
  );
  // an export's own elements: what it carries, the loader, and the script that it unpacks, both known to the policy by their hash
  expect(
    alive.filter(
      (element) =>
        !/^<script( type="application\/[^"]+" id="hornbook-\w+"| id="hornbook-live")?>(?!globalThis)/.test(element),
    ),
  ).toEqual([]);
  expect(complaints).toEqual([]);
}

test("every field of the page's forms: written, shown again, exported, forked, and never run", async () => {
  const folder = await ownFolder();
  const path = join(folder, "decided.ts");
  writeFileSync(path, sound);
  const { url } = await runOpen([path], { cwd: folder });
  const { page, complaints } = await watched(url);
  const file = () => readFileSync(path, "utf8");

  await page.locator("#given-remark").fill(attack);
  await page.keyboard.press("Tab");
  await page.getByRole("button", { name: "Keep these values" }).click();
  await expect.poll(file).toContain(`given.text(${JSON.stringify(attack)}`);

  const areas = page.locator('.block[data-cell="areas"]');
  await areas.getByRole("button", { name: "write a rationale" }).click();
  const writing = page.getByRole("form", { name: "A rationale beside this result" });
  await writing.getByLabel("What is decided").fill(`D ${attack}`);
  await writing.getByLabel("Chosen").fill(`C ${attack}`);
  await writing.getByLabel("Reasons").fill(`R ${attack}`);
  await writing.getByLabel("Who agrees").fill(`A ${attack}`);
  const row = writing.getByRole("group", { name: "number 1" });
  await row.getByLabel("Called").fill(`N ${attack}`);
  await row.getByLabel("Number").fill("area");
  await row.getByLabel("Unit").fill("m^2");
  // what is no quantity or no reading of a cell is refused, whatever it would do
  await row.getByLabel("May move by").fill(attack);
  await writing.getByRole("button", { name: "agree and write it down" }).click();
  await writing.getByText("may move by").last().waitFor();
  await row.getByLabel("May move by").fill("0.1 m^2");
  await writing.getByRole("button", { name: "agree and write it down" }).click();
  await expect.poll(file).toContain(`decision: ${JSON.stringify(`D ${attack}`)}`);
  const written = page.locator('.beside[data-mark="rationale"]', { hasText: "globalThis.ran=1" });
  await written.waitFor();
  await expectInert(page, complaints);

  // again, so that the hostile words come back from the file into a form, and go into the history
  await written.getByRole("button", { name: "agree again" }).click();
  const again = page.getByRole("form", { name: /Agree to the numbers as they are now/ });
  expect(await again.getByLabel("Who agrees").inputValue()).toBe(`A ${attack}`);
  await again.getByRole("button", { name: "agree", exact: true }).click();
  await expect.poll(file).toContain(`history: [`);
  await written.getByText("one former agreement").click();
  await expectInert(page, complaints);

  await page.getByRole("button", { name: "Fork this study" }).click();
  const form = page.getByRole("form", { name: "Fork this study for another dish" });
  await form.getByLabel("Name of the new study").fill(attack);
  await form.getByRole("button", { name: "write the fork" }).click();
  await page.getByText("Forked to ").waitFor();
  await expectInert(page, complaints);
  await page.close();
  const [forked] = readdirSync(folder).filter((name) => name !== "decided.ts");
  expect(forked).toMatch(/^[a-z0-9-]+\.ts$/);

  const second = await runOpen([join(folder, forked!)], { cwd: folder });
  const fork = await watched(second.url);
  expect(await fork.page.title()).toBe(attack);
  await fork.page.locator('.beside[data-mark="rationale"]', { hasText: "globalThis.ran=1" }).waitFor();
  await expectInert(fork.page, fork.complaints);
  await fork.page.close();

  for (const still of [[], ["--still"]]) {
    const name = `sent${still.length}.html`;
    const sent = await run(["export", join(folder, forked!), "-o", name, ...still], { cwd: folder });
    expect(sent.code, sent.err).toBe(0);
    const opened = await openFile(browser, join(folder, name), { scripts: true });
    expect(await opened.page.title()).toBe(attack);
    await expectInert(opened.page, opened.complaints);
    await opened.close();
    const to = await ownFolder();
    expect((await run(["fork", join(folder, name), "--name", `x ${attack}`, "--to", to], { cwd: to })).code).toBe(0);
    expect(readFileSync(join(to, readdirSync(to)[0]!), "utf8")).toContain(JSON.stringify(`D ${attack}`));
  }
}, 180_000);

test("the file's own name: shown on the page, in its title, in the export and in a fork, and never run", async () => {
  const folder = await ownFolder();
  const name = "<img src=x onerror=globalThis.ran=1>\"'`${globalThis.ran=1}&amp;.ts";
  // without a head, so that the file's name is the title
  writeFileSync(join(folder, name), sound.replace(/export const title = .*\n/, ""));
  const { url } = await runOpen([join(folder, name)], { cwd: folder });
  const { page, complaints } = await watched(url);
  expect(await page.title()).toContain("<img src=x onerror=globalThis.ran=1>");
  expect(await page.locator("footer").textContent()).toContain("<img src=x");
  await expectInert(page, complaints);
  await page.close();
  for (const still of [[], ["--still"]]) {
    expect((await run(["export", join(folder, name), "-o", "sent.html", ...still], { cwd: folder })).code).toBe(0);
    const opened = await openFile(browser, join(folder, "sent.html"), { scripts: true });
    await expectInert(opened.page, opened.complaints);
    await opened.close();
  }
  const forked = await run(["fork", join(folder, name), "--name", "Plain"], { cwd: folder });
  expect(forked.code, forked.err).toBe(0);
  expect(readFileSync(join(folder, "plain.ts"), "utf8")).toContain(`inherited: ${JSON.stringify(name)}`);
  const second = await runOpen([join(folder, "plain.ts")], { cwd: folder });
  const fork = await watched(second.url);
  await fork.page.locator('.beside[data-mark="rationale"]', { hasText: "<img src=x" }).waitFor();
  await expectInert(fork.page, fork.complaints);
  await fork.page.close();
}, 120_000);
