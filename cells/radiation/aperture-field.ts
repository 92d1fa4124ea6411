// Transforms of an aperture field given as radial functions, with a phase over the aperture: by quadrature.

import { speedOfLight } from "../constants.ts";
import { besselJ0, besselJ1 } from "../math/bessel.ts";
import type { Complex } from "../math/complex.ts";
import { gaussLegendre } from "../math/quadrature.ts";
import type { ApertureTransform } from "./aperture-transform.ts";
import { pathExcess } from "./flare.ts";

/**
 * Field on the aperture by its radial functions of r = ρ/radius (peak phasors, V/m), before the flare's phase:
 * E_x = ½[S + D cos 2φ], E_y = ½ D sin 2φ, and the same for η0·H × ẑ.
 */
export interface RadialField {
  electricSum: Complex;
  electricDifference: Complex;
  magneticSum: Complex;
  magneticDifference: Complex;
}

export interface FieldOverAperture {
  /** Hz */
  frequency: number;
  /** m */
  radius: number;
  /** m, apex to rim; Infinity is flat */
  flareSlant: number;
  /** r in 0…1 */
  fieldAt: (r: number) => RadialField;
  /** the largest transverse number χ in the field (J0(χr), J2(χr)): how fast it turns */
  highestTransverseNumber: number;
}

/**
 * Gauss–Legendre points over the radius for an error of 1e-12 of boresight. The integrand turns by at most ka (kernel) + χ (field)
 * + twice the phase excess at the rim (the spherical phase is steepest there); the rule resolves a turn of Ω over [0, 1]
 * once count > Ω/4, and a few points more drive the error to rounding.
 */
export function radialNodeCount(turn: number): number {
  return Math.ceil(turn / 4 + 1.5 * Math.cbrt(turn) + 9);
}

/**
 * The transform of a field over an aperture under the spherical phase e^{−jkδ(ρ)} of its flare (flare.ts).
 * @returns u ↦ transforms, to hand to `farField`
 * @accuracy 1e-12 of boresight, measured by doubling the points (test/cells/radiation/flare)
 * @throws {RangeError} slant not above the radius
 */
export function transformOfField(field: FieldOverAperture, nodeFactor = 1): (u: number) => ApertureTransform {
  const k = (2 * Math.PI * field.frequency) / speedOfLight;
  const excess = pathExcess({ slant: field.flareSlant, radius: field.radius });
  const turn = k * field.radius + field.highestTransverseNumber + 2 * k * excess(field.radius);
  const rule = gaussLegendre(Math.ceil(nodeFactor * radialNodeCount(turn)));
  const count = rule.nodes.length;
  const radii = Float64Array.from(rule.nodes, (node) => (1 + node) / 2);
  // The eight reals at each node with weight, phase and area: π·radius²·r dr.
  const weighted = new Float64Array(8 * count);
  for (let i = 0; i < count; i++) {
    const r = radii[i]!;
    const w = (rule.weights[i]! / 2) * r * Math.PI * field.radius ** 2;
    const angle = -k * excess(r * field.radius);
    const c = w * Math.cos(angle);
    const s = w * Math.sin(angle);
    const at = field.fieldAt(r);
    [at.electricSum, at.electricDifference, at.magneticSum, at.magneticDifference].forEach(({ re, im }, p) => {
      weighted[8 * i + 2 * p] = c * re - s * im;
      weighted[8 * i + 2 * p + 1] = s * re + c * im;
    });
  }
  return (u) => {
    const sum = new Float64Array(8);
    for (let i = 0; i < count; i++) {
      const x = u * radii[i]!;
      const j0 = besselJ0(x);
      // Absolute precision is all that counts in a sum, so the recurrence serves down to small x.
      const j2 = x < 1e-3 ? (x * x) / 8 : (2 * besselJ1(x)) / x - j0;
      const row = 8 * i;
      sum[0]! += j0 * weighted[row]!;
      sum[1]! += j0 * weighted[row + 1]!;
      sum[2]! += j2 * weighted[row + 2]!;
      sum[3]! += j2 * weighted[row + 3]!;
      sum[4]! += j0 * weighted[row + 4]!;
      sum[5]! += j0 * weighted[row + 5]!;
      sum[6]! += j2 * weighted[row + 6]!;
      sum[7]! += j2 * weighted[row + 7]!;
    }
    return {
      electricSum: { re: sum[0]!, im: sum[1]! },
      electricDifference: { re: sum[2]!, im: sum[3]! },
      magneticSum: { re: sum[4]!, im: sum[5]! },
      magneticDifference: { re: sum[6]!, im: sum[7]! },
    };
  };
}
