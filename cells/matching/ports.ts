// The ports of a horn closed by what is outside: a small complex system at each frequency.

import { type Complex, type ComplexVector, complexVector } from "../math/complex.ts";
import { solveComplex } from "./complex-solve.ts";

export interface Ports {
  /** [n × n] real, as the elimination leaves it */
  impedance: Float64Array;
  /** jη0·Y of each port's matched guide */
  loads: Complex[];
  /** port at which a wave of unit voltage comes in */
  driven: number;
  /** the real admittance that the elimination already holds at every port */
  inside: number;
  /** jη0·Y that the first ports see together, in place of their matched guides, [m × m] */
  together?: ComplexVector;
}

/** v = Z·i inside, i = drive − Y·v outside. */
export function solvePorts({ impedance, loads, driven, inside, together }: Ports): {
  voltage: ComplexVector;
  current: ComplexVector;
} {
  const n = loads.length;
  const outside = complexVector(n * n);
  loads.forEach(({ re, im }, p) => {
    outside.re[p * n + p] = re;
    outside.im[p * n + p] = im;
  });
  const m = together ? Math.round(Math.sqrt(together.re.length)) : 0;
  for (let p = 0; p < m; p++) {
    for (let q = 0; q < m; q++) {
      outside.re[p * n + q] = together!.re[p * m + q]!;
      outside.im[p * n + q] = together!.im[p * m + q]!;
    }
  }
  for (let p = 0; p < n; p++) outside.re[p * n + p]! -= inside;
  // (1 + Z·(Y − inside))·v = 2·Z·y_driven
  const matrix = complexVector(n * n);
  const right = complexVector(n);
  for (let p = 0; p < n; p++) {
    for (let k = 0; k < n; k++) {
      const z = impedance[p * n + k]!;
      if (z === 0) continue;
      for (let q = 0; q < n; q++) {
        matrix.re[p * n + q]! += z * outside.re[k * n + q]!;
        matrix.im[p * n + q]! += z * outside.im[k * n + q]!;
      }
    }
    matrix.re[p * n + p]! += 1;
    right.re[p] = 2 * impedance[p * n + driven]! * loads[driven]!.re;
    right.im[p] = 2 * impedance[p * n + driven]! * loads[driven]!.im;
  }
  const voltage = solveComplex(matrix, right, n, 1);
  const current = complexVector(n);
  current.re[driven] = 2 * loads[driven]!.re;
  current.im[driven] = 2 * loads[driven]!.im;
  for (let p = 0; p < n; p++) {
    for (let q = 0; q < n; q++) {
      const [a, b] = [outside.re[p * n + q]!, outside.im[p * n + q]!];
      current.re[p]! -= a * voltage.re[q]! - b * voltage.im[q]!;
      current.im[p]! -= a * voltage.im[q]! + b * voltage.re[q]!;
    }
  }
  return { voltage, current };
}
