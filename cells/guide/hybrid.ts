// Hybrid modes of the corrugated guide: dispersion and hybrid factor.
//
// The corrugated wall is a surface with E_φ = 0 and, averaged over a pitch, −E_z/H_φ = jX·(slot width/pitch), X the
// reactance of the exact slot (slot.ts). Time e^{+jωt}, travel e^{−jβz}. With x = Ka, K² = k² − β², b = β/k:
//
//   E_z = J1(Kρ) cos φ,   η0·H_z = Λ·J1(Kρ) sin φ                                              Λ: the hybrid factor
//   E_φ(a) = 0  gives      Λ = −b·J1(x)/(x·J1′(x))
//   the slot    gives      (ka/x)·[J1′/J1 − b²·J1/(x²·J1′)] = (pitch/slot)·(−η0/X)
//
// Published: Clarricoats & Olver, Corrugated Horns for Microwave Antennas, 1984, chapters 2–3. What it leaves out: the
// space harmonics of the teeth (valid for pitch below about λ/3, better λ/5), tooth thickness other than by the fill.

import { requireNumber, requirePositive } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import { besselIRatio, besselJ0, besselJ2, besselJPrime1 } from "../math/bessel.ts";
import { besselPrimeZero, besselZero } from "../math/bessel-zeros.ts";
import { brentMinimum, brentRoot } from "../math/roots.ts";
import { requireSlot, type Slot, slotField } from "./slot.ts";

/** A corrugated wall, uniform along z. */
export interface CorrugatedWall extends Slot {
  /** slot width / pitch, in (0, 1] */
  slotFill: number;
}

/** Modes of azimuthal order one. At balance the HE have Λ = +1, the EH Λ = −1. */
export type HybridName = "EH11" | "HE11" | "EH12" | "HE12";

/** A travelling mode of a corrugated guide. */
export interface HybridMode {
  name: HybridName;
  /** Hz */
  frequency: number;
  /** m, inner radius of the teeth */
  radius: number;
  /** (Ka)², K² = k² − β²: negative for a slow (surface) wave */
  transverseSquared: number;
  /** β, rad/m; above k for a slow wave */
  phaseConstant: number;
  /** Λ; +1 for a balanced HE mode, −1 for a balanced EH mode, large where the mode is nearly TE, 0 nearly TM */
  hybridFactor: number;
}

/** Where (Ka)² of each mode can lie: between zeros of J1′ (nearly TE) and of J1 (nearly TM). */
function branch(name: HybridName): { low: number; high: number } {
  switch (name) {
    case "EH11":
      return { low: Number.NEGATIVE_INFINITY, high: besselPrimeZero(1, 1) ** 2 };
    case "HE11":
      return { low: besselPrimeZero(1, 1) ** 2, high: besselZero(1, 1) ** 2 };
    case "EH12":
      return { low: besselZero(1, 1) ** 2, high: besselPrimeZero(1, 2) ** 2 };
    case "HE12":
      return { low: besselPrimeZero(1, 2) ** 2, high: besselZero(1, 2) ** 2 };
    default:
      throw new RangeError(`hybridMode: name must be EH11, HE11, EH12 or HE12; got ${String(name)}`);
  }
}

/** J0, J1/x, J1′ and J2/x² as functions of t = x² of either sign; for t < 0 all are divided by I0. */
function radialTerms(t: number): { j0: number; share: number; slope: number; second: number } {
  if (t >= 0) {
    const x = Math.sqrt(t);
    const j0 = besselJ0(x);
    const second = x < 1e-4 ? (1 - t / 12) / 8 : besselJ2(x) / t;
    return { j0, share: (j0 + t * second) / 2, slope: besselJPrime1(x), second };
  }
  const x = Math.sqrt(-t);
  const ratio = besselIRatio(x) / x;
  const second = (ratio * besselIRatio(x, 2)) / x;
  return { j0: 1, share: ratio, slope: 1 - ratio, second };
}

/**
 * Characteristic function of t = (Ka)², free of poles: the slot equation times x·J1·J1′·(electric part of the slot).
 * Zero at a mode. Uses J1′² − (J1/x)² = −J0·J2.
 */
function characteristic(wall: CorrugatedWall, frequency: number): (t: number) => number {
  const ka = (2 * Math.PI * frequency * wall.innerRadius) / speedOfLight;
  let { electric, magnetic } = slotField(wall, frequency);
  if (electric < 0) {
    electric = -electric;
    magnetic = -magnetic;
  }
  return (t) => {
    const { j0, share, slope, second } = radialTerms(t);
    return (-j0 * second + (share / ka) ** 2) * electric - ((share * slope) / (wall.slotFill * ka)) * magnetic;
  };
}

/**
 * A hybrid mode of a corrugated guide at one frequency, or null where it doesn't travel.
 *
 * HE11 and HE12 turn into TE11, TE12 as the slots approach λ/2, EH12 into TM11. EH11 exists only on an inductive wall
 * (slots below the balanced depth): TE11 for very shallow slots, then slow (β > k), with β → ∞ at balance. Slots deeper
 * than λ/2 repeat this; the names then follow (Ka)², not the mode's history.
 *
 * @throws {RangeError} a length or the frequency not positive, slotFill outside (0, 1], unknown name
 * @accuracy root to 1e-13 in (Ka)²; the model itself as good as its thin-tooth wall
 * @source Clarricoats & Olver 1984, chapter 3
 */
export function hybridMode(name: HybridName, wall: CorrugatedWall, frequency: number): HybridMode | null {
  requireWall("hybridMode", wall);
  requirePositive("hybridMode: frequency", frequency, "Hz");
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const ka = k * wall.innerRadius;
  const f = characteristic(wall, frequency);
  const range = branch(name);
  const high = Math.min(range.high, ka * ka);
  let low = range.low;
  if (low === Number.NEGATIVE_INFINITY) {
    // The slow wave: look outward until the sign changes; a β of 1e4·k is no wave on a wall of finite pitch.
    low = -1;
    while (f(low) * f(high) > 0 && low > -1e8 * ka * ka) low *= 4;
  }
  if (low >= high) return null;
  let end = high;
  if (f(low) * f(high) > 0) {
    // Near cutoff two roots can lie close together: a forward wave and, at smaller β, a backward one. Take the forward.
    const side = Math.sign(f(low));
    const dip = name === "EH11" ? null : brentMinimum((t) => side * f(t), low, high, { tolerance: 1e-10 * high });
    if (!dip || dip.value > 0) return null;
    end = dip.x;
  }
  const t = brentRoot(f, low, end, { tolerance: 1e-14 * Math.max(1, Math.abs(low), high) });
  return modeAt(name, { frequency, radius: wall.innerRadius, t });
}

function modeAt(name: HybridName, at: { frequency: number; radius: number; t: number }): HybridMode {
  const k = (2 * Math.PI * at.frequency) / speedOfLight;
  const b = Math.sqrt(Math.max(0, 1 - at.t / (k * at.radius) ** 2));
  const { share, slope } = radialTerms(at.t);
  return {
    name,
    frequency: at.frequency,
    radius: at.radius,
    transverseSquared: at.t,
    phaseConstant: b * k,
    hybridFactor: (-b * share) / slope,
  };
}

/**
 * HE11 of a given hybrid factor: (Ka)² from E_φ(a) = 0 alone, whatever wall brings the factor about.
 * @param at.hybridFactor Λ > 0; 1 is balanced
 * @throws {RangeError} radius below the HE11 cutoff (ka ≤ j′11), factor or frequency not positive
 */
export function balancedLikeMode(at: { frequency: number; radius: number; hybridFactor: number }): HybridMode {
  requirePositive("balancedLikeMode: frequency", at.frequency, "Hz");
  requirePositive("balancedLikeMode: radius", at.radius, "m");
  requirePositive("balancedLikeMode: hybridFactor", at.hybridFactor);
  const ka = (2 * Math.PI * at.frequency * at.radius) / speedOfLight;
  const lowest = besselPrimeZero(1, 1);
  if (ka <= lowest) {
    throw new RangeError(
      `balancedLikeMode: radius must be above the HE11 cutoff of ${((lowest / ka) * at.radius * 1e3).toFixed(3)} mm; got ${(at.radius * 1e3).toFixed(3)} mm`,
    );
  }
  const high = Math.min(besselZero(1, 1), ka);
  // Λ·J1′ + b·J1/x falls from positive to negative on the branch.
  const f = (x: number): number => {
    const { share, slope } = radialTerms(x * x);
    return at.hybridFactor * slope + Math.sqrt(Math.max(0, 1 - (x / ka) ** 2)) * share;
  };
  const x = brentRoot(f, lowest, high, { tolerance: 1e-15 });
  return { ...modeAt("HE11", { ...at, t: x * x }), hybridFactor: at.hybridFactor };
}

/**
 * Lowest frequency at which a mode travels in a corrugated guide, Hz. For EH12 it is where a second mode can carry power
 * away from HE11: the upper end of a corrugated guide's clean band.
 *
 * On a capacitive wall HE11 starts as TE11 does (ka = j′11); EH12 starts where J1′(ka)/J1(ka) meets the slot's
 * admittance, between the TM11 and TE12 cutoffs of a smooth guide. Where those two conditions nearly coincide it starts a
 * little earlier and at β > 0, together with a backward wave.
 *
 * @throws {RangeError} as `hybridMode`
 * @accuracy 1e-12 relative
 */
export function hybridStart(name: HybridName, wall: CorrugatedWall): number {
  requireWall("hybridStart", wall);
  const perKa = speedOfLight / (2 * Math.PI * wall.innerRadius);
  const range = branch(name);
  const first = name === "EH11" ? besselPrimeZero(1, 1) : Math.sqrt(range.low);
  const last = name === "EH11" ? besselZero(1, 1) : Math.sqrt(range.high);
  const steps = 400;
  let below = first;
  for (let i = 0; i <= steps; i++) {
    const ka = first + ((last - first) * (i + 1e-6)) / steps;
    if (hybridMode(name, wall, ka * perKa)) {
      if (i === 0) return first * perKa;
      let above = ka;
      while (above - below > 1e-13 * above) {
        const middle = (above + below) / 2;
        if (hybridMode(name, wall, middle * perKa)) above = middle;
        else below = middle;
        if (middle === above && above - below <= 2 * Number.EPSILON * above) break;
      }
      return above * perKa;
    }
    below = ka;
  }
  throw new RangeError(
    `hybridStart: ${name} must start below ${((last * perKa) / 1e9).toFixed(3)} GHz; on this wall it doesn't`,
  );
}

function requireWall(where: string, wall: CorrugatedWall): void {
  requireSlot(where, wall);
  requireNumber(`${where}: slotFill`, wall.slotFill, { above: 0, max: 1 });
}
