import { describe, expect, test } from "vitest";
import { guideWavelength, TE11 } from "../../../cells/guide/mode.ts";
import {
  breakdownField,
  breakdownMargin,
  te10BreakdownPower,
  te11PeakField,
} from "../../../cells/horn/air-breakdown.ts";
import { assertClose } from "../../assert-close.ts";

describe("air breakdown", () => {
  test("WR-90 at 10 GHz and 3 MV/m", () => {
    // 22.86 mm by 10.16 mm: 1.047 MW, ab E²/(4η)·√(1 − (fc/f)²), closed form
    assertClose(te10BreakdownPower({ width: 22.86e-3, height: 10.16e-3, frequency: 10e9 }), 1.047e6, {
      abs: 500,
      because: "printed to four figures",
    });
  });

  test("circular guide: P = 1.990e-3 a² E² λ/λg", () => {
    // Moreno, "Microwave Transmission Design Data", 1948 (from memory): 1.99e-3 for TE11
    const guide = { radius: 11.9125e-3, frequency: 10e9 };
    const { breakdownPower } = breakdownMargin({ ...guide, power: 1 });
    const ratio = 299_792_458 / 10e9 / guideWavelength(TE11, guide.radius, guide.frequency);
    assertClose(breakdownPower / (guide.radius ** 2 * 9e12 * ratio), 1.99e-3, {
      abs: 5e-6,
      because: "printed to three figures",
    });
  });

  test("the axis is the worst place: field grows with the root of the power, and with a bad match", () => {
    const guide = { radius: 12e-3, frequency: 10e9, power: 100 };
    const rounding = { rel: 1e-12, because: "arithmetic" };
    assertClose(te11PeakField({ ...guide, power: 400 }), 2 * te11PeakField(guide), rounding);
    assertClose(te11PeakField({ ...guide, reflection: 0.2 }), 1.2 * te11PeakField(guide), rounding);
  });

  test("standard atmosphere: density at 3, 5 and 11 km", () => {
    // US Standard Atmosphere 1976, geopotential altitude (from memory): 0.90912, 0.73612, 0.36392 kg/m³ of 1.2250
    assertClose(breakdownField(0), 3e6, { rel: 0, because: "exact" });
    const printed = { rel: 5e-5, because: "printed to five figures, constants of the formula to six" };
    assertClose(breakdownField(3000) / 3e6, 0.90912 / 1.225, printed);
    assertClose(breakdownField(5000) / 3e6, 0.73612 / 1.225, printed);
    assertClose(breakdownField(11_000) / 3e6, 0.36392 / 1.225, printed);
  });

  test("margin: power allowed is a quarter of breakdown at 6 dB, and a kilowatt is far from it", () => {
    const guide = { radius: 11.9125e-3, frequency: 10e9, power: 1000 };
    const margin = breakdownMargin(guide);
    assertClose(margin.allowedPower / margin.breakdownPower, 10 ** -0.6, { rel: 1e-12, because: "6 dB" });
    assertClose((margin.breakdownField / margin.peakField) ** 2, 10 ** (margin.marginDb! / 10), {
      rel: 1e-12,
      because: "power goes with the field squared",
    });
    expect(margin.enough).toBe(true);
    expect(breakdownMargin({ ...guide, power: margin.allowedPower * 1.01 }).enough).toBe(false);
    expect(breakdownMargin({ ...guide, power: 0 }).marginDb).toBeNull();
    expect(breakdownMargin(guide, { altitude: 3000 }).breakdownPower).toBeLessThan(0.56 * margin.breakdownPower);
  });

  test("bad input names what is wrong", () => {
    expect(() => te11PeakField({ radius: 8e-3, frequency: 10e9, power: 1 })).toThrow(
      "frequency must be above the TE11 cutoff of 10.9812 GHz; got 10 GHz",
    );
    expect(() => te11PeakField({ radius: 12e-3, frequency: 10e9, power: -1 })).toThrow("power must be");
    expect(() => breakdownField(20_000)).toThrow("altitude must be a number at least -500 and at most 11000 m");
    expect(() => te10BreakdownPower({ width: 0.01, height: 0.005, frequency: 10e9 })).toThrow("frequency must be");
  });
});
