import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { differs, readQuantity, scaleOf, unitOf } from "../../../runtime/page/scale.ts";
import type { GivenView } from "../../../runtime/study.ts";

function quantity(text: string, value: number, min: number, max: number, more: Partial<GivenView> = {}): GivenView {
  return {
    name: "x",
    form: "quantity",
    label: "x",
    why: "",
    unit: text.split(" ")[1] ?? "",
    text,
    defaultText: text,
    value,
    min,
    max,
    ...more,
  };
}

describe("slider scale", () => {
  test("positions are round numbers with the unit of the text, ends are the limits", () => {
    const given = quantity("8.1 GHz", 8.1e9, 7.25e9, 9e9);
    const scale = scaleOf(given, unitOf(given))!;
    expect(scale.textAt(0)).toBe("7.250 GHz");
    expect(scale.textAt(scale.last)).toBe("9.000 GHz");
    expect(scale.textAt(scale.positionOf(8.1e9))).toBe("8.100 GHz");
    expect(scale.last).toBeGreaterThanOrEqual(200);
    expect(scale.last).toBeLessThanOrEqual(1000);
  });

  test("a step of the given is kept; one too fine is rounded up", () => {
    const stepped = quantity("2.4 m", 2.4, 1, 4, { step: 0.05 });
    expect(scaleOf(stepped, unitOf(stepped))!.last).toBe(60);
    const fine = quantity("2.4 m", 2.4, 0.3, 30, { step: 1e-5 });
    expect(scaleOf(fine, unitOf(fine))!.last).toBeLessThanOrEqual(1000);
  });

  test("limits that are no multiple of the step are still reached exactly", () => {
    const given = quantity("1 m", 1, 0.333, 3.0005);
    const scale = scaleOf(given, unitOf(given))!;
    expect(readQuantity(scale.textAt(0))!.number).toBe(0.333);
    expect(readQuantity(scale.textAt(scale.last))!.number).toBe(3.0005);
  });

  test("a value written in another unit is turned in that unit", () => {
    const given = quantity("94 in", 94 * 0.0254, 0.5, 12, { unit: "m" });
    const scale = scaleOf(given, unitOf(given))!;
    expect(scale.textAt(scale.positionOf(94 * 0.0254))).toMatch(/^94(\.0+)? in$/);
  });

  test("a zero tells no unit size: the known one stands in, else there is no slider", () => {
    const zero = quantity("0 mm", 0, 0, 0.005);
    expect(scaleOf(zero, unitOf(zero))).toBeUndefined();
    const scale = scaleOf(zero, unitOf({ ...zero, perUnit: 1e-3 }))!;
    expect(scale.textAt(0)).toBe("0.00 mm");
    expect(scale.textAt(scale.last)).toBe("5.00 mm");
  });

  test("property: every position lies within the limits and reads back to itself", () => {
    const range = fc.tuple(
      fc.double({ min: -1e4, max: 1e4, noNaN: true }),
      fc.double({ min: 1e-6, max: 1e4, noNaN: true }),
      fc.double({ min: 0, max: 1, noNaN: true }),
    );
    fc.assert(
      fc.property(range, ([low, span, share]) => {
        const min = Number(low.toPrecision(6));
        const max = Number((min + span).toPrecision(9));
        fc.pre(max > min);
        const scale = scaleOf(quantity("1 m", 1, min, max), { name: "m", factor: 1 })!;
        const position = Math.round(share * scale.last);
        const number = readQuantity(scale.textAt(position))!.number;
        expect(number).toBeGreaterThanOrEqual(min - 1e-9 * Math.abs(min));
        expect(number).toBeLessThanOrEqual(max + 1e-9 * Math.abs(max));
        expect(Math.abs(scale.positionOf(number) - position)).toBeLessThanOrEqual(
          position === 0 || position === scale.last ? 1 : 0,
        );
      }),
      { seed: 7, numRuns: 2000 },
    );
  });

  test("differs: 2.40 m is 2.4 m, 2.41 m isn't, 240 cm is written otherwise", () => {
    const given = quantity("2.4 m", 2.4, 1, 4);
    expect(differs({ ...given, text: "2.40 m" })).toBe(false);
    expect(differs({ ...given, text: "2.41 m" })).toBe(true);
    expect(differs({ ...given, text: "240 cm" })).toBe(true);
  });
});
