import { describe, expect, test } from "vitest";
import { apertureFields, sampledField, strengthAtWall, sumOfFields } from "../../../cells/figures/index.ts";
import { modeField, TE11 } from "../../../cells/guide/mode.ts";
import { assertClose } from "../../assert-close.ts";
import { headlessDocument, reason, te11, tm11 } from "./examples.ts";

describe("fields", () => {
  test("TE11 at the wall: 63.2 % of its largest in the E-plane, none along the metal", () => {
    const { ePlane, hPlane } = strengthAtWall(te11);
    // E_ρ over the axis is 2·J1(χ)/χ; J1(1.84118) = 0.58187 (Abramowitz & Stegun 1964, table 9.5: J1 at its first maximum)
    assertClose(ePlane, (2 * 0.58187) / 1.84118, { abs: 1e-5, because: "five printed digits" });
    assertClose(hPlane, 0, { abs: 1e-12, because: "no field along a perfect conductor" });
  });

  test("TM11 at the wall: 80.6 % in the E-plane", () => {
    // E_ρ over the axis is 2·J1′(χ) = 2·J0(χ) at a zero of J1; J0(3.83171) = −0.40276 (Abramowitz & Stegun 1964, table 9.5)
    assertClose(strengthAtWall(tm11).ePlane, 2 * 0.40276, { abs: 1e-5, because: "five printed digits" });
  });

  test("a field along x everywhere has E_ρ = cos φ, E_φ = −sin φ", () => {
    const even = sampledField(0.01, (_, phi) => ({ eRho: Math.cos(phi), ePhi: -Math.sin(phi) }), 5);
    expect([...Array.from(even.eRho), ...Array.from(even.ePhi)].map((value) => Math.round(value * 1e9) / 1e9)).toEqual([
      1, 1, 1, 1, 1, -1, -1, -1, -1, -1,
    ]);
  });

  test("the sum of TE11 and TM11 whose normal fields at the wall are equal and opposite has none there", () => {
    const last = te11.eRho.length - 1;
    const sum = sumOfFields([
      { field: te11, amplitude: 1 },
      { field: tm11, amplitude: -te11.eRho[last]! / tm11.eRho[last]! },
    ]);
    assertClose(strengthAtWall(sum).ePlane, 0, { abs: 1e-12, because: "they cancel by construction" });
    // in phase on the axis: TM11 strengthens the middle
    expect(sum.eRho[0]!).toBeGreaterThan(te11.eRho[0]!);
  });

  test("fields of different apertures are no sum", () => {
    const other = sampledField(0.02, (rho, phi) => modeField(TE11, 0.02, rho, phi));
    expect(() =>
      sumOfFields([
        { field: te11, amplitude: 1 },
        { field: other, amplitude: 1 },
      ]),
    ).toThrow("sumOfFields: all fields must have one radius");
  });

  test("bad input is refused with its value", () => {
    expect(() => sampledField(-1, () => ({ eRho: 0, ePhi: 0 }))).toThrow(
      "radius must be a positive length in m; got -1",
    );
    expect(() => apertureFields([])).toThrow("must have at least one plate");
    expect(() => apertureFields([{ label: "x", field: { radius: 1, eRho: [1, Number.NaN], ePhi: [1, 1] } }])).toThrow(
      "E_ρ of x must be a number; got NaN",
    );
    expect(() => apertureFields([{ label: "x", field: te11, powerShare: 1.2 }])).toThrow("share of power of x");
  });
});

describe("plates", () => {
  /** Triangles of the dart path: tip and the middle of the tail, in a plate's own coordinates. */
  function darts(field: typeof te11): { tip: [number, number]; tail: [number, number] }[] {
    const drawn = apertureFields([{ label: "x", field }]).draw({ document: headlessDocument(), width: 354 });
    const paths = [...drawn.querySelectorAll("path")].filter((path) => path.getAttribute("fill") === "#1f2a33");
    expect(paths).toHaveLength(1);
    return [...paths[0]!.getAttribute("d")!.matchAll(/M(-?\d+) (-?\d+)l(-?\d+) (-?\d+) (-?\d+) (-?\d+)z/g)].map(
      (match) => {
        const [x, y, dx1, dy1, dx2, dy2] = match.slice(1).map(Number) as [
          number,
          number,
          number,
          number,
          number,
          number,
        ];
        return { tip: [x, y], tail: [x + dx1 + dx2 / 2, y + dy1 + dy2 / 2] };
      },
    );
  }

  test("darts of an even field along x all point up, as long as each other", () => {
    const even = sampledField(0.01, (_, phi) => ({ eRho: Math.cos(phi), ePhi: -Math.sin(phi) }));
    const all = darts(even);
    expect(all.length).toBeGreaterThan(50);
    for (const { tip, tail } of all) {
      expect(Math.abs(tip[0] - tail[0])).toBeLessThanOrEqual(1);
      expect(tail[1] - tip[1]).toBeGreaterThan(40);
    }
  });

  test("darts stay on the plate", () => {
    for (const field of [te11, tm11])
      for (const { tip, tail } of darts(field))
        for (const [x, y] of [tip, tail]) expect(Math.hypot(x, y)).toBeLessThanOrEqual(82 * 4);
  });

  test("TM11 turns round between axis and wall", () => {
    const upright = darts(tm11).filter(({ tip, tail }) => Math.abs((tip[0] + tail[0]) / 2) < 10);
    const middle = upright.filter(({ tip, tail }) => Math.abs(tip[1] + tail[1]) / 2 < 60);
    const outer = upright.filter(({ tip, tail }) => Math.abs(tip[1] + tail[1]) / 2 > 230);
    expect(middle.length).toBeGreaterThan(0);
    expect(outer.length).toBeGreaterThan(0);
    for (const { tip, tail } of middle) expect(tip[1]).toBeLessThan(tail[1]);
    for (const { tip, tail } of outer) expect(tip[1]).toBeGreaterThan(tail[1]);
  });

  test("signs stand between terms and sum, the share of power beneath", () => {
    const drawing = apertureFields([
      { label: "TE11", field: te11, powerShare: 0.84 },
      { label: "TM11", field: tm11, follows: "plus", powerShare: 0.064, phaseDeg: -8 },
      { label: "Mouth", field: te11, follows: "equals" },
    ]);
    const words = drawing.draw({ document: headlessDocument(), width: 760 }).textContent!;
    for (const expected of ["+", "=", "84 % of the power", "6.4 % of the power, 8° behind"])
      expect(words).toContain(expected);
    expect(drawing.alt).toContain(
      "TE11 (84 % of the power): at the wall 63 % of the largest strength in the E-plane, 0 % in the H-plane",
    );
  });

  test("four in a row at 760 px, two by two at 354", () => {
    const drawing = apertureFields(["a", "b", "c", "d"].map((label) => ({ label, field: te11 })));
    const rowsAt = (width: number) => {
      const titles = [...drawing.draw({ document: headlessDocument(), width }).querySelectorAll("text")];
      return new Set(titles.map((title) => title.getAttribute("y"))).size;
    };
    expect([rowsAt(760), rowsAt(354)]).toEqual([1, 2]);
  });

  test("a mouth that isn't there keeps its place and says why", () => {
    const drawing = apertureFields([
      { label: "TE11", field: te11 },
      { label: "Mouth", kind: "dualMode", follows: "equals", reason },
    ]);
    expect(drawing.alt).toContain(`Mouth: not realisable. ${reason}`);
    expect(drawing.draw({ document: headlessDocument(), width: 760 }).textContent!.replace(/\s/g, "")).toContain(
      "notrealisable:Thedish",
    );
  });
});
