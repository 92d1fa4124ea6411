// What a lathe can make of a horn: its teeth, slots, wall and depths against figures of common practice.

import { requirePositive } from "../../check.ts";
import { toMm } from "../../units.ts";
import type { HornProfile } from "../horn-profile.ts";
import { slotGroups } from "./bore.ts";
import { type RingSlot, wallFeatures, type ZR } from "./metal.ts";
import { hardestReach, type Reach } from "./reach.ts";
import { thinnestWall } from "./thinnest-wall.ts";

/** passes: within what is usual; barely: within what can be done with care; misses: beyond */
export type MachiningWord = "passes" | "barely" | "misses";

/** One check. */
export interface MachiningVerdict {
  field: "tooth" | "toothSlenderness" | "slotWidth" | "slotAspect" | "wall" | "reach" | "tolerance";
  label: string;
  sense: "at least" | "at most";
  /** m, or a plain ratio; null where there is no such value: no bar passes */
  value: number | null;
  unit: "m" | "1";
  /** what any good shop does, and what can be done at all */
  usual: number;
  limit: number;
  verdict: MachiningWord;
  /** where the worst is, or what to do about it */
  words: string;
}

/** What a shop usually does and what it can do at most. Lengths in m. */
export interface ShopLimits {
  tooth: readonly [usual: number, limit: number];
  toothSlenderness: readonly [usual: number, limit: number];
  slotWidth: readonly [usual: number, limit: number];
  slotAspect: readonly [usual: number, limit: number];
  wall: readonly [usual: number, limit: number];
  reach: readonly [usual: number, limit: number];
  tolerance: readonly [usual: number, limit: number];
}

/**
 * Common practice of turning aluminium and brass, no standard: ask the shop that will make it. Teeth and walls in m; a tooth's
 * height over its thickness; a slot's depth over its width (ground grooving tools to 6); a bar's overhang over its diameter (4
 * in steel, 6 in carbide, 10 damped); the tightest tolerance (±10 µm, about IT7 of ISO 286 at 20 mm, on a good lathe; ±4 µm, IT5, on the best).
 */
export const usualShop: ShopLimits = {
  tooth: [0.8e-3, 0.5e-3],
  toothSlenderness: [8, 15],
  slotWidth: [1e-3, 0.5e-3],
  slotAspect: [3, 6],
  wall: [1.5e-3, 1e-3],
  reach: [4, 10],
  tolerance: [10e-6, 4e-6],
};

const labels: Record<MachiningVerdict["field"], string> = {
  tooth: "Tooth, thinnest",
  toothSlenderness: "Tooth, height over thickness",
  slotWidth: "Slot, narrowest",
  slotAspect: "Slot, depth over width",
  wall: "Wall, thinnest",
  reach: "Tool, overhang over diameter",
  tolerance: "Tightest tolerance",
};

/** Equal within rounding: a tooth dimensioned to just the limit keeps it. */
const rounding = 1e-6;

/** Places are written as a drawing does: slots from 1 at the throat, z from the mouth in mm. */
const place = (slot: number, z: number): string => `slot ${slot + 1}, z ${toMm(z).toFixed(2).replace("-", "−")} mm`;

/**
 * Checks a horn against a shop's limits, the worst place of each.
 * @param horn.outer           outer wall, m
 * @param horn.tightest        m, tightest tolerance asked
 * @param shop                 where it differs from `usualShop`
 * @throws {RangeError} a limit not positive, or as `wallFeatures`
 */
export function machiningVerdicts(
  horn: { profile: HornProfile; inner: readonly ZR[]; outer: readonly ZR[]; tightest: number },
  shop: Partial<ShopLimits> = {},
): MachiningVerdict[] {
  const limits = { ...usualShop, ...shop };
  for (const [field, [usual, limit]] of Object.entries(limits)) {
    requirePositive(`machiningVerdicts: ${field}, usual`, usual);
    requirePositive(`machiningVerdicts: ${field}, limit`, limit);
  }
  const judged = (
    field: MachiningVerdict["field"],
    sense: MachiningVerdict["sense"],
    value: number | null,
    unit: MachiningVerdict["unit"],
    words: string,
  ): MachiningVerdict => {
    const [usual, limit] = limits[field];
    const keeps = (bound: number): boolean =>
      value !== null && (sense === "at least" ? value >= bound * (1 - rounding) : value <= bound * (1 + rounding));
    const verdict: MachiningWord = keeps(usual) ? "passes" : keeps(limit) ? "barely" : "misses";
    return { field, label: labels[field], sense, value, unit, usual, limit, verdict, words };
  };
  const { slots } = wallFeatures(horn.profile);
  const found: MachiningVerdict[] = [];
  if (slots.length > 0) {
    const narrowest = worstOf(slots, (slot) => slot.start - slot.end);
    const deepest = worstOf(slots, aspect);
    const width = (i: number) => slots[i]!.end - slots[i]!.start;
    found.push(
      judged("slotWidth", "at least", width(narrowest), "m", place(narrowest, slots[narrowest]!.end)),
      judged("slotAspect", "at most", aspect(slots[deepest]!), "1", place(deepest, slots[deepest]!.end)),
    );
  }
  const teeth = teethOf(slots, horn.profile.z.at(-1)!);
  if (teeth.length > 0) {
    const thinnest = teeth[worstOf(teeth, ({ thickness }) => -thickness)]!;
    const slenderest = teeth[worstOf(teeth, slenderness)]!;
    const behind = ({ slot, z }: Tooth): string => `mouth side of ${place(slot, z)}`;
    found.push(
      judged("tooth", "at least", thinnest.thickness, "m", behind(thinnest)),
      judged("toothSlenderness", "at most", slenderness(slenderest), "1", behind(slenderest)),
    );
  }
  const wall = thinnestWall(horn.inner, horn.outer);
  const reach = hardestReach(horn.profile);
  found.push(
    judged("wall", "at least", wall.thickness, "m", `at z ${toMm(wall.z).toFixed(1).replace("-", "−")} mm`),
    judged("reach", "at most", reach.overhang, "1", reachWords(reach)),
    judged("tolerance", "at least", horn.tightest, "m", "either way"),
  );
  return found;
}

const aspect = ({ start, end, innerRadius, outerRadius }: RingSlot): number =>
  (outerRadius - innerRadius) / (end - start);

interface Tooth {
  slot: number;
  z: number;
  thickness: number;
  height: number;
}

const slenderness = ({ thickness, height }: Tooth): number => height / thickness;

/** The ridge on the mouth side of each slot that another slot, or the mouth itself, ends. */
function teethOf(slots: readonly RingSlot[], mouth: number): Tooth[] {
  const groups = slotGroups(slots);
  return slots.flatMap((slot, i) => {
    const next = slots[i + 1];
    const inGroup = groups.some(([first, last]) => i >= first && i < last);
    const thickness = (next && inGroup ? next.start : mouth) - slot.end;
    const atMouth = !next && thickness <= 2 * (slot.end - slot.start);
    if (!(next && inGroup) && !atMouth) return [];
    const height = Math.max(slot.outerRadius, next && inGroup ? next.outerRadius : 0) - slot.innerRadius;
    return thickness > 0 ? [{ slot: i, z: slot.end, thickness, height }] : [];
  });
}

/** Index of the worst; of those that are equal but for rounding, the first. */
function worstOf<T>(items: readonly T[], badness: (item: T) => number): number {
  let worst = 0;
  items.forEach((item, i) => {
    if (badness(item) > badness(items[worst]!) + rounding * Math.abs(badness(item))) worst = i;
  });
  return worst;
}

function reachWords({ overhang, depth, barDiameter, from, z, slot }: Reach): string {
  const where = slot === undefined ? `bore at z ${toMm(z).toFixed(1).replace("-", "−")} mm` : place(slot, z);
  if (overhang === null)
    return `${where}: no straight bar passes the bore; split the horn, build it of rings, or electroform it`;
  const bar = `${toMm(depth).toFixed(0)} mm from the ${from}, bar of ${toMm(barDiameter).toFixed(1)} mm at most`;
  return overhang > 10 ? `${where}: ${bar}; split the horn, build it of rings, or electroform it` : `${where}: ${bar}`;
}
