// The dimensions of a build drawing: lengths in a chain from the datum, diameters at both ends, bores between them by leaders.

import { listedStations } from "../horn/workshop/bore.ts";
import type { BuildSheet } from "../horn/workshop/build-sheet.ts";
import { dimension } from "./kit/dimension.ts";
import { ink, paper, secondary, textSize } from "./kit/palette.ts";
import { coordinate, type Pen, text, textBlock } from "./kit/svg.ts";
import { textWidth } from "./kit/text-width.ts";
import { millimetres } from "./kit/words.ts";

/** Where the section stands on the paper: px, and px a m. */
export interface SectionFrame {
  pen: Pen;
  sheet: BuildSheet;
  /** of a point of the section, the upper half by a positive radius */
  at: (z: number, radius: number) => [x: number, y: number];
  scale: number;
  axisY: number;
  throatX: number;
  mouthX: number;
  /** px, half of the outside diameter */
  half: number;
  /** so slim on this paper that diameters can't be written along their lines: they stand below, and need room */
  slim: boolean;
}

const size = textSize.drawing;
const rowHeight = 25;
const labelLeading = 15;

/** A tolerance in mm, without idle zeros: "±0.02". */
export const plusMinus = (tolerance: number): string => `±${millimetres(tolerance, 4).replace(/\.?0+$/, "")}`;

/** A dimension's words: with its tolerance where that fits into `room` px. */
function words(sheet: BuildSheet, value: number, diameter: boolean, room: number): string {
  const bare = `${diameter ? "Ø " : ""}${millimetres(value, 2)}`;
  const found = sheet.dimensions.find(
    (one) => one.diameter === diameter && one.tolerance && Math.abs(Math.abs(one.value) - value) < 1e-9,
  );
  if (!found?.tolerance) return bare;
  const whole = `${bare} ${plusMinus(found.tolerance.plusMinus)}`;
  return textWidth(whole, size) + 2 <= room ? whole : bare;
}

/** True for a half width at which some diameter isn't written along its line. */
export const isSlim = (half: number): boolean => 2 * half < textWidth("Ø 000.00", size) + 6;
const belowSlim = 24;
/** px beyond the half width that a datum takes above it. */
export const datumRoom = (slim: boolean): number => (slim ? 46 : 30);

/** Lengths from the mouth, the shortest nearest to the horn, and the datum itself. */
export function chainsFromDatum(frame: SectionFrame, top: number): { elements: Element[]; bottom: number } {
  const { pen, sheet, at, mouthX, axisY, slim } = frame;
  const first = top + 14 + (slim ? belowSlim : 0);
  const lengths = listedStations(sheet.stations)
    .filter(({ name }) => name !== "mouth")
    .reverse();
  const outerAt = (z: number): number => axisY + outerRadius(sheet, z) * frame.scale;
  const elements = lengths.map(({ z }, i) => {
    const x = at(z, 0)[0];
    const lineY = first + i * rowHeight;
    return dimension(pen, {
      along: "x",
      from: mouthX,
      to: x,
      at: lineY,
      extendFrom: [i === 0 ? outerAt(0) + 3 : lineY - rowHeight + 4, outerAt(z) + 3],
      words: words(sheet, -z, false, mouthX - x),
    });
  });
  const bottom = first + Math.max(0, lengths.length - 1) * rowHeight + 4;
  return { elements: [...elements, ...datum(frame)], bottom };
}

/** Radius of the outer wall at a plane, m; the larger one at a step. */
function outerRadius({ outer }: BuildSheet, z: number): number {
  let largest = 0;
  for (let i = 1; i < outer.length; i++) {
    const [z0, r0] = outer[i - 1]!;
    const [z1, r1] = outer[i]!;
    if (z < z0 || z > z1) continue;
    largest = Math.max(largest, z1 > z0 ? r0 + ((r1 - r0) * (z - z0)) / (z1 - z0) : Math.max(r0, r1));
  }
  return largest;
}

/** The plane of the mouth, from which everything is measured: a filled triangle on it, and its name. */
function datum({ pen, mouthX, axisY, half, slim }: SectionFrame): Element[] {
  const y = axisY - half - datumRoom(slim) + 21;
  return [
    pen("path", {
      d: `M${coordinate(mouthX)} ${coordinate(y - 12)}V${coordinate(axisY - half + 2)}`,
      stroke: secondary,
      "stroke-width": 0.8,
    }),
    pen("path", { d: `M${coordinate(mouthX)} ${coordinate(y)}l7 -4v8z`, fill: ink }),
    text(pen, mouthX + 12, y + 4, "datum, z = 0", { size }),
  ];
}

/** Inside diameters at both ends and the outside one. */
export function diameters(frame: SectionFrame): Element[] {
  const { pen, sheet, at, scale, throatX, mouthX, axisY, slim } = frame;
  const throat = sheet.inner[0]![1];
  const mouth = sheet.inner.at(-1)![1];
  const outside = Math.max(...sheet.outer.map(([, r]) => r));
  const across = (radius: number, line: { x: number; from: number }): Element => {
    const room = 2 * radius * scale;
    const label = words(sheet, 2 * radius, true, room);
    return dimension(pen, {
      along: "y",
      from: axisY - radius * scale,
      to: axisY + radius * scale,
      at: line.x,
      extendFrom: [line.from, line.from],
      words: label,
      place: textWidth(label, size) + 6 <= room ? "on" : "after",
    });
  };
  // The outside is measured where it is widest; its extension lines start there.
  const widest = sheet.outer.findLast(([, r]) => r === outside)!;
  const apart = slim ? 62 : 34;
  return [
    across(throat, { x: throatX - 30, from: throatX - 3 }),
    across(mouth, { x: mouthX + 26, from: mouthX + 3 }),
    across(outside, { x: mouthX + 26 + apart, from: at(widest[0], 0)[0] + 3 }),
  ];
}

/** A bore between the ends: its words stand left of a leader that falls to the wall. */
interface BoreLabel {
  z: number;
  /** m, of the wall that the leader meets */
  radius: number;
  lines: string[];
}

/** Steps and corners whose bore isn't given by the station before them: a cylinder's is written once, at its inner end. */
export function boreLabels(sheet: BuildSheet): BoreLabel[] {
  const listed = listedStations(sheet.stations);
  return listed.flatMap(({ name, z, before, after }, i): BoreLabel[] => {
    if (name === "throat" || name === "mouth") return [];
    const bore = (radius: number): string => `Ø ${millimetres(2 * radius, 2)}`;
    if (before !== after) return [{ z, radius: Math.max(before, after), lines: [`${bore(before)} to`, bore(after)] }];
    return Math.abs(listed[i - 1]!.after - before) < 1e-9 ? [] : [{ z, radius: after, lines: [bore(after)] }];
  });
}

/** px that they take above the section. */
export function labelRoom(labels: readonly BoreLabel[]): number {
  return 20 + labelLeading * labels.reduce((sum, { lines }) => sum + lines.length, 0) + 8;
}

/** Each label stands a step above the one before it, so that no leader crosses another's words. */
export function drawBoreLabels({ pen, at, axisY, half }: SectionFrame, labels: readonly BoreLabel[]): Element[] {
  let bottom = axisY - half - 14;
  return labels.flatMap(({ z, radius, lines }) => {
    const [x, wallY] = at(z, radius);
    const first = bottom - (lines.length - 1) * labelLeading;
    bottom -= lines.length * labelLeading;
    return [
      pen("path", {
        d: `M${coordinate(x)} ${coordinate(first - 10)}V${coordinate(wallY)}`,
        stroke: secondary,
        "stroke-width": 0.8,
      }),
      pen("circle", { cx: x, cy: wallY, r: 1.8, fill: ink, stroke: paper, "stroke-width": 0.6 }),
      textBlock(pen, x - 5, first, lines, { size, anchor: "end", leading: labelLeading }),
    ];
  });
}
