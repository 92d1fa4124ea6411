// The corrugated horn: its slots and teeth, where they stand and how deep they are.

import { speedOfLight } from "../../constants.ts";
import type { CorrugatedWall } from "../../guide/hybrid.ts";
import { balancedSlotDepth } from "../../guide/slot.ts";
import type { Dimension } from "../candidate.ts";
import type { Flare } from "../flare.ts";
import type { HornProfile } from "../horn-profile.ts";

/** A slot and the tooth behind it (toward the mouth). Lengths in m. */
export interface Corrugation {
  /** radius of the tooth's top */
  innerRadius: number;
  /** radial depth of the slot, from that radius */
  depth: number;
}

/** Plain data; lengths in m. */
export interface CorrugatedGeometry {
  throatLength: number;
  /** from the throat to the top of the last tooth */
  flare: Flare;
  pitch: number;
  slotWidth: number;
  /** the first of them are the converter */
  converterCount: number;
  /** from the throat to the mouth; each begins with its slot */
  corrugations: Corrugation[];
  wall: number;
  /** Hz, at which the slots behind the converter are balanced */
  balanceFrequency: number;
  /** Hz, between which the model holds, and why it ends there */
  validity: Validity;
}

export interface Validity {
  low: number;
  high: number;
  lowReason: string;
  highReason: string;
}

/** Slots over which the depth falls from near λ/2 to the balanced depth: 5…8, common practice. */
export const converterCount = 6;
/** Fewest corrugations in all: the converter and four more for the mode to settle. */
export const fewestCorrugations = converterCount + 4;
/** Most corrugations: a longer horn is no practical feed, and dimensioning it no longer instant. */
export const mostCorrugations = 2000;
/** Depth of the first slot: wavelengths at band centre, and at most so much at the upper band edge, short of the half wave. */
const firstDepth = 0.42;
const firstDepthAtHigh = 0.48;

/**
 * Corrugations on a cone: tooth tops on the straight line from throat to mouth; depths from 0.42 λ at the first slot,
 * linearly over the converter, to the balanced depth for each slot's own radius (exact radial slot).
 *
 * @source depth law: Granet & James, "Design of corrugated horns: a primer", IEEE Antennas Propag. Mag. 47(2), 76–84, 2005;
 *   variable-depth converter: Thomas 1978, James 1982
 */
export function corrugations(
  flare: Flare,
  count: number,
  at: { bandCenter: number; bandHigh: number; balanceFrequency: number },
): Corrugation[] {
  const first = Math.min((firstDepth * speedOfLight) / at.bandCenter, (firstDepthAtHigh * speedOfLight) / at.bandHigh);
  return Array.from({ length: count }, (_, i) => {
    const innerRadius = flare.startRadius + ((flare.radius - flare.startRadius) * (i + 1)) / count;
    const balanced = balancedSlotDepth(at.balanceFrequency, innerRadius);
    const share = Math.min(1, i / converterCount);
    return { innerRadius, depth: Math.max(balanced, first + (balanced - first) * share) };
  });
}

/** The wall at one corrugation, as the hybrid-mode equations see it. */
export function wallAt({ innerRadius, depth }: Corrugation, slotFill: number): CorrugatedWall {
  return { innerRadius, depth, slotFill };
}

export function corrugatedLength({ throatLength, flare }: CorrugatedGeometry): number {
  return throatLength + flare.length;
}

/** Throat guide, then for each corrugation its slot (down, along, up) and its tooth; the last tooth ends at the mouth. */
export function corrugatedProfile(geometry: CorrugatedGeometry): HornProfile {
  const { throatLength, flare, pitch, slotWidth, corrugations: all } = geometry;
  const z = [-throatLength - flare.length, -flare.length];
  const radius = [flare.startRadius, flare.startRadius];
  // Counted from the mouth, so that the last tooth ends at exactly 0 and each slot begins exactly where a tooth ended.
  const start = (i: number): number => (i === all.length ? 0 : -(all.length - i) * pitch);
  all.forEach(({ innerRadius, depth }, i) => {
    z.push(start(i), start(i) + slotWidth, start(i) + slotWidth, start(i + 1));
    radius.push(innerRadius + depth, innerRadius + depth, innerRadius, innerRadius);
  });
  z[1] = z[2]!;
  return { z, radius };
}

/** m, over the deepest reach of any slot, wall included. */
export function corrugatedOuterDiameter({ corrugations: all, wall }: CorrugatedGeometry): number {
  return 2 * (all.reduce((widest, { innerRadius, depth }) => Math.max(widest, innerRadius + depth), 0) + wall);
}

export function corrugatedDimensions(geometry: CorrugatedGeometry): Dimension[] {
  const { flare, pitch, slotWidth, corrugations: all } = geometry;
  return [
    { label: "throat radius", value: flare.startRadius, unit: "m" },
    { label: "throat guide length", value: geometry.throatLength, unit: "m" },
    { label: "corrugations", value: all.length, unit: "1" },
    { label: "of these in the converter", value: geometry.converterCount, unit: "1" },
    { label: "pitch", value: pitch, unit: "m" },
    { label: "slot width", value: slotWidth, unit: "m" },
    { label: "tooth thickness", value: pitch - slotWidth, unit: "m" },
    { label: "first slot depth", value: all[0]!.depth, unit: "m" },
    { label: "last slot depth", value: all[all.length - 1]!.depth, unit: "m" },
    { label: "mouth radius, tops of the teeth", value: flare.radius, unit: "m" },
    { label: "flare length", value: flare.length, unit: "m" },
    { label: "half flare angle", value: Math.atan((flare.radius - flare.startRadius) / flare.length), unit: "rad" },
    { label: "phase error at the rim of the mouth, wavelengths", value: flare.phaseError, unit: "1" },
    { label: "wall", value: geometry.wall, unit: "m" },
  ];
}
