import { describe, expect, test } from "vitest";
import { balancedSlotDepth } from "../../../../cells/guide/slot.ts";
import type { CorrugatedGeometry } from "../../../../cells/horn/corrugated/geometry.ts";
import { he11Pattern } from "../../../../cells/horn/corrugated/model.ts";
import { flareOfLength } from "../../../../cells/horn/flare.ts";
import {
  closedFormPattern,
  corrugatedHorn,
  mouthTerms,
  type RealizableHorn,
  smoothHorn,
} from "../../../../cells/horn/index.ts";
import { crossPolarPeak, levelAt } from "../../../../cells/pattern/cuts.ts";
import { directivity } from "../../../../cells/pattern/power.ts";
import { fromDeg } from "../../../../cells/units.ts";
import { assertClose } from "../../../assert-close.ts";
import { askedBy, kuBand, wavelengthAt10GHz, xBand } from "../asked.ts";

function built(candidate: ReturnType<typeof corrugatedHorn>): RealizableHorn & { geometry: CorrugatedGeometry } {
  if (!candidate.feasible) throw new Error(candidate.reason);
  return candidate as RealizableHorn & { geometry: CorrugatedGeometry };
}

describe("corrugatedHorn", () => {
  // Balanced HE11 of a large mouth, J0(2.4048 r/a): full widths 75.79 and 131.23 deg·λ/D at −3.0103 and −10 dB (Clarricoats & Olver
  // 1984; closed form).
  test.each([
    [10 * Math.log10(2), 75.79, 7],
    [10, 131.23, 12],
  ])("a large, nearly flat mouth: fall of %f dB", (taperDb, widthDeg, halfAngleDeg) => {
    const halfAngle = fromDeg(halfAngleDeg);
    // the closed form is of the aperture alone; obliquity adds (1 + cos θ)/2
    const obliquityDb = -20 * Math.log10((1 + Math.cos(halfAngle)) / 2);
    const asked = { halfAngle, feedTaperDb: taperDb + obliquityDb, bandLow: 10e9, bandCenter: 10e9, bandHigh: 10e9 };
    const horn = built(corrugatedHorn(asked, { phaseError: 0.02 }));
    // the printed widths take sin θ for θ, as in u = ka sin θ
    const sine = (Math.sin(halfAngle) * 180) / Math.PI;
    assertClose(2 * horn.apertureRadius, (widthDeg * wavelengthAt10GHz) / (2 * sine), {
      rel: 3e-3,
      because: "a mouth of 5 wavelengths and a phase error of 0.02 change 2e-3",
    });
  });

  test.each([xBand, kuBand, [8, 11] as const])("meets the taper at band centre, %f to %f GHz", (low, high) => {
    const asked = askedBy(0.8, low, high);
    const { meanDb } = levelAt(closedFormPattern(built(corrugatedHorn(asked)), asked.bandCenter), asked.halfAngle);
    assertClose(meanDb, -asked.feedTaperDb, {
      abs: 2e-3,
      because: "radius to 1e-5, slot fill settled after the search",
    });
  });

  test.each([
    [0.5, ...xBand],
    [0.8, ...xBand],
    [0.8, ...kuBand],
    [1.5, ...xBand],
    [3, ...xBand],
  ])("f/D %f, %f to %f GHz: pitch, slots and teeth in bounds", (fOverD, low, high) => {
    const { geometry } = built(corrugatedHorn(askedBy(fOverD, low, high)));
    const wavelength = 299_792_458 / (((low + high) / 2) * 1e9);
    // rules of Granet & James 2005 (from memory): pitch λ/10…λ/5, slot over pitch 0.7…0.9, throat ka about 3
    expect(geometry.pitch).toBeGreaterThanOrEqual(wavelength / 10);
    expect(geometry.pitch).toBeLessThanOrEqual(wavelength / 5);
    expect(geometry.slotWidth / geometry.pitch).toBeGreaterThanOrEqual(0.7 - 1e-9);
    expect(geometry.slotWidth / geometry.pitch).toBeLessThanOrEqual(0.9);
    expect(geometry.pitch - geometry.slotWidth).toBeGreaterThanOrEqual(0.8e-3 - 1e-12);
    expect((2 * Math.PI * geometry.flare.startRadius) / wavelength).toBeGreaterThan(2.5);
    expect((2 * Math.PI * geometry.flare.startRadius) / wavelength).toBeLessThan(3.5);
    assertClose(geometry.corrugations.length * geometry.pitch, geometry.flare.length, {
      rel: 1e-12,
      because: "a whole number",
    });
  });

  test("depths: near half a wave at the throat, falling to the balanced depth of each slot", () => {
    const asked = askedBy(0.8, ...xBand);
    const { geometry } = built(corrugatedHorn(asked));
    const wavelength = 299_792_458 / asked.bandCenter;
    const depths = geometry.corrugations.map(({ depth }) => depth);
    expect(depths[0]! / wavelength).toBeGreaterThanOrEqual(0.4);
    expect(depths[0]! / wavelength).toBeLessThanOrEqual(0.5);
    expect(depths).toEqual([...depths].sort((p, q) => q - p));
    geometry.corrugations.slice(geometry.converterCount).forEach(({ innerRadius, depth }) => {
      expect(depth).toBe(balancedSlotDepth(asked.bandCenter, innerRadius));
    });
    // the fit in closed form, d = (λ/4) exp(1/(2.114 (ka)^1.134)), Granet & James 2005 (from memory): 0.3 %
    const ka = (2 * Math.PI * geometry.flare.radius) / wavelength;
    const fit = (wavelength / 4) * Math.exp(1 / (2.114 * ka ** 1.134));
    assertClose(depths[depths.length - 1]!, fit, { rel: 3e-3, because: "the fit's own accuracy" });
  });

  test("no cross-polar at band centre, little over a narrow band", () => {
    const asked = askedBy(0.8, ...xBand);
    const horn = built(corrugatedHorn(asked));
    const smooth = smoothHorn(asked);
    if (!smooth.feasible) throw new Error(smooth.reason);
    const peak = (frequency: number): number => crossPolarPeak(closedFormPattern(horn, frequency));
    expect(peak(asked.bandCenter)).toBeLessThan(-100);
    expect(peak(asked.bandLow)).toBeLessThan(-40);
    expect(peak(asked.bandHigh)).toBeLessThan(-40);
    expect(crossPolarPeak(closedFormPattern(smooth, asked.bandCenter))).toBeGreaterThan(-22);
  });

  // Converged mode matching by an independent program, not a measurement: 36 corrugations, radius 12 to 38 mm over 144 mm, last slots
  // 7.9 mm deep and 3 mm of 4 mm wide. The throat's EH12 is what the closed form leaves out of the cross-polar.
  test.each([
    [10, 16.4776, -5.7839, -5.7345],
    [11, 17.3814, -7.351, -6.9966],
  ])("model against mode matching at %f GHz", (frequencyGHz, directivityDbi, eAt20Db, hAt20Db) => {
    const frequency = frequencyGHz * 1e9;
    const flare = flareOfLength({ startRadius: 12e-3, radius: 38e-3 }, 144e-3, 299_792_458 / frequency);
    const pattern = he11Pattern({ flare, last: { innerRadius: 38e-3, depth: 7.9e-3 }, slotFill: 0.75 }, frequency, 361);
    assertClose(10 * Math.log10(directivity(pattern)), directivityDbi, { abs: 0.15, because: "HE11 alone" });
    const level = levelAt(pattern, fromDeg(20));
    assertClose(level.ePlaneDb, eAt20Db, { abs: 0.25, because: "HE11 alone" });
    assertClose(level.hPlaneDb, hAt20Db, { abs: 0.25, because: "HE11 alone" });
  });

  test("model against mode matching: cross-polar off balance at 11 GHz", () => {
    const flare = flareOfLength({ startRadius: 12e-3, radius: 38e-3 }, 144e-3, 299_792_458 / 11e9);
    const pattern = he11Pattern({ flare, last: { innerRadius: 38e-3, depth: 7.9e-3 }, slotFill: 0.75 }, 11e9, 361);
    assertClose(crossPolarPeak(pattern), -39.81, {
      abs: 1,
      because: "HE11 alone, its hybrid factor from the exact slot",
    });
  });

  test("a wide band is balanced lower, so that its lower edge keeps clear of the slow wave", () => {
    const { geometry } = built(corrugatedHorn(askedBy(0.8, 8, 11)));
    expect(geometry.balanceFrequency).toBeLessThan(9.5e9);
    expect(geometry.validity.low).toBeLessThanOrEqual(8e9);
    expect(geometry.validity.high).toBeGreaterThanOrEqual(11e9);
  });

  test("outside the frequencies of HE11 alone the pattern says so", () => {
    const horn = built(corrugatedHorn(askedBy(0.8, ...xBand)));
    const { validity } = horn.geometry;
    expect(closedFormPattern(horn, 8.15e9).warnings).toEqual([]);
    const below = closedFormPattern(horn, 0.99 * validity.low).warnings.map(({ text }) => text);
    expect(below.join()).toMatch(/^Below 7\.\d+ GHz a slow wave/);
    const above = closedFormPattern(horn, 1.01 * validity.high).warnings.map(({ text }) => text);
    expect(above.join()).toMatch(/^Above 9\.\d+ GHz the first slot is half a wave deep/);
  });

  test("profile: slots from the throat, the last tooth ends at z = 0", () => {
    const horn = built(corrugatedHorn(askedBy(0.8, ...xBand)));
    const { z, radius } = horn.profile;
    expect(z).toEqual([...z].sort((p, q) => p - q));
    expect(z).toHaveLength(2 + 4 * horn.geometry.corrugations.length);
    assertClose(z[0]!, -horn.length, { rel: 1e-12, because: "throat guide and flare" });
    expect(z[z.length - 1]).toBe(0);
    expect(radius[radius.length - 1]).toBe(horn.apertureRadius);
    expect(Math.max(...radius) + 2e-3).toBe(horn.outerDiameter / 2);
    for (let i = 0; i < z.length - 1; i++) {
      // every piece lies along z or straight across it
      expect(z[i] === z[i + 1] || radius[i] === radius[i + 1]).toBe(true);
    }
  });

  test("mouthTerms: HE11, no field at the wall", () => {
    const horn = built(corrugatedHorn(askedBy(0.8, ...xBand)));
    const [he11] = mouthTerms(horn, 8.15e9);
    expect(he11).toMatchObject({ name: "HE11", powerShare: 1 });
    const onAxis = Math.abs(he11!.profile(0, 0).eRho);
    expect(Math.abs(he11!.profile(horn.apertureRadius, Math.PI / 2).ePhi) / onAxis).toBeLessThan(1e-9);
    expect(Math.abs(he11!.profile(horn.apertureRadius, 0).eRho) / onAxis).toBeLessThan(0.1);
  });

  test("what can't be built says why, with the numbers", () => {
    const reason = (...given: Parameters<typeof corrugatedHorn>): string => {
      const found = corrugatedHorn(...given);
      expect(found.feasible).toBe(false);
      return found.reason;
    };
    expect(reason(askedBy(0.8, 35, 36))).toMatch(
      /Teeth of 0\.80 mm, .* it would be 2\.67 mm, where a fifth of a wavelength, 1\.69 mm/,
    );
    expect(reason(askedBy(0.8, 8, 16))).toMatch(
      /too wide for one throat: TE11 at 8\.000 GHz asks .* at least 12\.6 mm/,
    );
    expect(reason(askedBy(0.3, ...xBand))).toMatch(/a dish this deep usually takes a choke-ring or wide-flare feed/);
    expect(reason(askedBy(6, ...xBand), { phaseError: 0.05 })).toMatch(/take \d{4} corrugations; more than 2000/);
    expect(reason(askedBy(0.8, ...xBand), { maxLength: 0.02 })).toMatch(/where 20\.0 mm is allowed/);
    expect(reason(askedBy(0.8, ...xBand), { maxDiameter: 0.08 })).toMatch(/95\.0 mm across its walls/);
  });

  test("a deep dish takes a mouth near cutoff and says so", () => {
    const asked = askedBy(0.35, ...xBand);
    const horn = built(corrugatedHorn(asked));
    expect(horn.warnings[0]?.text).toMatch(/^The horn is only 1\.1\d\d times as wide as TE11 needs/);
    const { meanDb } = levelAt(closedFormPattern(horn, asked.bandCenter), asked.halfAngle);
    assertClose(meanDb, -asked.feedTaperDb, { abs: 2e-3, because: "radius to 1e-5" });
  });

  test("thicker teeth take a wider pitch, still no thinner than the limit", () => {
    const { geometry } = built(corrugatedHorn(askedBy(0.8, ...xBand), { toothThickness: 2e-3 }));
    expect(geometry.pitch - geometry.slotWidth).toBeGreaterThanOrEqual(2e-3 - 1e-12);
    expect(geometry.slotWidth / geometry.pitch).toBeGreaterThanOrEqual(0.7 - 1e-9);
  });
});
