// One slot of a corrugated wall: a radial line, m = 1, shorted at its bottom.
//
// Thin teeth and narrow slots are assumed: E_φ = 0 on the wall, and in the slot only the field without z-variation
// (E_z, H_φ), so the pitch must be small against λ/2. Published: Clarricoats & Olver, Corrugated Horns for Microwave
// Antennas, 1984, chapter 3.

import { requirePositive } from "../check.ts";
import { speedOfLight, vacuumImpedance } from "../constants.ts";
import { besselJ1, besselJPrime1, besselY1, besselYPrime1 } from "../math/bessel.ts";
import { brentRoot } from "../math/roots.ts";

/** A slot by its mouth and depth, m. */
export interface Slot {
  /** m, radius of the slot's mouth (the guide's wall) */
  innerRadius: number;
  /** m, radial depth */
  depth: number;
}

/**
 * Field of the slot at its mouth, up to one common factor: E_z ∝ electric, η0·H_φ ∝ −j·magnetic.
 *
 *   electric = J1(ka)Y1(kb) − J1(kb)Y1(ka),   magnetic = J1′(ka)Y1(kb) − J1(kb)Y1′(ka),   b = a + depth
 *
 * Scaled so that electric² + magnetic² = 1: both finite through every resonance. Arguments are not checked.
 */
export function slotField(slot: Slot, frequency: number): { electric: number; magnetic: number } {
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const ka = k * slot.innerRadius;
  const kb = k * (slot.innerRadius + slot.depth);
  const electric = besselJ1(ka) * besselY1(kb) - besselJ1(kb) * besselY1(ka);
  const magnetic = besselJPrime1(ka) * besselY1(kb) - besselJ1(kb) * besselYPrime1(ka);
  const size = Math.hypot(electric, magnetic);
  return { electric: electric / size, magnetic: magnetic / size };
}

/**
 * Reactance −E_z/H_φ that the wall shows a mode of azimuthal order one at a slot's mouth, ohm, without the share of the
 * teeth: > 0 inductive (shallower than about λ/4), < 0 capacitive (λ/4 to λ/2), ±∞ at the balanced depth.
 * For ka ≫ 1 it is η0·tan(k·depth).
 * @throws {RangeError} an argument not positive
 * @source Clarricoats & Olver 1984, chapter 3
 */
export function slotReactance(slot: Slot, frequency: number): number {
  requireSlot("slotReactance", slot);
  requirePositive("slotReactance: frequency", frequency, "Hz");
  const { electric, magnetic } = slotField(slot, frequency);
  return (-vacuumImpedance * electric) / magnetic;
}

/**
 * Slot depth, m, that makes H_φ vanish at the wall (E_φ vanishes anyway): the balanced condition, in which HE11 has no
 * cross-polarization. Shallowest depth with J1′(ka)·Y1(kb) = Y1′(ka)·J1(kb), b = a + depth.
 *
 * A little over λ/4, deeper in a narrow guide. Independent of the slot-to-pitch ratio.
 *
 * @param frequency   Hz
 * @param innerRadius m
 * @throws {RangeError} either not positive
 * @source Clarricoats & Olver 1984, chapter 3
 */
export function balancedSlotDepth(frequency: number, innerRadius: number): number {
  requirePositive("balancedSlotDepth: frequency", frequency, "Hz");
  requirePositive("balancedSlotDepth: innerRadius", innerRadius, "m");
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const ka = k * innerRadius;
  const magnetic = (kd: number): number =>
    besselJPrime1(ka) * besselY1(ka + kd) - besselJ1(ka + kd) * besselYPrime1(ka);
  // The root lies between π/2 (flat wall) and j11 = 3.83 (vanishing radius); the next one is π further.
  return brentRoot(magnetic, Math.PI / 2 - 1e-6, 3.84, { tolerance: 1e-14 }) / k;
}

/**
 * The same depth by a fit in closed form, m: d = (λ/4)·exp[1/(2.114·(ka)^1.134)].
 * @accuracy 0.3 % of `balancedSlotDepth` for ka ≥ 2.5 (test/cells/guide/slot)
 * @throws {RangeError} either argument not positive
 * @source Granet & James, Design of corrugated horns: a primer, IEEE Antennas Propag. Mag. 47(2), 76–84, 2005
 */
export function balancedSlotDepthEstimate(frequency: number, innerRadius: number): number {
  requirePositive("balancedSlotDepthEstimate: frequency", frequency, "Hz");
  requirePositive("balancedSlotDepthEstimate: innerRadius", innerRadius, "m");
  const wavelength = speedOfLight / frequency;
  const ka = (2 * Math.PI * innerRadius) / wavelength;
  return (wavelength / 4) * Math.exp(1 / (2.114 * ka ** 1.134));
}

/** Frequency, Hz, at which a slot is balanced: `balancedSlotDepth` solved for it. @throws {RangeError} not positive */
export function balancedFrequency(slot: Slot): number {
  requireSlot("balancedFrequency", slot);
  const unit = speedOfLight / slot.depth;
  return brentRoot((f) => balancedSlotDepth(f, slot.innerRadius) - slot.depth, 0.249 * unit, 0.62 * unit);
}

/** Frequencies between which a slot's wall is capacitive. */
export interface CapacitiveWindow {
  /** Hz: balanced; below, the wall is inductive and guides a slow surface wave */
  low: number;
  /** Hz: the slot is half a wave deep and shorts the wall; HE11 has become TE11 */
  high: number;
}

/**
 * Band in which the slots are between about λ/4 and λ/2 deep: the wall is capacitive and the guide carries no slow wave.
 * @throws {RangeError} innerRadius or depth not positive
 * @source Clarricoats & Olver 1984, chapter 3
 */
export function capacitiveWindow(slot: Slot): CapacitiveWindow {
  const low = balancedFrequency(slot);
  // kd at the half-wave short lies between π (flat wall) and j11.
  const unit = speedOfLight / slot.depth;
  const high = brentRoot((f) => slotField(slot, f).electric, 0.4999 * unit, 0.62 * unit);
  return { low, high };
}

/**
 * Slow-wave limit of a corrugated wall, Hz: below it the slots are shallower than a quarter wave (exactly: than the
 * balanced depth), the wall is inductive, and power can leave HE11 for the slow mode EH11. `capacitiveWindow().low`.
 */
export function slowWaveLimit(slot: Slot): number {
  return balancedFrequency(slot);
}

/** @throws {RangeError} innerRadius or depth not positive */
export function requireSlot(where: string, slot: Slot): void {
  requirePositive(`${where}: innerRadius`, slot.innerRadius, "m");
  requirePositive(`${where}: depth`, slot.depth, "m");
}
