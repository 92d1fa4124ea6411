import { describe, expect, test } from "vitest";
import { modeField, TE11, TM11 } from "../../../../cells/guide/mode.ts";
import { stepCoupling, stepLaunch } from "../../../../cells/horn/dual-mode/step.ts";
import { gaussLegendre } from "../../../../cells/math/quadrature.ts";
import { assertClose } from "../../../assert-close.ts";

describe("stepCoupling", () => {
  /** ∫ e·e′ dS over the narrow guide by Gauss in ρ and exact sampling in φ (cos² and sin² only). */
  function overlap(narrow: typeof TE11, wide: typeof TE11, a: number, b: number): number {
    const { nodes, weights } = gaussLegendre(60);
    let sum = 0;
    for (let i = 0; i < nodes.length; i++) {
      const rho = (a * (1 + nodes[i]!)) / 2;
      for (let j = 0; j < 8; j++) {
        const phi = (Math.PI * (j + 0.5)) / 4;
        const e = modeField(narrow, a, rho, phi);
        const f = modeField(wide, b, rho, phi);
        sum += ((weights[i]! * a) / 2) * rho * (Math.PI / 4) * (e.eRho * f.eRho + e.ePhi * f.ePhi);
      }
    }
    return sum;
  }

  test("overlaps in closed form are the integrals of the profiles", () => {
    const [a, b] = [15e-3, 19.6e-3];
    const { onTe11, onTm11 } = stepCoupling(a, b);
    const close = { abs: 1e-12, because: "60 Gauss points on smooth profiles" };
    for (let n = 1; n <= 6; n++) {
      assertClose(onTe11[n - 1]!, overlap(TE11, { family: "TE", m: 1, n }, a, b), close);
      assertClose(onTe11[40 + n - 1]!, overlap(TE11, { family: "TM", m: 1, n }, a, b), close);
      assertClose(onTm11[n - 1]!, overlap(TM11, { family: "TE", m: 1, n }, a, b), close);
      assertClose(onTm11[40 + n - 1]!, overlap(TM11, { family: "TM", m: 1, n }, a, b), close);
    }
  });

  test("the wide guide's modes hold the whole of each function", () => {
    // Parseval: Σ overlap² → ∫|e|² = 1; the tail of 40 pairs falls as 1/n where the function jumps at the edge.
    const { onTe11, onTm11 } = stepCoupling(15e-3, 19.6e-3);
    const sum = (overlaps: Float64Array): number => overlaps.reduce((total, c) => total + c * c, 0);
    for (const function_ of [onTe11, onTm11]) {
      expect(sum(function_)).toBeLessThan(1);
      assertClose(sum(function_), 1, { abs: 0.02, because: "tail of a function that jumps at the edge" });
    }
  });

  test("refuses radii for which two functions don't describe the opening", () => {
    expect(() => stepCoupling(15e-3, 15.1e-3)).toThrow(/narrow over wide radius must be .*at most 0\.98/);
    expect(() => stepCoupling(10e-3, 20e-3)).toThrow(RangeError);
    expect(() => stepLaunch(stepCoupling(15e-3, 19.6e-3), 5e9)).toThrow(/TE11 must travel before the step; at 5 GHz/);
  });
});

describe("stepLaunch", () => {
  // Converged mode matching (1200 and 1568 modes) by an independent program, 10 GHz, √Z-normalized waves of TE11 incoming;
  // not a measurement.
  test("against mode matching: 15.0 to 19.6 mm, TM11 travels", () => {
    const launch = stepLaunch(stepCoupling(15e-3, 19.6e-3), 10e9);
    const te11 = Math.hypot(0.871640717171327, -0.06429822844233597);
    const tm11 = Math.hypot(0.3982516496647964, 0.26799212990808996);
    const lead =
      Math.atan2(0.26799212990808996, 0.3982516496647964) - Math.atan2(-0.06429822844233597, 0.871640717171327);
    assertClose(Math.hypot(launch.te11.re, launch.te11.im), te11, { rel: 0.02, because: "two functions at the step" });
    assertClose(launch.ratio, tm11 / te11, { rel: 0.08, because: "two functions at the step; no corner singularity" });
    assertClose(launch.phaseLead, lead, { abs: 0.07, because: "4°: two functions at the step" });
  });

  test("against mode matching: 11.0 to 14.0 mm, TM11 cut off", () => {
    const launch = stepLaunch(stepCoupling(11e-3, 14e-3), 10e9);
    assertClose(launch.te11.re, 0.9998516934775981, { abs: 1e-3, because: "two functions at the step" });
    assertClose(launch.te11.im, 0.009637433077180827, { abs: 0.01, because: "two functions at the step" });
    assertClose(launch.tm11.re, 0.1934404370090655, { rel: 0.08, because: "two functions at the step" });
    assertClose(launch.tm11.im, 0.19535668219484636, { rel: 0.08, because: "two functions at the step" });
  });

  test("never launches more power than comes in", () => {
    for (const ratio of [0.62, 0.7, 0.8, 0.9, 0.97])
      for (const frequency of [9.5e9, 10e9, 11e9, 12e9]) {
        const { te11, tm11 } = stepLaunch(stepCoupling(ratio * 19.6e-3, 19.6e-3), frequency);
        const power = te11.re ** 2 + te11.im ** 2 + tm11.re ** 2 + tm11.im ** 2;
        expect(power).toBeLessThanOrEqual(1 + 1e-12);
      }
  });

  test("a smaller step launches less", () => {
    const ratios = [0.65, 0.75, 0.85, 0.95].map((x) => stepLaunch(stepCoupling(x * 20e-3, 20e-3), 10e9).ratio);
    expect(ratios).toEqual([...ratios].sort((p, q) => q - p));
  });
});
