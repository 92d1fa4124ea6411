import { describe, expect, test } from "vitest";
import {
  bandAnalysis,
  crossPolarPeak,
  dish,
  dualModeHorn,
  type FeedRequirement,
  feedRequirement,
  levelAt,
  matchedOverBand,
  smoothHorn,
  tuneDualMode,
} from "../../../../cells/index.ts";
import { aperturePattern } from "../../../../cells/radiation/aperture-pattern.ts";
import { assertClose } from "../../../assert-close.ts";

const reflector = dish({ diameter: 2.4, fOverD: 0.8 });
const asked = (bandLow: number, bandHigh: number): FeedRequirement =>
  feedRequirement({ dish: reflector, bandLow, bandHigh, edgeTaperDb: 11 });

describe("tuneDualMode", () => {
  test.each([
    [7.9e9, 8.4e9],
    [10.7e9, 11.7e9],
  ])(
    "%d to %d Hz: balanced and tapered at the rim, by a finer analysis than the one it was solved with",
    (low, high) => {
      const requirement = asked(low, high);
      const first = dualModeHorn(requirement);
      let told = 0;
      const tuned = tuneDualMode(first, requirement, {}, () => told++);
      if (!first.feasible || !tuned.feasible) throw new Error("no horn");
      expect(tuned.warnings).toEqual([]);
      expect(told).toBeLessThanOrEqual(42);
      const { bandCenter, halfAngle, feedTaperDb } = requirement;
      const fine = bandAnalysis(tuned.profile, {
        frequencies: [bandCenter],
        reflectionError: 1e-4,
        crossPolarErrorDb: -60,
      });
      const pattern = aperturePattern(fine.apertureModes[0]!);
      const rim = levelAt(pattern, halfAngle);
      assertClose(rim.meanDb, -feedTaperDb, { abs: 0.05, because: "solved to 0.02 dB at −50 dB of the mouth's field" });
      assertClose(rim.ePlaneDb, rim.hPlaneDb, {
        abs: 0.1,
        because: "planes equal to −50 dB of their sum, a finer analysis",
      });
      // Potter 1963 and common practice: in phase and in the right ratio, TM11 takes the cross-polar below −30 dB
      expect(crossPolarPeak(pattern)).toBeLessThan(-34);
      const before = bandAnalysis(first.profile, { frequencies: [bandCenter] }).apertureModes[0]!;
      expect(crossPolarPeak(pattern)).toBeLessThan(crossPolarPeak(aperturePattern(before)) - 8);
    },
  );

  test("over the default band the worst is lower too, and the result is plain data that the closed form still reads", () => {
    const requirement = asked(7.9e9, 8.4e9);
    const first = dualModeHorn(requirement);
    const tuned = tuneDualMode(first, requirement);
    const worst = (horn: typeof first): number => {
      const band = matchedOverBand(horn, reflector, requirement);
      return band.feasible ? Math.max(...band.points.map(({ crossPolarPeakDb }) => crossPolarPeakDb)) : Number.NaN;
    };
    expect(worst(tuned)).toBeLessThan(worst(first) - 5);
    expect(structuredClone(tuned)).toEqual(tuned);
    expect(tuned.reason).toMatch(/balanced there at band centre by mode matching/);
  });

  test("what can't be balanced within a limit keeps its first dimensions and says so", () => {
    const requirement = asked(7.9e9, 8.4e9);
    const first = dualModeHorn(requirement);
    const tight = tuneDualMode(first, requirement, { maxLength: 0.05 });
    expect(tight).toMatchObject({ feasible: true, profile: (first as { profile: unknown }).profile });
    expect(tight.warnings.map(({ text }) => text).join()).toMatch(
      /could not be balanced .* over a limit\. Its first dimensions stand\./,
    );
  });

  test("no horn passes through, another kind is refused", () => {
    const deep = dualModeHorn(
      feedRequirement({ dish: dish({ diameter: 2.4, fOverD: 0.35 }), bandLow: 8e9, bandHigh: 8.2e9, edgeTaperDb: 11 }),
    );
    expect(tuneDualMode(deep, asked(8e9, 8.2e9))).toBe(deep);
    expect(() => tuneDualMode(smoothHorn(asked(8e9, 8.2e9)), asked(8e9, 8.2e9))).toThrow(
      "tuneDualMode: horn must be dualMode; got smooth",
    );
  });
});
