import { describe, expect, test } from "vitest";
import { TE11, wallLoss } from "../../../../cells/guide/mode.ts";
import { flareOfLength } from "../../../../cells/horn/flare.ts";
import { closedFormPattern, ohmicLossDb, type RealizableHorn, smoothHorn } from "../../../../cells/horn/index.ts";
import { smoothAttenuation, te11Pattern } from "../../../../cells/horn/smooth/model.ts";
import { crossPolarPeak, levelAt } from "../../../../cells/pattern/cuts.ts";
import { directivity } from "../../../../cells/pattern/power.ts";
import { fromDeg } from "../../../../cells/units.ts";
import { assertClose } from "../../../assert-close.ts";
import { askedBy, flat, kuBand, largeMouth, wavelengthAt10GHz, xBand } from "../asked.ts";

function built(candidate: ReturnType<typeof smoothHorn>): RealizableHorn {
  if (!candidate.feasible) throw new Error(candidate.reason);
  return candidate;
}

describe("smoothHorn", () => {
  // u = k a sin θ at which the mean of E- and H-plane intensity of a large TE11 mouth has fallen by 3.0103 and 10 dB.
  // SciPy 1.17.1: brentq(lambda u: ((2*jv(1,u)/u)**2 + (2*jvp(1,u)/(1-(u/jnp_zeros(1,1)[0])**2))**2)/2 - 10**(-L/10), .5, 3.7)
  test.each([
    [3.0103, 1.8034930341627673],
    [10, 3.1522838364575447],
  ])("a large, nearly flat mouth: fall of %f dB", (taperDb, u) => {
    const horn = built(smoothHorn(largeMouth(taperDb), flat));
    const expected = (u * wavelengthAt10GHz) / (2 * Math.PI * Math.sin(fromDeg(3)));
    assertClose(horn.apertureRadius, expected, {
      rel: 2e-3,
      because: "obliquity at 3° and a finite mouth change 1e-3",
    });
  });

  test.each([xBand, kuBand])("meets the taper at band centre, %f to %f GHz", (low, high) => {
    const asked = askedBy(0.8, low, high);
    const horn = built(smoothHorn(asked));
    const { meanDb } = levelAt(closedFormPattern(horn, asked.bandCenter), asked.halfAngle);
    assertClose(meanDb, -asked.feedTaperDb, { abs: 1e-3, because: "radius to 1e-5, coarser angles in the search" });
  });

  test("the throat carries TE11 with margin and keeps TM01 away over a narrow band", () => {
    const horn = built(smoothHorn(askedBy(0.8, ...xBand)));
    // TE11 cutoff by fc·D = 175.69847 GHz·mm, TM01 229.48506: closed form χ c/(π D)
    const diameterMm = 2e3 * horn.throatRadius;
    expect(7.9 / (175.69847 / diameterMm)).toBeGreaterThanOrEqual(1.15 - 1e-9);
    expect(229.48506 / diameterMm).toBeGreaterThan(8.4);
    expect(horn.warnings).toEqual([]);
  });

  test("a wide band lets TM01 into the throat and says so", () => {
    const horn = built(smoothHorn(askedBy(0.8, 8, 12)));
    expect(horn.warnings[0]?.text).toMatch(/^TM01 travels in the throat above 9\.\d+ GHz/);
  });

  test("profile: throat to mouth, ends at z = 0", () => {
    const horn = built(smoothHorn(askedBy(0.8, ...xBand)));
    expect(horn.profile.z).toEqual([-horn.length, 0]);
    expect(horn.profile.radius).toEqual([horn.throatRadius, horn.apertureRadius]);
    assertClose(horn.outerDiameter, 2 * (horn.apertureRadius + 2e-3), { rel: 1e-14, because: "2 mm walls by default" });
  });

  test("shortened to the limit it still meets the taper and says what it cost", () => {
    const asked = askedBy(0.8, ...xBand);
    const horn = built(smoothHorn(asked, { maxLength: 0.05 }));
    expect(horn.length).toBe(0.05);
    expect(horn.reason).toMatch(/shortened to the 50\.0 mm allowed at the cost of a phase error of 0\.\d+ wavelengths/);
    const { meanDb } = levelAt(closedFormPattern(horn, asked.bandCenter), asked.halfAngle);
    assertClose(meanDb, -asked.feedTaperDb, { abs: 1e-3, because: "solved again at the limit" });
  });

  test("what can't be built says why, with the numbers", () => {
    const reason = (...given: Parameters<typeof smoothHorn>): string => {
      const found = smoothHorn(...given);
      expect(found.feasible).toBe(false);
      return found.reason;
    };
    expect(reason(askedBy(0.3, ...xBand, 1))).toMatch(/would have to be 3\.58 dB stronger toward the rim at 79\.6°/);
    expect(reason(askedBy(0.8, ...xBand, 1.5))).toMatch(
      /smallest mouth, 12\.2 mm in radius \(1\.1 times the TE11 cutoff/,
    );
    expect(reason(askedBy(0.8, ...xBand, 35))).toMatch(/main lobe of a TE11 mouth ends there at \d+\.\d+ dB/);
    expect(reason(askedBy(20, ...xBand))).toMatch(/Even a mouth of \d+\.\d mm radius, 12\.5 wavelengths/);
    expect(reason(askedBy(0.8, ...xBand), { maxLength: 0.01 })).toMatch(/78\.5 mm long .* where 10\.0 mm is allowed/);
    expect(reason(askedBy(0.8, ...xBand), { maxDiameter: 0.06 })).toMatch(
      /67\.5 mm across its walls, where 60\.0 mm is allowed/,
    );
    expect(reason({ ...askedBy(0.8, ...xBand), dishDiameter: 0.05 })).toMatch(/shade the whole dish of 50\.0 mm/);
  });

  test("illegal arguments throw, naming value and range", () => {
    const asked = askedBy(0.8, ...xBand);
    expect(() => smoothHorn({ ...asked, halfAngle: 2 })).toThrow(/half-angle must be .* below 1\.57.*; got 2 rad/);
    expect(() => smoothHorn({ ...asked, bandHigh: 7e9 })).toThrow(RangeError);
    expect(() => smoothHorn({ ...asked, feedTaperDb: Number.NaN })).toThrow(RangeError);
    expect(() => smoothHorn(asked, { maxLength: -1 })).toThrow(/largest length/);
    expect(() => smoothHorn(asked, { phaseError: 0.4 })).toThrow(/at most 0\.3 wavelengths/);
  });
});

describe("smooth-wall model", () => {
  // A cone from 11 to 36 mm radius over 100 mm. Converged mode matching by an independent program (TE1n/TM1n, directivity over the
  // forward integral); not a measurement. The closed form leaves out mode conversion in the cone.
  test.each([
    [10, 16.5917, -18.8767, -8.1131, -5.16],
    [12, 17.9985, -18.2868, -11.8917, -7.5106],
  ])("against mode matching at %f GHz", (frequencyGHz, directivityDbi, crossPolarDb, eAt20Db, hAt20Db) => {
    const frequency = frequencyGHz * 1e9;
    const flare = flareOfLength({ startRadius: 11e-3, radius: 36e-3 }, 100e-3, 299_792_458 / frequency);
    const pattern = te11Pattern(flare, frequency, 361);
    assertClose(10 * Math.log10(directivity(pattern)), directivityDbi, {
      abs: 0.05,
      because: "closed form, half flare angle 14°",
    });
    assertClose(crossPolarPeak(pattern), crossPolarDb, { abs: 0.3, because: "closed form, half flare angle 14°" });
    const level = levelAt(pattern, fromDeg(20));
    assertClose(level.ePlaneDb, eAt20Db, { abs: 0.4, because: "closed form, half flare angle 14°" });
    assertClose(level.hPlaneDb, hAt20Db, { abs: 0.1, because: "closed form, half flare angle 14°" });
  });

  test("ohmicLossDb: a straight guide loses what the handbook's formula says", () => {
    // TE11, aluminium 3.816e7 S/m, D = 22 mm, 10 GHz: 0.11832 dB/m (closed form, Marcuvitz 1951; conductivity from memory).
    const straight = flareOfLength({ startRadius: 11e-3, radius: 11e-3 }, 1, wavelengthAt10GHz);
    const decibels = (20 / Math.LN10) * smoothAttenuation({ flare: straight, wall: 1e-3 }, 10e9, 3.816e7);
    assertClose(decibels, 0.11832, { rel: 1e-4, because: "five figures printed" });
  });

  test("ohmicLossDb: a cone loses less than its throat would, by the same integral in steps", () => {
    const horn = built(smoothHorn(askedBy(0.8, ...xBand)));
    const steps = 2000;
    let nepers = 0;
    for (let i = 0; i < steps; i++) {
      const share = (i + 0.5) / steps;
      const radius = horn.throatRadius + (horn.apertureRadius - horn.throatRadius) * share;
      nepers += (wallLoss(TE11, radius, 8.15e9, 3.8e7) * horn.length) / steps;
    }
    assertClose(ohmicLossDb(horn, 8.15e9, 3.8e7), (20 / Math.LN10) * nepers, {
      rel: 1e-6,
      because: "midpoints, 2000 steps",
    });
  });

  test("closedFormPattern: 1° apart is converged", () => {
    const asked = askedBy(0.8, ...xBand);
    const horn = built(smoothHorn(asked));
    const { flare } = horn.geometry as { flare: Parameters<typeof te11Pattern>[0] };
    const fine = te11Pattern(flare, asked.bandCenter, 1441);
    const handed = closedFormPattern(horn, asked.bandCenter);
    assertClose(directivity(handed), directivity(fine), {
      rel: 1e-10,
      because: "the power sum is exact for either grid",
    });
    for (const deg of [10, 20, 34.7]) {
      const difference = levelAt(handed, fromDeg(deg)).meanDb - levelAt(fine, fromDeg(deg)).meanDb;
      assertClose(difference, 0, { abs: 1e-4, because: "splines at 1° with ka = 5.4" });
    }
    assertClose(crossPolarPeak(handed), crossPolarPeak(fine), { abs: 1e-3, because: "splines at 1° with ka = 5.4" });
  });
});
