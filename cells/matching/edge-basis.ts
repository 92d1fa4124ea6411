// Aperture fields with the behaviour of a right-angled metal edge, and their couplings to the modes of a guide.
//
// At the edge of a step (a wedge of 270° of free space) the field normal to it grows as d^(−1/3), the one along it falls as
// d^(2/3), d the distance (Meixner 1972). On the disk r = ρ/a ≤ 1 the functions are (1 − r²)^(−1/3) times Jacobi polynomials
// of r², combined so that only the normal component is singular. Their Hankel transforms are Bessel functions of order
// 2/3 + m (Sneddon 1966, section 2.1; Erdélyi, Tables of Integral Transforms II, 8.5), which leaves
//
//   n-th TE function   couples to TE modes alone   κ^(−5/3)·J_{2n+5/3}(κ)       n = 1, 2, …
//   n-th TM function   couples to TM modes alone   κ^(−2/3)·J_{2n+2/3}(κ)       n = 1, 2, …
//   the first function couples to both             (10/3)·κ^(−5/3)·J_{5/3}(κ), κ^(−2/3)·J_{2/3}(κ)
//
// with κ = χ·a/b for a mode of the guide of radius b ≥ a.

import { writeBesselThirds } from "../math/bessel-thirds.ts";
import type { RealMatrix } from "./couplings.ts";
import { isTE, type ModeTable } from "./mode-table.ts";

/** What the modes beyond those listed add, as the outer product of one vector for TE and one for TM, [count]. */
export interface ModeTail {
  te: Float64Array;
  tm: Float64Array;
}

/** The p-th function: its number among TE and among TM functions, −1 where it couples to none of them. */
interface EdgeFunction {
  te: number;
  tm: number;
}

/** Order of the functions: first, TE 1, TM 1, TE 2, TM 2, … */
function edgeFunctions(count: number): EdgeFunction[] {
  return Array.from({ length: count }, (_, p) => {
    if (p === 0) return { te: 0, tm: 0 };
    return p % 2 === 1 ? { te: (p + 1) / 2, tm: -1 } : { te: -1, tm: p / 2 };
  });
}

/** Scales that keep the functions' sizes alike; the first one's are in their true ratio. */
const teScale = (n: number): number => (n === 0 ? 10 / 3 : (n + 1) ** 2);
const tmScale = (n: number): number => n + 1;

/**
 * Couplings of the first `count` edge functions to the first `modeCount` modes of a guide, [modeCount × count].
 * @param ratio a/b, in (0, 1]
 */
export function edgeCouplings(ratio: number, count: number, modeCount: number, table: ModeTable): RealMatrix {
  const values = new Float64Array(modeCount * count);
  const functions = edgeFunctions(count);
  const orders = 2 + 2 * functions.reduce((most, { te, tm }) => Math.max(most, te, tm), 0);
  const bessel = new Float64Array(orders);
  for (let j = 0; j < modeCount; j++) {
    const kappa = table.chi[j]! * ratio;
    writeBesselThirds(kappa, orders, bessel);
    // κ^(−2/3), κ^(−5/3): a cube root is several times cheaper than a power.
    const root = Math.cbrt(kappa);
    const factor = (Math.PI * ratio * table.scale[j]!) / (root * root * (isTE(j) ? kappa : 1));
    const te = isTE(j);
    for (let p = 0; p < count; p++) {
      const n = te ? functions[p]!.te : functions[p]!.tm;
      if (n >= 0) values[j * count + p] = factor * (te ? teScale(n) * bessel[2 * n + 1]! : tmScale(n) * bessel[2 * n]!);
    }
  }
  return { rows: modeCount, columns: count, values };
}

/**
 * Transforms of the functions at one κ, without a guide's factor π·ratio·scale; or, with a tail's sum in place of κ, their
 * leading term for large κ, as `edgeTail`.
 */
export function edgeTransforms(kappa: number, count: number, tailSum?: number): ModeTail {
  const te = new Float64Array(count);
  const tm = new Float64Array(count);
  const functions = edgeFunctions(count);
  const orders = 2 + 2 * functions.reduce((most, each) => Math.max(most, each.te, each.tm), 0);
  const bessel = new Float64Array(orders);
  if (tailSum === undefined) writeBesselThirds(kappa, orders, bessel);
  const root = Math.cbrt(kappa);
  const asymptote = (n: number): number => Math.sqrt(tailSum ?? 0) * (n % 2 === 0 ? 1 : -1);
  functions.forEach((each, p) => {
    if (each.te >= 0) {
      te[p] =
        teScale(each.te) *
        (tailSum === undefined ? bessel[2 * each.te + 1]! / (root * root * kappa) : asymptote(each.te));
    }
    if (each.tm >= 0) {
      tm[p] = tmScale(each.tm) * (tailSum === undefined ? bessel[2 * each.tm]! / (root * root) : asymptote(each.tm));
    }
  });
  return { te, tm };
}

/**
 * What the modes beyond `modeCount` add to a sum over admittances: Σ M[p]M[q]·γ/k → te[p]·te[q]/(ka) and
 * Σ M[p]M[q]·k/γ → tm[p]·tm[q]·ka. The leading term of the couplings for large κ, summed as an integral with its oscillating
 * part.
 * @accuracy 1e-5 of the whole sum for the first function, 4e-3 for the ninth, from κ = 60 on (test/cells/matching/edge-basis)
 */
export function edgeTail(ratio: number, count: number, modeCount: number, table: ModeTable): ModeTail {
  const te = new Float64Array(count);
  const tm = new Float64Array(count);
  const even = modeCount % 2 === 0;
  const lastTE = table.chi[even ? modeCount - 2 : modeCount - 1]!;
  const lastTM = table.chi[even ? modeCount - 1 : modeCount - 2]!;
  const teSum = Math.sqrt(tailSum(ratio, lastTE, (5 * Math.PI) / 3 + Math.PI / 2));
  const tmSum = Math.sqrt(tailSum(ratio, lastTM, (2 * Math.PI) / 3 + Math.PI / 2));
  edgeFunctions(count).forEach((each, p) => {
    const sign = (n: number): number => (n % 2 === 0 ? 1 : -1);
    if (each.te >= 0) te[p] = teSum * teScale(each.te) * sign(each.te);
    if (each.tm >= 0) tm[p] = tmSum * tmScale(each.tm) * sign(each.tm);
    if (ratio === 1) {
      te[p]! *= atWallFactor(4 * (2 * each.te + 5 / 3) ** 2 - 8, lastTE);
      tm[p]! *= atWallFactor(4 * (2 * each.tm + 2 / 3) ** 2 - 4, lastTM);
    }
  });
  return { te, tm };
}

/**
 * At equal radii every mode meets the function at one phase, π/3 in the limit; this is its cosine there, with the next term
 * of the phase (excess/8κ), against the limit's ½. 1/κ is its mean over the tail's weight κ^(−7/3).
 */
function atWallFactor(excess: number, last: number): number {
  const meanInverse = 4 / 7 / (last + Math.PI / 2);
  return 2 * Math.cos(Math.PI / 3 - (excess * meanInverse) / 8);
}

/** Σ πρκ^(−7/3)·[1 + cos(2κ − φ)] over κ = ρ(χ_last + π), ρ(χ_last + 2π), … */
function tailSum(ratio: number, last: number, phase: number): number {
  const smooth = 0.75 * (ratio * (last + Math.PI / 2)) ** (-4 / 3);
  if (ratio === 1) return smooth / 2;
  const term = (n: number): number => Math.PI * ratio * (ratio * (last + n * Math.PI)) ** (-7 / 3);
  // Σ h_n zⁿ by parts, z = e^{2πiρ}: h_0/(1 − z) + Δh_0·z/(1 − z)² + Δ²h_0·z²/(1 − z)³
  const start = 2 * ratio * (last + Math.PI) - phase;
  const turn = 2 * Math.PI * ratio;
  const size = 2 * Math.sin(turn / 2);
  const [h0, h1, h2] = [term(1), term(2), term(3)];
  // 1/(1 − z) = e^{i(π − θ)/2}/(2 sin θ/2)
  const lean = (Math.PI - turn) / 2;
  const sum =
    (h0 * Math.cos(start + lean)) / size +
    ((h1 - h0) * Math.cos(start + turn + 2 * lean)) / size ** 2 +
    ((h2 - 2 * h1 + h0) * Math.cos(start + 2 * turn + 3 * lean)) / size ** 3;
  return smooth + sum;
}
