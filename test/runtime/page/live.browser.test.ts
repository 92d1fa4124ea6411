// The live page in a real browser: states, drawings, a painted page that wakes, texts from outside.

import { readFileSync } from "node:fs";
import type { Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { Figure } from "../../../runtime/shown.ts";
import { calls, frames, type SamplePages, samplePages } from "./open-page.ts";

let pages: SamplePages;
beforeAll(async () => {
  pages = await samplePages();
});
afterAll(async () => {
  await pages?.close();
});

describe("states", () => {
  test("stop and compute speak to the cell where the work is", async () => {
    const page = await pages.open();
    await page.locator('[data-cell="band"]').getByRole("button", { name: "stop" }).click();
    expect(await calls(page)).toEqual(["stop sweep"]);
    await page.evaluate(() => window.sample.put("band", { state: "behind" }));
    await page.locator('[data-cell="band"]').getByRole("button", { name: "compute" }).click();
    expect(await calls(page)).toEqual(["stop sweep", "again sweep"]);
  });

  test("the state is spoken once, when the study has come to rest", async () => {
    const page = await pages.open();
    const heard = page.locator("#study > [role=status]");
    for (const progress of [0.7, 0.8, 0.9])
      await page.evaluate((share) => window.sample.put("sweep", { progress: share }), progress);
    await page.evaluate(() => {
      window.sample.put("sweep", { state: "current", progress: undefined });
      window.sample.put("band", { state: "current" });
    });
    expect(await heard.textContent()).toBe("");
    await expect.poll(() => heard.textContent(), { timeout: 4000 }).toBe("One result is behind and three have failed.");
  });

  test("a figure that fails and comes back leaves what is below where it was", async () => {
    const page = await pages.open();
    const below = () => page.locator("#trade").evaluate((section) => section.getBoundingClientRect().top + scrollY);
    const before = await below();
    const value = await page.evaluate(() => {
      const { value } = window.sample.cell("patterns");
      const failure = { reason: "no such horn", cell: "patterns", file: "f.ts", line: 1, path: ["patterns"] };
      window.sample.put("patterns", { state: "failed", value: undefined, failure });
      (window as unknown as { held: unknown }).held = value;
      return document.querySelector('[data-cell="patterns"] .content')?.textContent;
    });
    expect(value).toContain("no such horn");
    expect(Math.abs((await below()) - before)).toBeLessThan(120);
    await page.evaluate(() =>
      window.sample.put("patterns", {
        state: "current",
        value: (window as unknown as { held: unknown }).held,
        failure: undefined,
      }),
    );
    expect(await below()).toBe(before);
  });
});

describe("a painted page", () => {
  test("is readable without scripts, and says that its values can't be turned", async () => {
    const page = await pages.open({ painted: true, scripts: false });
    expect(await page.locator("h1").textContent()).toBe("A feed for the northern mast");
    expect(await page.locator(".drawing svg").count()).toBe(3);
    expect(await page.locator(".asleep").isVisible()).toBe(true);
    await page.locator('[data-cell="patterns"] details.code summary').click();
    expect(await page.locator('[data-cell="patterns"] pre').isVisible()).toBe(true);
  });

  test("stands where it stood, to the pixel, when its script has taken over; focus and opened code stay", async () => {
    const things = "h1, h2, h3, .drawing, .results tr, .givens tr, .beside, .caption, .foot, .actions, footer";
    const places = (page: Page) =>
      page.locator(things).evaluateAll((all) => all.map((each) => Math.round(each.getBoundingClientRect().top)));
    const page = await pages.open({ painted: true, wake: false });
    await page.locator('[data-cell="patterns"] details.code summary').click();
    await page.locator("#given-dishDiameter").focus();
    const before = await places(page);
    await page.addScriptTag({ path: pages.script });
    await page.waitForFunction(() => !document.querySelector("noscript"));
    expect(await page.locator('[data-cell="patterns"] pre').isVisible()).toBe(true);
    expect(await page.evaluate(() => document.activeElement?.id)).toBe("given-dishDiameter");
    expect(await places(page)).toEqual(before);
    await page.keyboard.press("Tab");
    await page.keyboard.press("ArrowRight");
    await frames(page);
    expect(await calls(page)).toEqual(["set dishDiameter 2.45 m"]);
  });
});

describe("drawings", () => {
  test("are drawn for the room there is, and again only when that changes", async () => {
    const page = await pages.open();
    const width = () => page.locator('[data-cell="patterns"] .drawing svg').getAttribute("width");
    expect(await width()).toBe("760");
    await page.setViewportSize({ width: 390, height: 900 });
    await expect.poll(width).toBe("354");
    await page.setViewportSize({ width: 1300, height: 900 });
    await expect.poll(width).toBe("760");
  });

  test("a drawing and its numbers can be saved as files", async () => {
    const page = await pages.open();
    const figure = page.locator('[data-cell="patterns"]');
    const text = async (name: string) => {
      const [download] = await Promise.all([
        page.waitForEvent("download"),
        figure.getByRole("button", { name }).click(),
      ]);
      return { file: download.suggestedFilename(), text: readFileSync(await download.path(), "utf8") };
    };
    expect(await text("numbers")).toEqual({
      file: "patterns.csv",
      text: '"theta, deg","level, dB"\r\n0,0\r\n30,-11\r\n60,-33\r\n',
    });
    const drawing = await text("drawing");
    expect(drawing.file).toBe("patterns.svg");
    expect(drawing.text).toMatch(/^<svg [^>]*xmlns="http:\/\/www.w3.org\/2000\/svg"[\s\S]*<polyline[\s\S]*<\/svg>$/);
    await page.evaluate(() => {
      const value = window.sample.cell("patterns").value as Figure;
      const dxf = { label: "DXF", extension: "dxf", type: "image/vnd.dxf", text: () => "0\nEOF\n" };
      window.sample.put("patterns", { value: { ...value, drawing: { ...value.drawing, files: [dxf] } } });
    });
    expect(await text("DXF")).toEqual({ file: "patterns.dxf", text: "0\nEOF\n" });
  });

  test("a figure that is still being computed shows what the file holds, and says so", async () => {
    const page = await pages.open({ painted: true, wake: false });
    await page.evaluate(() => {
      (window as unknown as { hold: string }).hold = "band";
    });
    await page.addScriptTag({ path: pages.script });
    await page.waitForFunction(() => !document.querySelector("noscript"));
    const figure = page.locator('[data-cell="band"]');
    expect(await figure.locator(".drawing polyline").count()).toBe(3);
    expect(await figure.locator(".foot .line").textContent()).toContain("shown as the file holds it");
  });
});

describe("texts from outside", () => {
  test("none becomes markup or runs, in any place of the live page", async () => {
    const page = await pages.open({ hash: `#site=${encodeURIComponent("<img src=x onerror=window.ran=1>")}&<b>=1` });
    await page.evaluate(() => {
      const evil = '</textarea><script>window.ran=1</script><img src=x onerror="window.ran=1">';
      const { sample } = window;
      sample.set("profile", evil);
      for (const given of sample.givens)
        Object.assign(given, { label: evil, why: evil, refusal: { entered: evil, message: evil } });
      sample.put("line 1", { value: { shows: "head", document: evil, title: evil, facts: [[evil, evil]] } });
      sample.put("line 50", {
        value: { shows: "note", markdown: `## ${evil}\n\n[x](javascript:window.ran=1) ${evil}` },
      });
      sample.put("trade", {
        source: evil,
        value: {
          shows: "table",
          title: evil,
          basis: evil,
          columns: [{ label: evil }],
          rows: [
            { label: evil, under: evil, cells: [{ text: evil, word: evil }] },
            { label: evil, cells: evil },
          ],
        },
      });
      sample.put("line 85", { value: { shows: "margin", mark: "warning", markdown: evil } });
      sample.put("lonely", { failure: { reason: evil, cell: evil, file: evil, line: 1, path: [evil, evil] } });
    });
    for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
    await frames(page);
    expect(await page.locator("#study script, #study img, #study b, #study a[href^=javascript]").count()).toBe(0);
    expect(await page.evaluate(() => (window as unknown as { ran?: number }).ran)).toBeUndefined();
    expect(await page.textContent("h1")).toContain("<script>window.ran=1</script>");
    expect(await page.inputValue("#given-site")).toContain("<img");
  });
});

test("nothing in the page's console went wrong, under a policy without style attributes", () => {
  expect(pages.errors).toEqual([]);
});
