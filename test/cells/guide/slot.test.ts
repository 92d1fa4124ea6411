import { describe, expect, test } from "vitest";
import { speedOfLight, vacuumImpedance } from "../../../cells/constants.ts";
import {
  balancedFrequency,
  balancedSlotDepth,
  balancedSlotDepthEstimate,
  capacitiveWindow,
  slotField,
  slotReactance,
  slowWaveLimit,
} from "../../../cells/guide/slot.ts";
import { assertClose } from "../../assert-close.ts";

const frequency = 10e9;
const wavelength = speedOfLight / frequency;
const radiusOf = (ka: number): number => (ka * wavelength) / (2 * Math.PI);

describe("balanced slot depth", () => {
  // Exact m = 1 short-circuited radial slot with H_φ(a) = 0, J1'(ka)Y1(kb) = Y1'(ka)J1(kb). Status: computed.
  test.each([
    [2, 0.3101],
    [3, 0.286],
    [4, 0.2753],
    [6, 0.2657],
    [8, 0.2614],
    [10, 0.2589],
    [15, 0.2557],
    [20, 0.2542],
  ])("exact slot, ka = %d: %d λ", (ka, depth) => {
    assertClose(balancedSlotDepth(frequency, radiusOf(ka)) / wavelength, depth, {
      abs: 1e-4,
      because: "4 printed decimals",
    });
  });

  // Granet & James 2005, d = 0.25 λ exp[1/(2.114 (ka)^1.134)]. Formula from memory, values computed.
  test.each([
    [4, 0.2758],
    [6, 0.266],
    [8, 0.2614],
    [10, 0.2588],
    [20, 0.254],
  ])("fit, ka = %d: %d λ", (ka, depth) => {
    assertClose(balancedSlotDepthEstimate(frequency, radiusOf(ka)) / wavelength, depth, {
      abs: 6e-5,
      because: "4 printed decimals",
    });
  });

  test("exact slot and fit agree to 0.3 % from ka = 2.5 up", () => {
    for (const ka of [2.5, 3, 4, 6, 8, 10, 15, 20, 60]) {
      const radius = radiusOf(ka);
      assertClose(balancedSlotDepthEstimate(frequency, radius), balancedSlotDepth(frequency, radius), {
        rel: 3e-3,
        because: "the fit's own precision",
      });
    }
  });

  test("round trip: balancedFrequency of a balanced depth", () => {
    for (const ka of [0.5, 2, 6.3, 40]) {
      const innerRadius = radiusOf(ka);
      const depth = balancedSlotDepth(frequency, innerRadius);
      assertClose(balancedFrequency({ innerRadius, depth }), frequency, { rel: 1e-12, because: "two roots" });
    }
  });
});

describe("slotReactance", () => {
  test("limit: a slot in a wide guide is η·tan(kd)", () => {
    for (const share of [0.05, 0.15, 0.3, 0.45]) {
      const depth = share * wavelength;
      assertClose(
        slotReactance({ innerRadius: 3000 * wavelength, depth }, frequency),
        vacuumImpedance * Math.tan(2 * Math.PI * share),
        { rel: 2e-3, because: "curvature of order depth/radius" },
      );
    }
  });

  test("inductive below, capacitive above the balanced depth, up to the half-wave short", () => {
    const innerRadius = 30e-3;
    const depth = balancedSlotDepth(frequency, innerRadius);
    const slot = { innerRadius, depth };
    const { low, high } = capacitiveWindow(slot);
    assertClose(low, frequency, { rel: 1e-12, because: "the depth was balanced at that frequency" });
    expect(slowWaveLimit(slot)).toBe(low);
    expect(slotReactance(slot, low * 0.999)).toBeGreaterThan(0);
    expect(slotReactance(slot, low * 1.001)).toBeLessThan(0);
    expect(slotReactance(slot, high * 0.999)).toBeLessThan(0);
    expect(slotReactance(slot, high * 1.001)).toBeGreaterThan(0);
    assertClose(slotField(slot, high).electric, 0, { abs: 1e-12, because: "the slot's mouth is shorted there" });
  });

  test("law (Foster): the reactance of a lossless slot rises with frequency between its poles", () => {
    const slot = { innerRadius: 30e-3, depth: 8e-3 };
    let before = Number.NEGATIVE_INFINITY;
    const { low, high } = capacitiveWindow(slot);
    for (let i = 1; i < 60; i++) {
      const here = slotReactance(slot, low + ((high - low) * i) / 60);
      expect(here).toBeGreaterThan(before);
      before = here;
    }
  });
});

test("refusals name value and unit", () => {
  expect(() => balancedSlotDepth(0, 0.03)).toThrow(/frequency must be a number above 0 Hz; got 0/);
  expect(() => balancedSlotDepth(1e10, -0.03)).toThrow(/innerRadius must be a number above 0 m; got -0\.03/);
  expect(() => slotReactance({ innerRadius: 0.03, depth: 0 }, 1e10)).toThrow(/depth/);
});
