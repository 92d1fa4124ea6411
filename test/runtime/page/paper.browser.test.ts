// The printed page: sections whole, notes at their rows, no control on paper; with and without a script behind it.

import type { Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { type SamplePages, samplePages } from "./open-page.ts";
import { type PlacedLink, pdfLinks } from "./pdf-links.ts";

let pages: SamplePages;
beforeAll(async () => {
  pages = await samplePages();
});
afterAll(async () => {
  await pages?.close();
});

/** Links of one letter's size at the start and end of each section, and at each note and its row. */
async function markPlaces(page: Page): Promise<string[]> {
  await page.addStyleTag({
    content: ".place-mark { position: absolute; left: 0; font: 4px/4px sans-serif } section, tr { position: relative }",
  });
  return page.evaluate(() => {
    const names: string[] = [];
    const put = (element: Element, name: string, end = false) => {
      const link = document.createElement("a");
      link.href = `https://place.invalid/${name}`;
      link.textContent = ".";
      link.className = "place-mark";
      if (end) link.style.bottom = "0";
      else link.style.top = "0";
      element.append(link);
    };
    for (const section of document.querySelectorAll("section")) {
      put(section, `${section.id}/start`);
      put(section, `${section.id}/end`, true);
      names.push(section.id);
    }
    for (const note of document.querySelectorAll("td.notes > .beside:first-child")) {
      const name = note.getAttribute("data-cell")!.replace(" ", "-");
      put(note, `note/${name}`);
      put(note.closest("tr")!.querySelector("th")!.closest("tr")!, `row/${name}`);
    }
    return names;
  });
}

const place = (links: Map<string, PlacedLink>, name: string): PlacedLink => {
  const link = links.get(`https://place.invalid/${name}`);
  if (!link) throw new Error(`no place ${name} in the PDF`);
  return link;
};

describe("on A4", () => {
  for (const awake of [true, false])
    test(`${awake ? "live" : "painted, no script run"}: a section never splits, and a note stands at its row`, async () => {
      const page = await pages.open(awake ? {} : { painted: true, wake: false });
      const sections = await markPlaces(page);
      const pdf = await page.pdf({ preferCSSPageSize: true });
      const links = pdfLinks(pdf);
      expect(sections.length).toBeGreaterThan(3);
      for (const id of sections) expect(place(links, `${id}/end`).page, id).toBe(place(links, `${id}/start`).page);
      // pt on paper; 2 px of the page are 1.5 pt
      for (const note of ["line-41", "line-85", "line-87"]) {
        expect(place(links, `note/${note}`).page, note).toBe(place(links, `row/${note}`).page);
        expect(Math.abs(place(links, `note/${note}`).top - place(links, `row/${note}`).top), note).toBeLessThanOrEqual(
          1.5,
        );
        expect(place(links, `note/${note}`).left - place(links, `row/${note}`).left, note).toBeCloseTo(
          (512 + 23) * 0.75,
          0,
        );
      }
    });

  test("no slider, button, link row or code is printed", async () => {
    const page = await pages.open();
    for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
    await page.emulateMedia({ media: "print" });
    const seen = await page
      .locator("input[type=range], input[type=file], button, summary, pre, nav, .skip, progress")
      .evaluateAll((all) =>
        all.filter((each) => each.getClientRects().length > 0).map((each) => each.outerHTML.slice(0, 80)),
      );
    expect(seen).toEqual([]);
    expect(await page.locator("#given-dishDiameter").isVisible()).toBe(true);
    expect(await page.locator('[data-cell="fine"] .foot .state').isVisible()).toBe(true);
  });
});
