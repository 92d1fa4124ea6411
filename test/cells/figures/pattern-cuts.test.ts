import { describe, expect, test } from "vitest";
import { comparison, patternCuts, patternDifference } from "../../../cells/figures/index.ts";
import { cutStroke } from "../../../cells/figures/kit/palette.ts";
import { cosineFeed } from "../../../cells/pattern/ideal-feeds.ts";
import { fromDeg, toDeg } from "../../../cells/units.ts";
import { assertClose } from "../../assert-close.ts";
import { drawnAt, panelsOf, textsOf, valueAt } from "./drawn.ts";
import { exampleDish, examples, reason, unevenFeed } from "./examples.ts";

const halfAngle = exampleDish.halfAngle;
const one = (n: number, h = n) =>
  patternCuts([{ label: "Smooth cone", kind: "smooth", pattern: unevenFeed(n, h) }], { halfAngle });

/** cosⁿ in dB at an angle: 10·n·log₁₀ cos θ */
const cosineDb = (n: number, deg: number): number => 10 * n * Math.log10(Math.cos(fromDeg(deg)));

describe("curves", () => {
  test.each([760, 354])("E solid and H dashed pass where cosⁿ is, at %i px", (width) => {
    const [panel] = panelsOf(drawnAt(one(8, 14), width));
    const e = panel!.curves.find(({ dash }) => dash === "")!;
    const h = panel!.curves.find(({ dash }) => dash.startsWith("6"))!;
    for (const deg of [10, 30, 45, 60]) {
      assertClose(valueAt(panel!, e.points, deg), cosineDb(8, deg), {
        abs: 0.02,
        because: "0.5° chords and coordinates to 0.001 px",
      });
      assertClose(valueAt(panel!, h.points, deg), cosineDb(14, deg), {
        abs: 0.04,
        because: "0.5° chords and coordinates to 0.001 px",
      });
    }
  });

  test("−10 dB of cos⁴ stands at 55.8°", () => {
    const [panel] = panelsOf(drawnAt(one(4)));
    const curve = panel!.curves.find(({ dash }) => dash === "")!;
    // cos θ = 10^(−10/40)
    assertClose(valueAt(panel!, curve.points, toDeg(Math.acos(10 ** (-10 / 40)))), -10, {
      abs: 0.02,
      because: "as above",
    });
  });

  test("cross-polar is half the difference of the planes, dotted", () => {
    const [panel] = panelsOf(drawnAt(one(8, 14)));
    const cross = panel!.curves.find(({ dash }) => dash.startsWith("1.6"))!;
    const expected = 20 * Math.log10((Math.cos(fromDeg(30)) ** 4 - Math.cos(fromDeg(30)) ** 7) / 2);
    assertClose(valueAt(panel!, cross.points, 30), expected, { abs: 0.03, because: "0.5° chords" });
  });

  test("nothing is drawn below the floor, a feed without cross-polar has no dotted curve", () => {
    const [panel] = panelsOf(drawnAt(one(30)));
    for (const { points } of panel!.curves) for (const [, y] of points) expect(panel!.y(y)).toBeGreaterThan(-45.01);
    expect(panel!.curves.some(({ dash }) => dash.startsWith("1.6"))).toBe(false);
  });

  test("the three cuts are told apart without colour", () => {
    const dashes = [cutStroke.e, cutStroke.h, cutStroke.cross].map(({ dash }) => dash);
    expect(new Set(dashes).size).toBe(3);
  });
});

describe("rim and limit", () => {
  test("the upright stands at the half-angle, its dots at the levels there", () => {
    const drawn = drawnAt(one(8, 14));
    const [panel] = panelsOf(drawn);
    const upright = [...panel!.element.querySelectorAll("line")].find(
      (line) =>
        line.getAttribute("x1") === line.getAttribute("x2") &&
        Number(line.getAttribute("y2")) - Number(line.getAttribute("y1")) !== 0,
    )!;
    assertClose(panel!.x(Number(upright.getAttribute("x1"))), toDeg(halfAngle), {
      abs: 0.05,
      because: "coordinates of the axis to 0.01 px",
    });
    expect(textsOf(drawn)).toContain("rim 34.7°");
    const at = toDeg(halfAngle);
    const words = `at the rim: E −${Math.abs(cosineDb(8, at)).toFixed(1)}, H −${Math.abs(cosineDb(14, at)).toFixed(1)} dB`;
    expect(textsOf(drawn)).toContain(words);
  });

  test("what is asked is a line with its words; one below the floor is left out", () => {
    const entries = [{ label: "a", kind: "smooth", pattern: cosineFeed(8) }] as const;
    const asked = drawnAt(patternCuts(entries, { halfAngle, crossPolarLimitDb: -25 }));
    expect(textsOf(asked)).toContain("asked: ≤ −25");
    expect(asked.outerHTML).toContain("#8a3800");
    const low = drawnAt(patternCuts(entries, { halfAngle, crossPolarLimitDb: -60 }));
    expect(low.outerHTML).not.toContain("#8a3800");
  });
});

describe("places", () => {
  test("a horn that can't be built keeps its place, with its reason", () => {
    const drawing = examples.cuts!();
    const words = textsOf(drawnAt(drawing));
    expect(words).toContain("not realisable");
    expect(words.join(" ")).toContain(reason.slice(0, 25));
    expect(panelsOf(drawnAt(drawing))).toHaveLength(2);
    expect(drawing.alt).toContain(`Dual-mode: not realisable. ${reason}`);
  });

  test("models of one horn share a panel, each in its own line, named in the legend", () => {
    const drawn = drawnAt(examples["cuts by several models"]!());
    const [panel, ...others] = panelsOf(drawn);
    expect(others).toHaveLength(0);
    expect(new Set(panel!.curves.map(({ stroke }) => stroke))).toEqual(new Set(["#D55E00", "#4f5b65"]));
    const words = textsOf(drawn);
    expect(words).toContain("closed form");
    expect(words).toContain("measured: × E, + H, ○ cross-polar");
    expect(words.filter((text) => text.startsWith("mode matching: E"))).toHaveLength(1);
  });

  test("the numbers list every model", () => {
    const { data } = examples["cuts by several models"]!();
    expect(data![0]).toEqual([
      "candidate",
      "model",
      "theta (deg)",
      "E-plane (dB)",
      "H-plane (dB)",
      "cross-polar 45° (dB)",
    ]);
    expect(data!.length).toBe(1 + 3 * 361);
    const at60 = data!.find((row) => row[1] === "closed form" && row[2] === 60)!;
    assertClose(at60[3] as number, cosineDb(9, 60), { abs: 1e-9, because: "a sample of the pattern itself" });
  });

  test("words say none where there is no cross-polar", () => {
    expect(one(8).alt).toContain("highest cross-polar none.");
  });
});

test.each([
  [() => patternCuts([], { halfAngle }), "must have at least one candidate"],
  [
    () => patternCuts([{ label: "a", kind: "smooth", pattern: cosineFeed(8) }], { halfAngle: 2 }),
    "half-angle must be a number above 0 and below",
  ],
  [
    () => patternCuts([{ label: "a", kind: "smooth", pattern: cosineFeed(8) }], { halfAngle, thetaMax: 0.1 }),
    "end of the axis must be",
  ],
  [
    () =>
      patternCuts([{ label: "a", kind: "smooth", pattern: cosineFeed(8) }], {
        halfAngle,
        crossPolarLimitDb: Number.NaN,
      }),
    "cross-polar limit",
  ],
])("bad input is refused in words", (make, message) => {
  expect(make).toThrow(message);
});

describe("difference of patterns", () => {
  test("cosⁿ against cosᵐ differs by 10 (m − n) log cos θ", () => {
    const { thetaDeg, ePlaneDb, hPlaneDb, ePlaneRmsDb } = patternDifference(cosineFeed(8), cosineFeed(9), {
      thetaMax: Math.PI / 3,
      floorDb: -40,
    });
    let sum = 0;
    thetaDeg.forEach((deg, i) => {
      const expected = 10 * Math.log10(Math.cos(fromDeg(deg)));
      assertClose(ePlaneDb[i]!, expected, { abs: 1e-9, because: "both patterns on the same samples" });
      expect(hPlaneDb[i]).toBe(ePlaneDb[i]);
      sum += expected ** 2;
    });
    expect(thetaDeg).toHaveLength(121);
    assertClose(ePlaneRmsDb, Math.sqrt(sum / 121), {
      rel: 1e-9,
      because: "root of the mean square over the same angles",
    });
  });

  test("another sampling is interpolated", () => {
    const { ePlaneDb } = patternDifference(cosineFeed(8), cosineFeed(8, { thetaCount: 1801 }), {
      thetaMax: 1,
      floorDb: -30,
    });
    for (const value of ePlaneDb)
      assertClose(value, 0, { abs: 1e-3, because: "cubic splines through samples 0.1° apart" });
  });

  test("where the reference is below the floor there is no difference", () => {
    const { thetaDeg, ePlaneDb } = patternDifference(cosineFeed(8), cosineFeed(9), {
      thetaMax: Math.PI / 2,
      floorDb: -10,
    });
    for (const [i, deg] of thetaDeg.entries()) expect(Number.isNaN(ePlaneDb[i]!)).toBe(cosineDb(8, deg) < -10);
  });

  test("the figure says which less which, how far, and where it counts", () => {
    const drawing = comparison(
      { model: "closed form", pattern: cosineFeed(8) },
      { model: "measured", pattern: cosineFeed(9) },
      { label: "Smooth cone", kind: "smooth", halfAngle },
    );
    const { ePlaneRmsDb } = patternDifference(cosineFeed(8), cosineFeed(9), { thetaMax: Math.PI / 2, floorDb: -30 });
    expect(drawing.alt).toContain(
      `Difference (measured less closed form) from 0° to 90°, where closed form is above −30 dB: rms E ${ePlaneRmsDb.toFixed(2)}`,
    );
    const [, below] = panelsOf(drawnAt(drawing));
    const e = below!.curves.find(({ dash }) => dash === "")!;
    assertClose(valueAt(below!, e.points, 45), 10 * Math.log10(Math.cos(Math.PI / 4)), {
      abs: 0.02,
      because: "0.5° chords",
    });
  });
});
