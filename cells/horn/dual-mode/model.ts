// Closed-form model of the dual-mode horn: TE11 and TM11 as the step launches them, carried to the mouth, radiated.

import { modeField, modeName, TE11, TM11, travels, wallLoss, waveImpedance } from "../../guide/mode.ts";
import { integrate } from "../../math/quadrature.ts";
import type { FeedPattern } from "../../pattern/feed-pattern.ts";
import type { ApertureModes } from "../../radiation/aperture-modes.ts";
import { aperturePattern } from "../../radiation/aperture-pattern.ts";
import { capSlant, radiusAt } from "../flare.ts";
import type { MouthTerm } from "../mouth-field.ts";
import type { DualModeGeometry } from "./geometry.ts";
import { stepCoupling, stepLaunch } from "./step.ts";
import { travelToMouth } from "./travel.ts";

/**
 * TE11 and TM11 at the mouth for 1 W of TE11 at the throat; phases relative to TE11 there, whose amplitude is real.
 *
 * Amplitudes come from the step (`stepLaunch`) and stay; the phase between the modes is the launch phase plus what TE11
 * falls behind on the way (`travelToMouth`). Where TM11 is cut off on the way it decays, and the result says so.
 *
 * @throws {RangeError} frequency not positive, or TE11 cut off in the input guide
 */
export function dualModeAperture(geometry: DualModeGeometry, frequency: number): ApertureModes {
  const launch = stepLaunch(stepCoupling(geometry.inputRadius, geometry.stepRadius), frequency);
  const te11 = travelToMouth(TE11, geometry, frequency);
  const tm11 = travelToMouth(TM11, geometry, frequency);
  const size = Math.hypot(launch.te11.re, launch.te11.im);
  const share = size * launch.ratio * Math.exp(-tm11.decay);
  const phase = launch.phaseLead + te11.phase - tm11.phase;
  const cutOff = !travels(TM11, geometry.stepRadius, frequency);
  return {
    frequency,
    radius: geometry.flare.radius,
    modePairs: 1,
    amplitudes: {
      re: Float64Array.of(size, share * Math.cos(phase)),
      im: Float64Array.of(0, share * Math.sin(phase)),
    },
    warnings: cutOff
      ? [
          {
            code: "outside-validated-range",
            text: `TM11 is cut off behind the step at ${(frequency / 1e9).toFixed(3)} GHz: the horn works as a smooth one there, and the step's model is rough.`,
          },
        ]
      : [],
  };
}

export function dualModePattern(geometry: DualModeGeometry, frequency: number, thetaCount: number): FeedPattern {
  const modes = dualModeAperture(geometry, frequency);
  return aperturePattern(modes, { flareSlant: capSlant(geometry.flare), thetaCount });
}

/** TE11 and TM11 at the mouth. A TM11 cut off there carries no power; its share is then 0. */
export function dualModeMouth(geometry: DualModeGeometry, frequency: number): MouthTerm[] {
  const { radius } = geometry.flare;
  const { re, im } = dualModeAperture(geometry, frequency).amplitudes;
  const powers = [TE11, TM11].map((mode, i) => (travels(mode, radius, frequency) ? re[i]! ** 2 + im[i]! ** 2 : 0));
  const all = powers[0]! + powers[1]!;
  return [TE11, TM11].map((mode, i) => {
    const impedance = waveImpedance(mode, radius, frequency);
    const scale = Math.sqrt(2 * Math.hypot(impedance.re, impedance.im));
    return {
      name: modeName(mode),
      powerShare: powers[i]! / all,
      phase: Math.atan2(im[i]!, re[i]!),
      amplitude: { re: scale * re[i]!, im: scale * im[i]! },
      profile: (rho, phi) => modeField(mode, radius, rho, phi),
    };
  });
}

/**
 * Attenuation from throat to mouth, Np: TE11 alone before the step, then each mode's own share of the power by its own
 * attenuation along straight and flare (power-loss method, guide taken as straight at each z).
 *
 * @throws {RangeError} frequency at or below the TM11 cutoff behind the step
 */
export function dualModeAttenuation(geometry: DualModeGeometry, frequency: number, conductivity: number): number {
  const { flare, stepRadius, straightLength } = geometry;
  const input = geometry.inputLength * wallLoss(TE11, geometry.inputRadius, frequency, conductivity);
  const { ratio } = stepLaunch(stepCoupling(geometry.inputRadius, stepRadius), frequency);
  const beyond = [TE11, TM11].map(
    (mode) =>
      straightLength * wallLoss(mode, stepRadius, frequency, conductivity) +
      integrate((z) => wallLoss(mode, radiusAt(flare, z), frequency, conductivity), -flare.length, 0, 24),
  ) as [number, number];
  const tm11Power = ratio ** 2 / (1 + ratio ** 2);
  const left = (1 - tm11Power) * Math.exp(-2 * beyond[0]) + tm11Power * Math.exp(-2 * beyond[1]);
  return input - Math.log(left) / 2;
}
