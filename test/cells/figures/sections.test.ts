// The drawings to scale: what is read back from them is what went in.

import { describe, expect, test } from "vitest";
import { dishSection, hornsToScale } from "../../../cells/figures/index.ts";
import { dish } from "../../../cells/reflector/dish.ts";
import { toDeg } from "../../../cells/units.ts";
import { assertClose } from "../../assert-close.ts";
import { drawnAt, strokes, textsOf } from "./drawn.ts";
import { type corrugatedHorn, dualModeHorn, exampleDish, examples, noHorn, reason, smoothHorn } from "./examples.ts";

const pathsWith = (drawn: Element, attribute: string, value: string): Element[] =>
  [...drawn.querySelectorAll("path")].filter((path) => path.getAttribute(attribute) === value);

describe("dish", () => {
  const drawn = drawnAt(dishSection(exampleDish));
  const [curve] = strokes(pathsWith(drawn, "stroke-width", "3")[0]!);
  const [rays] = strokes(
    pathsWith(drawn, "stroke", "#1f2a33").find((path) => path.getAttribute("stroke-width") === "1")!,
  );
  const focus = rays![1]!;

  test("every point of the curve is as far from the focus as from the directrix", () => {
    const vertex = curve![20]!;
    const focal = focus[0] - vertex[0];
    for (const [x, y] of curve!)
      assertClose(Math.hypot(x - focus[0], y - focus[1]), x - vertex[0] + focal, {
        abs: 0.03,
        because: "a parabola, coordinates to 0.01 px",
      });
  });

  test("diameter over focal length and the angle of the rim ray are the dish's", () => {
    const diameter = Math.abs(curve![0]![1] - curve!.at(-1)![1]);
    const focal = focus[0] - curve![20]![0];
    assertClose(focal / diameter, 0.8, { rel: 1e-3, because: "coordinates to 0.01 px of 300" });
    const rim = curve![0]!;
    assertClose(toDeg(Math.atan2(Math.abs(rim[1] - focus[1]), focus[0] - rim[0])), 34.708, {
      abs: 0.02,
      because: "tan(ψ/2) = 1/(4·0.8)",
    });
  });

  test("words carry the numbers with units", () => {
    // 2.4 m, f/D 0.8: f = 1.92 m, depth = D²/16f = 187.5 mm, rim at f + depth = 2.1075 m, ψ = 2 atan(1/3.2) = 34.71°
    const words = textsOf(drawn);
    expect(words).toEqual(expect.arrayContaining(["2.40 m", "focal length 1.92 m", "34.7°", "2.11 m"]));
    expect(words.some((text) => /^depth 18[78] mm$/.test(text))).toBe(true);
    expect(dishSection(exampleDish).alt).toContain("focal length 1.92 m (f/D 0.80)");
  });

  test("the feed is drawn to the same scale, its phase centre at the focus", () => {
    const withFeed = drawnAt(dishSection(exampleDish, { feed: smoothHorn as never, phaseCenter: -0.018 }));
    const outline = [...withFeed.querySelectorAll("path")].find((path) => path.getAttribute("stroke-width") === "0.9")!;
    const points = strokes(outline)[0]!;
    const focal = focus[0] - curve![20]![0];
    const perM = focal / 1.92;
    const xs = points.map(([x]) => x);
    assertClose(Math.max(...xs) - Math.min(...xs), 0.12 * perM, { abs: 0.03, because: "length of the horn" });
    assertClose(Math.min(...xs), focus[0] - 0.018 * perM, {
      abs: 0.03,
      because: "the mouth is 18 mm nearer the dish than the phase centre",
    });
  });

  test("facts stand beside it, beneath it on a phone", () => {
    const drawing = examples.dish!();
    const factX = (width: number) => {
      const text = [...drawnAt(drawing, width).querySelectorAll("text")].find((one) => one.textContent === "15.1 dBi")!;
      return Number(text.getAttribute("x"));
    };
    expect(factX(760)).toBeGreaterThan(400);
    expect(factX(354)).toBe(0);
    expect(drawing.alt).toContain("Feed directivity near: 15.1 dBi.");
  });

  test.each([0.26, 0.4, 1, 4])("f/D %f fits its place", (fOverD) => {
    for (const width of [760, 354]) {
      const html = drawnAt(dishSection(dish({ diameter: 1, fOverD })), width);
      for (const path of html.querySelectorAll("path"))
        for (const point of strokes(path).flat())
          if (Number.isFinite(point[0])) expect(point[0]).toBeLessThanOrEqual(width);
    }
  });

  test("a dish that is none is refused", () => {
    expect(() => dishSection({ ...exampleDish, focalLength: Number.NaN })).toThrow(
      "dishSection: focal length must be a number above 0 m; got NaN",
    );
  });
});

describe("horns", () => {
  const drawing = examples.horns!();
  const drawn = drawnAt(drawing);
  /** px per mm, read from the scale bar */
  const perMm = (() => {
    const words = textsOf(drawn).find((text) => /^\d+ mm$/.test(text) && Number.parseInt(text, 10) >= 20)!;
    const bar = [...drawn.querySelectorAll("path")].find((path) => /^M0\.5 [\d.]+v6h/.test(path.getAttribute("d")!))!;
    return Number(/h([\d.]+)v/.exec(bar.getAttribute("d")!)![1]) / Number.parseInt(words, 10);
  })();
  /** outlines of metal, left and right half of each horn */
  const outlines = [...drawn.querySelectorAll("path")].filter(
    (path) => path.getAttribute("stroke-linejoin") === "round" && path.getAttribute("stroke-width") === "1",
  );

  test("three horns at the scale of the bar, mouths in one line", () => {
    expect(outlines).toHaveLength(3);
    const lengths = [120, 140, 164];
    const outside = [66, 72, 95.8];
    const tops = outlines.map((path, i) => {
      const points = strokes(path).flat();
      const ys = points.map(([, y]) => y);
      const xs = points.map(([x]) => x);
      assertClose((Math.max(...ys) - Math.min(...ys)) / perMm, lengths[i]!, {
        rel: 2e-3,
        because: "coordinates to 0.01 px, bar to 0.01 px",
      });
      assertClose((Math.max(...xs) - Math.min(...xs)) / perMm, outside[i]!, { rel: 2e-3, because: "as above" });
      return Math.min(...ys);
    });
    expect(new Set(tops).size).toBe(1);
  });

  test("the corrugated horn has its 36 slots as they are", () => {
    const points = strokes(outlines[2]!)[1]!;
    // each slot gives its outline four corners
    expect(points.length).toBeGreaterThan(36 * 4);
    expect(textsOf(drawn)).toEqual(expect.arrayContaining(["36 slots", "13.5 deep", "7.9 deep", "pitch 4.00"]));
  });

  test("dimensions, the step and the phase centre in words", () => {
    expect(textsOf(drawn)).toEqual(
      expect.arrayContaining([
        "Ø 62.0",
        "Ø 19.0",
        "120.0",
        "step",
        "25.0 to 33.0",
        "straight 20.0",
        "18 mm",
        "19 mm",
        "11 mm",
      ]),
    );
    expect(drawing.alt).toContain(
      "Dual-mode: mouth 68.0 mm, throat 25.0 mm, length 140.0 mm, outside 72.0 mm and step 25.0 to 33.0 straight 20.0; phase centre 19 mm behind the mouth.",
    );
  });

  test("the phase centre's mark is at its depth under the mouth", () => {
    const mouth = Math.min(
      ...strokes(outlines[0]!)
        .flat()
        .map(([, y]) => y),
    );
    const mark = drawn.querySelector("circle")!;
    assertClose((Number(mark.getAttribute("cy")) - mouth) / perMm, 18, {
      rel: 2e-3,
      because: "coordinates to 0.01 px",
    });
  });

  test("cut metal is hatched, and only metal", () => {
    const hatch = pathsWith(drawn, "stroke-width", "0.6");
    expect(hatch).toHaveLength(3);
    // Ø 62 mouth, axis in the middle of the first horn: no hatch within 8 mm of the axis
    const axis = strokes(outlines[0]!)
      .flat()
      .map(([x]) => x);
    const middle = (Math.max(...axis) + Math.min(...axis)) / 2;
    for (const [x] of strokes(hatch[0]!).flat()) expect(Math.abs(x - middle) / perMm).toBeGreaterThan(8);
  });

  test("one that can't be built keeps its place and its reason", () => {
    const missing = examples["horns, one missing"]!();
    const words = textsOf(drawnAt(missing));
    expect(words).toEqual(expect.arrayContaining(["Dual-mode", "not realisable"]));
    expect(words.join(" ")).toContain("TM11 travels");
    expect(missing.alt).toContain(`Dual-mode: not realisable. ${reason}`);
    expect(missing.data!.some((row) => row[0] === "Dual-mode")).toBe(false);
  });

  test("none at all is still a figure in words", () => {
    const drawing = hornsToScale([{ label: "Dual-mode", candidate: noHorn }]);
    expect(textsOf(drawnAt(drawing)).join(" ")).toContain("not realisable");
  });

  test("on a phone horns stand under each other, still to one scale", () => {
    const narrow = drawnAt(drawing, 354);
    const found = [...narrow.querySelectorAll("path")].filter(
      (path) => path.getAttribute("stroke-linejoin") === "round" && path.getAttribute("stroke-width") === "1",
    );
    const heights = found.map((path) => {
      const ys = strokes(path)
        .flat()
        .map(([, y]) => y);
      return Math.max(...ys) - Math.min(...ys);
    });
    assertClose(heights[2]! / heights[0]!, 164 / 120, { rel: 1e-3, because: "one scale" });
    expect(
      new Set(
        found.map((path) =>
          Math.min(
            ...strokes(path)
              .flat()
              .map(([, y]) => y),
          ),
        ),
      ).size,
    ).toBe(3);
  });

  test("bad input is refused", () => {
    expect(() => hornsToScale([])).toThrow("at least one candidate");
    expect(() => hornsToScale([{ label: "a", candidate: smoothHorn, phaseCenter: Number.NaN }])).toThrow(
      "phase centre of a",
    );
    const falling = { ...(dualModeHorn as object), profile: { z: [0, -1], radius: [1, 1] } } as typeof corrugatedHorn;
    expect(() => hornsToScale([{ label: "a", candidate: falling }])).toThrow("z must not fall");
  });
});
