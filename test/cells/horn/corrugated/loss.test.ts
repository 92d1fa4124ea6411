import { describe, expect, test } from "vitest";
import { vacuumImpedance } from "../../../../cells/constants.ts";
import { type CorrugatedWall, hybridMode } from "../../../../cells/guide/hybrid.ts";
import { wallCurrents } from "../../../../cells/horn/corrugated/loss.ts";
import { corrugatedHorn, ohmicLossDb, type RealizableHorn } from "../../../../cells/horn/index.ts";
import { besselJ1, besselJPrime1, besselY1, besselYPrime1 } from "../../../../cells/math/bessel.ts";
import { integrate } from "../../../../cells/math/quadrature.ts";
import { assertClose } from "../../../assert-close.ts";
import { askedBy, xBand } from "../asked.ts";

const frequency = 10e9;
const k = (2 * Math.PI * frequency) / 299_792_458;
const [pitch, slotWidth] = [4e-3, 3e-3];

const betaOf = (wall: CorrugatedWall): number => hybridMode("HE11", wall, frequency)!.phaseConstant;
/** central difference of β over one dimension of the wall */
function slope(wall: CorrugatedWall, change: (by: number) => Partial<CorrugatedWall>, step: number): number {
  return (betaOf({ ...wall, ...change(step) }) - betaOf({ ...wall, ...change(-step) })) / (2 * step);
}

describe("wallCurrents", () => {
  // A wall that recedes by n changes β by n·k/(4η0 P)·∫(|η0 H|² − |E|²) dl (perturbation of a guide's wall: Slater 1946; the
  // incremental-inductance rule of Wheeler 1942 where E has no part; both from memory). The dispersion knows nothing of the currents' formulas.
  test.each([
    [20e-3, 7.9e-3],
    [38e-3, 7.9e-3],
    [13e-3, 12.8e-3],
    [30e-3, 9.5e-3],
  ])("slot bottom, %f m with slots of %f m", (innerRadius, depth) => {
    const wall = { innerRadius, depth, slotFill: slotWidth / pitch };
    const mode = hybridMode("HE11", wall, frequency)!;
    const { bottom } = wallCurrents(mode, wall, { pitch, slotWidth });
    const recession = slope(wall, (by) => ({ depth: depth + by }), 1e-7);
    assertClose(bottom, (2 * pitch * vacuumImpedance * recession) / k, { rel: 1e-5, because: "central difference" });
  });

  test.each([
    [20e-3, 7.9e-3],
    [38e-3, 7.9e-3],
    [13e-3, 12.8e-3],
  ])("slot faces, %f m with slots of %f m", (innerRadius, depth) => {
    const wall = { innerRadius, depth, slotFill: slotWidth / pitch };
    const mode = hybridMode("HE11", wall, frequency)!;
    const { faces } = wallCurrents(mode, wall, { pitch, slotWidth });
    // share of E² to H² on the faces, from the slot's own standing wave
    const b = innerRadius + depth;
    const s = (rho: number): number => besselJ1(k * rho) * besselY1(k * b) - besselJ1(k * b) * besselY1(k * rho);
    const slopeOfS = (rho: number): number =>
      besselJPrime1(k * rho) * besselY1(k * b) - besselJ1(k * b) * besselYPrime1(k * rho);
    const magnetic = integrate((r) => (slopeOfS(r) ** 2 + (s(r) / (k * r)) ** 2) * r, innerRadius, b, 40);
    const electric = integrate((r) => s(r) ** 2 * r, innerRadius, b, 40);
    // both faces recede by n: the slot widens by 2n
    const recession = slope(wall, (by) => ({ slotFill: (slotWidth + 2 * by) / pitch }), 1e-7);
    const expected = (2 * pitch * vacuumImpedance * recession) / k;
    assertClose(faces * (1 - electric / magnetic), expected, {
      rel: 1e-4,
      because: "central difference, 8 Gauss points",
    });
  });
});

describe("ohmic loss of a corrugated horn", () => {
  function built(fOverD: number): RealizableHorn {
    const horn = corrugatedHorn(askedBy(fOverD, ...xBand));
    if (!horn.feasible) throw new Error(horn.reason);
    return horn;
  }

  test("hundredths of a decibel at most, with the root of the resistivity", () => {
    const horn = built(0.8);
    const aluminium = ohmicLossDb(horn, 8.15e9, 3.8e7);
    expect(aluminium).toBeGreaterThan(1e-3);
    expect(aluminium).toBeLessThan(0.03);
    assertClose(ohmicLossDb(horn, 8.15e9, 3.8e7 / 4), 2 * aluminium, { rel: 1e-12, because: "Rs ∝ 1/√σ" });
  });

  test("a long horn's sampled slots stand for all", () => {
    // 96 slots, nine of them sampled: against every slot by hand
    const horn = built(1.5);
    const geometry = horn.geometry as {
      corrugations: { innerRadius: number; depth: number }[];
      pitch: number;
      slotWidth: number;
    };
    const loss = ohmicLossDb(horn, 8.15e9, 3.8e7);
    const few = { ...horn, geometry: { ...geometry, corrugations: geometry.corrugations.slice(0, 15) } };
    const nineOnly = ohmicLossDb(few as RealizableHorn, 8.15e9, 3.8e7);
    let sum = nineOnly;
    for (let i = 15; i < geometry.corrugations.length; i += 9) {
      const window = geometry.corrugations.slice(i, i + 9);
      // six dummies for the converter's place, taken off again
      const dummies = Array.from({ length: 6 }, () => window[0]!);
      const withDummies = {
        ...horn,
        geometry: { ...geometry, throatLength: 0, corrugations: [...dummies, ...window] },
      };
      const dummiesOnly = { ...horn, geometry: { ...geometry, throatLength: 0, corrugations: dummies } };
      sum +=
        ohmicLossDb(withDummies as RealizableHorn, 8.15e9, 3.8e7) -
        ohmicLossDb(dummiesOnly as RealizableHorn, 8.15e9, 3.8e7);
    }
    assertClose(loss, sum, { rel: 0.01, because: "Simpson's rule over a smooth fall" });
  });
});
