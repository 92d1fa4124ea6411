// A horn as a workshop wants it drawn: full section in true proportions, axis level, every length from the mouth.

import { listedStations } from "../horn/workshop/bore.ts";
import type { BuildSheet } from "../horn/workshop/build-sheet.ts";
import type { ZR } from "../horn/workshop/metal.ts";
import { toMm } from "../units.ts";
import {
  boreLabels,
  chainsFromDatum,
  datumRoom,
  diameters,
  drawBoreLabels,
  isSlim,
  labelRoom,
  type SectionFrame,
} from "./build-dimensions.ts";
import type { Drawing } from "./drawing.ts";
import { roundStep } from "./kit/axis.ts";
import { chainLine } from "./kit/dimension.ts";
import { hatchPath } from "./kit/hatch.ts";
import { hollow, ink, secondary, textSize } from "./kit/palette.ts";
import { coordinate, drawingRoot, type Pen, pathThrough, svgPen, text, textBlock } from "./kit/svg.ts";
import { textWidth, wrapText } from "./kit/text-width.ts";
import { decimal, listed, millimetres } from "./kit/words.ts";

/** Tallest section, px. */
const tallest = 380;
/** Largest scale: a horn for millimetre waves is drawn no larger than twenty times its size, at 4 px a mm. */
const largestScale = 80_000;
const roomLeft = 78;
const roomRight = 120;
const leading = 17;

/**
 * Dimensioned section of a horn: cut metal hatched, lengths in a chain from the datum at the mouth, diameters with their
 * tolerances where there is room (all of them are in the sheet's table), slots numbered as in theirs.
 * Its numbers are the points of both walls.
 */
export function buildDrawing(sheet: BuildSheet): Drawing {
  const alt = altText(sheet);
  return { alt, data: rows(sheet), draw: ({ document, width }) => draw(svgPen(document), width, alt, sheet) };
}

function altText(sheet: BuildSheet): string {
  const parts = listedStations(sheet.stations).map(({ name, z, before, after }) => {
    const bore =
      before === after ? millimetres(2 * after, 2) : `${millimetres(2 * before, 2)} to ${millimetres(2 * after, 2)}`;
    return `${name} Ø ${bore} at z ${millimetres(z, 2)}`;
  });
  const outside = 2 * Math.max(...sheet.outer.map(([, r]) => r));
  const slots = sheet.slots.length > 0 ? ` ${sheet.slots.length} slots, listed in the table of slots.` : "";
  return `Section of the horn with dimensions in mm, z from the mouth: ${listed(parts)}; outside Ø ${millimetres(outside, 2)}, wall ${millimetres(sheet.wall, 2)}.${slots}`;
}

function rows({ inner, outer }: BuildSheet): (string | number)[][] {
  const of = (wall: string, points: readonly ZR[]) =>
    points.map(([z, r]): (string | number)[] => [wall, toMm(z), toMm(r)]);
  return [["wall", "z from the mouth (mm)", "radius (mm)"], ...of("inner", inner), ...of("outer", outer)];
}

function draw(pen: Pen, width: number, alt: string, sheet: BuildSheet): Element {
  const { inner, outer } = sheet;
  const length = -inner[0]![0];
  const outside = Math.max(...outer.map(([, r]) => r));
  const scale = Math.min(largestScale, tallest / (2 * outside), (width - roomLeft - roomRight) / length);
  const labels = boreLabels(sheet);
  const half = outside * scale;
  // A short horn stands in the middle of the place it has.
  const throatX = roomLeft + Math.max(0, (width - roomLeft - roomRight - length * scale) / 2);
  const slim = isSlim(half);
  const axisY = Math.max(labelRoom(labels), datumRoom(slim)) + half;
  const at: SectionFrame["at"] = (z, r) => [throatX + (z + length) * scale, axisY - r * scale];
  const frame: SectionFrame = { pen, sheet, at, scale, axisY, throatX, mouthX: throatX + length * scale, half, slim };
  const chains = chainsFromDatum(frame, axisY + half + 12);
  const foot = drawFoot(pen, { top: chains.bottom + 16, width, scale }, sheet);
  return drawingRoot(
    pen,
    { width, height: foot.bottom + 8 },
    alt,
    ...section(frame),
    ...slotNumbers(frame),
    ...drawBoreLabels(frame, labels),
    ...diameters(frame),
    ...chains.elements,
    ...foot.elements,
  );
}

function section({ pen, sheet, at, throatX, mouthX, axisY }: SectionFrame): Element[] {
  const { inner, outer } = sheet;
  const side = (sign: 1 | -1): [number, number][] => [
    ...inner.map(([z, r]) => at(z, sign * r)),
    ...[...outer].reverse().map(([z, r]) => at(z, sign * r)),
  ];
  const bore = [...inner.map(([z, r]) => at(z, r)), ...[...inner].reverse().map(([z, r]) => at(z, -r))];
  const metal = [side(1), side(-1)];
  return [
    pen("path", { d: pathThrough(bore, true), fill: hollow }),
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
    // Edges of the bore that are seen behind the cut: its two ends.
    pen("path", {
      d: [inner[0]!, inner.at(-1)!].map(([z, r]) => pathThrough([at(z, r), at(z, -r)])).join(""),
      stroke: ink,
      "stroke-width": 0.7,
    }),
    chainLine(pen, [throatX - 12, axisY], [mouthX + 7, axisY]),
  ];
}

/** Numbers of slots within the bore: the first, every fifth, the last, as far as there is room. */
function slotNumbers({ pen, sheet, at, scale }: SectionFrame): Element[] {
  const size = textSize.small;
  const elements: Element[] = [];
  let free = Number.NEGATIVE_INFINITY;
  const last = sheet.slots.length;
  const xOf = ({ z, width }: BuildSheet["slots"][number]): number => at(z - width / 2, 0)[0];
  const lastX = last > 0 ? xOf(sheet.slots[last - 1]!) : 0;
  for (const slot of sheet.slots) {
    if (slot.number !== 1 && slot.number !== last && slot.number % 5 !== 0) continue;
    // Between teeth and axis there must be room for a line of text.
    if (slot.innerRadius * scale < size + 10) continue;
    const words = String(slot.number);
    const reach = textWidth(words, size) / 2 + 3;
    const x = xOf(slot);
    const crowdsLast = slot.number !== last && x + reach > lastX - textWidth(String(last), size) / 2 - 3;
    if (x - reach < free || crowdsLast) continue;
    elements.push(
      text(pen, x, at(0, slot.innerRadius)[1] + size + 3, words, { size, anchor: "middle", fill: secondary }),
    );
    free = x + reach;
  }
  return elements;
}

/** Scale bar, what is the same for all slots, and the notes of the sheet. */
function drawFoot(
  pen: Pen,
  { top, width, scale }: { top: number; width: number; scale: number },
  sheet: BuildSheet,
): { elements: Element[]; bottom: number } {
  const barMm = roundStep(45 / (scale / 1000));
  const bar = (barMm * scale) / 1000;
  const barWords = `${decimal(barMm, barMm < 1 ? 1 : 0)} mm`;
  const shared = sheet.dimensions.filter(({ label }) =>
    ["slot width", "pitch, for reference", "tooth"].includes(label),
  );
  const slots =
    sheet.slots.length > 0
      ? [
          `${sheet.slots.length === 1 ? "One slot" : `${sheet.slots.length} slots, numbered from the throat`}${shared.map(({ label, value }) => `; ${label.replace(", for reference", "")} ${millimetres(value, 3)}`).join("")}.`,
        ]
      : [];
  const wall = `Wall ${millimetres(sheet.wall, 2)}, cut metal hatched.`;
  const lines = [...slots, wall, ...sheet.notes].flatMap((note) => wrapText(note, width, textSize.drawing));
  const y = top + 10;
  return {
    elements: [
      pen("path", { d: `M0.5 ${coordinate(y - 6)}v6h${coordinate(bar)}v-6`, stroke: ink, "stroke-width": 1 }),
      text(pen, bar + 9, y + 1, barWords),
      textBlock(pen, 0, y + 26, lines, { fill: secondary, leading }),
    ],
    bottom: y + 26 + (lines.length - 1) * leading,
  };
}
