// What every figure owes its reader, its page and its export.

import { describe, expect, test } from "vitest";
import { examples, headlessDocument, widths } from "./examples.ts";

const cases = Object.entries(examples).flatMap(([name, make]) => widths.map((width) => ({ name, width, make })));

describe.each(cases)("$name at $width px", ({ make, width }) => {
  const drawn = make().draw({ document: headlessDocument(), width });
  const elements = [...drawn.querySelectorAll("*")];

  test("one svg element as wide as asked, with a view box to scale by", () => {
    expect(drawn.localName).toBe("svg");
    expect(drawn.getAttribute("width")).toBe(String(width));
    const box = drawn.getAttribute("viewBox")!.split(" ").map(Number);
    expect(box.slice(0, 3)).toEqual([0, 0, width]);
    expect(box[3]).toBe(Number(drawn.getAttribute("height")));
    expect(box[3]).toBeGreaterThan(80);
  });

  test("nothing that a content security policy forbids and no id to clash", () => {
    const text = drawn.outerHTML;
    expect(text).not.toMatch(/\sstyle=|<style|<script|\son\w+=|\sid=|url\(|href/);
    expect(text).not.toContain("foreignObject");
  });

  test("no attribute and no word is without a number where it needs one", () => {
    for (const element of elements)
      for (const { name, value } of element.attributes)
        expect(value, `${name} of ${element.localName}`).not.toMatch(/NaN|Infinity|undefined|null/);
    expect(drawn.textContent).not.toMatch(/NaN|Infinity|undefined|null/);
  });

  test("text is at least 11 px", () => {
    const sizes = elements.map((element) => element.getAttribute("font-size")).filter((size) => size !== null);
    for (const size of sizes) expect(Number.parseFloat(size)).toBeGreaterThanOrEqual(11);
    expect(Number(drawn.getAttribute("font-size"))).toBeGreaterThanOrEqual(11);
  });

  test("minus signs are true ones", () => {
    const words = elements
      .filter((element) => element.localName === "text")
      .map((element) => element.textContent ?? "");
    for (const text of words) expect(text).not.toMatch(/(^|\s)-\d/);
  });

  test("drawing twice gives the same", () => {
    expect(make().draw({ document: headlessDocument(), width }).outerHTML).toBe(drawn.outerHTML);
  });
});

describe.each(Object.entries(examples))("%s in words and numbers", (_, make) => {
  const { alt, data } = make();

  test("the alternative is sentences with numbers and units, and rides in the drawing", () => {
    expect(alt.length).toBeGreaterThan(60);
    expect(alt).toMatch(/\d/);
    expect(alt.trim()).toMatch(/\.$/);
    const drawn = make().draw({ document: headlessDocument(), width: 760 });
    expect(drawn.querySelector("desc")?.textContent).toBe(alt);
  });

  test("numbers are rows under named columns with their units", () => {
    const [head, ...rows] = data!;
    expect(rows.length).toBeGreaterThan(0);
    for (const row of rows) expect(row).toHaveLength(head!.length);
    const numeric = head!.filter((_, column) => rows.some((row) => typeof row[column] === "number"));
    for (const name of numeric.filter((name) => name !== "f/D")) expect(name).toMatch(/\(.+\)$/);
    for (const row of rows)
      for (const value of row) if (typeof value === "number") expect(value).toSatisfy(Number.isFinite);
  });
});
