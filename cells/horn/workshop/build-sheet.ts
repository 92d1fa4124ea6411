// All a workshop has to know of a horn: dimensions with tolerances, slots, both walls, what is hard to make, what it weighs.

import { requirePositive, type Warning } from "../../check.ts";
import { speedOfLight } from "../../constants.ts";
import { toMm } from "../../units.ts";
import type { FeedKind, HornProfile } from "../horn-profile.ts";
import { listedStations, type Station, stations } from "./bore.ts";
import { type MachiningVerdict, machiningVerdicts, type ShopLimits } from "./machining.ts";
import { type MetalMass, masses, metalVolume } from "./mass.ts";
import { largestInnerRadius, outerWall, wallFeatures, wallPoints, wallThickness, type ZR } from "./metal.ts";
import { roundedDown, type Tolerance, type ToleranceClass, toleranceOf } from "./tolerance.ts";

/** What a horn must say of itself to be built: any realizable one does, and so does an own profile. */
export interface BuildableHorn {
  kind: FeedKind;
  profile: HornProfile;
  /** m, outside, walls included */
  outerDiameter: number;
  warnings?: Warning[];
}

export interface BuildGivens {
  /** Hz, upper band edge: tolerances are parts of its wavelength */
  highestFrequency: number;
  /** m; default what the horn's outside diameter leaves over its widest slot */
  wall?: number;
  /** where the shop differs from what is usual */
  shop?: Partial<ShopLimits>;
}

/** A dimension with its tolerance. Lengths in m, angles in rad. z is counted from the mouth, negative into the horn. */
export interface SheetDimension {
  label: string;
  value: number;
  unit: "m" | "rad" | "1";
  /** written with Ø */
  diameter: boolean;
  /** none for a dimension given for reference */
  tolerance?: Tolerance;
}

/** A slot. Lengths in m. */
export interface SlotRow {
  /** 1 at the throat */
  number: number;
  /** the wall on the mouth side, from the mouth: negative into the horn */
  z: number;
  width: number;
  /** top of the tooth on the mouth side */
  innerRadius: number;
  depth: number;
}

/** Plain data: can be sent to a worker. Lengths in m, datum: the mouth's plane, z = 0. */
export interface BuildSheet {
  kind: FeedKind;
  inner: ZR[];
  outer: ZR[];
  wall: number;
  stations: Station[];
  dimensions: SheetDimension[];
  slots: SlotRow[];
  /** of each of a slot's dimensions: position, width, depth, radius of the tooth */
  slotTolerance?: Tolerance;
  machining: MachiningVerdict[];
  /** m³ */
  volume: number;
  masses: MetalMass[];
  /** what a drawing says in words */
  notes: string[];
  warnings: Warning[];
}

/**
 * The build sheet of a horn: everything is read from its profile, so any kind will do, an own profile too.
 *
 * The outside follows the bore at an even wall; flange, fixing and weather cover are not in it. The tolerances are common
 * practice (see `toleranceOf`), no analysis of this horn.
 *
 * @throws {RangeError} frequency, wall or a shop's limit not positive; a profile that is none (see `wallFeatures`), or that
 *   doesn't end at z = 0
 */
export function buildSheet(horn: BuildableHorn, givens: BuildGivens): BuildSheet {
  const { highestFrequency, shop } = givens;
  requirePositive("buildSheet: highest frequency", highestFrequency, "Hz");
  const inner = wallPoints(horn.profile);
  const mouth = inner.at(-1)![0];
  if (Math.abs(mouth) > 1e-9)
    throw new RangeError(`buildSheet: profile must end at the mouth, z = 0 m; got ${mouth} m`);
  const wall = requirePositive("buildSheet: wall", givens.wall ?? wallThickness(horn), "m");
  const outer = outerWall(horn.profile, wall);
  const found = stations(horn.profile);
  const { slots } = wallFeatures(horn.profile);
  const tolerance = (what: ToleranceClass, size: number): Tolerance => toleranceOf(what, size, highestFrequency);
  const outside = 2 * (largestInnerRadius(horn.profile) + wall);
  const dimensions = [
    ...stationDimensions(found, tolerance),
    ...slotDimensions(slots, tolerance),
    measure("outside, largest", outside, tolerance("outside", outside), true),
    measure("wall", wall, tolerance("outside", wall)),
  ];
  const tightest = Math.min(...dimensions.map((one) => one.tolerance?.plusMinus ?? Number.POSITIVE_INFINITY));
  const volume = metalVolume(inner, outer);
  const slotTolerance = slots[0] ? tolerance("slot", slots[0].end - slots[0].start) : undefined;
  return {
    kind: horn.kind,
    inner,
    outer,
    wall,
    stations: found,
    dimensions,
    slots: slots.map(({ start, end, innerRadius, outerRadius }, i) => ({
      number: i + 1,
      z: end,
      width: end - start,
      innerRadius,
      depth: outerRadius - innerRadius,
    })),
    ...(slotTolerance ? { slotTolerance } : {}),
    machining: machiningVerdicts({ profile: horn.profile, inner, outer, tightest }, shop),
    volume,
    masses: masses(volume),
    notes: notesFor(highestFrequency, slots.length > 0),
    warnings: horn.warnings ?? [],
  };
}

function measure(label: string, value: number, tolerance?: Tolerance, diameter = false): SheetDimension {
  return { label, value, unit: "m", diameter, ...(tolerance ? { tolerance } : {}) };
}

type ToleranceBy = (what: ToleranceClass, size: number) => Tolerance;

/** From the datum inward: mouth, then each corner and step, then the throat. The bore of a cylinder is given once, at its inner end. */
function stationDimensions(found: readonly Station[], tolerance: ToleranceBy): SheetDimension[] {
  const listed = listedStations(found);
  const counts = { step: 0, corner: 0, mouth: 0, throat: 0 };
  const total = (name: Station["name"]) => listed.filter((one) => one.name === name).length;
  const dimensions: SheetDimension[] = [];
  for (let i = listed.length - 1; i >= 0; i--) {
    const { name, z, before, after } = listed[i]!;
    counts[name]++;
    const called = total(name) > 1 ? `${name} ${counts[name]}` : name;
    const bore = (radius: number, side: string): void => {
      const what = name === "throat" || radius === listed[0]!.after ? "guide bore" : "bore";
      dimensions.push(measure(`${called}, inside${side}`, 2 * radius, tolerance(what, 2 * radius), true));
    };
    if (name !== "mouth") dimensions.push(measure(`${called}, z from the mouth`, z, tolerance("axial", -z)));
    const cylinder = i > 0 && Math.abs(listed[i - 1]!.after - before) < 1e-9;
    if (before !== after) bore(after, ", mouth side");
    if (!cylinder) bore(before, before === after ? "" : ", throat side");
  }
  return dimensions;
}

/** What all slots share, if they do: the rest is in their table. */
function slotDimensions(slots: ReturnType<typeof wallFeatures>["slots"], tolerance: ToleranceBy): SheetDimension[] {
  if (slots.length === 0) return [];
  const widths = slots.map(({ start, end }) => end - start);
  const pitches = slots.slice(1).map(({ end }, i) => end - slots[i]!.end);
  const even = (values: readonly number[]): boolean => Math.max(...values) - Math.min(...values) < 1e-8;
  const dimensions: SheetDimension[] = [{ label: "slots", value: slots.length, unit: "1", diameter: false }];
  const [width, pitch] = [widths[0]!, pitches[0]];
  if (even(widths)) dimensions.push(measure("slot width", width, tolerance("slot", width)));
  if (pitch !== undefined && even(pitches)) {
    // For reference: positions count from the mouth, so that errors don't add up.
    dimensions.push(measure("pitch, for reference", pitch));
    if (even(widths)) dimensions.push(measure("tooth", pitch - width, tolerance("slot", pitch - width)));
  }
  return dimensions;
}

function notesFor(highestFrequency: number, slotted: boolean): string[] {
  const corner = String(Number(toMm(roundedDown(speedOfLight / highestFrequency / 100)).toPrecision(2)));
  return [
    "Dimensions in mm, bare metal at 20 °C before plating. Datum: the plane of the mouth, z = 0; negative into the horn.",
    slotted
      ? `Inside corners of slots: radius ${corner} mm at most. Tops of teeth sharp, without burrs.`
      : `Inside corners of steps: radius ${corner} mm at most. Edges of the bore sharp, without burrs.`,
    "Bore: roughness Ra 0.8 µm at most (common practice; ohmic loss grows once it nears the skin depth).",
    "Flange, fixing and weather cover are not part of this sheet.",
  ];
}
