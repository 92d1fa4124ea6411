// The mode ratio of a dual-mode mouth: as much TM11 as makes E- and H-plane equal at the rim.

import type { Complex } from "../../math/complex.ts";
import { patternInterpolant } from "../../pattern/interpolant.ts";
import { aperturePattern } from "../../radiation/aperture-pattern.ts";
import { capSlant, type Flare } from "../flare.ts";
import { coarseThetaCountFor } from "../kind.ts";
import { te11Pattern } from "../smooth/model.ts";

/** A mouth with TE11 and TM11 in phase, both planes as much alike at the rim as TM11 can make them. */
export interface BalancedMouth {
  /** |TM11|/|TE11|, power waves; 0 or below where TE11's E-plane is not narrower than its H-plane at the rim */
  ratio: number;
  /** dB, positive: fall of the φ-mean from boresight to the rim */
  taperDb: number;
  /** dB, E-plane over H-plane at the rim: 0 unless no ratio makes them equal */
  planeDifferenceDb: number;
}

/**
 * Solves |E_TE + r·E_TM|² = |H_TE + r·H_TM|² at the rim angle for the positive r, on the closed-form patterns.
 *
 * With a flat mouth TM11 radiates nothing in the H-plane and on boresight; the spherical phase of a flare makes it a few
 * hundredths of a decibel, so both planes and boresight carry it here. With much phase error the two modes' E-planes part in
 * phase toward the rim, and no r may make the planes equal: then the r of least difference, and the difference left.
 */
export function balancedMouth(flare: Flare, frequency: number, halfAngle: number): BalancedMouth {
  const thetaCount = coarseThetaCountFor(flare.radius, frequency);
  const te = patternInterpolant(te11Pattern(flare, frequency, thetaCount));
  const amplitudes = { re: Float64Array.of(1, 1), im: new Float64Array(2) };
  const modes = { frequency, radius: flare.radius, modePairs: 1, amplitudes, warnings: [] };
  const both = patternInterpolant(aperturePattern(modes, { flareSlant: capSlant(flare), thetaCount }));
  const [e, h, axis] = [te.ePlane(halfAngle), te.hPlane(halfAngle), te.copolar45(0)];
  const eTm = difference(both.ePlane(halfAngle), e);
  const hTm = difference(both.hPlane(halfAngle), h);
  const axisTm = difference(both.copolar45(0), axis);
  // a r² + 2 b r + c = 0
  const a = power(eTm) - power(hTm);
  const b = product(e, eTm) - product(h, hTm);
  const c = power(e) - power(h);
  const ratio = (-b + Math.sqrt(Math.max(0, b * b - a * c))) / a;
  const at = (te11: Complex, tm11: Complex): number =>
    (te11.re + ratio * tm11.re) ** 2 + (te11.im + ratio * tm11.im) ** 2;
  const levels = [at(e, eTm), at(h, hTm)] as const;
  return {
    ratio,
    taperDb: 10 * Math.log10((2 * at(axis, axisTm)) / (levels[0] + levels[1])),
    planeDifferenceDb: 10 * Math.log10(levels[0] / levels[1]),
  };
}

const difference = (p: Complex, q: Complex): Complex => ({ re: p.re - q.re, im: p.im - q.im });
const power = ({ re, im }: Complex): number => re * re + im * im;
/** Re p q* */
const product = (p: Complex, q: Complex): number => p.re * q.re + p.im * q.im;
