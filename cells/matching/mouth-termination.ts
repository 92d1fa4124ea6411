// A mouth that reflects: its admittance at the last aperture, and the waves that reach it.

import { type ComplexVector, complexVector } from "../math/complex.ts";
import type { Guide } from "./chain.ts";
import { solveComplex } from "./complex-solve.ts";
import { guardedGammaSquared, matchedAdmittance, writeLine } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { flangeAdmittance } from "./mouth-flange.ts";

export interface MouthTermination {
  /** jη0·Y that the last aperture sees of the port modes beyond it, [ports × ports] */
  admittance: ComplexVector;
  /** forward voltage of each port mode at the mouth, for port voltages at the last aperture */
  forward(voltage: ComplexVector): ComplexVector;
}

/** The last guide with a flange at its end, for the modes that are ports. Evanescent ones decay on the way. */
export function flangedMouth(last: Guide, ports: number, k: number, table: ModeTable): MouthTermination {
  const atMouth = flangeAdmittance(last.radius, ports, k, table);
  const line = { self: new Float64Array(ports), transfer: new Float64Array(ports), selfAt: 0, transferAt: 0 };
  const gammaSquared = (n: number): number => guardedGammaSquared(table.chi[n]! / last.radius, k);
  const here = last.length > 0;
  if (here) for (let n = 0; n < ports; n++) writeLine(isTE(n), gammaSquared(n), k, last.length, line, n);
  // Voltages at the mouth for those at the aperture: (A + Y)·V = B·v, with the line's self and transfer admittances.
  const carried = complexVector(ports * ports);
  for (let n = 0; n < ports; n++) carried.re[n * ports + n] = here ? line.transfer[n]! : 1;
  const sum: ComplexVector = { re: atMouth.re.slice(), im: atMouth.im.slice() };
  for (let n = 0; n < ports; n++) sum.re[n * ports + n]! += line.self[n]!;
  const across = here ? solveComplex(sum, carried, ports, ports) : carried;
  // Seen from the aperture: A − B·(A + Y)⁻¹·B
  const admittance = here ? complexVector(ports * ports) : atMouth;
  for (let m = 0; here && m < ports; m++) {
    for (let n = 0; n < ports; n++) {
      admittance.re[m * ports + n] = (m === n ? line.self[n]! : 0) - line.transfer[m]! * across.re[m * ports + n]!;
      admittance.im[m * ports + n] = -line.transfer[m]! * across.im[m * ports + n]!;
    }
  }
  return {
    admittance,
    forward(voltage) {
      const there = multiplied(across, voltage, ports);
      const current = multiplied(atMouth, there, ports);
      const out = complexVector(ports);
      for (let n = 0; n < ports; n++) {
        // V⁺ = (V + I/y)/2
        const { re, im } = matchedAdmittance(isTE(n), gammaSquared(n), k);
        const size = re * re + im * im;
        out.re[n] = (there.re[n]! + (current.re[n]! * re + current.im[n]! * im) / size) / 2;
        out.im[n] = (there.im[n]! + (current.im[n]! * re - current.re[n]! * im) / size) / 2;
      }
      return out;
    },
  };
}

export function multiplied(matrix: ComplexVector, vector: ComplexVector, n: number): ComplexVector {
  const out = complexVector(n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const [a, b] = [matrix.re[i * n + j]!, matrix.im[i * n + j]!];
      out.re[i]! += a * vector.re[j]! - b * vector.im[j]!;
      out.im[i]! += a * vector.im[j]! + b * vector.re[j]!;
    }
  }
  return out;
}
