// Coupling integrals of two guides' modes over the smaller cross-section: closed form, real, without frequency.

import { requireInteger, requirePositive } from "../check.ts";
import { isTE, type ModeTable, modeTable, wallValues } from "./mode-table.ts";

/** A matrix without frequency: rows by columns, row-major. */
export interface RealMatrix {
  rows: number;
  columns: number;
  values: Float64Array;
}

/** Below this distance |χ_small − χ_large·a/b| the quotient has lost 1e-13 and the Taylor series takes over. */
const taylorBelow = 2e-3;

/**
 * Couplings C[j, i] = ∫ e_i·E_j dS over the smaller guide's cross-section, of unit mode fields (∫|e|² dS = 1 each over its
 * own guide, E_x > 0 on the axis): e_i a mode of the guide of radius a, E_j of the guide of radius b ≥ a.
 *
 *   with α = χ_i, β = χ_j·a/b, s the profile scale:  C = ½π·s_i·s_j·(a/b)·I
 *   TE→TE  I = 2α·J1(α)·J1′(β)/(α² − β²)        TM→TM  I = 2β·J1(β)·J1′(α)/(β² − α²)
 *   TE→TM  I = 2·J1(α)·J1(β)/(αβ)               TM→TE  I = 0
 *
 * The field that crosses the step obeys V_large = C·V_small and I_small = Cᵀ·I_large. Modes in both guides count by rising
 * cutoff: TE11, TM11, TE12, …
 *
 * @param smallRadius m
 * @param largeRadius m, not below smallRadius
 * @returns [largeCount × smallCount]; the unit matrix at equal radii
 * @throws {RangeError} a radius not positive, the larger below the smaller, a count not whole
 * @accuracy 1e-13 absolute against quadrature (test/cells/matching/couplings)
 * @source Wexler, IEEE Trans. MTT-15 (1967); James, IEEE Trans. MTT-29 (1981), 1059–1066; by Green's theorem
 */
export function junctionCouplings(smallRadius: number, largeRadius: number, counts: ModeCounts): RealMatrix {
  requirePositive("junctionCouplings: smallRadius", smallRadius, "m");
  requirePositive("junctionCouplings: largeRadius", largeRadius, "m");
  requireInteger("junctionCouplings: smallCount", counts.smallCount, { min: 1 });
  requireInteger("junctionCouplings: largeCount", counts.largeCount, { min: 1 });
  if (largeRadius < smallRadius) {
    throw new RangeError(
      `junctionCouplings: largeRadius must be at least the smaller radius, ${smallRadius * 1e3} mm; got ${largeRadius * 1e3} mm`,
    );
  }
  return couplings(smallRadius / largeRadius, counts, modeTable(Math.max(counts.smallCount, counts.largeCount)));
}

export interface ModeCounts {
  smallCount: number;
  largeCount: number;
}

/** `junctionCouplings` by the ratio of radii, 0 < ratio ≤ 1, with a table that holds enough modes. Unchecked. */
export function couplings(ratio: number, { smallCount, largeCount }: ModeCounts, table: ModeTable): RealMatrix {
  const values = new Float64Array(largeCount * smallCount);
  if (ratio === 1) {
    for (let i = 0; i < Math.min(smallCount, largeCount); i++) values[i * smallCount + i] = 1;
    return { rows: largeCount, columns: smallCount, values };
  }
  const { chi, scale, wall } = table;
  const factor = Math.PI * ratio;
  for (let j = 0; j < largeCount; j++) {
    const beta = chi[j]! * ratio;
    const { value, slope } = wallValues(beta);
    const outer = factor * scale[j]!;
    const row = j * smallCount;
    if (isTE(j)) {
      for (let i = 0; i < smallCount; i += 2) {
        const alpha = chi[i]!;
        const delta = beta - alpha;
        const quotient =
          Math.abs(delta) < taylorBelow
            ? taylorQuotient(alpha, delta, { value: wall[i]!, slope: 0 }, 1)
            : slope / delta;
        values[row + i] = (-outer * scale[i]! * alpha * wall[i]! * quotient) / (alpha + beta);
      }
    } else {
      const toTE = (outer * value) / beta;
      for (let i = 0; i < smallCount; i++) {
        const alpha = chi[i]!;
        if (isTE(i)) {
          values[row + i] = (toTE * scale[i]! * wall[i]!) / alpha;
          continue;
        }
        const delta = beta - alpha;
        const quotient =
          Math.abs(delta) < taylorBelow
            ? taylorQuotient(alpha, delta, { value: 0, slope: wall[i]! }, 0)
            : value / delta;
        values[row + i] = (outer * scale[i]! * beta * wall[i]! * quotient) / (alpha + beta);
      }
    }
  }
  return { rows: largeCount, columns: smallCount, values };
}

/**
 * J1(α + δ)/δ (order 0) or J1′(α + δ)/δ (order 1) where the numerator vanishes at δ = 0: Taylor's series, the derivatives
 * by differentiating Bessel's equation. Six terms: the next is below 1e-17 for |δ| < 2e-3.
 */
function taylorQuotient(alpha: number, delta: number, at: { value: number; slope: number }, order: 0 | 1): number {
  // x²y⁽ⁿ⁺²⁾ = −(2n+1)x·y⁽ⁿ⁺¹⁾ − (x² + n² − 1)y⁽ⁿ⁾ − 2n·x·y⁽ⁿ⁻¹⁾ − n(n−1)y⁽ⁿ⁻²⁾
  const y = [at.value, at.slope];
  const square = alpha * alpha;
  for (let n = 0; n + 2 <= 6 + order; n++) {
    const before = n >= 1 ? 2 * n * alpha * y[n - 1]! : 0;
    const twoBefore = n >= 2 ? n * (n - 1) * y[n - 2]! : 0;
    y.push((-(2 * n + 1) * alpha * y[n + 1]! - (square + n * n - 1) * y[n]! - before - twoBefore) / square);
  }
  let sum = 0;
  for (let n = 6; n >= 1; n--) sum = (sum * delta + y[n + order]!) / n;
  return sum;
}
