import { expect, test } from "vitest";
import { bandAnalysis } from "../../../cells/matching/index.ts";
import { modeTable } from "../../../cells/matching/mode-table.ts";
import { flangeAdmittance, halfSpaceAdmittance } from "../../../cells/matching/mouth-flange.ts";
import { assertClose } from "../../assert-close.ts";
import { profileOf, profiles } from "./listed-profiles.ts";

const table = modeTable(80);

test("flangeAdmittance: the half space takes power and gives none, whatever the field", () => {
  const count = 9;
  for (const ka of [1, 2.2, 5, 12]) {
    const { im } = halfSpaceAdmittance(count, ka);
    for (let p = 0; p < count; p++) {
      expect(im[p * count + p]).toBeGreaterThan(0);
      for (let q = 0; q < p; q++) {
        assertClose(im[p * count + q]!, im[q * count + p]!, { abs: 1e-12, because: "reciprocity" });
        expect(im[p * count + q]! ** 2).toBeLessThan(im[p * count + p]! * im[q * count + q]! * (1 + 1e-12));
      }
    }
  }
});

test("flangeAdmittance: far above cutoff the mouth is nearly matched", () => {
  const { re, im } = flangeAdmittance(1, 1, 25, table);
  assertClose(Math.hypot(re[0]!, im[0]! - 1), 0, { abs: 0.02, because: "a wide aperture radiates as a plane wave" });
});

test("bandAnalysis: open guide in a flange, near that of an open guide with a thin wall", () => {
  // Radius 13 mm, 40 mm long, 1.5 mm wall, 8.2 GHz, whole metal by an independent integral-equation program:
  // S11 = 0.1289 at 88.5°. The flange shields the back, which lowers the reflection of so narrow a guide by some hundredths.
  const guide = profileOf([
    [0, 13],
    [40, 13],
  ]);
  const { s11, powerBalance } = bandAnalysis(guide, { frequencies: [8.2e9], mouthAdmittance: "flange" });
  assertClose(Math.hypot(s11.re[0]!, s11.im[0]!), 0.1289, { abs: 0.03, because: "a flange is not a thin wall" });
  assertClose((Math.atan2(s11.im[0]!, s11.re[0]!) * 180) / Math.PI, 88.5, {
    abs: 3,
    because: "same plane of reflection",
  });
  assertClose(powerBalance[0]!, 0, { abs: 1e-11, because: "what isn't reflected is radiated" });
});

test("bandAnalysis: the flange moves a cone's S11 toward that of the whole metal", () => {
  // Cone 11 to 36 mm over 100 mm, 10 GHz, whole metal by an independent program: −0.02454 − j0.03577.
  const away = (mouthAdmittance: "none" | "flange"): number => {
    const { s11 } = bandAnalysis(profiles.smoothCone, { frequencies: [10e9], mouthAdmittance });
    return Math.hypot(s11.re[0]! + 0.02454, s11.im[0]! + 0.03577);
  };
  const [without, flanged] = [away("none"), away("flange")];
  expect(without).toBeGreaterThan(0.03);
  expect(flanged).toBeLessThan(without / 2);
});

test("bandAnalysis: a mouth that is neither is refused", () => {
  const options = { frequencies: [10e9], mouthAdmittance: "open" as "none" };
  expect(() => bandAnalysis(profiles.smoothCone, options)).toThrow(
    /mouthAdmittance must be "none" or "flange"; got open/,
  );
});
