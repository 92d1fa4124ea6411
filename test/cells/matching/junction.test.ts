import { expect, test } from "vitest";
import { stepScattering } from "../../../cells/matching/index.ts";
import type { ComplexVector } from "../../../cells/math/complex.ts";
import { assertClose, assertComplexClose } from "../../assert-close.ts";
import { readReference } from "../../references/read.ts";

interface ListedStep {
  a1: number;
  a2: number;
  S11: Record<string, [number, number]>;
  S21: Record<string, [number, number]>;
}

const names = ["TE11", "TM11", "TE12", "TM12", "TE13", "TM13"];
const { "15_19.6": wide, "11_14": narrow } = JSON.parse(readReference("junctions.json")) as Record<string, ListedStep>;
const at = ({ re, im }: ComplexVector, i: number) => ({ re: re[i]!, im: im[i]! });

for (const step of [wide!, narrow!]) {
  test(`stepScattering: ${step.a1} to ${step.a2} mm against an independent program`, () => {
    const s = stepScattering({ leftRadius: step.a1 / 1e3, rightRadius: step.a2 / 1e3, frequency: 10e9 });
    names.forEach((name, i) => {
      const [backRe, backIm] = step.S11[name]!;
      const [onRe, onIm] = step.S21[name]!;
      const because = `1200 modes listed, two formulations within 5e-6; ${name}`;
      assertComplexClose(at(s.reflected, i), { re: backRe, im: backIm }, { abs: 5e-6, because });
      assertComplexClose(at(s.transmitted, i), { re: onRe, im: onIm }, { abs: 5e-6, because });
    });
    assertClose(s.powerError, 0, { abs: 1e-12, because: "lossless; rounding of 21 unknowns" });
  });

  test(`stepScattering: ${step.a1} to ${step.a2} mm, fewer functions are seen`, () => {
    const miss = (functions: number): number => {
      const s = stepScattering({ leftRadius: step.a1 / 1e3, rightRadius: step.a2 / 1e3, frequency: 10e9, functions });
      const [re, im] = step.S21.TE11!;
      return Math.hypot(s.transmitted.re[0]! - re, s.transmitted.im[0]! - im);
    };
    const [three, five, nine] = [miss(3), miss(5), miss(9)];
    expect(three).toBeGreaterThan(3 * five);
    expect(three).toBeGreaterThan(1e-5);
    expect(nine).toBeLessThan(1e-5);
  });
}

test("stepScattering: reciprocity between the two sides, travelling modes", () => {
  const sides = { frequency: 12e9, functions: 15 };
  const forth = [0, 1].map((incident) =>
    stepScattering({ ...sides, leftRadius: 0.017, rightRadius: 0.0235, incident }),
  );
  const back = [0, 1].map((incident) => stepScattering({ ...sides, leftRadius: 0.0235, rightRadius: 0.017, incident }));
  const because = "one symmetric real matrix serves both directions";
  for (const i of [0, 1]) {
    for (const j of [0, 1]) {
      assertComplexClose(at(forth[i]!.transmitted, j), at(back[j]!.transmitted, i), { abs: 1e-12, because });
    }
  }
  assertComplexClose(at(forth[0]!.reflected, 1), at(forth[1]!.reflected, 0), { abs: 1e-12, because });
  assertComplexClose(at(back[0]!.reflected, 1), at(back[1]!.reflected, 0), { abs: 1e-12, because });
});

test("stepScattering: a step of vanishing height reflects in proportion to it", () => {
  const slope = (height: number): number =>
    stepScattering({ leftRadius: 0.012, rightRadius: 0.012 + height, frequency: 10e9 }).reflected.re[0]! / height;
  // First order in the height: half the change of ln Z, less T11 of the taper's coupling; the rest is reactive.
  const chi = 1.8411837813406593;
  const cutoffSquared = (chi / 0.012) ** 2;
  const betaSquared = ((2 * Math.PI * 10e9) / 299792458) ** 2 - cutoffSquared;
  const expected = (-cutoffSquared / betaSquared / 2 + 1 / (chi * chi - 1)) / 0.012;
  assertClose(slope(1e-7), expected, { rel: 1e-3, because: "Solymar 1959, reflection of a taper; 1e-7/0.012 and χ²" });
  assertClose(slope(1e-6), expected, { rel: 2e-3, because: "linear in the height; second order is 1e-3 here" });
});

test("stepScattering: a mode below its cutoff can't come in", () => {
  expect(() => stepScattering({ leftRadius: 0.008, rightRadius: 0.012, frequency: 10e9 })).toThrow(
    /TE11 cutoff on the left/,
  );
});
