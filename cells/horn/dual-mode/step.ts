// The abrupt step of a dual-mode horn: how much TM11 it raises beside TE11, and in which phase.

import { requireNumber, requirePositive } from "../../check.ts";
import { speedOfLight } from "../../constants.ts";
import { profileScale, transverseNumber } from "../../guide/mode.ts";
import { besselJ1, besselJPrime1 } from "../../math/bessel.ts";
import type { Complex } from "../../math/complex.ts";

/** Modes TE1n and TM1n of the wide guide that are carried, n = 1…40. */
const widePairs = 40;

/** A mode of azimuthal order one, as the overlaps need it. */
interface OrderOne {
  family: "TE" | "TM";
  chi: number;
  /** factor before the potential J1(χρ/a) for a profile with ∫|e|² dS = 1 */
  potentialScale: number;
}

function orderOne(family: "TE" | "TM", n: number): OrderOne {
  const mode = { family, m: 1, n };
  const chi = transverseNumber(mode);
  return { family, chi, potentialScale: profileScale(mode, chi) / chi };
}

// A constant table: all TE first, then all TM. The first of each is also a field function of the step.
const modes: readonly OrderOne[] = (["TE", "TM"] as const).flatMap((family) =>
  Array.from({ length: widePairs }, (_, i) => orderOne(family, i + 1)),
);
const narrowTe = modes[0]!;
const narrowTm = modes[widePairs]!;
const teScale = Math.PI * narrowTe.potentialScale * besselJ1(narrowTe.chi);
const tmScale = Math.PI * narrowTm.potentialScale * besselJPrime1(narrowTm.chi);

/**
 * Frequency-free part of a step: how each mode of the wide guide overlaps the step's two field functions, TE11 and TM11
 * of the narrow guide. [2·widePairs] each, all TE first. Plain data.
 */
export interface StepCoupling {
  /** m */
  narrowRadius: number;
  wideRadius: number;
  onTe11: Float64Array;
  onTm11: Float64Array;
}

/** Amplitudes behind the step for one unit of TE11 coming in; power waves, √W for 1 W. */
export interface StepLaunch {
  te11: Complex;
  tm11: Complex;
  /** |TM11| / |TE11| */
  ratio: number;
  /** rad by which TM11 leads TE11, both with E_x > 0 on the axis */
  phaseLead: number;
}

/**
 * Overlaps ∫ e_narrow · e_wide dS over the opening, in closed form (profiles with ∫|e|² dS = 1 over their own guide).
 *
 *   TE–TE:  π N N′ J1(χ) J1′(κ) χ² κ/(χ² − κ²)       TE–TM:  π N N′ J1(χ) J1(κ)
 *   TM–TM:  π N N′ J1′(χ) J1(κ) κ² χ/(κ² − χ²)       TM–TE:  0
 *
 * narrow mode first; χ its transverse number, κ that of the wide mode times narrow/wide radius, N the factors before the
 * potentials J1.
 *
 * @throws {RangeError} radii not positive, or a ratio narrow/wide outside 0.6…0.98: nearer to 1 the two functions no
 *   longer describe the opening, below 0.6 TM12 of the wide guide meets TM11 of the narrow one
 * @source overlaps by Green's theorem as in Wexler, "Solution of waveguide discontinuities by modal analysis", IEEE
 *   Trans. MTT-15, 508–517, 1967
 */
export function stepCoupling(narrowRadius: number, wideRadius: number): StepCoupling {
  requirePositive("stepCoupling: narrow radius", narrowRadius, "m");
  requirePositive("stepCoupling: wide radius", wideRadius, "m");
  const ratio = requireNumber("stepCoupling: narrow over wide radius", narrowRadius / wideRadius, {
    min: 0.6,
    max: 0.98,
  });
  const onTe11 = new Float64Array(2 * widePairs);
  const onTm11 = new Float64Array(2 * widePairs);
  modes.forEach(({ family, chi, potentialScale }, i) => {
    // In units of the narrow radius.
    const k2 = chi * ratio;
    const value = besselJ1(k2);
    if (family === "TE") {
      const slope = besselJPrime1(k2);
      onTe11[i] = potentialScale * teScale * ((narrowTe.chi ** 2 * k2 * slope) / (narrowTe.chi ** 2 - k2 ** 2));
    } else {
      onTe11[i] = potentialScale * teScale * value;
      onTm11[i] = potentialScale * tmScale * ((k2 ** 2 * narrowTm.chi * value) / (k2 ** 2 - narrowTm.chi ** 2));
    }
  });
  return { narrowRadius, wideRadius, onTe11, onTm11 };
}

/**
 * TE11 and TM11 behind the step, with the step's field taken as TE11 plus the (evanescent) TM11 of the narrow guide and
 * every mode behind it met in the mean (Galerkin; 40 TE and 40 TM modes of the wide guide).
 *
 * TE11 alone as the step's field, the simplest closed form, would put both modes exactly in phase; TM11's stored energy in
 * the narrow guide is what turns it, by tens of degrees, and the second function brings most of that. What stays out: the
 * field's singularity at the corner.
 *
 * @param frequency Hz; TE11 must travel in the narrow guide
 * @accuracy against converged mode matching at 15.0→19.6 mm, 10 GHz: ratio 7 % high, phase lead 4° low
 *   (test/cells/horn/dual-mode/step). Taking it for the truth shifts the frequency of best balance by about 1 %.
 * @throws {RangeError} frequency not positive or TE11 cut off in the narrow guide
 * @source after Agarwal & Nagelberg, "Phase characteristics of a circularly symmetric dual-mode transducer", IEEE Trans.
 *   MTT-18, 69–71, 1970 (TE11 and TM11 at a step); Wexler 1967 for the method
 */
export function stepLaunch(coupling: StepCoupling, frequency: number): StepLaunch {
  requirePositive("stepLaunch: frequency", frequency, "Hz");
  const { narrowRadius, wideRadius, onTe11, onTm11 } = coupling;
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const incoming = admittance(narrowTe, narrowRadius, k).re;
  if (!(incoming > 0))
    throw new RangeError(`stepLaunch: TE11 must travel before the step; at ${frequency / 1e9} GHz it is cut off`);

  // 2×2 system: what the wide guide's modes admit to each pair of functions, and the narrow guide itself.
  const y11 = { re: incoming, im: 0 };
  const y12 = { re: 0, im: 0 };
  const y22 = admittance(narrowTm, narrowRadius, k);
  const source = 2 * incoming;
  const wide = modes.map((mode) => admittance(mode, wideRadius, k));
  wide.forEach((y, i) => {
    add(y11, y, onTe11[i]! * onTe11[i]!);
    add(y12, y, onTe11[i]! * onTm11[i]!);
    add(y22, y, onTm11[i]! * onTm11[i]!);
  });
  const determinant = subtract(product(y11, y22), product(y12, y12));
  const first = quotient({ re: source * y22.re, im: source * y22.im }, determinant);
  const second = quotient({ re: -source * y12.re, im: -source * y12.im }, determinant);

  // Wave behind the step: voltage × √admittance, against √admittance of the incoming one.
  const wave = (i: number): Complex => {
    const voltage = {
      re: onTe11[i]! * first.re + onTm11[i]! * second.re,
      im: onTe11[i]! * first.im + onTm11[i]! * second.im,
    };
    return product(voltage, squareRoot({ re: wide[i]!.re / incoming, im: wide[i]!.im / incoming }));
  };
  const te11 = wave(0);
  const tm11 = wave(widePairs);
  const between = quotient(tm11, te11);
  return { te11, tm11, ratio: Math.hypot(between.re, between.im), phaseLead: Math.atan2(between.im, between.re) };
}

/** Wave admittance × η0: γ/(jk) for TE, jk/γ for TM; |γ| no smaller than 1e-6·k, so that a cutoff stays finite. */
function admittance({ family, chi }: OrderOne, radius: number, k: number): Complex {
  const squared = (chi / radius - k) * (chi / radius + k);
  const size = Math.max(Math.sqrt(Math.abs(squared)) / k, 1e-6);
  if (squared < 0) return { re: family === "TE" ? size : 1 / size, im: 0 };
  return { re: 0, im: family === "TE" ? -size : 1 / size };
}

function add(to: Complex, y: Complex, weight: number): void {
  to.re += weight * y.re;
  to.im += weight * y.im;
}

const product = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re });
const subtract = (a: Complex, b: Complex): Complex => ({ re: a.re - b.re, im: a.im - b.im });

function quotient(a: Complex, b: Complex): Complex {
  const size = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / size, im: (a.im * b.re - a.re * b.im) / size };
}

/** Principal root. */
function squareRoot({ re, im }: Complex): Complex {
  const size = Math.hypot(re, im);
  const real = Math.sqrt((size + re) / 2);
  return { re: real, im: im === 0 ? (re < 0 ? Math.sqrt(-re) : 0) : im / (2 * real) };
}
