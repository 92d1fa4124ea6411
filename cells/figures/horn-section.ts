// One horn in section, mouth up: cut metal, axis, dimensions, what is special about its wall.

import type { RealizableHorn } from "../horn/candidate.ts";
import { outerWall, wallFeatures, wallThickness } from "../horn/workshop/metal.ts";
import { toMm } from "../units.ts";
import { chainLine, dimension } from "./kit/dimension.ts";
import { hatchPath } from "./kit/hatch.ts";
import { hairline, hollow, ink, paper, secondary, textSize } from "./kit/palette.ts";
import { coordinate, type Pen, pathThrough, text } from "./kit/svg.ts";
import { textWidth } from "./kit/text-width.ts";
import { millimetres } from "./kit/words.ts";

/** The parts of a realizable horn that its drawing needs. */
export type SectionedHorn = Pick<
  RealizableHorn,
  "profile" | "throatRadius" | "apertureRadius" | "length" | "outerDiameter"
>;

/** A note at the left of the section; the first line is in ink and the leader meets it. */
interface WallNote {
  /** m */
  z: number;
  /** m, radius at which the leader ends; none if left out */
  leaderTo?: number;
  lines: string[];
}

const noteSize = textSize.small + 0.5;
const noteLeading = 16;
const noteGap = 10;

/** What is written beside the wall: diameter steps with the straight that follows, slots at the mouth and at the throat. */
export function wallNotes({ profile }: SectionedHorn): WallNote[] {
  const { steps, slots } = wallFeatures(profile);
  const notes: WallNote[] = [];
  const mm = (value: number) => millimetres(value);
  const first = slots[0];
  const last = slots.at(-1);
  if (first && last) {
    const pitch = slots.length > 1 ? (last.start - first.start) / (slots.length - 1) : undefined;
    const depth = (slot: typeof first) => slot.outerRadius - slot.innerRadius;
    notes.push({
      z: last.start,
      lines: [`${mm(depth(last))} deep`, ...(pitch === undefined ? [] : [`pitch ${millimetres(pitch, 2)}`])],
    });
    if (slots.length > 1)
      notes.push({ z: (first.start + first.end) / 2, lines: [`${slots.length} slots`, `${mm(depth(first))} deep`] });
  }
  for (const step of steps) {
    const straight = straightAfter(profile, step.z);
    const lines = ["step", `${mm(2 * step.from)} to ${mm(2 * step.to)}`];
    if (straight > 0) lines.push(`straight ${mm(straight)}`);
    notes.push({ z: step.z, leaderTo: Math.max(step.from, step.to), lines });
  }
  return notes.sort((a, b) => b.z - a.z);
}

/** Length of the cylinder that begins at a step, m. */
function straightAfter({ z, radius }: SectionedHorn["profile"], at: number): number {
  const start = z.findLastIndex((one) => Math.abs(one - at) <= 1e-9);
  let end = start;
  while (end + 1 < z.length && Math.abs(radius[end + 1]! - radius[start]!) < 1e-9) end++;
  return z[end]! - at;
}

/** Room that a section takes at this scale to the left of its axis (with its notes) and to the right (with its length), px. */
export function sideRoom(horn: SectionedHorn, scale: number): { left: number; right: number } {
  const half = (horn.outerDiameter / 2) * scale;
  const outer = outerWall(horn.profile, wallThickness(horn));
  const notes = wallNotes(horn).map((note) => {
    const height = (note.lines.length - 1) * noteLeading;
    const widest = Math.max(...note.lines.map((line) => textWidth(line, noteSize)));
    return widest + noteGap + widestBetween(outer, note.z - height / scale, note.z + noteLeading / scale) * scale;
  });
  return { left: Math.max(half, ...notes), right: half + 34 };
}

/** Largest radius of an outline between two heights, m. */
function widestBetween(outline: readonly (readonly [number, number])[], low: number, high: number): number {
  let widest = 0;
  for (let i = 1; i < outline.length; i++) {
    const [z0, r0] = outline[i - 1]!;
    const [z1, r1] = outline[i]!;
    if (z1 < low || z0 > high) continue;
    const radiusAt = (z: number): number =>
      z1 > z0 ? r0 + ((Math.min(z1, Math.max(z0, z)) - z0) / (z1 - z0)) * (r1 - r0) : Math.max(r0, r1);
    widest = Math.max(widest, radiusAt(low), radiusAt(high));
  }
  return widest;
}

export interface SectionPlace {
  /** px, axis of the horn and plane of the mouth */
  axisX: number;
  mouthY: number;
  /** px per m */
  scale: number;
  /** m, phase centre on the axis, negative inside the horn */
  phaseCenter?: number;
}

/** @returns the drawing and the y of its lowest part */
export function hornSection(pen: Pen, horn: SectionedHorn, place: SectionPlace): { element: Element; bottom: number } {
  const { axisX, mouthY, scale, phaseCenter } = place;
  const { profile, throatRadius, apertureRadius, length, outerDiameter } = horn;
  const at = (z: number, r: number): [number, number] => [axisX + r * scale, mouthY - z * scale];
  const inner = profile.z.map((z, i) => [z, profile.radius[i]!] as const);
  const outer = outerWall(profile, wallThickness(horn));
  const throatZ = profile.z[0]!;
  const throatY = mouthY - throatZ * scale;
  const half = (outerDiameter / 2) * scale;
  const side = (sign: 1 | -1): [number, number][] => [
    ...inner.map(([z, r]) => at(z, sign * r)),
    ...[...outer].reverse().map(([z, r]) => at(z, sign * r)),
  ];
  const inside = [...inner.map(([z, r]) => at(z, r)), ...[...inner].reverse().map(([z, r]) => at(z, -r))];
  const metal = [side(-1), side(1)];
  const bottomDimension = throatY + 22;
  const lengthX = axisX + half + 22;
  const element = pen(
    "g",
    {},
    pen("path", {
      d: `M${coordinate(axisX - half)} ${coordinate(mouthY)}H${coordinate(lengthX + 8)}`,
      stroke: hairline,
      "stroke-dasharray": "3 3",
    }),
    pen("path", { d: pathThrough(inside, true), fill: hollow }),
    pen("path", {
      d: metal.map((polygon) => hatchPath(polygon, 3.2)).join(""),
      stroke: secondary,
      "stroke-width": 0.6,
    }),
    pen("path", {
      d: metal.map((polygon) => pathThrough(polygon, true)).join(""),
      stroke: ink,
      "stroke-width": 1,
      "stroke-linejoin": "round",
    }),
    chainLine(pen, [axisX, mouthY - 18], [axisX, throatY + 14]),
    dimension(pen, {
      along: "x",
      from: axisX - apertureRadius * scale,
      to: axisX + apertureRadius * scale,
      at: mouthY - 26,
      extendFrom: [mouthY - 3, mouthY - 3],
      words: `Ø ${millimetres(2 * apertureRadius)}`,
    }),
    dimension(pen, {
      along: "x",
      from: axisX - throatRadius * scale,
      to: axisX + throatRadius * scale,
      at: bottomDimension,
      extendFrom: [throatY + 3, throatY + 3],
      words: `Ø ${millimetres(2 * throatRadius)}`,
      place: "after",
    }),
    dimension(pen, {
      along: "y",
      from: mouthY,
      to: throatY,
      at: lengthX,
      words: millimetres(length),
    }),
    pen("path", {
      d: `M${coordinate(axisX + throatRadius * scale + 6)} ${coordinate(throatY)}H${coordinate(lengthX + 4)}`,
      stroke: secondary,
      "stroke-width": 0.5,
      "stroke-dasharray": "1 3",
    }),
    ...notesBeside(pen, horn, place),
    phaseCenter === undefined ? undefined : phaseCenterMark(pen, axisX, mouthY - phaseCenter * scale, phaseCenter),
  );
  return { element, bottom: bottomDimension + 8 };
}

/** Notes stand outside the outer wall where it is widest beside them, and give way to each other downwards. */
function notesBeside(pen: Pen, horn: SectionedHorn, { axisX, mouthY, scale }: SectionPlace): Element[] {
  const outer = outerWall(horn.profile, wallThickness(horn));
  const parts: Element[] = [];
  let lowest = -Infinity;
  for (const { z, leaderTo, lines } of wallNotes(horn)) {
    const y = Math.max(mouthY - z * scale + 4, mouthY + 22, lowest + 22);
    const height = (lines.length - 1) * noteLeading;
    const [low, high] = [(mouthY - y - height) / scale, (mouthY - y + noteLeading) / scale];
    const right = axisX - widestBetween(outer, low, high) * scale - noteGap;
    lines.forEach((line, i) => {
      parts.push(
        text(pen, right, y + i * noteLeading, line, { size: noteSize, anchor: "end", fill: i === 0 ? ink : secondary }),
      );
    });
    if (leaderTo !== undefined && Math.abs(y - 4 - (mouthY - z * scale)) < 1)
      parts.push(
        pen("path", {
          d: `M${coordinate(right + 3)} ${coordinate(y - 4)}H${coordinate(axisX - leaderTo * scale)}`,
          stroke: secondary,
          "stroke-width": 0.8,
        }),
      );
    lowest = y + height;
  }
  return parts;
}

/** The half-filled circle: two opposite quarters are dark. */
function phaseCenterMark(pen: Pen, x: number, y: number, phaseCenter: number): Element {
  const r = 5;
  const quarter = `M${coordinate(x)} ${coordinate(y)}`;
  return pen(
    "g",
    {},
    pen("circle", { cx: x, cy: y, r, fill: paper, stroke: ink, "stroke-width": 1 }),
    pen("path", {
      d: `${quarter}v${-r}a${r} ${r} 0 0 1 ${r} ${r}z${quarter}v${r}a${r} ${r} 0 0 1 ${-r} ${-r}z`,
      fill: ink,
    }),
    text(pen, x + 10, y + 4, `${Math.abs(toMm(phaseCenter)).toFixed(0)} mm`, { halo: hollow }),
  );
}
