import { describe, expect, test } from "vitest";
import type { DualModeGeometry } from "../../../../cells/horn/dual-mode/geometry.ts";
import { dualModeAperture } from "../../../../cells/horn/dual-mode/model.ts";
import {
  closedFormPattern,
  dualModeHorn,
  mouthTerms,
  type RealizableHorn,
  smoothHorn,
} from "../../../../cells/horn/index.ts";
import { beamwidth, crossPolarPeak, halfPowerDb, levelAt } from "../../../../cells/pattern/cuts.ts";
import { fromDeg, toDeg } from "../../../../cells/units.ts";
import { assertClose } from "../../../assert-close.ts";
import { askedBy, flat, kuBand, largeMouth, wavelengthAt10GHz, xBand } from "../asked.ts";

function built(candidate: ReturnType<typeof dualModeHorn>): RealizableHorn & { geometry: DualModeGeometry } {
  if (!candidate.feasible) throw new Error(candidate.reason);
  return candidate as RealizableHorn & { geometry: DualModeGeometry };
}

describe("dualModeHorn", () => {
  // Equal E- and H-plane widths of a large mouth, closed form: full width in deg·λ/D and TM11/TE11 power. Potter 1963 gives the
  // E-plane factor 1 − α/(1 − (3.832/u)²) with α about 0.65 (from memory).
  test.each([
    ["−3 dB", 10 * Math.log10(2), 74.32, -7.57],
    ["−10 dB", 10, 128.35, -8.04],
  ])("a large, nearly flat mouth: equal widths at %s", (_name, taperDb, widthDeg, ratioDb) => {
    const { geometry } = built(dualModeHorn(largeMouth(taperDb), flat));
    // the printed widths take sin θ for θ, as in u = ka sin θ
    const sine = (Math.sin(fromDeg(3)) * 180) / Math.PI;
    assertClose(2 * geometry.flare.radius, (widthDeg * wavelengthAt10GHz) / (2 * sine), {
      rel: 2e-3,
      because: "obliquity at 3° and a finite mouth change 1e-3",
    });
    assertClose(20 * Math.log10(geometry.modeRatio), ratioDb, {
      abs: 0.02,
      because: "two decimals printed, finite mouth",
    });
  });

  test.each([xBand, kuBand])("both planes meet the taper at the rim at band centre, %f to %f GHz", (low, high) => {
    const asked = askedBy(0.8, low, high);
    const level = levelAt(closedFormPattern(built(dualModeHorn(asked)), asked.bandCenter), asked.halfAngle);
    const close = { abs: 2e-3, because: "radius to 1e-5, ratio to 1e-6" };
    assertClose(level.meanDb, -asked.feedTaperDb, close);
    assertClose(level.ePlaneDb, level.hPlaneDb, close);
  });

  test.each([
    [0.8, ...xBand],
    [0.8, ...kuBand],
    [0.6, ...xBand],
    [1.5, ...xBand],
  ])("f/D %f, %f to %f GHz: step inside the window over the band", (fOverD, low, high) => {
    const { geometry } = built(dualModeHorn(askedBy(fOverD, low, high)));
    // D/λ at cutoff: TM11 1.21967, TE12 1.69705, TE11 0.58607 (closed form)
    const inWaves = (radius: number, frequencyGHz: number): number => (2 * radius * frequencyGHz * 1e9) / 299_792_458;
    expect(inWaves(geometry.stepRadius, low)).toBeGreaterThan(1.21967);
    expect(inWaves(geometry.stepRadius, high)).toBeLessThan(1.69705);
    expect(inWaves(geometry.inputRadius, high)).toBeLessThan(1.21967);
    expect(inWaves(geometry.inputRadius, low)).toBeGreaterThan(1.15 * 0.58607);
  });

  test("both modes are in phase at the mouth at band centre, in the ratio wanted", () => {
    const asked = askedBy(0.8, ...xBand);
    const { geometry } = built(dualModeHorn(asked));
    const { re, im } = dualModeAperture(geometry, asked.bandCenter).amplitudes;
    assertClose(Math.atan2(im[1]!, re[1]!), 0, {
      abs: 1e-9,
      because: "the straight's length is solved in closed form",
    });
    assertClose(Math.hypot(re[1]!, im[1]!) / re[0]!, geometry.modeRatio, {
      rel: 1e-5,
      because: "input radius to 1e-7",
    });
    expect(geometry.straightLength).toBeGreaterThanOrEqual(0);
  });

  test("no shorter straight brings them in phase", () => {
    const asked = askedBy(0.8, ...xBand);
    const { geometry } = built(dualModeHorn(asked));
    const mismatches = [0.1, 0.3, 0.5, 0.7, 0.9].map((share) => {
      const shorter = { ...geometry, straightLength: share * geometry.straightLength };
      const { re, im } = dualModeAperture(shorter, asked.bandCenter).amplitudes;
      return Math.abs(Math.atan2(im[1]!, re[1]!));
    });
    for (const mismatch of mismatches) expect(mismatch).toBeGreaterThan(0.1);
  });

  test.each([0.55, 0.6, 0.8, 1, 1.5])("half-power beamwidth below about 55° at f/D %f", (fOverD) => {
    // common practice for the dual-mode horn
    const asked = askedBy(fOverD, ...xBand);
    const pattern = closedFormPattern(built(dualModeHorn(asked)), asked.bandCenter);
    expect(toDeg(beamwidth(pattern, halfPowerDb, "D"))).toBeLessThan(55);
  });

  test("cross-polar: far below the smooth cone's at band centre, rising toward the edges", () => {
    const asked = askedBy(0.8, ...xBand);
    const horn = built(dualModeHorn(asked));
    const smooth = smoothHorn(asked);
    const peak = (frequency: number): number => crossPolarPeak(closedFormPattern(horn, frequency));
    const center = peak(asked.bandCenter);
    expect(center).toBeLessThan(-35);
    if (!smooth.feasible) throw new Error(smooth.reason);
    expect(crossPolarPeak(closedFormPattern(smooth, asked.bandCenter))).toBeGreaterThan(-22);
    expect(peak(asked.bandLow)).toBeGreaterThan(center + 10);
    expect(peak(asked.bandHigh)).toBeGreaterThan(center + 10);
  });

  test.each([0.3, 0.35, 0.4, 0.5])("f/D %f is too deep: the mouth wanted is under TM11's window", (fOverD) => {
    const found = dualModeHorn(askedBy(fOverD, ...xBand));
    expect(found.feasible).toBe(false);
    expect(found.reason).toMatch(
      /smallest mouth, 24\.3 mm in radius \(1\.05 times the radius below which TM11 can't travel at 7\.900 GHz\), already falls \d+\.\d\d dB/,
    );
  });

  test("a band too wide for one step is refused with both radii", () => {
    const found = dualModeHorn(askedBy(0.8, 8, 16));
    expect(found.reason).toMatch(
      /TM11 asks a radius of at least 24\.0 mm behind the step, at 16\.000 GHz TE12 allows at most 15\.4 mm/,
    );
  });

  test("a longer horn than allowed trades phase error for length, or is refused", () => {
    const asked = askedBy(1, ...xBand);
    const free = built(dualModeHorn(asked));
    const shorter = built(dualModeHorn(asked, { maxLength: 0.9 * free.length }));
    expect(shorter.length).toBeLessThanOrEqual(0.9 * free.length);
    expect(shorter.geometry.flare.phaseError).toBeGreaterThan(free.geometry.flare.phaseError);
    expect(shorter.reason).toMatch(/shortened/);
    expect(dualModeHorn(asked, { maxLength: 0.08 }).reason).toMatch(
      /where 80\.0 mm is allowed; up to 0\.3 wavelengths no shorter one fits/,
    );
  });

  test("with much phase error no TM11 makes the planes equal: the mean still meets the taper, and the reason says so", () => {
    const asked = { ...askedBy(0.9, ...xBand, 16), dishDiameter: 2.4 };
    const horn = built(dualModeHorn(asked, { phaseError: 0.3 }));
    expect(horn.reason).toMatch(/as equal as this phase error lets it, \d\.\d\d dB apart/);
    const level = levelAt(closedFormPattern(horn, asked.bandCenter), asked.halfAngle);
    assertClose(level.meanDb, -asked.feedTaperDb, { abs: 2e-3, because: "radius to 1e-5, ratio to 1e-6" });
    expect(Math.abs(level.ePlaneDb - level.hPlaneDb)).toBeGreaterThan(0.1);
  });

  test("profile: straight, step, straight, cone to z = 0", () => {
    const horn = built(dualModeHorn(askedBy(0.8, ...xBand)));
    const { z, radius } = horn.profile;
    expect(z).toEqual([...z].sort((p, q) => p - q));
    expect(z[0]).toBe(-horn.length);
    expect(z[z.length - 1]).toBe(0);
    expect(z[1]).toBe(z[2]);
    expect(radius[1]).toBe(horn.throatRadius);
    expect(radius[2]).toBe(horn.geometry.stepRadius);
  });

  test("mouthTerms: shares of power add up, TM11 in phase at band centre", () => {
    const asked = askedBy(0.8, ...xBand);
    const terms = mouthTerms(built(dualModeHorn(asked)), asked.bandCenter);
    expect(terms.map(({ name }) => name)).toEqual(["TE11", "TM11"]);
    assertClose(terms[0]!.powerShare + terms[1]!.powerShare, 1, { abs: 1e-14, because: "shares" });
    assertClose(terms[1]!.phase, 0, { abs: 1e-9, because: "band centre" });
    // near the wall in the E-plane the two cancel: alpha = 0.65 leaves about a third of TE11's field there
    const atWall = terms.map(({ profile, amplitude }) => amplitude.re * profile(0.999 * 35.4e-3, 0).eRho);
    expect(Math.sign(atWall[0]!)).toBe(-Math.sign(atWall[1]!));
  });
});
