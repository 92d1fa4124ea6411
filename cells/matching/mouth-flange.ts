// The mouth in an infinite flat flange: what the half space before it answers to the modes of the last guide.
//
// The field in the mouth is expanded in the same edge functions as at any step: the rim is a right-angled edge too. A half
// space is a guide of infinite radius, whose modes are plane waves of every transverse number κ/a, so that
//   Y[p, q] = π∫₀^∞ κ·[M_p·M_q·y_TE]_TE + κ·[M_p·M_q·y_TM]_TM dκ.

import { type ComplexVector, complexVector } from "../math/complex.ts";
import { gaussLegendre } from "../math/quadrature.ts";
import { solveComplex } from "./complex-solve.ts";
import { edgeCouplings, edgeTail, edgeTransforms } from "./edge-basis.ts";
import { guardedGammaSquared, matchedAdmittance } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";

/** Modes of the guide taken along at the flange, and where the integral over κ passes into its tail. */
const guideModes = 60;
const reach = 70;

/** κ and weights: fine about the branch point at κ = ka, where waves go from travelling to evanescent. */
const travellingNodes = gaussLegendre(32);
const evanescentNodes = gaussLegendre(96);

/** jη0·Y of the half space in edge functions on a disk, [count × count]. @param ka wave number times the mouth's radius */
export function halfSpaceAdmittance(count: number, ka: number): ComplexVector {
  const out = complexVector(count * count);
  const add = (part: Float64Array, kappa: number, forTE: number, forTM: number): void => {
    const { te, tm } = edgeTransforms(kappa, count);
    for (let p = 0; p < count; p++) {
      for (let q = 0; q < count; q++) {
        part[p * count + q]! += Math.PI * kappa * (forTE * te[p]! * te[q]! + forTM * tm[p]! * tm[q]!);
      }
    }
  };
  // κ = ka·sin u: y_TE = j cos u, y_TM = j/cos u, dκ = ka·cos u du
  travellingNodes.nodes.forEach((node, i) => {
    const u = ((1 + node) * Math.PI) / 4;
    const weight = (travellingNodes.weights[i]! * Math.PI) / 4;
    add(out.im, ka * Math.sin(u), weight * ka * Math.cos(u) ** 2, weight * ka);
  });
  // κ = ka·cosh v: y_TE = sinh v, y_TM = −1/sinh v, dκ = ka·sinh v dv
  const last = Math.acosh(Math.max(reach, 3 * ka) / ka);
  evanescentNodes.nodes.forEach((node, i) => {
    const v = ((1 + node) * last) / 2;
    const weight = (evanescentNodes.weights[i]! * last) / 2;
    add(out.re, ka * Math.cosh(v), weight * ka * Math.sinh(v) ** 2, -weight * ka);
  });
  const { te, tm } = edgeTransforms(0, count, 0.75 * Math.max(reach, 3 * ka) ** (-4 / 3));
  for (let p = 0; p < count; p++) {
    for (let q = 0; q < count; q++) {
      out.re[p * count + q]! += (te[p]! * te[q]!) / ka - tm[p]! * tm[q]! * ka;
    }
  }
  return out;
}

/**
 * Admittance of a circular mouth in an infinite flange, TE1n and TM1n together.
 *
 * jη0·Y that the flanged mouth shows the first `ports` modes of its guide, [ports × ports]; the further modes, excited by the
 * mouth itself, are matched behind it.
 * @accuracy power to rounding; against the whole metal of an open guide with a thin wall 0.03 in S11 (test/cells/matching/mouth-flange)
 * @source  Bailey & Swift, IEEE Trans. AP-16 (1968), 386–391, input admittance of a circular aperture in a flange (from memory);
 *          the expansion by edge functions is our own
 */
export function flangeAdmittance(radius: number, ports: number, k: number, table: ModeTable): ComplexVector {
  const count = Math.max(11, ports + 6);
  const y = halfSpaceAdmittance(count, k * radius);
  const { values } = edgeCouplings(1, count, guideModes, table);
  for (let n = ports; n < guideModes; n++) {
    const { re, im } = matchedAdmittance(isTE(n), guardedGammaSquared(table.chi[n]! / radius, k), k);
    for (let p = 0; p < count; p++) {
      for (let q = 0; q < count; q++) {
        const pair = values[n * count + p]! * values[n * count + q]!;
        y.re[p * count + q]! += pair * re;
        y.im[p * count + q]! += pair * im;
      }
    }
  }
  const tail = edgeTail(1, count, guideModes, table);
  for (let p = 0; p < count; p++) {
    for (let q = 0; q < count; q++) {
      y.re[p * count + q]! += (tail.te[p]! * tail.te[q]!) / (k * radius) - tail.tm[p]! * tail.tm[q]! * k * radius;
    }
  }
  // Z = M·Y⁻¹·Mᵀ at the ports, then its inverse.
  const columns = complexVector(count * ports);
  for (let p = 0; p < count; p++) for (let n = 0; n < ports; n++) columns.re[p * ports + n] = values[n * count + p]!;
  const solved = solveComplex(y, columns, count, ports);
  const z = complexVector(ports * ports);
  for (let m = 0; m < ports; m++) {
    for (let n = 0; n < ports; n++) {
      for (let p = 0; p < count; p++) {
        z.re[m * ports + n]! += values[m * count + p]! * solved.re[p * ports + n]!;
        z.im[m * ports + n]! += values[m * count + p]! * solved.im[p * ports + n]!;
      }
    }
  }
  const unit = complexVector(ports * ports);
  for (let n = 0; n < ports; n++) unit.re[n * ports + n] = 1;
  return solveComplex(z, unit, ports, ports);
}
