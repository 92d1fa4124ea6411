// The dual-mode horn: a guide, an abrupt step that raises TM11, a straight that sets its phase, a flare to the mouth.

import type { Dimension } from "../candidate.ts";
import type { Flare } from "../flare.ts";
import type { HornProfile } from "../horn-profile.ts";

/** Plain data; lengths in m. */
export interface DualModeGeometry {
  /** guide before the step: TE11 travels, TM11 doesn't */
  inputRadius: number;
  inputLength: number;
  /** guide behind the step: TM11 travels, TE12 doesn't */
  stepRadius: number;
  straightLength: number;
  /** from the step radius to the mouth */
  flare: Flare;
  wall: number;
  /** |TM11|/|TE11| at the mouth at band centre, power waves */
  modeRatio: number;
  /** full turns by which TE11 falls behind TM11 from step to mouth at band centre, launch phase included */
  turns: number;
}

export function dualModeLength({ inputLength, straightLength, flare }: DualModeGeometry): number {
  return inputLength + straightLength + flare.length;
}

export function dualModeProfile(geometry: DualModeGeometry): HornProfile {
  const { inputRadius, stepRadius, straightLength, flare } = geometry;
  const step = -(straightLength + flare.length);
  return {
    z: [-dualModeLength(geometry), step, step, -flare.length, 0],
    radius: [inputRadius, inputRadius, stepRadius, stepRadius, flare.radius],
  };
}

export function dualModeDimensions(geometry: DualModeGeometry): Dimension[] {
  const { flare } = geometry;
  return [
    { label: "input guide radius", value: geometry.inputRadius, unit: "m" },
    { label: "input guide length", value: geometry.inputLength, unit: "m" },
    { label: "radius behind the step", value: geometry.stepRadius, unit: "m" },
    { label: "phasing length", value: geometry.straightLength, unit: "m" },
    { label: "flare length", value: flare.length, unit: "m" },
    { label: "half flare angle", value: Math.atan((flare.radius - flare.startRadius) / flare.length), unit: "rad" },
    { label: "mouth radius", value: flare.radius, unit: "m" },
    { label: "phase error at the rim of the mouth, wavelengths", value: flare.phaseError, unit: "1" },
    { label: "TM11 over TE11 at the mouth, amplitude", value: geometry.modeRatio, unit: "1" },
    { label: "wall", value: geometry.wall, unit: "m" },
  ];
}
