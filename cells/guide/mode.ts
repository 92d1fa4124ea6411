// Modes of the smooth circular guide: cutoff, propagation, impedance, fields, wall loss.
//
// Time e^{+jωt}, travel in +z as e^{−γz}. Perfect conductor, vacuum inside (air differs by 3e-4 in index), except in
// `wallLoss`. Published: Marcuvitz, Waveguide Handbook, 1951, section 2.3; Pozar, Microwave Engineering, section 3.4.

import { requireInteger, requireNumber, requirePositive } from "../check.ts";
import { speedOfLight, vacuumImpedance, vacuumPermeability } from "../constants.ts";
import { besselJ, besselJPrime } from "../math/bessel.ts";
import { besselPrimeZero, besselZero } from "../math/bessel-zeros.ts";
import type { Complex } from "../math/complex.ts";

/** A mode of the circular guide: m is the azimuthal order (0…), n counts radial zeros from 1. */
export interface GuideMode {
  family: "TE" | "TM";
  m: number;
  n: number;
}

export const TE11: GuideMode = { family: "TE", m: 1, n: 1 };
export const TM01: GuideMode = { family: "TM", m: 0, n: 1 };
export const TE21: GuideMode = { family: "TE", m: 2, n: 1 };
export const TE01: GuideMode = { family: "TE", m: 0, n: 1 };
export const TM11: GuideMode = { family: "TM", m: 1, n: 1 };
export const TE31: GuideMode = { family: "TE", m: 3, n: 1 };
export const TM21: GuideMode = { family: "TM", m: 2, n: 1 };
export const TE12: GuideMode = { family: "TE", m: 1, n: 2 };
export const TM12: GuideMode = { family: "TM", m: 1, n: 2 };

/** "TE11" */
export function modeName(mode: GuideMode): string {
  return `${mode.family}${mode.m}${mode.n}`;
}

/** χ = kc·a of a mode: j′_{m,n} for TE, j_{m,n} for TM. @throws {RangeError} m < 0, n < 1 or not whole */
export function transverseNumber(mode: GuideMode): number {
  requireInteger("transverseNumber: m", mode.m, { min: 0 });
  requireInteger("transverseNumber: n", mode.n, { min: 1 });
  return mode.family === "TE" ? besselPrimeZero(mode.m, mode.n) : besselZero(mode.m, mode.n);
}

/**
 * Cutoff frequency, Hz: fc = χ c / (2π a).
 * @param radius m, > 0
 * @throws {RangeError} radius not positive, mode numbers out of range
 * @source Marcuvitz 1951, section 2.3; Pozar eq. 3.120 and 3.136
 */
export function cutoffFrequency(mode: GuideMode, radius: number): number {
  requirePositive("cutoffFrequency: radius", radius, "m");
  return (transverseNumber(mode) * speedOfLight) / (2 * Math.PI * radius);
}

/** Cutoff wavelength, m: λc = 2π a / χ. @throws {RangeError} as `cutoffFrequency` */
export function cutoffWavelength(mode: GuideMode, radius: number): number {
  return speedOfLight / cutoffFrequency(mode, radius);
}

/** Radius at which a mode is at cutoff, m: a = χ c / (2π f). @param frequency Hz, > 0 */
export function cutoffRadius(mode: GuideMode, frequency: number): number {
  requirePositive("cutoffRadius: frequency", frequency, "Hz");
  return (transverseNumber(mode) * speedOfLight) / (2 * Math.PI * frequency);
}

/**
 * Band in which a circular guide is usually used with TE11, Hz: 1.150 to 1.577 times the TE11 cutoff. The upper end lies
 * beyond the TM01 cutoff (1.306 times) and short of TE21 (1.659 times): it relies on nothing exciting TM01.
 * @source rule behind the bands of IEC 60153-4, circular waveguides; common practice, not a law
 */
export function usualBand(radius: number): { low: number; high: number } {
  const cutoff = cutoffFrequency(TE11, radius);
  return { low: 1.15 * cutoff, high: 1.577 * cutoff };
}

/** γ² = kc² − k², 1/m²: negative while the mode travels. */
function propagationSquared(where: string, mode: GuideMode, radius: number, frequency: number): number {
  requirePositive(`${where}: radius`, radius, "m");
  requirePositive(`${where}: frequency`, frequency, "Hz");
  const cutoffNumber = transverseNumber(mode) / radius;
  const k = (2 * Math.PI * frequency) / speedOfLight;
  // As a product: no digits lost near cutoff.
  return (cutoffNumber - k) * (cutoffNumber + k);
}

/** True where the mode travels (frequency above cutoff). */
export function travels(mode: GuideMode, radius: number, frequency: number): boolean {
  return propagationSquared("travels", mode, radius, frequency) < 0;
}

/**
 * Propagation constant γ, 1/m: jβ with β = √(k² − kc²) above cutoff, real α = √(kc² − k²) below. Lossless wall.
 * @param radius    m, > 0
 * @param frequency Hz, > 0
 * @throws {RangeError} either not positive
 * @source Marcuvitz 1951, section 2.3; Pozar eq. 3.115
 */
export function propagationConstant(mode: GuideMode, radius: number, frequency: number): Complex {
  const squared = propagationSquared("propagationConstant", mode, radius, frequency);
  return squared < 0 ? { re: 0, im: Math.sqrt(-squared) } : { re: Math.sqrt(squared), im: 0 };
}

/**
 * Guide wavelength, m: λg = 2π/β.
 * @throws {RangeError} at or below cutoff, where there is none; radius or frequency not positive
 */
export function guideWavelength(mode: GuideMode, radius: number, frequency: number): number {
  const squared = propagationSquared("guideWavelength", mode, radius, frequency);
  if (squared >= 0) {
    const cutoffGHz = (cutoffFrequency(mode, radius) / 1e9).toPrecision(6);
    throw new RangeError(
      `guideWavelength: frequency must be above the ${modeName(mode)} cutoff of ${cutoffGHz} GHz; got ${frequency / 1e9} GHz`,
    );
  }
  return (2 * Math.PI) / Math.sqrt(-squared);
}

/**
 * Wave impedance E_t/H_t, ohm: jωμ/γ (TE), γ/(jωε) (TM): real while the mode travels, +j (TE) or −j (TM) below cutoff.
 *
 * At a cutoff |γ| is taken no smaller than 1e-6·k, so that the impedance stays finite: an offset of 1e-12 in (f/fc)².
 *
 * @throws {RangeError} radius or frequency not positive
 * @source Marcuvitz 1951, section 2.3; Pozar eq. 3.117, 3.139
 */
export function waveImpedance(mode: GuideMode, radius: number, frequency: number): Complex {
  const squared = propagationSquared("waveImpedance", mode, radius, frequency);
  const k = (2 * Math.PI * frequency) / speedOfLight;
  const ratio = Math.max(Math.sqrt(Math.abs(squared)) / k, 1e-6);
  const size = mode.family === "TE" ? vacuumImpedance / ratio : vacuumImpedance * ratio;
  if (squared < 0) return { re: size, im: 0 };
  return { re: 0, im: mode.family === "TE" ? size : -size };
}

/** A transverse field vector at a point: components along ρ and φ. */
export interface TransverseField {
  eRho: number;
  ePhi: number;
}

/**
 * Transverse electric profile e of a mode, 1/m, with ∫|e|² dS = 1 over the cross-section.
 *
 *   TE: e_ρ ∝ m J_m(x)/x cos mφ,  e_φ ∝ −J_m′(x) sin mφ        x = χρ/a
 *   TM: e_ρ ∝ J_m′(x) cos mφ,     e_φ ∝ −m J_m(x)/x sin mφ
 *
 * For a power wave a (|a|² in W) the fields (peak phasors) are E_t = √(2Z)·a·e and H_t = √(2/Z)·a·(ẑ × e). For m = 1
 * e_x > 0 on the axis, polarized along x (φ = 0). For m = 0 the profile is e_φ (TE) or e_ρ (TM) ∝ +J1(x), without φ.
 *
 * @param rho m, 0…radius
 * @param phi rad
 * @throws {RangeError} rho outside the guide, radius not positive
 * @source Marcuvitz 1951, section 2.3 (eq. 20–30); normalization: A&S 1964, 11.4.5
 */
export function modeField(mode: GuideMode, radius: number, rho: number, phi: number): TransverseField {
  requirePositive("modeField: radius", radius, "m");
  requireNumber("modeField: rho", rho, { min: 0, max: radius * (1 + 1e-12), unit: "m" });
  const chi = transverseNumber(mode);
  const { m } = mode;
  const x = (chi * rho) / radius;
  const scale = profileScale(mode, chi) / radius;
  if (m === 0) {
    const value = scale * besselJ(1, x);
    return mode.family === "TE" ? { eRho: 0, ePhi: value } : { eRho: value, ePhi: 0 };
  }
  const slope = besselJPrime(m, x);
  const share = x === 0 ? (m === 1 ? 0.5 : 0) : (m * besselJ(m, x)) / x;
  const [along, across] = mode.family === "TE" ? [share, slope] : [slope, share];
  return { eRho: scale * along * Math.cos(m * phi), ePhi: -scale * across * Math.sin(m * phi) };
}

/**
 * Factor before the bare profile (as written at `modeField`, x-dependence only) for ∫|e|² dS = 1 at radius 1 m.
 * Divide by the radius for another one. For m = 1 the axis field is half of it.
 */
export function profileScale(mode: GuideMode, chi = transverseNumber(mode)): number {
  const angular = mode.m === 0 ? 2 * Math.PI : Math.PI;
  const radial =
    mode.family === "TE"
      ? ((chi * chi - mode.m * mode.m) * besselJ(mode.m, chi) ** 2) / 2
      : (chi * chi * besselJPrime(mode.m, chi) ** 2) / 2;
  return chi / Math.sqrt(angular * radial);
}

/** Surface resistance of a smooth metal, ohm: Rs = √(π f μ0/σ). @param conductivity S/m @source Pozar eq. 1.125 */
export function surfaceResistance(frequency: number, conductivity: number): number {
  requirePositive("surfaceResistance: frequency", frequency, "Hz");
  requirePositive("surfaceResistance: conductivity", conductivity, "S/m");
  return Math.sqrt((Math.PI * frequency * vacuumPermeability) / conductivity);
}

/**
 * Attenuation by the wall's ohmic loss, Np/m, by the power-loss method (fields of the lossless guide):
 *
 *   TE: α = Rs/(a η √(1 − q²)) · [q² + m²/(χ² − m²)],   TM: α = Rs/(a η √(1 − q²)),   q = fc/f
 *
 * The method fails within about Rs/η (relative) of cutoff; a real surface is rougher than Rs assumes (tens of percent).
 *
 * @param conductivity S/m, > 0
 * @returns Np/m; × 8.685 889 638 for dB/m
 * @throws {RangeError} at or below cutoff, or an argument not positive
 * @source Marcuvitz 1951, section 2.3; Pozar eq. 3.133 (TE11)
 */
export function wallLoss(mode: GuideMode, radius: number, frequency: number, conductivity: number): number {
  const resistance = surfaceResistance(frequency, conductivity);
  const cutoff = cutoffFrequency(mode, radius);
  if (frequency <= cutoff) {
    throw new RangeError(
      `wallLoss: frequency must be above the ${modeName(mode)} cutoff of ${(cutoff / 1e9).toPrecision(6)} GHz; got ${frequency / 1e9} GHz`,
    );
  }
  const q = cutoff / frequency;
  const chi = transverseNumber(mode);
  const share = mode.family === "TM" ? 1 : q * q + (mode.m * mode.m) / (chi * chi - mode.m * mode.m);
  return (resistance * share) / (radius * vacuumImpedance * Math.sqrt((1 - q) * (1 + q)));
}

/**
 * All modes (of any azimuthal order) that travel in a guide of this radius, by ascending cutoff. An ideal body of
 * revolution driven by TE11 excites only those with m = 1.
 * @throws {RangeError} radius or frequency not positive, or so large a guide that orders above 100 travel (ka > 100)
 */
export function travellingModes(radius: number, frequency: number): GuideMode[] {
  requirePositive("travellingModes: radius", radius, "m");
  requirePositive("travellingModes: frequency", frequency, "Hz");
  const ka = (2 * Math.PI * frequency * radius) / speedOfLight;
  requireNumber("travellingModes: k·radius", ka, { max: 100 });
  const found: { mode: GuideMode; chi: number }[] = [];
  for (const family of ["TE", "TM"] as const) {
    // The first zero exceeds the order (A&S 9.5.2), so orders beyond ka are cut off.
    for (let m = 0; m <= ka; m++) {
      for (let n = 1; ; n++) {
        const mode: GuideMode = { family, m, n };
        const chi = transverseNumber(mode);
        if (chi >= ka) break;
        found.push({ mode, chi });
      }
    }
  }
  return found.sort((p, q) => p.chi - q.chi || (p.mode.family < q.mode.family ? -1 : 1)).map(({ mode }) => mode);
}
