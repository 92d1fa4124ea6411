// Closed-form model of the smooth-wall cone: TE11 alone at the mouth, under the spherical phase of the flare.

import { modeField, TE11, wallLoss, waveImpedance } from "../../guide/mode.ts";
import { integrate } from "../../math/quadrature.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import { aperturePattern } from "../../radiation/aperture-pattern.ts";
import { capSlant, type Flare, radiusAt } from "../flare.ts";
import type { MouthTerm } from "../mouth-field.ts";
import type { SmoothGeometry } from "./geometry.ts";

/** Pattern of 1 W of TE11 behind a flare. @param thetaCount angles from 0 to π */
export function te11Pattern(flare: Flare, frequency: number, thetaCount: number): FeedPattern {
  const amplitudes = { re: Float64Array.of(1, 0), im: new Float64Array(2) };
  return aperturePattern(
    { frequency, radius: flare.radius, modePairs: 1, amplitudes, warnings: [] },
    { flareSlant: capSlant(flare), thetaCount },
  );
}

export function smoothPattern({ flare }: SmoothGeometry, frequency: number, thetaCount: number): FeedPattern {
  return te11Pattern(flare, frequency, thetaCount);
}

export function smoothMouth({ flare }: SmoothGeometry, frequency: number): MouthTerm[] {
  const impedance = waveImpedance(TE11, flare.radius, frequency).re;
  return [
    {
      name: "TE11",
      powerShare: 1,
      phase: 0,
      amplitude: { re: Math.sqrt(2 * impedance), im: 0 },
      profile: (rho, phi) => modeField(TE11, flare.radius, rho, phi),
    },
  ];
}

/** Attenuation of TE11 along the cone, Np: ∫ α(a(z)) dz, the guide taken as straight at each z. 24 Gauss points: 1e-6 relative. */
export function smoothAttenuation({ flare }: SmoothGeometry, frequency: number, conductivity: number): number {
  return integrate((z) => wallLoss(TE11, radiusAt(flare, z), frequency, conductivity), -flare.length, 0, 24);
}
