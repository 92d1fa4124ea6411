// The efficiency sum: from a feed's pattern to the gain of the dish.

import { requireNumber, requirePositive, type Warning } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import type { PatternInterpolant } from "../pattern/interpolant.ts";
import { movedInterpolant } from "../pattern/phase-center.ts";
import { radiatedPower } from "../pattern/power.ts";
import { powerToDb, toMm } from "../units.ts";
import { angleToRadius, type Dish, uniformGainDbi } from "./dish.ts";
import { phaseCenterOverDish } from "./feed-position.ts";
import { type Illumination, illuminationOf } from "./illumination.ts";
import { ruzeEfficiency, surfaceLossDb } from "./losses.ts";

export interface DishEfficiencyOptions {
  /** m along the feed's axis (0 = mouth, negative = inside the horn): the point that stands at the focus. Default: the best phase centre of this pattern over the dish. A built feed can't move with frequency, so a sweep gives it */
  phaseCenter?: number;
  /** m, diameter of the disc around the axis that the feed shades; default 0 */
  blockageDiameter?: number;
  /** share of the aperture's area that struts shade, evenly spread, 0…1; default 0 */
  strutShare?: number;
  /** m, rms; default 0 */
  surfaceError?: number;
  /** dB, positive, in the walls of the feed; default 0 */
  ohmicLossDb?: number;
}

/** What a dish does with one feed at one frequency. Every efficiency is a power ratio, 0…1. Plain data. */
export interface DishPerformance {
  /** Hz */
  frequency: number;
  /** share of the feed's power that reaches the dish */
  spilloverEfficiency: number;
  /** share of that which is copolar */
  polarizationEfficiency: number;
  /** loss by uneven amplitude over the aperture */
  illuminationEfficiency: number;
  /** loss by uneven phase over the aperture, with the feed where it stands */
  phaseEfficiency: number;
  /** product of the four above: a perfect dish with nothing in front of it */
  apertureEfficiency: number;
  /** what the feed's disc and the struts leave, by the field that falls on them */
  blockageEfficiency: number;
  /** what the rough surface leaves (Ruze) */
  surfaceEfficiency: number;
  /** what the feed's walls leave */
  radiationEfficiency: number;
  /** all together: gain over (πD/λ)² */
  totalEfficiency: number;
  /** dBi, all but the ohmic loss */
  directivityDbi: number;
  /** dBi, ohmic loss included */
  gainDbi: number;
  /** dBi, 100 % efficiency */
  uniformGainDbi: number;
  /** m, the point of the feed's axis at the focus */
  feedPositionZ: number;
  warnings: Warning[];
}

/** Largest surface error for which Ruze's formula is trusted here, wavelengths. */
const ruzeLimit = 1 / 16;
/** Smallest dish for which edge diffraction and the feed's near field are small against the numbers here, wavelengths. */
const smallestDish = 15;

/**
 * Kildal's sub-efficiencies of a front-fed paraboloid, and what blockage, surface and walls leave of them.
 *
 *   η_sp  = ∫₀^ψ (|C|²+|X|²) sin θ dθ / ∫₀^π (|C|²+|X|²) sin θ dθ
 *   η_pol = ∫₀^ψ |C|² sin θ dθ / ∫₀^ψ (|C|²+|X|²) sin θ dθ
 *   η_ill = 2 cot²(ψ/2) (∫₀^ψ |C| tan(θ/2) dθ)² / ∫₀^ψ |C|² sin θ dθ
 *   η_ph  = |∫₀^ψ C tan(θ/2) dθ|² / (∫₀^ψ |C| tan(θ/2) dθ)²
 *   η_bl  = |1 − ∫₀^θb C tan(θ/2) dθ / ∫₀^ψ C tan(θ/2) dθ|² (1 − struts)²,   θb the angle to the edge of the shaded disc
 *
 * with C = (E+H)/2 and X = (E−H)/2 in the 45° plane: a body of revolution driven by one TE11 polarization needs no other
 * cut. Aperture-field optics: no edge diffraction, no direct radiation of the feed on boresight, no multiple reflection
 * between dish and feed; the feed's far field is taken at the dish. Below about 15 wavelengths of diameter that is rough,
 * and the result carries a warning.
 *
 * A shift of the feed is taken as the far-field phase e^{jkz cos θ}, the usual definition; against a horn physically moved
 * this differs by up to 0.07 dB.
 *
 * @throws {RangeError} an option out of range; blockage as wide as the dish
 * @accuracy 3e-6 in each efficiency at 0.5° against the closed form of cosⁿ feeds, n = 2…8 (test/cells/reflector/efficiency)
 * @source Kildal, "Factorization of the feed efficiency of paraboloids and Cassegrain antennas", IEEE Trans. AP-33(8),
 *   903–908, 1985; blockage by the null-field hypothesis, common practice; Ruze 1966
 */
export function dishEfficiency(pattern: FeedPattern, dish: Dish, options: DishEfficiencyOptions = {}): DishPerformance {
  const { frequency } = pattern;
  const where = "dishEfficiency:";
  const blockageDiameter = requireNumber(`${where} blockage diameter`, options.blockageDiameter ?? 0, {
    min: 0,
    below: dish.diameter,
    unit: "m",
  });
  const strutShare = requireNumber(`${where} strut share`, options.strutShare ?? 0, { min: 0, below: 1 });
  const surfaceError = requireNumber(`${where} surface error`, options.surfaceError ?? 0, { min: 0, unit: "m" });
  const ohmicLossDb = requireNumber(`${where} ohmic loss`, options.ohmicLossDb ?? 0, { min: 0, unit: "dB" });
  const feedPositionZ =
    options.phaseCenter === undefined
      ? phaseCenterOverDish(pattern, dish).z
      : requireNumber(`${where} phase centre`, options.phaseCenter, { unit: "m" });

  const atFocus = movedInterpolant(pattern, feedPositionZ);
  const nodeCount = nodesFor(pattern, dish);
  const sums = integrals(illuminationOf(atFocus, dish.halfAngle, nodeCount));
  // The total comes from another rule than the share; for a feed with no spillover to speak of, rounding may order them wrongly.
  const caught = 2 * Math.PI * sums.power;
  const spilloverEfficiency = caught / Math.max(caught, radiatedPower(pattern));
  const polarizationEfficiency = sums.copolarPower / sums.power;
  const illuminationEfficiency = (2 * sums.amplitude ** 2) / (sums.copolarPower * Math.tan(dish.halfAngle / 2) ** 2);
  const phaseEfficiency = (sums.field.re ** 2 + sums.field.im ** 2) / sums.amplitude ** 2;
  const apertureEfficiency = spilloverEfficiency * polarizationEfficiency * illuminationEfficiency * phaseEfficiency;
  const blockageEfficiency = leftByDisc(atFocus, dish, blockageDiameter, sums.field) * (1 - strutShare) ** 2;

  const uniform = uniformGainDbi(dish.diameter, frequency);
  // summed in dB, where even an absurd surface leaves a finite number
  const directivityDbi =
    uniform + powerToDb(apertureEfficiency * blockageEfficiency) - surfaceLossDb(surfaceError, frequency);
  const surfaceEfficiency = ruzeEfficiency(surfaceError, frequency);
  const radiationEfficiency = 10 ** (-ohmicLossDb / 10);
  return {
    frequency,
    spilloverEfficiency,
    polarizationEfficiency,
    illuminationEfficiency,
    phaseEfficiency,
    apertureEfficiency,
    blockageEfficiency,
    surfaceEfficiency,
    radiationEfficiency,
    totalEfficiency: apertureEfficiency * blockageEfficiency * surfaceEfficiency * radiationEfficiency,
    directivityDbi,
    gainDbi: directivityDbi - ohmicLossDb,
    uniformGainDbi: uniform,
    feedPositionZ,
    warnings: [...pattern.warnings, ...doubts(dish, frequency, surfaceError)],
  };
}

/** As many nodes as the pattern has samples in the dish, never fewer than 64 or more than 400. */
function nodesFor(pattern: FeedPattern, dish: Dish): number {
  return Math.min(400, Math.max(64, Math.ceil((pattern.theta.length * dish.halfAngle) / Math.PI)));
}

/** The four integrals over θ; 2π times the powers is watts. */
function integrals({ theta, weight, copolar, crossPolarIntensity }: Illumination) {
  let power = 0;
  let copolarPower = 0;
  let amplitude = 0;
  const field = { re: 0, im: 0 };
  for (let i = 0; i < theta.length; i++) {
    const w = weight[i]!;
    const [re, im] = [copolar.re[i]!, copolar.im[i]!];
    const intensity = re * re + im * im;
    const solid = w * Math.sin(theta[i]!);
    const aperture = w * Math.tan(theta[i]! / 2);
    copolarPower += intensity * solid;
    power += (intensity + crossPolarIntensity[i]!) * solid;
    amplitude += Math.sqrt(intensity) * aperture;
    field.re += re * aperture;
    field.im += im * aperture;
  }
  return { power, copolarPower, amplitude, field };
}

/** |1 − field on the disc / field on the dish|². */
function leftByDisc(
  atFocus: PatternInterpolant,
  dish: Dish,
  diameter: number,
  onDish: { re: number; im: number },
): number {
  if (diameter === 0) return 1;
  const { field } = integrals(illuminationOf(atFocus, angleToRadius(dish, diameter / 2)));
  const re = onDish.re - field.re;
  const im = onDish.im - field.im;
  return (re * re + im * im) / (onDish.re ** 2 + onDish.im ** 2);
}

function doubts(dish: Dish, frequency: number, surfaceError: number): Warning[] {
  const wavelength = speedOfLight / requirePositive("dishEfficiency: frequency", frequency, "Hz");
  const warnings: Warning[] = [];
  const diameterWaves = dish.diameter / wavelength;
  if (diameterWaves < smallestDish)
    warnings.push({
      code: "outside-validated-range",
      text: `The dish is ${diameterWaves.toPrecision(3)} wavelengths wide; below about ${smallestDish} the aperture-field efficiencies are rough, because edge diffraction and the feed's near field are left out.`,
    });
  if (surfaceError > ruzeLimit * wavelength)
    warnings.push({
      code: "outside-validated-range",
      text: `The surface error of ${toMm(surfaceError).toPrecision(3)} mm is ${(surfaceError / wavelength).toPrecision(2)} wavelengths; beyond 1/16 Ruze's formula leaves out most of what still radiates.`,
    });
  return warnings;
}
