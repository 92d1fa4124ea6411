import { expect, test } from "vitest";
import { bandAnalysis, createMatcher } from "../../../cells/matching/index.ts";
import { crossPolarPeakAt } from "../../../cells/pattern/cuts.ts";
import { patternInterpolant } from "../../../cells/pattern/interpolant.ts";
import { apertureDirectivity, directivity } from "../../../cells/pattern/power.ts";
import { aperturePattern, aperturePower } from "../../../cells/radiation/aperture-pattern.ts";
import { assertClose, assertComplexClose } from "../../assert-close.ts";
import { type ListedAnalysis, listedAnalyses, profileOf, profiles } from "./listed-profiles.ts";

const decibels = (ratio: number): number => 10 * Math.log10(ratio);
const polar = (levelDb: number, phaseDeg: number) => {
  const size = 10 ** (levelDb / 20);
  return { re: size * Math.cos((phaseDeg * Math.PI) / 180), im: size * Math.sin((phaseDeg * Math.PI) / 180) };
};

for (const { horn, profile, cases } of listedAnalyses) {
  const result = bandAnalysis(profile, { frequencies: cases.map((one) => one.f_GHz * 1e9) });

  cases.forEach((listed: ListedAnalysis, i) => {
    const modes = result.apertureModes[i]!;
    const s11 = { re: result.s11.re[i]!, im: result.s11.im[i]! };

    test(`bandAnalysis: ${horn} at ${listed.f_GHz} GHz, reflection and modes of an independent program`, () => {
      const [re, im] = listed.S11;
      assertComplexClose(s11, { re, im }, { abs: 2e-4, because: "listed to 1e-5; tapers at the first level to 2e-4" });
      listed.aperture_modes.forEach((mode, n) => {
        const amplitude = { re: modes.amplitudes.re[n]!, im: modes.amplitudes.im[n]! };
        assertComplexClose(amplitude, mode, { abs: 1e-3, because: `listed to 1e-4; ${mode.mode}` });
      });
    });

    test(`bandAnalysis: ${horn} at ${listed.f_GHz} GHz, the pattern of an independent program`, () => {
      const pattern = aperturePattern(modes);
      assertClose(decibels(directivity(pattern)), listed.D_int_dBi, { abs: 0.005, because: "listed to 3e-4 dB" });
      assertClose(decibels(apertureDirectivity(pattern)), listed.D_pow_dBi, {
        abs: 0.005,
        because: "listed to 3e-4 dB",
      });
      const { level } = { level: crossPolarPeakAt(pattern).levelDb };
      assertClose(level, listed.xp45_peak_dB, { abs: 0.05, because: "amplitudes to 1e-3, lobe above −42 dB" });
      const cut = patternInterpolant(pattern);
      const boresight = cut.copolar45(0);
      const relative = ({ re, im }: { re: number; im: number }) => {
        const size = boresight.re ** 2 + boresight.im ** 2;
        return {
          re: (re * boresight.re + im * boresight.im) / size,
          im: (im * boresight.re - re * boresight.im) / size,
        };
      };
      listed.theta_deg.forEach((thetaDeg, t) => {
        const theta = (thetaDeg * Math.PI) / 180;
        const because = `amplitudes to 1e-3; ${thetaDeg}°`;
        const e = polar(listed.E_dB[t]!, listed.E_ph[t]!);
        const h = polar(listed.H_dB[t]!, listed.H_ph[t]!);
        assertComplexClose(relative(cut.ePlane(theta)), e, { abs: 5e-4, because });
        assertComplexClose(relative(cut.hPlane(theta)), h, { abs: 5e-4, because });
      });
    });

    test(`bandAnalysis: ${horn} at ${listed.f_GHz} GHz, the stated error bounds the true one`, () => {
      const { convergence } = result;
      expect(convergence.reached).toBe(true);
      const [re, im] = listed.S11;
      // The listed value's own uncertainty is 1e-5 in S11 and 1e-4 in an amplitude.
      expect(Math.hypot(s11.re - re, s11.im - im)).toBeLessThan(convergence.reflectionErrors[i]! + 1e-5);
      const travelling = listed.aperture_modes.filter((mode) => mode.propagating);
      const miss = travelling.map(({ re, im }, n) =>
        Math.hypot(modes.amplitudes.re[n]! - re, modes.amplitudes.im[n]! - im),
      );
      expect(Math.hypot(...miss)).toBeLessThan(convergence.apertureError + 2e-4);
    });

    test(`bandAnalysis: ${horn} at ${listed.f_GHz} GHz keeps its power`, () => {
      assertClose(result.powerBalance[i]!, 0, { abs: 1e-11, because: "as computed: rounding of the elimination" });
      const carried = s11.re ** 2 + s11.im ** 2 + aperturePower(modes);
      assertClose(carried, 1, { abs: 1e-11, because: "as given out, one mode travels in the throat" });
    });
  });
}

test("bandAnalysis: dropping functions at the edges is seen", () => {
  const coarse = bandAnalysis(profiles.corrugated, { frequencies: [10e9, 11e9], level: { edgeFunctions: 7 } });
  const fine = bandAnalysis(profiles.corrugated, { frequencies: [10e9, 11e9], level: { edgeFunctions: 13 } });
  const change = (i: number, n: number): number =>
    Math.hypot(
      coarse.apertureModes[i]!.amplitudes.re[n]! - fine.apertureModes[i]!.amplitudes.re[n]!,
      coarse.apertureModes[i]!.amplitudes.im[n]! - fine.apertureModes[i]!.amplitudes.im[n]!,
    );
  expect(change(0, 0)).toBeGreaterThan(1e-3);
  expect(coarse.convergence.apertureError).toBeGreaterThan(change(0, 0));
  expect(coarse.convergence.reached).toBe(false);
  expect(coarse.warnings.map(({ code }) => code)).toContain("precision-loss");
  expect(fine.convergence.apertureError).toBeLessThan(coarse.convergence.apertureError / 10);
});

test("bandAnalysis: more steps and modes in a taper change the answer less and less, within the estimate", () => {
  const at = (taperModes: number, stepsPerWavelength: number) =>
    bandAnalysis(profiles.smoothCone, { frequencies: [10e9], level: { taperModes, stepsPerWavelength } });
  const [coarse, middle, fine] = [at(12, 15), at(20, 25), at(40, 50)];
  const apart = (a: typeof coarse, b: typeof coarse): number =>
    Math.hypot(a.s11.re[0]! - b.s11.re[0]!, a.s11.im[0]! - b.s11.im[0]!);
  expect(apart(coarse, fine)).toBeLessThan(coarse.convergence.reflectionError);
  expect(apart(middle, fine)).toBeLessThan(middle.convergence.reflectionError);
  expect(apart(middle, fine)).toBeLessThan(apart(coarse, fine));
});

test("createMatcher: the same digits as a fresh analysis after a control has turned", () => {
  const frequencies = [9.5e9, 10.5e9];
  const turned = {
    z: [...profiles.corrugated.z],
    radius: profiles.corrugated.radius.map((r, i) => (i === 90 ? r + 1e-4 : r)),
  };
  const matcher = createMatcher();
  matcher.band(profiles.corrugated, { frequencies });
  expect(matcher.band(turned, { frequencies })).toEqual(bandAnalysis(turned, { frequencies }));
  expect(matcher.band(profiles.corrugated, { frequencies })).toEqual(
    bandAnalysis(profiles.corrugated, { frequencies }),
  );
});

test("bandAnalysis: a bare guide passes everything with the phase of its length", () => {
  const { s11, apertureModes } = bandAnalysis({ z: [-0.02, 0], radius: [0.012, 0.012] }, { frequencies: [10e9] });
  assertClose(Math.hypot(s11.re[0]!, s11.im[0]!), 0, { abs: 1e-12, because: "nothing reflects" });
  const beta = Math.sqrt(((2 * Math.PI * 10e9) / 299792458) ** 2 - (1.8411837813406593 / 0.012) ** 2);
  const passed = { re: apertureModes[0]!.amplitudes.re[0]!, im: apertureModes[0]!.amplitudes.im[0]! };
  const expected = { re: Math.cos(beta * 0.02), im: -Math.sin(beta * 0.02) };
  assertComplexClose(passed, expected, { abs: 1e-12, because: "e^(−jβL)" });
});

test("bandAnalysis: a guide below cutoff on the way reflects nearly everything", () => {
  const profile = profileOf([
    [0, 12],
    [10, 12],
    [0, 6],
    [12, 6],
    [0, 14],
    [10, 14],
  ]);
  const { s11, apertureModes, powerBalance } = bandAnalysis(profile, { frequencies: [10e9] });
  // TE11 of the narrow guide falls by e^{−αL}: −23 dB for the field, less the mismatch at both ends.
  const passed = aperturePower(apertureModes[0]!);
  expect(passed).toBeGreaterThan(1e-5);
  expect(passed).toBeLessThan(1e-2);
  assertClose(s11.re[0]! ** 2 + s11.im[0]! ** 2, 1 - passed, { abs: 1e-11, because: "power balance" });
  assertClose(powerBalance[0]!, 0, { abs: 1e-11, because: "power balance" });
});

test("bandAnalysis: what makes no sense is refused in words", () => {
  const options = { frequencies: [10e9] };
  expect(() => bandAnalysis({ z: [-0.02, 0], radius: [0.008, 0.02] }, options)).toThrow(
    /above the TE11 cutoff of the throat/,
  );
  expect(() => bandAnalysis({ z: [0, 0], radius: [0.012, 0.02] }, options)).toThrow(/must have a length/);
  expect(() => bandAnalysis({ z: [-0.02, -0.01, -0.015, 0], radius: [1, 1, 1, 1] }, options)).toThrow(/must not fall/);
  expect(() => bandAnalysis({ z: [-0.02, 0], radius: [0.012, Number.NaN] }, options)).toThrow(/radius 2/);
  expect(() => bandAnalysis({ z: [-0.02, 0], radius: [0.012, 0.02] }, { frequencies: [] })).toThrow(/at least one/);
  expect(() => bandAnalysis(profiles.smoothCone, { ...options, reflectionError: 0 })).toThrow(/reflectionError/);
});
