// Can a tool get there: the thickest bar that passes, and how far it must stick out.

import type { HornProfile } from "../horn-profile.ts";
import { bridgedBore } from "./bore.ts";
import { type RingSlot, wallFeatures, type ZR } from "./metal.ts";

/** The hardest place to reach, from the better end. */
export interface Reach {
  /** how far the bar sticks out over its diameter; null where no bar passes at all */
  overhang: number | null;
  /** m, how far in, and the thickest bar that passes */
  depth: number;
  barDiameter: number;
  from: "mouth" | "throat";
  /** m, and the slot cut there (counted from 0 at the throat); none: boring */
  z: number;
  slot?: number;
}

/** m, kept free on each side of a bar with its cutting edge. Common practice. */
const clearance = 0.25e-3;
/** Share of a bore's diameter that a boring bar takes up: the rest is for chips. Common practice. */
const chipRoom = 0.75;

/**
 * Bar that cuts at radius `cut` behind a bore no narrower than `narrowest`, m: bar and cutting edge together have to pass the
 * bore, and the edge stands out at least as far as it cuts behind it, so d ≤ 2r − (r_cut − r) − clearances.
 */
function barFor(narrowest: number, cut: number): number {
  return Math.min(chipRoom * 2 * narrowest, 3 * narrowest - cut - 2 * clearance);
}

/** Places are tried a two-hundredth of the length apart, and always in the middle of a straight run. */
const places = 200;

/**
 * The place that asks the longest bar against its thickness, with every place cut from the end that makes it easier.
 * Bored and grooved with straight bars along the axis; an angled or swung tool may do better.
 * @throws {RangeError} as `wallFeatures`
 */
export function hardestReach(profile: HornProfile): Reach {
  const { slots } = wallFeatures(profile);
  const bore = bridgedBore(profile, slots);
  const ways: Ways = { bore, fromThroat: runningLeast(bore), fromMouth: runningLeast([...bore].reverse()).reverse() };
  let hardest: Reach | undefined;
  for (const place of [...borePlaces(bore), ...slotPlaces(bore, slots)]) {
    const reach = easier(fromEnd("mouth", place, ways), fromEnd("throat", place, ways));
    if (!hardest || worse(reach, hardest)) hardest = reach;
  }
  return hardest!;
}

/** A place to cut, in the run of the bore that begins at its corner `run`. m */
interface Place {
  run: number;
  /** the far sides as seen from the mouth and from the throat */
  start: number;
  end: number;
  cut: number;
  slot?: number;
}

function borePlaces(bore: readonly ZR[]): Place[] {
  const length = bore.at(-1)![0] - bore[0]![0];
  return bore.slice(1).flatMap(([z1, r1], run) => {
    const [z0, r0] = bore[run]!;
    if (z1 === z0) return [];
    const count = 2 * Math.ceil((places * (z1 - z0)) / (2 * length));
    return Array.from({ length: count + 1 }, (_, k) => {
      const z = z0 + ((z1 - z0) * k) / count;
      return { run, start: z, end: z, cut: r0 + ((r1 - r0) * k) / count };
    });
  });
}

function slotPlaces(bore: readonly ZR[], slots: readonly RingSlot[]): Place[] {
  const runAt = new Map(bore.map(([z], i) => [z, i]));
  return slots.map(({ start, end, outerRadius }, slot) => ({
    run: runAt.get(start)!,
    start,
    end,
    cut: outerRadius,
    slot,
  }));
}

/** Least radius between each corner and either end, the corner included. */
interface Ways {
  bore: readonly ZR[];
  fromThroat: number[];
  fromMouth: number[];
}

function runningLeast(points: readonly ZR[]): number[] {
  const least: number[] = [];
  for (const [, r] of points) least.push(Math.min(r, least.at(-1) ?? r));
  return least;
}

function fromEnd(from: Reach["from"], { run, start, end, cut, slot }: Place, ways: Ways): Reach {
  const { bore, fromThroat, fromMouth } = ways;
  const z = from === "mouth" ? start : end;
  const depth = from === "mouth" ? bore.at(-1)![0] - z : z - bore[0]![0];
  // The bar passes the ridge on its own side of a slot, and the place itself in a bore.
  const narrowest = Math.min(cut, from === "mouth" ? fromMouth[run + 1]! : fromThroat[run]!);
  const barDiameter = barFor(narrowest, cut);
  const overhang = barDiameter > 0 ? depth / barDiameter : null;
  return { overhang, depth, barDiameter: Math.max(0, barDiameter), from, z, ...(slot === undefined ? {} : { slot }) };
}

const worse = (one: Reach, other: Reach): boolean =>
  (one.overhang ?? Number.POSITIVE_INFINITY) > (other.overhang ?? Number.POSITIVE_INFINITY);
const easier = (one: Reach, other: Reach): Reach => (worse(one, other) ? other : one);
