// In a real browser: no word is cut off, none lies on another.

import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { textWidth } from "../../../cells/figures/kit/text-width.ts";
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

/**
 * Boxes of all words as the browser lays them out. Drawings are laid out for the faces of their stack; a machine that has
 * none of them falls back to a wider face, by a factor that is measured on a sample and taken out again.
 */
async function boxes(svg: string): Promise<{ frame: Box; texts: Box[] }> {
  await page.setContent(`<!doctype html><body>${svg}</body>`);
  return page.evaluate(
    ({ sample, expected }) => {
      const frame = document.querySelector("svg")!;
      const probe = document.createElementNS("http://www.w3.org/2000/svg", "text");
      probe.textContent = sample;
      probe.setAttribute("font-size", "100");
      frame.append(probe);
      const factor = Math.max(1, probe.getComputedTextLength() / expected);
      probe.remove();
      const box = (element: Element, words: string) => {
        const { left, right, top, bottom } = element.getBoundingClientRect();
        return { words, left, right, top, bottom };
      };
      const narrowed = (text: Element) => {
        const found = box(text, text.textContent ?? "");
        const anchor = getComputedStyle(text).textAnchor;
        const spare = (1 - 1 / factor) * (found.right - found.left);
        if (/rotate/.test(text.getAttribute("transform") ?? "")) return found;
        const share = anchor === "start" ? 0 : anchor === "middle" ? 0.5 : 1;
        return { ...found, left: found.left + share * spare, right: found.right - (1 - share) * spare };
      };
      const texts = [...frame.querySelectorAll("text")].filter((text) => text.textContent);
      return { frame: box(frame, ""), texts: texts.map(narrowed) };
    },
    { sample, expected: textWidth(sample, 100) },
  );
}

const sample = "Highest cross-polar, dB: asked below 25.0 at 12.1 GHz";

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
