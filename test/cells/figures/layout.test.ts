// In a real browser: no word is cut off, none lies on another.

import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { launchBrowser } from "../../browser.ts";
import { examples, headlessDocument, widths } from "./examples.ts";

let browser: Browser;
let page: Page;
beforeAll(async () => {
  browser = await launchBrowser();
  page = await browser.newPage();
});
afterAll(() => browser?.close());

interface Box {
  words: string;
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** Boxes of all words as the browser lays them out, in whatever face this machine has for the drawing's stack. */
async function boxes(svg: string): Promise<{ frame: Box; texts: Box[] }> {
  await page.setContent(`<!doctype html><body>${svg}</body>`);
  return page.evaluate(() => {
    const frame = document.querySelector("svg")!;
    const box = (element: Element, words: string) => {
      const { left, right, top, bottom } = element.getBoundingClientRect();
      return { words, left, right, top, bottom };
    };
    const texts = [...frame.querySelectorAll("text")].filter((text) => text.textContent);
    return { frame: box(frame, ""), texts: texts.map((text) => box(text, text.textContent ?? "")) };
  });
}

const cases = Object.keys(examples).flatMap((name) => widths.map((width) => ({ name, width })));

describe("words in a real browser", () => {
  test.each(cases)("$name at $width px", async ({ name, width }) => {
    const svg = examples[name]!().draw({ document: headlessDocument(), width }).outerHTML;
    const { frame, texts } = await boxes(svg);
    expect(texts.length).toBeGreaterThan(3);
    const slack = 1;
    const outside = texts.filter(
      (text) =>
        text.left < frame.left - slack ||
        text.right > frame.right + slack ||
        text.top < frame.top - slack ||
        text.bottom > frame.bottom + slack,
    );
    expect(outside.map(({ words }) => words)).toEqual([]);
    // 3 px: accents and descenders of one line may reach into the air of the next
    const air = 3;
    const overlaps = texts.flatMap((one, i) =>
      texts
        .slice(i + 1)
        .filter(
          (other) =>
            one.left < other.right - air &&
            other.left < one.right - air &&
            one.top < other.bottom - air &&
            other.top < one.bottom - air,
        )
        .map((other) => `${one.words} / ${other.words}`),
    );
    expect(overlaps).toEqual([]);
  });
});
