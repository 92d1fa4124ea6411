// Where things stand on a wide and a narrow screen, and whether everyone reaches them.

import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { frames, type SamplePages, samplePages } from "./open-page.ts";

let pages: SamplePages;
beforeAll(async () => {
  pages = await samplePages();
});
afterAll(async () => {
  await pages?.close();
});

const axe = readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");

async function findings(page: Page): Promise<string[]> {
  await page.evaluate(axe);
  return page.evaluate(async () => {
    const { axe } = window as unknown as { axe: typeof import("axe-core") };
    const result = await axe.run(document, { resultTypes: ["violations"] });
    return result.violations
      .filter(({ impact }) => impact === "serious" || impact === "critical")
      .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 120)).join(" | ")}`);
  });
}

describe("where things stand", () => {
  test("at 1440 px a note begins at its row or figure, and no two overlap", async () => {
    const page = await pages.open({ hash: "#bandLow=8.025%20GHz" });
    const notes = await page.locator("main .beside").evaluateAll((all) =>
      all.map((note) => {
        const thing = note.closest("tr") ?? note.parentElement?.querySelector("figure") ?? note.parentElement!;
        const { top, bottom, left, width } = note.getBoundingClientRect();
        return {
          name: note.getAttribute("data-cell"),
          top,
          bottom,
          left,
          width,
          target: thing.getBoundingClientRect().top,
          pushed: note.previousElementSibling?.matches(".beside"),
        };
      }),
    );
    const column = await page.locator("main").evaluate((main) => main.getBoundingClientRect().right);
    for (const note of notes) {
      expect(note.left, note.name ?? "").toBe(column + 52);
      expect(note.width).toBe(276);
    }
    for (const name of ["line 41", "line 60", "line 85", "line 87"]) {
      const note = notes.find((each) => each.name === name)!;
      if (name === "line 41") continue; // pushed down by the note above it
      expect(Math.abs(note.top - note.target), name).toBeLessThanOrEqual(2);
    }
    notes.sort((a, b) => a.top - b.top);
    for (const [index, note] of notes.entries())
      if (index > 0) expect(note.top).toBeGreaterThanOrEqual(notes[index - 1]!.bottom);
  });

  test("at 390 and 1000 px nothing is wider than the window, but drawings and code in their own box", async () => {
    for (const width of [390, 1000]) {
      const page = await pages.open({ width, hash: "#bandLow=8.025%20GHz&dishDiameter=99%20m" });
      for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
      const wide = await page.evaluate(() => {
        const out = [...document.querySelectorAll("#study *")].filter((element) => {
          if (element.closest("pre, .unseen, .skip, textarea, thead") || element.closest("svg")) return false;
          return element.getBoundingClientRect().right > document.documentElement.clientWidth + 0.5;
        });
        return {
          page: document.documentElement.scrollWidth,
          out: out.map((element) => element.outerHTML.slice(0, 100)),
        };
      });
      expect(wide.out).toEqual([]);
      expect(wide.page).toBe(width);
    }
  });
});

describe("for everyone", () => {
  test("no serious finding of axe-core, wide, narrow, and with everything opened", async () => {
    for (const width of [1440, 390]) {
      const page = await pages.open({ width, hash: "#bandLow=8.025%20GHz&nothing=1" });
      await page.fill("#given-dishDiameter", "90 m");
      await page.keyboard.press("Enter");
      await frames(page);
      for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
      expect(await findings(page)).toEqual([]);
    }
  });

  test("the whole page can be walked and worked by keyboard, and the focus is always seen", async () => {
    const page = await pages.open();
    const walked: string[] = [];
    for (let step = 0; step < 80; step++) {
      await page.keyboard.press("Tab");
      const at = await page.evaluate(() => {
        const active = document.activeElement;
        if (!active || active === document.body) return undefined;
        const { outlineStyle, outlineWidth } = getComputedStyle(active);
        return {
          name: active.id || active.getAttribute("aria-label") || active.textContent!.trim(),
          seen: outlineStyle !== "none" && Number.parseFloat(outlineWidth) >= 1,
        };
      });
      if (!at) break;
      expect(at.seen, at.name).toBe(true);
      walked.push(at.name);
    }
    expect(walked.slice(0, 6)).toEqual([
      "Skip to the report",
      "Go to the first that has failed",
      "Given",
      "What the dish asks of the feed",
      "Over the band",
      "Trade",
    ]);
    for (const name of [
      "given-dishDiameter",
      "Dish diameter, slider",
      "given-material",
      "given-polarizer",
      "given-profile",
      "Keep these values",
      "stop",
      "code",
    ])
      expect(walked).toContain(name);
    await page.locator('[data-cell="trade"] details.code summary').focus();
    await page.keyboard.press("Enter");
    expect(await page.locator('[data-cell="trade"] pre').textContent()).toContain("const trade = table(");
  });

  test("the page's own code stays light", () => {
    // The budget of a whole exported study is 700 kB; reading Markdown (marked) is 52 kB of this, rationales 4 kB.
    expect(pages.weight.script).toBeLessThan(94_000);
    expect(pages.weight.style).toBeLessThan(24_000);
  });
});
