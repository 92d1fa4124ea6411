// The point that a pattern seems to come from.

import { requireNumber } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import type { Complex, ComplexVector } from "../math/complex.ts";
import { gaussLegendre } from "../math/quadrature.ts";
import type { FeedPattern } from "./feed-pattern.ts";
import { type PatternInterpolant, patternInterpolant } from "./interpolant.ts";
import { requirePattern } from "./theta-grid.ts";

/** Best-fit phase center over a cone; z in m from the centre of the aperture, > 0 out of the horn (normally < 0: inside). */
export interface PhaseCenter {
  /** of the copolar in the 45° plane: the one to put at the focus */
  z: number;
  ePlaneZ: number;
  hPlaneZ: number;
  /** ePlaneZ − hPlaneZ: astigmatism */
  splitZ: number;
  /** rms of the copolar phase left over, rad, weighted as the fit */
  residualRad: number;
}

/**
 * Phase center by weighted least squares over 0 ≤ θ ≤ halfAngle:
 *
 *   arg F(θ) ≈ c + k z cos θ,   weight |F|² sin θ
 *
 * (a point source at z has exactly that phase). The weight is the power that meets each part of the dish, so that a weak
 * flank near a null cannot pull the fit.
 *
 * Safe unwrapping: phases are never added up sample by sample. A first slope comes from the phase differences of
 * neighbouring nodes; what remains after taking it off is fitted as an angle within ±π about the weighted mean, again
 * until the fit stands still.
 *
 * @param halfAngle rad, in (0, π/2]
 * @throws {RangeError} not a pattern, halfAngle outside, or a phase that runs too fast for the sampling
 *         (|z|·k·sin θ·Δθ > 2.5 rad: sample the pattern more finely or move its phase origin nearer)
 * @accuracy a point source's place to 1e-9 m (test/cells/pattern/phase-center)
 */
export function phaseCenter(pattern: FeedPattern, halfAngle: number): PhaseCenter {
  requirePattern("phaseCenter", pattern);
  requireNumber("phaseCenter: halfAngle", halfAngle, { above: 0, max: Math.PI / 2, unit: "rad" });
  const interpolant = patternInterpolant(pattern);
  const k = (2 * Math.PI * pattern.frequency) / speedOfLight;
  const samples = halfAngle / (Math.PI / (pattern.theta.length - 1));
  const rule = gaussLegendre(Math.min(200, Math.max(32, Math.ceil(samples / 2))));
  const theta = Array.from(rule.nodes, (x) => (halfAngle * (1 + x)) / 2);
  const fitCut = (cut: (theta: number) => Complex) => {
    const field = theta.map(cut);
    const weight = field.map(({ re, im }, i) => rule.weights[i]! * (re * re + im * im) * Math.sin(theta[i]!));
    return fitPhase({ field, weight, cosine: theta.map(Math.cos), k });
  };
  const copolar = fitCut(interpolant.copolar45);
  const e = fitCut(interpolant.ePlane);
  const h = fitCut(interpolant.hPlane);
  return {
    z: pattern.phaseOriginZ + copolar.z,
    ePlaneZ: pattern.phaseOriginZ + e.z,
    hPlaneZ: pattern.phaseOriginZ + h.z,
    splitZ: e.z - h.z,
    residualRad: copolar.residualRad,
  };
}

interface PhaseFit {
  field: Complex[];
  weight: number[];
  cosine: number[];
  k: number;
}

/** arg(p·q*) */
function phaseDifference(p: Complex, q: Complex): number {
  return Math.atan2(p.im * q.re - p.re * q.im, p.re * q.re + p.im * q.im);
}

function fitPhase({ field, weight, cosine, k }: PhaseFit): { z: number; residualRad: number } {
  let numerator = 0;
  let denominator = 0;
  const heaviest = Math.max(...weight);
  for (let i = 1; i < field.length; i++) {
    const step = cosine[i]! - cosine[i - 1]!;
    const difference = phaseDifference(field[i]!, field[i - 1]!);
    const w = Math.min(weight[i]!, weight[i - 1]!);
    if (w > 1e-3 * heaviest && Math.abs(difference) > 2.5) {
      throw new RangeError(
        `phaseCenter: the phase must turn less than 2.5 rad between samples; got ${difference.toFixed(2)} rad; try more angles or a nearer phase origin`,
      );
    }
    numerator += w * difference * step;
    denominator += w * step * step;
  }
  let z = denominator > 0 ? numerator / (k * denominator) : 0;
  const totalWeight = weight.reduce((sum, w) => sum + w, 0);
  const meanCosine = weight.reduce((sum, w, i) => sum + w * cosine[i]!, 0) / totalWeight;
  const spread = weight.reduce((sum, w, i) => sum + w * (cosine[i]! - meanCosine) ** 2, 0);
  let residual: number[] = [];
  for (let pass = 0; pass < 20; pass++) {
    const flattened = field.map(({ re, im }, i) => {
      const angle = -k * z * cosine[i]!;
      const c = Math.cos(angle);
      const s = Math.sin(angle);
      return { re: re * c - im * s, im: re * s + im * c };
    });
    // Mean direction, each node counted by weight and not once more by its own size.
    const mean = { re: 0, im: 0 };
    flattened.forEach((f, i) => {
      const size = Math.hypot(f.re, f.im) || 1;
      mean.re += (weight[i]! * f.re) / size;
      mean.im += (weight[i]! * f.im) / size;
    });
    residual = flattened.map((f) => phaseDifference(f, mean));
    const change = residual.reduce((sum, r, i) => sum + weight[i]! * r * (cosine[i]! - meanCosine), 0) / (k * spread);
    z += change;
    if (Math.abs(k * change) < 1e-12) break;
  }
  const meanResidual = residual.reduce((sum, r, i) => sum + weight[i]! * r, 0) / totalWeight;
  const square = residual.reduce((sum, r, i) => sum + weight[i]! * (r - meanResidual) ** 2, 0);
  return { z, residualRad: Math.sqrt(square / totalWeight) };
}

/**
 * The same far field with its phases referred to another point z of the axis: times e^{−jk(z − z_old) cos θ}. It is the
 * far-field phase only, the usual meaning of putting a phase center at the focus, not a horn physically moved.
 * @param z m, new phase origin
 * @throws {RangeError} not a pattern; z not finite
 */
export function movedPhaseOrigin(pattern: FeedPattern, z: number): FeedPattern {
  requirePattern("movedPhaseOrigin", pattern);
  requireNumber("movedPhaseOrigin: z", z, { unit: "m" });
  const k = (2 * Math.PI * pattern.frequency) / speedOfLight;
  const angle = Float64Array.from(pattern.theta, (t) => -k * (z - pattern.phaseOriginZ) * Math.cos(t));
  const turned = ({ re, im }: ComplexVector): ComplexVector => ({
    re: re.map((x, i) => x * Math.cos(angle[i]!) - im[i]! * Math.sin(angle[i]!)),
    im: re.map((x, i) => x * Math.sin(angle[i]!) + im[i]! * Math.cos(angle[i]!)),
  });
  return { ...pattern, ePlane: turned(pattern.ePlane), hPlane: turned(pattern.hPlane), phaseOriginZ: z };
}

/** The interpolant of `movedPhaseOrigin`, without its samples: the phase is turned where it is read. @throws {RangeError} likewise */
export function movedInterpolant(pattern: FeedPattern, z: number): PatternInterpolant {
  requireNumber("movedInterpolant: z", z, { unit: "m" });
  const still = patternInterpolant(pattern);
  const shift = (-2 * Math.PI * pattern.frequency * (z - pattern.phaseOriginZ)) / speedOfLight;
  const turned =
    (cut: (theta: number) => Complex) =>
    (theta: number): Complex => {
      const { re, im } = cut(theta);
      const angle = shift * Math.cos(theta);
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      return { re: re * c - im * s, im: re * s + im * c };
    };
  return {
    ePlane: turned(still.ePlane),
    hPlane: turned(still.hPlane),
    copolar45: turned(still.copolar45),
    crossPolar45: turned(still.crossPolar45),
  };
}
