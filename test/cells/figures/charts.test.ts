// Losses, the band, dispersion: numbers read back from what is drawn.

import { describe, expect, test } from "vitest";
import {
  bandCurves,
  dispersion,
  lossSteps,
  performanceSteps,
  standardQuantities,
} from "../../../cells/figures/index.ts";
import { kindStyle, lineStroke } from "../../../cells/figures/kit/palette.ts";
import type { DishPerformance } from "../../../cells/reflector/efficiency.ts";
import { assertClose } from "../../assert-close.ts";
import { drawnAt, panelsOf, textsOf, valueAt } from "./drawn.ts";
import { bandPoints, examples, reason } from "./examples.ts";

describe("loss steps", () => {
  const db = (value: number): number => 10 ** (value / 10);
  const drawing = lossSteps([
    {
      label: "Smooth cone",
      kind: "smooth",
      steps: [
        { label: "illumination", efficiency: db(-1) },
        { label: "spillover", efficiency: db(-0.5) },
        { label: "surface", efficiency: db(-0.25), common: true },
        { label: "phase", efficiency: 1 },
      ],
    },
  ]);
  const bars = [...drawnAt(drawing).querySelectorAll("rect")].map((rect) => ({
    x: Number(rect.getAttribute("x")),
    width: Number(rect.getAttribute("width")),
    fill: rect.getAttribute("fill"),
    stroke: rect.getAttribute("stroke"),
  }));

  test("bars are as long as their losses and hang from where the one before ended", () => {
    assertClose(bars[0]!.width / bars[1]!.width, 2, { rel: 1e-3, because: "1 dB over 0.5 dB, px to 0.01" });
    assertClose(bars[2]!.width / bars[1]!.width, 0.5, { rel: 1e-3, because: "0.25 dB over 0.5 dB" });
    assertClose(bars[1]!.x, bars[0]!.x + bars[0]!.width, { abs: 0.02, because: "px to 0.01" });
    assertClose(bars[2]!.x, bars[1]!.x + bars[1]!.width, { abs: 0.02, because: "px to 0.01" });
    expect(bars[3]!.width).toBeGreaterThan(1);
  });

  test("tick words stand at their loss", () => {
    const drawn = drawnAt(drawing);
    const tick = [...drawn.querySelectorAll("text")].find(
      (text) => text.textContent === "−1.0" || text.textContent === "−1",
    )!;
    assertClose(Number(tick.getAttribute("x")), bars[0]!.x + bars[0]!.width, {
      abs: 0.02,
      because: "1 dB is where the first bar ends",
    });
    expect(textsOf(drawn)).toContain("0 dB");
  });

  test("the sum is the product, in per cent and dB", () => {
    // −1.75 dB is 66.8 %
    expect(textsOf(drawnAt(drawing))).toEqual(
      expect.arrayContaining(["66.8 %", "−1.75 dB in all", "−1.00", "−0.50", "0.00"]),
    );
    expect(drawing.alt).toContain(
      "Smooth cone: 66.8 % in all, −1.75 dB (illumination −1.00, spillover −0.50, surface −0.25, phase 0.00 dB).",
    );
    const sums = drawing.data!.slice(1).map((row) => row[4] as number);
    assertClose(sums.at(-1)!, -1.75, { abs: 1e-12, because: "sum of the levels" });
  });

  test("a common loss is hollow and grey, which shows without colour; a sentence says so", () => {
    expect(bars[0]!.stroke).toBeNull();
    expect(bars[2]!.stroke).not.toBeNull();
    expect(bars[0]!.fill).toBe(kindStyle("smooth").line);
    expect(textsOf(drawnAt(drawing))).toContain("Hollow grey bars are common to every feed.");
  });

  test("all candidates on one scale; a missing one says why", () => {
    const drawn = drawnAt(examples.losses!());
    const widths = [...drawn.querySelectorAll("rect")].map((rect) => Number(rect.getAttribute("width")));
    // illumination is the same 0.88 in both
    expect(widths[0]).toBe(widths[4]);
    expect(textsOf(drawn)).toContain("not realisable");
    expect(examples.losses!().alt).toContain(reason);
  });

  test("steps of a dish are its sub-efficiencies", () => {
    const performance = {
      illuminationEfficiency: 0.88,
      spilloverEfficiency: 0.9,
      phaseEfficiency: 0.99,
      polarizationEfficiency: 0.98,
      blockageEfficiency: 0.97,
      surfaceEfficiency: 0.96,
      radiationEfficiency: 0.999,
      totalEfficiency: 0.88 * 0.9 * 0.99 * 0.98 * 0.97 * 0.96 * 0.999,
    } as DishPerformance;
    const steps = performanceSteps(performance, { surface: "surface, 0.5 mm rms" });
    assertClose(
      steps.reduce((product, { efficiency }) => product * efficiency, 1),
      performance.totalEfficiency,
      { rel: 1e-12, because: "every factor of the total once" },
    );
    expect(steps.find(({ common }) => common)?.label).toBe("surface, 0.5 mm rms");
  });

  test.each([0, -0.1, 1.01, Number.NaN])("an efficiency of %f is refused", (efficiency) => {
    const make = () => lossSteps([{ label: "a", kind: "smooth", steps: [{ label: "spillover", efficiency }] }]);
    expect(make).toThrow("lossSteps: spillover of a must be a number above 0");
  });
});

describe("over the band", () => {
  const drawing = examples.band!();
  const drawn = drawnAt(drawing);
  const panels = panelsOf(drawn);

  test("four panels with units, two by two; under each other on a phone", () => {
    expect(panels).toHaveLength(4);
    for (const { title } of standardQuantities()) expect(textsOf(drawn)).toContain(title);
    const lefts = (width: number) =>
      new Set(panelsOf(drawnAt(drawing, width)).map(({ element }) => element.getAttribute("x"))).size;
    expect([lefts(760), lefts(354)]).toEqual([2, 1]);
  });

  test("curves pass where the numbers are", () => {
    const [efficiency, crossPolar, phaseCenter, taper] = panels as [
      (typeof panels)[0],
      (typeof panels)[0],
      (typeof panels)[0],
      (typeof panels)[0],
    ];
    const smooth = (panel: (typeof panels)[0]) =>
      panel.curves.find(({ stroke, dash }) => stroke === "#D55E00" && dash === "")!.points;
    assertClose(valueAt(efficiency, smooth(efficiency), 12.1), 73, {
      abs: 0.01,
      because: "a straight line between samples",
    });
    assertClose(valueAt(crossPolar, smooth(crossPolar), 12.1), -21, { abs: 0.05, because: "as above" });
    assertClose(valueAt(phaseCenter, smooth(phaseCenter), 12.1), -3, {
      abs: 0.02,
      because: "metres became millimetres",
    });
    assertClose(valueAt(taper, smooth(taper), 12.1), 11, { abs: 0.01, because: "as above" });
  });

  test("kinds carry different marks, models different dashes", () => {
    const kinds = ["smooth", "dualMode", "corrugated", "chokeRing", "measured", "custom"] as const;
    expect(new Set(kinds.map((kind) => kindStyle(kind).mark)).size).toBe(6);
    const dashes = (["full", "second", "third"] as const).map((style) => lineStroke[style].dash);
    expect(new Set(dashes).size).toBe(3);
    expect(panels[0]!.curves.some(({ stroke, dash }) => stroke === "#4f5b65" && dash.startsWith("9"))).toBe(true);
    expect(textsOf(drawn)).toEqual(expect.arrayContaining(["mode matching", "closed form"]));
  });

  test("labels at the lines' ends don't meet", () => {
    const labels = [...drawn.querySelectorAll("text")].filter(
      (text) => text.textContent === "smooth" || text.textContent?.startsWith("corrugated"),
    );
    const at = labels.map((label) => ({ x: Number(label.getAttribute("x")), y: Number(label.getAttribute("y")) }));
    for (const [i, one] of at.entries())
      for (const other of at.slice(i + 1))
        if (one.x === other.x && Math.abs(one.y - other.y) < 100) expect(Math.abs(one.y - other.y)).toBeGreaterThan(14);
  });

  test("no cross-polar is no curve and an arrow, and words say below the floor", () => {
    expect(textsOf(drawn)).toContain("corrugated ↓");
    expect(drawing.alt).toContain("corrugated below −60");
    expect(drawing.alt).not.toContain("300");
  });

  test("limits with their words, a missing candidate with its reason", () => {
    expect(textsOf(drawn)).toEqual(expect.arrayContaining(["asked: below −25", "asked: above 70"]));
    expect(textsOf(drawn).join(" ")).toContain("Dual-mode, not realisable: The dish is too deep");
    expect(drawing.alt).toContain(`dual-mode: not realisable. ${reason}`);
  });

  test("uprights stand at the band's edges", () => {
    const at = [...panels[0]!.element.querySelectorAll("g[stroke='#1f2a33'] line")].map((line) =>
      panels[0]!.x(Number(line.getAttribute("x1"))),
    );
    at.sort((a, b) => a - b);
    assertClose(at[0]!, 11.7, { abs: 1e-3, because: "lower edge" });
    assertClose(at.at(-1)!, 12.5, { abs: 1e-3, because: "upper edge" });
  });

  test("a quantity of one's own, with gaps", () => {
    const points = [11.7e9, 12.1e9, 12.5e9].map((frequency, i) => ({
      frequency,
      returnLossDb: i === 1 ? null : 20 + i,
    }));
    const own = bandCurves([{ label: "smooth", kind: "smooth", points }], {
      bandLow: 11.7e9,
      bandHigh: 12.5e9,
      quantities: [
        {
          title: "Return loss, dB",
          value: ({ returnLossDb }) => returnLossDb,
          digits: 1,
          limit: { value: 20, asked: "above" },
        },
      ],
    });
    expect(own.alt).toContain("Return loss, dB: smooth 20.0 to 22.0; asked: above 20.0.");
    expect(own.data![0]).toEqual(["candidate", "model", "frequency (GHz)", "Return loss (dB)"]);
    expect(own.data![2]![3]).toBe("");
    expect(drawnAt(own).outerHTML).not.toContain("NaN");
  });

  test.each([
    [() => bandCurves([], { bandLow: 1e9, bandHigh: 2e9 }), "at least one candidate"],
    [
      () => bandCurves([{ label: "a", kind: "smooth", points: bandPoints(0.7, -20) }], { bandLow: 2e9, bandHigh: 1e9 }),
      "upper edge must be a number at least 2000000000 Hz",
    ],
    [
      () => bandCurves([{ label: "a", kind: "smooth", points: [] }], { bandLow: 1e9, bandHigh: 2e9 }),
      "a must have at least one frequency",
    ],
  ])("bad input is refused in words", (make, message) => {
    expect(make).toThrow(message);
  });
});

describe("dispersion", () => {
  const drawing = examples.dispersion!();

  test("curves pass where the numbers are, and stop at the end of the axis", () => {
    const [panel] = panelsOf(drawnAt(drawing));
    const he11 = panel!.curves.find(({ dash }) => dash === "")!;
    assertClose(valueAt(panel!, he11.points, 10), 0.6, { abs: 1e-3, because: "a sample" });
    for (const { points } of panel!.curves) for (const [, y] of points) expect(panel!.y(y)).toBeLessThan(2.001);
  });

  test("modes are told apart by dashes and by their names", () => {
    const [panel] = panelsOf(drawnAt(drawing));
    expect(new Set(panel!.curves.map(({ dash }) => dash)).size).toBe(panel!.curves.length);
    expect(textsOf(drawnAt(drawing))).toEqual(expect.arrayContaining(["HE11", "EH11", "slow above 1"]));
  });

  test("words: where each travels, what is marked", () => {
    expect(drawing.alt).toContain("HE11 from 9.0 to 12.0 GHz, β/k 0.20 to 0.80.");
    expect(drawing.alt).toContain("EH11 from 9.0 to 12.0 GHz, β/k 0.90 to beyond 1.6.");
    expect(drawing.alt).toContain("balanced 10.2 GHz");
  });

  test("bad input is refused in words", () => {
    const curve = { label: "HE11", frequency: [1e9], phaseConstantRatio: [] };
    expect(() => dispersion([curve], { bandLow: 1e9, bandHigh: 2e9 })).toThrow("HE11 must have one ratio a frequency");
    expect(() => dispersion([], { bandLow: 1e9, bandHigh: 2e9 })).toThrow("at least one mode");
  });
});
