// The bore of a horn with its slots bridged: stations that a drawing dimensions, and what a tool finds on its way in.

import type { HornProfile } from "../horn-profile.ts";
import { type RingSlot, wallFeatures, wallPoints, type ZR } from "./metal.ts";

/** A place of the bore that a drawing dimensions. Lengths in m. */
export interface Station {
  name: "throat" | "mouth" | "step" | "corner";
  z: number;
  /** radius toward the throat */
  before: number;
  /** radius toward the mouth; differs at a step only */
  after: number;
}

/** Inner wall with each slot bridged from ridge to ridge. @throws {RangeError} as `wallFeatures` */
export function bridgedBore(profile: HornProfile, slots: readonly RingSlot[] = wallFeatures(profile).slots): ZR[] {
  const points = wallPoints(profile);
  let next = 0;
  return points.filter(([z], i) => {
    while (next < slots.length && z > slots[next]!.end) next++;
    const slot = slots[next];
    if (!slot || z < slot.start) return true;
    // Of the corners at a slot's ends only the ridges stay.
    if (z === slot.start) return points[i - 1]?.[0] !== z;
    return z === slot.end && points[i + 1]?.[0] !== z;
  });
}

/** Slots with only ridges between them: one group. @returns [first, last] index of each */
export function slotGroups(slots: readonly RingSlot[]): [number, number][] {
  const groups: [number, number][] = [];
  slots.forEach((slot, i) => {
    const last = slots[i - 1];
    // A ridge much longer than the slot beside it is a wall of its own.
    if (last && slot.start - last.end <= 2 * (last.end - last.start)) groups.at(-1)![1] = i;
    else groups.push([i, i]);
  });
  return groups;
}

/** A corner that leaves its neighbours' line by less than this is none, m. */
const straight = 1e-8;

/**
 * Stations from the throat to the mouth: ends, steps, and the corners of cones and cylinders. Between the slots of a group
 * there are none: the table of slots says where they stand.
 * @throws {RangeError} as `wallFeatures`
 */
export function stations(profile: HornProfile): Station[] {
  const { slots } = wallFeatures(profile);
  const ranges = slotGroups(slots).map(([first, last]) => [slots[first]!.start, slots[last]!.end] as const);
  const bore = bridgedBore(profile, slots);
  const found: Station[] = [];
  bore.forEach(([z, radius], i) => {
    const [before, after] = [bore[i - 1], bore[i + 1]];
    if (before && before[0] === z) return;
    const end = !before || !after;
    if (!end && ranges.some(([start, stop]) => z > start && z <= stop)) return;
    const stepped = after?.[0] === z ? bore[lastAt(bore, i)]![1] : radius;
    if (stepped === radius && !end && Math.abs(offLine(before, [z, radius], after)) < straight) return;
    const name = !before
      ? "throat"
      : lastAt(bore, i) === bore.length - 1
        ? "mouth"
        : stepped !== radius
          ? "step"
          : "corner";
    found.push({ name, z, before: radius, after: stepped });
  });
  return found;
}

function lastAt(points: readonly ZR[], i: number): number {
  let last = i;
  while (points[last + 1]?.[0] === points[i]![0]) last++;
  return last;
}

/** Radius of a point above the line between two others, m. */
function offLine(from: ZR, [z, radius]: ZR, to: ZR): number {
  return radius - from[1] - ((to[1] - from[1]) * (z - from[0])) / (to[0] - from[0]);
}

/** More stations than these are a curve: its points stand in the drawing's file and numbers, not among the dimensions. */
const mostStations = 8;

/** Those that a drawing dimensions: all, or of a curve the ends and steps. */
export function listedStations(found: readonly Station[]): readonly Station[] {
  return found.length <= mostStations ? found : found.filter(({ name }) => name !== "corner").slice(-mostStations);
}
