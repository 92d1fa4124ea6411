// Couplings of a smooth taper: what one small step contributes for each unit of ln(radius), and its exponential.

import type { RealMatrix } from "./couplings.ts";
import { isTE, type ModeTable } from "./mode-table.ts";

/**
 * T = dC/d ln(b/a) of `couplings` at equal radii: the same for every taper.
 *
 *   TE→TE  T[j, i] = π·s_i·s_j·χ_i·χ_j·(1 − 1/χ_j²)·w_i·w_j/(χ_i² − χ_j²),   T[i, i] = −1/(χ_i² − 1)
 *   TM→TM  T[j, i] = −π·s_i·s_j·χ_j²·w_i·w_j/(χ_j² − χ_i²),                  T[i, i] = −1
 *   TE→TM  T[j, i] = −π·s_i·s_j·w_i·w_j/χ_i,                                 TM→TE 0
 *
 * s and w as in the mode table. Source: derivative of the closed-form couplings; Reiter 1959 and Solymar 1959 give the
 * same equations for power waves.
 */
export function taperGenerator(count: number, { chi, scale, wall }: ModeTable): RealMatrix {
  const values = new Float64Array(count * count);
  for (let j = 0; j < count; j++) {
    const outer = Math.PI * scale[j]! * wall[j]!;
    const square = chi[j]! * chi[j]!;
    for (let i = 0; i < count; i++) {
      const pair = outer * scale[i]! * wall[i]!;
      const alpha = chi[i]!;
      let value = 0;
      if (i === j) value = isTE(j) ? -1 / (square - 1) : -1;
      else if (isTE(j) && isTE(i)) value = (pair * alpha * chi[j]! * (1 - 1 / square)) / (alpha * alpha - square);
      else if (!isTE(j) && !isTE(i)) value = (-pair * square) / (square - alpha * alpha);
      else if (!isTE(j)) value = -pair / alpha;
      values[j * count + i] = value;
    }
  }
  return { rows: count, columns: count, values };
}

/**
 * exp(T·logRatio): V_large = exp(T·ln(b/a))·V_small across a piece of smooth taper seen as one step. Unlike the truncated
 * step couplings, two of them in a row are exactly one of twice the length, so that a staircase converges quadratically.
 */
export function taperCouplings(generator: RealMatrix, logRatio: number): RealMatrix {
  const n = generator.rows;
  let norm = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += Math.abs(generator.values[i * n + j]!);
    norm = Math.max(norm, sum * Math.abs(logRatio));
  }
  // Scaling and squaring; ten terms leave 0.5¹¹/11! = 1e-11 of the first term, divided further by the squarings' start.
  const squarings = Math.max(0, Math.ceil(Math.log2(Math.max(norm, 1e-300) / 0.25)));
  const factor = logRatio / 2 ** squarings;
  let power = identity(n);
  let sum = identity(n);
  for (let k = 1; k <= 10; k++) {
    power = product(power, generator.values, n);
    for (let i = 0; i < power.length; i++) {
      power[i]! *= factor / k;
      sum[i]! += power[i]!;
    }
  }
  for (let k = 0; k < squarings; k++) sum = product(sum, sum, n);
  return { rows: n, columns: n, values: sum };
}

function identity(n: number): Float64Array {
  const values = new Float64Array(n * n);
  for (let i = 0; i < n; i++) values[i * n + i] = 1;
  return values;
}

function product(a: Float64Array, b: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const factor = a[i * n + k]!;
      if (factor === 0) continue;
      for (let j = 0; j < n; j++) out[i * n + j]! += factor * b[k * n + j]!;
    }
  }
  return out;
}
