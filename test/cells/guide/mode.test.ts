import { describe, expect, test } from "vitest";
import { speedOfLight, vacuumImpedance } from "../../../cells/constants.ts";
import {
  cutoffFrequency,
  cutoffRadius,
  cutoffWavelength,
  type GuideMode,
  guideWavelength,
  modeField,
  modeName,
  propagationConstant,
  surfaceResistance,
  TE01,
  TE11,
  TE12,
  TE21,
  TE31,
  TM01,
  TM11,
  TM12,
  TM21,
  travellingModes,
  travels,
  usualBand,
  wallLoss,
  waveImpedance,
} from "../../../cells/guide/mode.ts";
import { gaussLegendre } from "../../../cells/math/quadrature.ts";
import { assertClose } from "../../assert-close.ts";

describe("cutoff", () => {
  // Closed form χc/(πD), c = 299 792 458 m/s; printed tables often take 3e8 (+0.07 %). Status: computed.
  test.each<[GuideMode, number]>([
    [TE11, 175.69847],
    [TM01, 229.48506],
    [TE21, 291.45637],
    [TE01, 365.64783],
    [TM11, 365.64783],
    [TE31, 400.90645],
    [TM21, 490.07653],
    [TE12, 508.76307],
  ])("%o: cutoff × diameter is %d GHz·mm", (mode, product) => {
    assertClose((cutoffFrequency(mode, 0.5e-3) * 1e-9) / 1, product, { rel: 1e-7, because: "8 printed digits" });
  });

  test("TE11 by ratio: λc/D = 1.7062896, TM01 1.3061301 times higher", () => {
    // Textbooks print 1.706 and 1.306. Status: computed.
    assertClose(cutoffWavelength(TE11, 0.5), 1.7062896, { rel: 1e-7, because: "8 printed digits" });
    assertClose(cutoffFrequency(TM01, 1) / cutoffFrequency(TE11, 1), 1.3061301, {
      rel: 1e-7,
      because: "8 printed digits",
    });
  });

  test.each<[GuideMode, number]>([
    [TE11, 0.58607],
    [TM01, 0.76548],
    [TM11, 1.21967],
    [TE12, 1.69705],
  ])("%o: diameter at cutoff is %d wavelengths (closed form; computed)", (mode, diameters) => {
    const wavelength = speedOfLight / 10e9;
    assertClose((2 * cutoffRadius(mode, 10e9)) / wavelength, diameters, { abs: 5e-6, because: "5 printed decimals" });
  });

  // Four guides, closed form; status: computed.
  test.each<[string, number, GuideMode, number]>([
    ["S", 11.0, TE11, 7.98629],
    ["S", 11.0, TM01, 10.4311],
    ["S", 11.0, TM11, 16.6204],
    ["D, input", 15.0, TE11, 5.85662],
    ["D, input", 15.0, TM01, 7.6495],
    ["D, input", 15.0, TM11, 12.1883],
    ["D, after the step", 19.6, TE11, 4.4821],
    ["D, after the step", 19.6, TM11, 9.3278],
    ["C", 12.0, TE11, 7.32077],
    ["R", 13.0, TE11, 6.75763],
  ])("guide %s, radius %d mm, %o: %d GHz", (_, radiusMm, mode, cutoffGHz) => {
    assertClose(cutoffFrequency(mode, radiusMm * 1e-3) / 1e9, cutoffGHz, { rel: 1e-5, because: "6 printed digits" });
  });

  // IEC 60153-4 diameters and bands C 89, C 104 (from memory); cutoffs computed. The rule: 1.150 and 1.577 × fc,
  // from which the printed bands spread by 1.149–1.154 and 1.573–1.581.
  test.each([
    [23.825, 7.3745, 8.49, 11.6],
    [20.244, 8.679, 9.97, 13.7],
  ])("IEC series, diameter %d mm", (diameterMm, cutoffGHz, lowGHz, highGHz) => {
    const radius = diameterMm * 0.5e-3;
    assertClose(cutoffFrequency(TE11, radius) / 1e9, cutoffGHz, { rel: 1e-4, because: "5 printed digits" });
    const band = usualBand(radius);
    assertClose(band.low / 1e9, lowGHz, { rel: 0.004, because: "spread of the printed bands about the rule" });
    assertClose(band.high / 1e9, highGHz, { rel: 0.004, because: "spread of the printed bands about the rule" });
  });
});

describe("propagation", () => {
  test.each([
    ["S", 11.0, TE11, 10, 49.814],
    ["D, input", 15.0, TE11, 10, 36.986],
    ["D, after the step", 19.6, TE11, 10, 33.5365],
    ["D, after the step", 19.6, TM11, 10, 83.17],
    ["C", 12.0, TE11, 10, 44.008],
    ["R", 13.0, TE11, 8.2, 64.543],
  ] as const)("guide %s, radius %d mm, %o at %d GHz: λg = %d mm", (_, radiusMm, mode, frequencyGHz, wavelengthMm) => {
    // Closed form; status: computed.
    assertClose(guideWavelength(mode, radiusMm * 1e-3, frequencyGHz * 1e9) * 1e3, wavelengthMm, {
      rel: 1.2e-5,
      because: "5 or 6 printed digits",
    });
  });

  test("TM11 after the step is evanescent below 9.33 GHz and says so", () => {
    const gamma = propagationConstant(TM11, 19.6e-3, 9.2e9);
    expect(gamma.im).toBe(0);
    expect(gamma.re).toBeGreaterThan(0);
    expect(travels(TM11, 19.6e-3, 9.2e9)).toBe(false);
    expect(() => guideWavelength(TM11, 19.6e-3, 9.2e9)).toThrow(/above the TM11 cutoff of 9\.32775 GHz; got 9\.2 GHz/);
  });

  test("law: γ² + k² = kc² on both sides of cutoff", () => {
    for (const frequency of [5e9, 7.9e9, 8.1e9, 20e9]) {
      const { re, im } = propagationConstant(TE11, 11e-3, frequency);
      const k = (2 * Math.PI * frequency) / speedOfLight;
      assertClose(re * re - im * im + k * k, (1.8411837813406593 / 11e-3) ** 2, {
        rel: 1e-14,
        because: "three roundings",
      });
    }
  });

  test("law: Z_TE·Z_TM = η² for equal γ; real above, ±j below cutoff, finite at it", () => {
    const radius = 20e-3;
    const te = waveImpedance(TE01, radius, 12e9);
    const tm = waveImpedance(TM11, radius, 12e9);
    assertClose(te.re * tm.re, vacuumImpedance ** 2, { rel: 1e-13, because: "TE01 and TM11 share a cutoff" });
    expect(waveImpedance(TE11, radius, 1e9).im).toBeGreaterThan(0);
    expect(waveImpedance(TM11, radius, 1e9).im).toBeLessThan(0);
    expect(Number.isFinite(waveImpedance(TE11, radius, cutoffFrequency(TE11, radius)).im)).toBe(true);
  });
});

/** Polar quadrature over a disc of radius a, exact for these fields to rounding. */
function overDisc(radius: number, f: (rho: number, phi: number) => number): number {
  const { nodes, weights } = gaussLegendre(40);
  const turns = 16;
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const rho = (radius * (1 + nodes[i]!)) / 2;
    for (let j = 0; j < turns; j++) {
      const phi = (2 * Math.PI * (j + 0.3)) / turns;
      sum += ((weights[i]! * radius) / 2) * rho * ((2 * Math.PI) / turns) * f(rho, phi);
    }
  }
  return sum;
}

describe("modeField", () => {
  const modes = [TE11, TM11, TE12, TM12, TM01, TE01, TE21, TM21, { family: "TE", m: 1, n: 5 } as const];

  test("law: profiles are orthonormal over the cross-section", () => {
    const radius = 17e-3;
    for (const p of modes) {
      for (const q of modes) {
        const inner = overDisc(radius, (rho, phi) => {
          const e = modeField(p, radius, rho, phi);
          const g = modeField(q, radius, rho, phi);
          return e.eRho * g.eRho + e.ePhi * g.ePhi;
        });
        assertClose(inner, p === q ? 1 : 0, { abs: 1e-12, because: `quadrature of ${modeName(p)}·${modeName(q)}` });
      }
    }
  });

  test("m = 1: polarized along +x on the axis, whatever φ", () => {
    for (const mode of [TE11, TM11, TE12, TM12]) {
      for (const phi of [0, 1, 2.5]) {
        const { eRho, ePhi } = modeField(mode, 0.01, 0, phi);
        const along = eRho * Math.cos(phi) - ePhi * Math.sin(phi);
        const across = eRho * Math.sin(phi) + ePhi * Math.cos(phi);
        expect(along).toBeGreaterThan(0);
        assertClose(across, 0, { abs: 1e-12 * along, because: "rounding" });
      }
    }
  });

  test("the wall: E_φ vanishes for every mode", () => {
    for (const mode of modes) {
      assertClose(modeField(mode, 0.01, 0.01, 0.9).ePhi, 0, { abs: 1e-11, because: "against 1/radius = 100" });
    }
  });

  test("a point outside the guide is refused", () => {
    expect(() => modeField(TE11, 0.01, 0.011, 0)).toThrow(/modeField: rho .*at most 0\.01.* m; got 0\.011 m/);
  });
});

describe("wallLoss", () => {
  // Closed form Rs/(a k η β)·(kc² + k²/(χ² − 1)) of TE11 (Pozar eq. 3.133), given the conductivity. Status: computed.
  test.each([
    [5.8e7, 23.825, 10, 0.07194],
    [5.8e7, 22, 10, 0.09597],
    [3.816e7, 22, 10, 0.11832],
    [3.816e7, 26, 8.2, 0.10009],
  ])("TE11, %d S/m, diameter %d mm, %d GHz: %d dB/m", (conductivity, diameterMm, frequencyGHz, lossDb) => {
    const loss = wallLoss(TE11, diameterMm * 0.5e-3, frequencyGHz * 1e9, conductivity);
    assertClose((20 / Math.LN10) * loss, lossDb, { rel: 1e-4, because: "4 or 5 printed digits" });
  });

  // Pozar, Microwave Engineering, appendix F (conductivities from memory); Rs computed.
  test.each([
    [5.813e7, 0.02606],
    [3.816e7, 0.03216],
    [2.564e7, 0.03924],
    [6.173e7, 0.02529],
    [4.098e7, 0.03104],
  ])("surface resistance at 10 GHz, %d S/m: %d ohm", (conductivity, resistance) => {
    assertClose(surfaceResistance(10e9, conductivity), resistance, {
      abs: 5e-6,
      because: "half a unit of the last digit",
    });
  });

  test("law: power lost in the wall over twice the power carried, from the fields by quadrature", () => {
    // TM11 from its own fields: H_t = ẑ × e/√Z, wall current |H_φ(a)|.
    const radius = 20e-3;
    const frequency = 12e9;
    const carried = 1;
    const z = waveImpedance(TM11, radius, frequency).re;
    let lost = 0;
    for (let j = 0; j < 16; j++) {
      const h = Math.sqrt(2 / z) * modeField(TM11, radius, radius, (2 * Math.PI * j) / 16).eRho;
      lost += ((0.5 * surfaceResistance(frequency, 5e7) * 2 * Math.PI * radius) / 16) * h * h;
    }
    assertClose(wallLoss(TM11, radius, frequency, 5e7), lost / (2 * carried), {
      rel: 1e-12,
      because: "the same integral",
    });
  });

  test("refuses cutoff and nonsense", () => {
    expect(() => wallLoss(TE11, 11e-3, 7.9e9, 5.8e7)).toThrow(/above the TE11 cutoff/);
    expect(() => wallLoss(TE11, 11e-3, 10e9, 0)).toThrow(/conductivity must be a number above 0 S\/m; got 0/);
  });
});

describe("travellingModes", () => {
  test("guide S at 17 GHz: TE11, TM01, TE21, TE01 and TM11, in the order of cutoff", () => {
    const names = travellingModes(11e-3, 17e9).map(modeName);
    expect(names).toEqual(["TE11", "TM01", "TE21", "TE01", "TM11"]);
  });

  test("nothing travels below the TE11 cutoff", () => {
    expect(travellingModes(11e-3, 7.98e9)).toEqual([]);
  });
});

describe("refusals name value and unit", () => {
  test.each([0, -0.011, Number.NaN, Number.POSITIVE_INFINITY])("radius %d", (radius) => {
    expect(() => cutoffFrequency(TE11, radius)).toThrow(/cutoffFrequency: radius must be a number above 0 m; got/);
    expect(() => propagationConstant(TE11, radius, 1e10)).toThrow(RangeError);
  });

  test("mode numbers", () => {
    expect(() => cutoffFrequency({ family: "TE", m: -1, n: 1 }, 1)).toThrow(/transverseNumber: m/);
    expect(() => cutoffFrequency({ family: "TE", m: 1, n: 0 }, 1)).toThrow(/transverseNumber: n/);
  });
});
