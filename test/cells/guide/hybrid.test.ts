import { describe, expect, test } from "vitest";
import { speedOfLight } from "../../../cells/constants.ts";
import {
  balancedLikeMode,
  type CorrugatedWall,
  type HybridName,
  hybridMode,
  hybridStart,
} from "../../../cells/guide/hybrid.ts";
import { hybridField, hybridParts } from "../../../cells/guide/hybrid-field.ts";
import { cutoffFrequency, modeField, propagationConstant, TE11, TE12, TM11 } from "../../../cells/guide/mode.ts";
import { balancedSlotDepth, capacitiveWindow, slowWaveLimit } from "../../../cells/guide/slot.ts";
import { assertClose } from "../../assert-close.ts";
import { readReference } from "../../references/read.ts";

const names: HybridName[] = ["EH11", "HE11", "EH12", "HE12"];

// SciPy roots of the 2 × 2 determinant of the field components: test/references/hybrid-scipy.json.
const reference = JSON.parse(readReference("hybrid-scipy.json")) as {
  cases: (CorrugatedWall & { frequency: number; modes: { beta: number; Ka2: number; hybridFactor: number }[] })[];
};

describe("hybrid modes against SciPy", () => {
  test.each(reference.cases)("$frequency Hz, radius $innerRadius m, depth $depth m, fill $slotFill", (wall) => {
    const found = names
      .map((name) => hybridMode(name, wall, wall.frequency))
      .filter((mode) => mode !== null)
      .sort((p, q) => q.phaseConstant - p.phaseConstant);
    // The reference lists every mode; those beyond HE12 have no name here.
    const expected = wall.modes.slice(0, found.length);
    expect(found.length).toBeGreaterThan(0);
    expect(wall.modes.slice(found.length).every((mode) => mode.Ka2 > 7.0155 ** 2)).toBe(true);
    found.forEach((mode, i) => {
      const because = "roots to 1e-12 of β";
      assertClose(mode.phaseConstant, expected[i]!.beta, { rel: 1e-10, because });
      assertClose(mode.transverseSquared, expected[i]!.Ka2, { rel: 1e-8, because: `${because}, from k² − β²` });
      assertClose(mode.hybridFactor, expected[i]!.hybridFactor, { rel: 1e-8, because });
    });
  });
});

const frequency = 10e9;
const innerRadius = 30e-3;
const balanced: CorrugatedWall = { innerRadius, depth: balancedSlotDepth(frequency, innerRadius), slotFill: 0.8 };

describe("limits and laws", () => {
  test("balanced slots: Λ = +1 for HE, −1 for EH, whatever the fill (Clarricoats & Olver 1984; from memory)", () => {
    for (const slotFill of [0.5, 0.8, 1]) {
      const because = "the root of the dispersion at balance";
      const wall = { ...balanced, slotFill };
      assertClose(hybridMode("HE11", wall, frequency)!.hybridFactor, 1, { abs: 1e-11, because });
      assertClose(hybridMode("HE12", wall, frequency)!.hybridFactor, 1, { abs: 1e-11, because });
      assertClose(hybridMode("EH12", wall, frequency)!.hybridFactor, -1, { abs: 1e-11, because });
    }
  });

  test("far above cutoff a balanced HE11 has Ka = j01, EH12 Ka = j21", () => {
    const wide = { innerRadius: 3, depth: balancedSlotDepth(frequency, 3), slotFill: 0.8 };
    const because = "b → 1 as (Ka/ka)²";
    assertClose(Math.sqrt(hybridMode("HE11", wide, frequency)!.transverseSquared), 2.404825557695773, {
      abs: 1e-4,
      because,
    });
    assertClose(Math.sqrt(hybridMode("EH12", wide, frequency)!.transverseSquared), 5.135622301840683, {
      abs: 1e-4,
      because,
    });
  });

  test("half-wave slots: HE11 is TE11 and EH12 is TM11 of the smooth guide", () => {
    const { high } = capacitiveWindow(balanced);
    const because = "the slot shorts the wall";
    const he = hybridMode("HE11", balanced, high * (1 - 1e-9))!;
    assertClose(he.phaseConstant, propagationConstant(TE11, innerRadius, high).im, { rel: 1e-6, because });
    const eh = hybridMode("EH12", balanced, high * (1 - 1e-9))!;
    assertClose(eh.phaseConstant, propagationConstant(TM11, innerRadius, high).im, { rel: 1e-6, because });
  });

  test("vanishing slots: EH11 is TE11, HE11 is TM11 of the smooth guide", () => {
    const shallow = { innerRadius, depth: 1e-9, slotFill: 0.8 };
    const because = "a wall reactance of η·k·depth";
    assertClose(
      hybridMode("EH11", shallow, frequency)!.phaseConstant,
      propagationConstant(TE11, innerRadius, frequency).im,
      {
        rel: 1e-5,
        because,
      },
    );
    assertClose(
      hybridMode("HE11", shallow, frequency)!.phaseConstant,
      propagationConstant(TM11, innerRadius, frequency).im,
      {
        rel: 1e-5,
        because,
      },
    );
  });

  test("the slow wave: EH11 is slower than light just below the slow-wave limit and gone above it", () => {
    const limit = slowWaveLimit(balanced);
    assertClose(limit, frequency, { rel: 1e-12, because: "balanced at that frequency" });
    let before = 0;
    for (const share of [0.7, 0.8, 0.9, 0.97, 0.995]) {
      const mode = hybridMode("EH11", balanced, share * limit)!;
      const slowness = (mode.phaseConstant * speedOfLight) / (2 * Math.PI * share * limit);
      expect(mode.transverseSquared).toBeLessThan(0);
      expect(slowness).toBeGreaterThan(Math.max(1, before));
      before = slowness;
    }
    expect(hybridMode("EH11", balanced, 1.0001 * limit)).toBeNull();
    expect(hybridMode("EH11", balanced, 1.2 * limit)).toBeNull();
  });

  test("E_φ = 0 at the wall for every mode", () => {
    for (const name of ["HE11", "EH12", "HE12"] as const) {
      const mode = hybridMode(name, balanced, 11e9)!;
      const middle = Math.abs(hybridField(mode, innerRadius / 2, 1).ePhi);
      assertClose(hybridField(mode, innerRadius, 1).ePhi, 0, {
        abs: 1e-10 * middle,
        because: "the mode's own condition",
      });
    }
  });

  test("round trip: balancedLikeMode finds the mode again from its hybrid factor", () => {
    for (const at of [10e9, 11e9, 13e9]) {
      const mode = hybridMode("HE11", balanced, at)!;
      const again = balancedLikeMode({ frequency: at, radius: innerRadius, hybridFactor: mode.hybridFactor });
      assertClose(again.transverseSquared, mode.transverseSquared, { rel: 1e-11, because: "two roots" });
      assertClose(again.phaseConstant, mode.phaseConstant, { rel: 1e-11, because: "two roots" });
    }
  });

  test("a very large hybrid factor is TE11: same fields for the same power", () => {
    const mode = balancedLikeMode({ frequency, radius: innerRadius, hybridFactor: 1e8 });
    const ratio = (rho: number): number =>
      hybridField(mode, rho, 0.4).eRho / modeField(TE11, innerRadius, rho, 0.4).eRho;
    assertClose(ratio(0.02), ratio(0.005), { rel: 1e-6, because: "one profile" });
    // √(2Z): peak field of a watt in TE11.
    const z = (2 * Math.PI * frequency * 4e-7 * Math.PI) / propagationConstant(TE11, innerRadius, frequency).im;
    assertClose(ratio(0.02), Math.sqrt(2 * z), { rel: 1e-6, because: "power normalization" });
  });
});

describe("hybridStart", () => {
  test("HE11 on a capacitive wall starts with TE11, EH11 with TE11 on an inductive one", () => {
    const te11 = cutoffFrequency(TE11, innerRadius);
    const deep = { innerRadius, depth: 0.35 * (speedOfLight / te11), slotFill: 0.8 };
    assertClose(hybridStart("HE11", deep), te11, { rel: 1e-12, because: "the cutoff of H_z with E_φ = 0" });
    assertClose(hybridStart("EH11", balanced), te11, { rel: 1e-12, because: "the cutoff of H_z with E_φ = 0" });
  });

  test("EH12 starts between TM11 and TE12 of the smooth guide, and β grows from little or nothing", () => {
    for (const depth of [0.0075, 0.008, 0.0095, 0.011]) {
      const wall = { innerRadius, depth, slotFill: 0.75 };
      const start = hybridStart("EH12", wall);
      expect(start).toBeGreaterThan(cutoffFrequency(TM11, innerRadius));
      expect(start).toBeLessThanOrEqual(cutoffFrequency(TE12, innerRadius) * (1 + 1e-12));
      expect(hybridMode("EH12", wall, start * (1 - 1e-9))).toBeNull();
      const above = hybridMode("EH12", wall, start * (1 + 1e-9))!;
      // At 9.5 mm it starts together with a backward wave, at a β of its own.
      const share = (above.phaseConstant * speedOfLight) / (2 * Math.PI * start);
      expect(share).toBeLessThan(depth === 0.0095 ? 0.06 : 1e-3);
    }
  });

  test("deeper slots start EH12 at a lower frequency", () => {
    const start = (depth: number): number => hybridStart("EH12", { innerRadius, depth, slotFill: 0.75 });
    expect(start(0.011)).toBeLessThan(start(0.0095));
    expect(start(0.0095)).toBeLessThanOrEqual(start(0.008));
  });
});

describe("refusals name value and unit", () => {
  test("wall", () => {
    expect(() => hybridMode("HE11", { ...balanced, slotFill: 1.2 }, frequency)).toThrow(
      /slotFill .*above 0 and at most 1; got 1\.2/,
    );
    expect(() => hybridMode("HE11", { ...balanced, depth: -1e-3 }, frequency)).toThrow(/depth/);
    expect(() => hybridMode("HE11", balanced, Number.NaN)).toThrow(/frequency/);
    expect(() => hybridMode("HE31" as HybridName, balanced, frequency)).toThrow(/HE31/);
  });

  test("a radius below cutoff, a slow mode's aperture field", () => {
    expect(() => balancedLikeMode({ frequency, radius: 8e-3, hybridFactor: 1 })).toThrow(
      /cutoff of 8\.785 mm; got 8\.000 mm/,
    );
    expect(() => hybridParts(hybridMode("EH11", balanced, 9e9)!)).toThrow(/transverseSquared/);
  });

  test("a mode that doesn't travel is null", () => {
    expect(hybridMode("HE12", balanced, 6e9)).toBeNull();
    expect(hybridMode("HE11", balanced, 2e9)).toBeNull();
  });
});
