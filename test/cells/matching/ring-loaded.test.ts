import { expect, test } from "vitest";
import type { HornProfile } from "../../../cells/guide/horn-profile.ts";
import { ringCouplings, ringModes } from "../../../cells/matching/annular-modes.ts";
import { bandAnalysis } from "../../../cells/matching/index.ts";
import { modeTable } from "../../../cells/matching/mode-table.ts";
import { besselJPrime1, besselYPrime1 } from "../../../cells/math/bessel.ts";
import { assertClose } from "../../assert-close.ts";

const frequencies = [9e9, 10e9, 11e9];

interface Slot {
  /** m, how far the bottom reaches behind either wall */
  before: number;
  behind: number;
  /** m, radius from which it does */
  neck?: number;
  /** m, radius of the guide after it; 12 mm before it */
  after?: number;
}

/** A slot 2 mm wide and 22.5 mm in radius between two guides. */
function ringLoaded({ before, behind, neck = 0.0185, after = 0.014 }: Slot): HornProfile {
  const [bottom, opens, ends] = [0.0225, -0.012, -0.01];
  const points: [number, number][] = [
    [-0.03, 0.012],
    [opens, 0.012],
  ];
  if (before > 0) points.push([opens, neck], [opens - before, neck]);
  points.push([opens - before, bottom], [ends + behind, bottom]);
  if (behind > 0) points.push([ends + behind, neck], [ends, neck]);
  points.push([ends, after], [0, after]);
  return { z: points.map(([z]) => z), radius: points.map(([, radius]) => radius) };
}

const apart = (a: HornProfile, b: HornProfile): number => {
  const [p, q] = [bandAnalysis(a, { frequencies }), bandAnalysis(b, { frequencies })];
  return Math.max(...p.s11.re.map((re, i) => Math.hypot(re - q.s11.re[i]!, p.s11.im[i]! - q.s11.im[i]!)));
};

test("ringModes: the listed roots of the TE condition, radii 1 to 1.5", () => {
  const ring = { innerRadius: 0.01, outerRadius: 0.015 };
  const [first] = ringModes(ring, 1);
  const condition = (k: number): number =>
    besselJPrime1(k * 0.01) * besselYPrime1(k * 0.015) - besselYPrime1(k * 0.01) * besselJPrime1(k * 0.015);
  assertClose(condition(first!.cutoffNumber), 0, { abs: 1e-12, because: "a root to rounding" });
  // Marcuvitz 1951, section 2.4: the first root lies near twice over the sum of the radii.
  assertClose(first!.cutoffNumber, 2 / 0.025, { rel: 0.02, because: "mean circumference of one wavelength" });
});

test("ringCouplings: the modes of a ring, made of those of the guide, stay orthonormal", () => {
  const ring = { innerRadius: 0.018, outerRadius: 0.025 };
  const modes = ringModes(ring, 6);
  const { values } = ringCouplings(ring, modes, 2000, modeTable(2000));
  for (let i = 0; i < 6; i++) {
    for (let k = 0; k <= i; k++) {
      let sum = 0;
      for (let j = 0; j < 2000; j++) sum += values[j * 6 + i]! * values[j * 6 + k]!;
      assertClose(sum, i === k ? 1 : 0, { abs: 1.5e-3, because: "completeness; a jump at the neck falls as 1/n" });
    }
  }
});

test("bandAnalysis: a pocket without depth, or whose neck is the bottom, is a plain slot", () => {
  const plain = ringLoaded({ before: 0, behind: 0 });
  expect(apart(plain, ringLoaded({ before: 1e-6, behind: 0 }))).toBeLessThan(2e-3);
  expect(apart(plain, ringLoaded({ before: 1e-7, behind: 1e-7 }))).toBeLessThan(3e-4);
  expect(apart(plain, ringLoaded({ before: 1e-3, behind: 0, neck: 0.0224 }))).toBeLessThan(2e-2);
  expect(apart(plain, ringLoaded({ before: 1e-3, behind: 0 }))).toBeGreaterThan(0.1);
});

test("bandAnalysis: a ring-loaded slot keeps its power, and its error is no more than said", () => {
  for (const neck of [0.0185, 0.0155]) {
    const profile = ringLoaded({ before: 1e-3, behind: 5e-4, neck });
    const result = bandAnalysis(profile, { frequencies, level: { edgeFunctions: 11 } });
    const fine = bandAnalysis(profile, { frequencies, level: { edgeFunctions: 31 } });
    frequencies.forEach((_, f) => {
      assertClose(result.powerBalance[f]!, 0, { abs: 1e-11, because: "lossless" });
      const error = Math.hypot(result.s11.re[f]! - fine.s11.re[f]!, result.s11.im[f]! - fine.s11.im[f]!);
      expect(error).toBeLessThan(result.convergence.reflectionErrors[f]!);
    });
  }
});

test("bandAnalysis: a ring-loaded slot between equal guides doesn't know front from back", () => {
  const one = bandAnalysis(ringLoaded({ before: 8e-4, behind: 0, after: 0.012, neck: 0.016 }), { frequencies });
  const other = bandAnalysis(ringLoaded({ before: 0, behind: 8e-4, after: 0.012, neck: 0.016 }), { frequencies });
  frequencies.forEach((_, f) => {
    const size = ({ s11 }: typeof one): number => Math.hypot(s11.re[f]!, s11.im[f]!);
    assertClose(size(one), size(other), { abs: 1e-9, because: "mirror images: reciprocity" });
  });
});

test("bandAnalysis: z that falls elsewhere is refused, with the place", () => {
  const options = { frequencies };
  const slanted: HornProfile = { z: [-0.03, -0.012, -0.012, -0.014, 0], radius: [0.012, 0.012, 0.018, 0.02, 0.02] };
  expect(() => bandAnalysis(slanted, options)).toThrow(/must not fall .* got -14 mm after -12 mm at point 4/);
  const inBore = ringLoaded({ before: 1e-3, behind: 0, neck: 0.0115 });
  expect(() => bandAnalysis(inBore, options)).toThrow(/pocket at z = -12 mm/);
});
