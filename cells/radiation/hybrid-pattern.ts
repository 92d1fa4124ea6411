// Far field of HE11 at the mouth of a corrugated horn.

import { requirePositive } from "../check.ts";
import { balancedLikeMode, type HybridMode } from "../guide/hybrid.ts";
import { hybridParts } from "../guide/hybrid-field.ts";
import { besselJ0, besselJ2 } from "../math/bessel.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import { defaultThetaCount } from "../pattern/theta-grid.ts";
import { transformOfField } from "./aperture-field.ts";
import { type ApertureOptions, apertureWarnings } from "./aperture-pattern.ts";
import { type ApertureTransform, farField } from "./aperture-transform.ts";
import { besselTriple, lommelIntegrals } from "./lommel.ts";

export interface HybridAperture extends ApertureOptions {
  /** Hz */
  frequency: number;
  /** m, inner radius of the teeth at the mouth */
  radius: number;
  /** Λ > 0 of the HE11 mode there (`hybridMode(…).hybridFactor`); default 1, balanced */
  hybridFactor?: number;
  /** W carried by the mode; default 1 */
  power?: number;
}

/**
 * Far field of the hybrid mode HE11 at a corrugated horn's mouth, flat or under the spherical phase of its flare.
 *
 * The aperture holds the mode's full transverse E and H: the copolar J0 parts, related by the mode's own impedance, and
 * the J2 parts (hybrid-field.ts). Balanced (Λ = 1), the J2 parts of E and H cancel in the far field, which is then alike
 * in all planes: no cross-polar. Off balance they don't, and that is the cross-polar over the band.
 *
 * Left out: as `aperturePattern`, and the other modes (EH12 above all), whose share a converter sets. Against mode
 * matching of a corrugated horn of 10° half-angle, 2.5–2.8 λ wide: directivity within 0.12 dB; cross-polar within 0.5 dB
 * where Λ is 1.09 (−40 dB), but far too low at balance, where the other modes leave −42 dB.
 *
 * @returns pattern in √(W/sr), phases at the centre of the aperture; aperturePower = power
 * @throws {RangeError} an argument not positive, radius below the HE11 cutoff, slant not above the radius
 * @accuracy flat 1e-12, flared 1e-11 of boresight for the stated field
 * @source Clarricoats & Olver, Corrugated Horns for Microwave Antennas, 1984, chapters 2 and 4
 */
export function hybridPattern(aperture: HybridAperture): FeedPattern {
  const { frequency, radius } = aperture;
  const mode = balancedLikeMode({ frequency, radius, hybridFactor: aperture.hybridFactor ?? 1 });
  return hybridModePattern(mode, aperture);
}

/**
 * The same for any fast hybrid mode as `hybridMode` gives it (EH12, to see what a share of it would do).
 * @throws {RangeError} a slow mode; as `hybridPattern`
 */
export function hybridModePattern(mode: HybridMode, options: ApertureOptions & { power?: number } = {}): FeedPattern {
  const { frequency, radius } = mode;
  const power = requirePositive("hybridPattern: power", options.power ?? 1, "W");
  const flareSlant = options.flareSlant ?? Number.POSITIVE_INFINITY;
  const parts = hybridParts(mode);
  const scale = Math.sqrt(power);
  const chi = parts.transverseNumber;
  const real = (re: number) => ({ re, im: 0 });
  const field = (j0: number, j2: number) => ({
    electricSum: real(scale * parts.electric0 * j0),
    electricDifference: real(scale * parts.electric2 * j2),
    magneticSum: real(scale * parts.magnetic0 * j0),
    magneticDifference: real(scale * parts.magnetic2 * j2),
  });
  let transformAt: (u: number) => ApertureTransform;
  if (flareSlant === Number.POSITIVE_INFINITY) {
    const own = besselTriple(chi);
    const area = Math.PI * radius * radius;
    transformAt = (u) => {
      const { order0, order2 } = lommelIntegrals(own, besselTriple(u));
      return field(area * order0, area * order2);
    };
  } else {
    transformAt = transformOfField({
      frequency,
      radius,
      flareSlant,
      fieldAt: (r) => field(besselJ0(chi * r), besselJ2(chi * r)),
      highestTransverseNumber: chi,
    });
  }
  return {
    frequency,
    ...farField({ frequency, radius, thetaCount: options.thetaCount ?? defaultThetaCount }, transformAt),
    phaseOriginZ: 0,
    aperturePower: power,
    warnings: apertureWarnings({ frequency, radius, flareSlant }),
  };
}
