// What a horn's inner wall says about its metal: steps, slots, and an outer wall that covers them.

import type { HornProfile } from "../horn-profile.ts";

/** A point of a wall, m. */
export type ZR = readonly [z: number, radius: number];

/** An abrupt change of diameter that is no slot. */
export interface DiameterStep {
  z: number;
  from: number;
  to: number;
}

/** A ring slot cut into the wall, between two ridges. */
export interface RingSlot {
  start: number;
  end: number;
  /** m, radius of the ridge on its mouth side */
  innerRadius: number;
  outerRadius: number;
}

export interface WallFeatures {
  steps: DiameterStep[];
  slots: RingSlot[];
}

/**
 * Finds the abrupt steps of a profile and reads them: up and down again is a slot, up alone (or down alone) a diameter step.
 * @throws {RangeError} fewer than two points, lengths that differ, z falling, a radius not positive
 */
export function wallFeatures(profile: HornProfile): WallFeatures {
  const points = wallPoints(profile);
  const jumps: { z: number; from: number; to: number }[] = [];
  for (let i = 1; i < points.length; i++) {
    const [z0, from] = points[i - 1]!;
    const [z1, to] = points[i]!;
    if (z1 > z0 || to === from) continue;
    const last = jumps.at(-1);
    if (last && last.z === z1 && last.to === from) last.to = to;
    else jumps.push({ z: z1, from, to });
  }
  const features: WallFeatures = { steps: [], slots: [] };
  for (let i = 0; i < jumps.length; i++) {
    const up = jumps[i]!;
    const down = jumps[i + 1];
    if (up.to > up.from && down && down.to < down.from) {
      features.slots.push({ start: up.z, end: down.z, innerRadius: down.to, outerRadius: up.to });
      i++;
    } else features.steps.push(up);
  }
  return features;
}

/** Two points nearer than this along the axis are taken as one z, m: far below any tolerance, far above rounding. */
const abrupt = 1e-9;

/** Points without repetitions, steps at exactly one z. @throws {RangeError} as `wallFeatures` */
export function wallPoints({ z, radius }: HornProfile): ZR[] {
  if (z.length !== radius.length || z.length < 2)
    throw new RangeError(
      `horn profile: must have as many z as radii, at least two; got ${z.length} and ${radius.length}`,
    );
  const points: ZR[] = [];
  z.forEach((given, i) => {
    const r = radius[i]!;
    if (!(r > 0) || !Number.isFinite(r) || !Number.isFinite(given))
      throw new RangeError(
        `horn profile: point ${i + 1} must have a finite z and a positive radius in m; got z ${given}, radius ${r}`,
      );
    const last = points.at(-1);
    if (last && given < last[0] - abrupt)
      throw new RangeError(`horn profile: z must not fall; got ${given} m after ${last[0]} m`);
    const at = last && given - last[0] <= abrupt ? last[0] : given;
    if (!last || last[0] !== at || Math.abs(last[1] - r) > abrupt) points.push([at, r]);
  });
  return points;
}

/** The inner wall with its slots filled to their bottoms where ridges are thin: what the outer wall has to clear. */
function clearance(points: ZR[], slots: RingSlot[]): ZR[] {
  if (slots.length === 0) return points;
  const first = slots[0]!;
  const covered: ZR[] = points.filter(([z]) => z < first.start);
  const before = points.findLast(([z, r]) => z === first.start && r < first.outerRadius);
  if (before) covered.push(before);
  const ends = new Set(slots.map(({ end }) => end));
  const starts = new Set(slots.map(({ start }) => start));
  /** the bottom's corners of a slot: before another point at its end, behind another one at its start */
  const isSlotCorner = (k: number): boolean => {
    const z = points[k]![0];
    return (ends.has(z) && points[k + 1]?.[0] === z) || (starts.has(z) && points[k - 1]?.[0] === z);
  };
  let joined = false;
  slots.forEach((slot, i) => {
    const nextStart = slots[i + 1]?.start ?? 0;
    // A ridge much longer than the slot beside it is a wall of its own.
    const joins = nextStart - slot.end <= 2 * (slot.end - slot.start);
    // Between joined slots the wall runs straight from middle to middle; an end keeps its corner.
    if (!joined) covered.push([slot.start, slot.outerRadius]);
    covered.push([(slot.start + slot.end) / 2, slot.outerRadius]);
    if (!joins) {
      covered.push([slot.end, slot.outerRadius]);
      covered.push(...points.filter(([z], k) => z >= slot.end && z <= nextStart && !isSlotCorner(k)));
    } else if (!slots[i + 1]) covered.push([0, slot.outerRadius]);
    joined = joins;
  });
  return covered;
}

/**
 * Outer wall of a horn turned with an even wall: the inner wall (slots covered) moved outward by `wall` in radius, and by
 * `wall` along the axis where it steps.
 * @returns points from the throat plane to the mouth plane
 */
export function outerWall(profile: HornProfile, wall: number): ZR[] {
  const covered = clearance(wallPoints(profile), wallFeatures(profile).slots);
  let outline = covered.map(([z, r]): ZR => [z, r + wall]);
  covered.forEach(([z, r], i) => {
    const before = covered[i - 1];
    if (!before || before[0] !== z || before[1] === r) return;
    // The wall of the wider side goes on over the narrower one.
    outline = raised(outline, r > before[1] ? [z - wall, z] : [z, z + wall], Math.max(r, before[1]) + wall);
  });
  return withoutIdlePoints(outline);
}

/** A wall that is at least so high between two planes. Vertical runs are where two values meet at one z. */
function raised(points: readonly ZR[], [from, to]: readonly [number, number], height: number): ZR[] {
  const result: ZR[] = [];
  for (let i = 1; i < points.length; i++) {
    const [z0, r0] = points[i - 1]!;
    const [z1, r1] = points[i]!;
    if (z1 <= z0) continue;
    const crossing = r1 === r0 ? z0 : z0 + ((height - r0) / (r1 - r0)) * (z1 - z0);
    const radius = (z: number): number => (z === z1 ? r1 : r0 + ((r1 - r0) * (z - z0)) / (z1 - z0));
    const cuts = [z0, ...[from, to, crossing].filter((z) => z > z0 && z < z1).sort((p, q) => p - q), z1];
    for (let k = 1; k < cuts.length; k++) {
      const [u, v] = [cuts[k - 1]!, cuts[k]!];
      const middle = (u + v) / 2;
      const lift = middle > from && middle < to ? height : 0;
      result.push([u, Math.max(radius(u), lift)], [v, Math.max(radius(v), lift)]);
    }
  }
  return result;
}

/** Without points that repeat the one before or lie on the line of their neighbours. */
function withoutIdlePoints(points: readonly ZR[]): ZR[] {
  const kept: ZR[] = [];
  for (const point of points) {
    const [before, last] = [kept.at(-2), kept.at(-1)];
    if (last && point[0] - last[0] <= abrupt && Math.abs(point[1] - last[1]) <= abrupt) continue;
    if (before && last) {
      const off = (last[1] - before[1]) * (point[0] - before[0]) - (point[1] - before[1]) * (last[0] - before[0]);
      if (Math.abs(off) <= abrupt * Math.hypot(point[0] - before[0], point[1] - before[1])) kept.pop();
    }
    kept.push(point);
  }
  return kept;
}

/** Largest radius that the outer wall has to clear, m. */
export function largestInnerRadius({ radius }: HornProfile): number {
  return radius.reduce((largest, r) => Math.max(largest, r), 0);
}

/** Thickness of the wall, m, as `outerDiameter` leaves it at the widest place. */
export function wallThickness({ profile, outerDiameter }: { profile: HornProfile; outerDiameter: number }): number {
  return outerDiameter / 2 - largestInnerRadius(profile);
}
