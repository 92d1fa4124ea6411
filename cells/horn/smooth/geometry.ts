// The smooth-wall cone: what it is made of.

import type { Dimension } from "../candidate.ts";
import type { Flare } from "../flare.ts";
import type { HornProfile } from "../horn-profile.ts";

/** The cone from its throat to the mouth. Plain data. */
export interface SmoothGeometry {
  flare: Flare;
  /** m */
  wall: number;
}

export function smoothProfile({ flare }: SmoothGeometry): HornProfile {
  return { z: [-flare.length, 0], radius: [flare.startRadius, flare.radius] };
}

export function smoothDimensions({ flare, wall }: SmoothGeometry): Dimension[] {
  return [
    { label: "throat radius", value: flare.startRadius, unit: "m" },
    { label: "mouth radius", value: flare.radius, unit: "m" },
    { label: "length", value: flare.length, unit: "m" },
    { label: "half flare angle", value: Math.atan((flare.radius - flare.startRadius) / flare.length), unit: "rad" },
    { label: "phase error at the rim of the mouth, wavelengths", value: flare.phaseError, unit: "1" },
    { label: "wall", value: wall, unit: "m" },
  ];
}
