// How a mode travels from the step to the mouth: its phase, or its decay where the guide is too narrow for it.

import { requirePositive } from "../../check.ts";
import { speedOfLight } from "../../constants.ts";
import { type GuideMode, transverseNumber } from "../../guide/mode.ts";
import type { DualModeGeometry } from "./geometry.ts";

/** ∫β dz, rad, where the mode travels, and ∫α dz, Np, where it is cut off (lossless wall). */
export interface ModeTravel {
  phase: number;
  decay: number;
}

/**
 * ∫γ dz of a mode over the straight and the flare, the guide taken as straight at each z (WKB), in closed form:
 *
 *   ∫β da = √((ka)² − χ²) − χ arccos(χ/ka),     below cutoff  −∫α da = χ arcosh(χ/ka) − √(χ² − (ka)²)
 *
 * What it leaves out: conversion between modes along the flare, and reflection where the mode is near its cutoff; both
 * small for half flare angles up to about 15°, common practice for dual-mode horns.
 *
 * @throws {RangeError} frequency not positive
 */
export function travelToMouth(mode: GuideMode, geometry: DualModeGeometry, frequency: number): ModeTravel {
  const k = (2 * Math.PI * requirePositive("travelToMouth: frequency", frequency, "Hz")) / speedOfLight;
  const chi = transverseNumber(mode);
  const straight = alongStraight(chi, k * geometry.stepRadius, k * geometry.straightLength);
  const { startRadius, radius, length } = geometry.flare;
  // A cone of less than a micrometre in radius is straight to rounding.
  const cone =
    radius - startRadius < 1e-9 * radius
      ? alongStraight(chi, k * radius, k * length)
      : alongCone(chi, k * startRadius, k * radius, length / (radius - startRadius));
  return { phase: straight.phase + cone.phase, decay: straight.decay + cone.decay };
}

/** Straight guide; radius and length times k. */
function alongStraight(chi: number, ka: number, kLength: number): ModeTravel {
  const squared = (1 - chi / ka) * (1 + chi / ka);
  const turn = Math.sqrt(Math.abs(squared)) * kLength;
  return squared > 0 ? { phase: turn, decay: 0 } : { phase: 0, decay: turn };
}

/** Cone from ka = from to ka = to, dz = perRadius·da. */
function alongCone(chi: number, from: number, to: number, perRadius: number): ModeTravel {
  const phaseTo = (ka: number): number =>
    ka <= chi ? 0 : Math.sqrt((ka - chi) * (ka + chi)) - chi * Math.acos(chi / ka);
  const decayFrom = (ka: number): number =>
    ka >= chi ? 0 : chi * Math.acosh(chi / ka) - Math.sqrt((chi - ka) * (chi + ka));
  return { phase: perRadius * (phaseTo(to) - phaseTo(from)), decay: perRadius * (decayFrom(from) - decayFrom(to)) };
}
