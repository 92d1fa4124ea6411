// Transverse fields of a hybrid mode.

import { requireNumber } from "../check.ts";
import { speedOfLight, vacuumImpedance } from "../constants.ts";
import { besselJ0, besselJ1, besselJ2 } from "../math/bessel.ts";
import type { HybridMode } from "./hybrid.ts";
import type { TransverseField } from "./mode.ts";

/**
 * Amplitudes of a hybrid mode's two transverse parts, for 1 W of travelling power (peak phasors):
 *
 *   E_x = ½[electric0·J0(Kρ) + electric2·J2(Kρ)·cos 2φ],   E_y = ½·electric2·J2(Kρ)·sin 2φ                      V/m
 *   η0·H_y, −η0·H_x  the same with magnetic0, magnetic2                                                          V/m
 *
 *   electric0 ∝ b + Λ,   electric2 ∝ Λ − b,   magnetic0 ∝ 1 + bΛ,   magnetic2 ∝ bΛ − 1,   b = β/k
 *
 * The J2 parts are cross-polar (cos 2φ, sin 2φ). At Λ = 1 they are of opposite sign in E and H and cancel in the far
 * field; far above cutoff (b → 1) they vanish at balance. E_x > 0 on the axis for HE modes.
 */
export interface HybridParts {
  /** Ka, of a fast mode */
  transverseNumber: number;
  electric0: number;
  electric2: number;
  magnetic0: number;
  magnetic2: number;
}

/**
 * @throws {RangeError} a slow mode (it has no such aperture field in closed form here), or one that carries no power
 * @source Clarricoats & Olver 1984, chapter 2; power integrals A&S 1964, 11.4.5
 */
export function hybridParts(mode: HybridMode): HybridParts {
  requireNumber("hybridParts: transverseSquared", mode.transverseSquared, { above: 0 });
  const x = Math.sqrt(mode.transverseSquared);
  const b = (mode.phaseConstant * speedOfLight) / (2 * Math.PI * mode.frequency);
  const factor = mode.hybridFactor;
  const parts = { electric0: b + factor, electric2: factor - b, magnetic0: 1 + b * factor, magnetic2: b * factor - 1 };
  // ∫₀¹ J0² r dr and ∫₀¹ J2² r dr, argument x·r.
  const j0 = besselJ0(x);
  const j1 = besselJ1(x);
  const j2 = besselJ2(x);
  const square0 = (j0 * j0 + j1 * j1) / 2;
  const slope2 = j1 - (2 * j2) / x;
  const square2 = (slope2 * slope2 + (1 - 4 / (x * x)) * j2 * j2) / 2;
  // P = ½ Re ∫ (E × H*)·ẑ dS = (π a²/4η0)·[e0·h0·∫J0² + e2·h2·∫J2²]
  const area = Math.PI * mode.radius * mode.radius;
  const power =
    (area / (4 * vacuumImpedance)) *
    (parts.electric0 * parts.magnetic0 * square0 + parts.electric2 * parts.magnetic2 * square2);
  if (!(power > 0)) {
    throw new RangeError(`hybridParts: the mode must carry power outward; ${mode.name} with Λ = ${factor} doesn't`);
  }
  const scale = 1 / Math.sqrt(power);
  return {
    transverseNumber: x,
    electric0: scale * parts.electric0,
    electric2: scale * parts.electric2,
    magnetic0: scale * parts.magnetic0,
    magnetic2: scale * parts.magnetic2,
  };
}

/**
 * Transverse electric field of a hybrid mode at a point, V/m for 1 W.
 * @param rho m, 0…radius
 * @param phi rad
 * @throws {RangeError} rho outside the guide; as `hybridParts`
 */
export function hybridField(mode: HybridMode, rho: number, phi: number): TransverseField {
  requireNumber("hybridField: rho", rho, { min: 0, max: mode.radius * (1 + 1e-12), unit: "m" });
  const parts = hybridParts(mode);
  const x = (parts.transverseNumber * rho) / mode.radius;
  const sum = parts.electric0 * besselJ0(x);
  const difference = parts.electric2 * besselJ2(x);
  // E_ρ = E_x cos φ + E_y sin φ and so on: the sum goes with both alike, the difference with opposite signs.
  return { eRho: ((sum + difference) / 2) * Math.cos(phi), ePhi: ((difference - sum) / 2) * Math.sin(phi) };
}
