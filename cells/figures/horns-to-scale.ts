// Candidates side by side, to one scale, mouths level: what would have to be turned.

import { requireNumber } from "../check.ts";
import type { Candidate, RealizableHorn } from "../horn/candidate.ts";
import { wallThickness } from "../horn/workshop/metal.ts";
import { toMm } from "../units.ts";
import type { Drawing } from "./drawing.ts";
import { hornSection, sideRoom, wallNotes } from "./horn-section.ts";
import { roundStep } from "./kit/axis.ts";
import { ink, kindStyle, secondary, textSize } from "./kit/palette.ts";
import { drawingRoot, type Pen, svgPen, text, textBlock } from "./kit/svg.ts";
import { textWidth, wrapText } from "./kit/text-width.ts";
import { unrealizable } from "./kit/unrealizable.ts";
import { decimal, listed, millimetres } from "./kit/words.ts";

/** A candidate with its name, and where its pattern seems to come from. */
export interface DrawnHorn {
  /** "Smooth cone" */
  label: string;
  candidate: Candidate;
  /** m on the axis, negative inside the horn */
  phaseCenter?: number;
}

type Realizable = DrawnHorn & { candidate: RealizableHorn };
const isRealizable = (horn: DrawnHorn): horn is Realizable => horn.candidate.feasible;

/** Longest drawing of the longest horn, and largest scale, px and px per m. */
const tallest = 400;
const largestScale = 4000;
/** Under this width horns stand under each other. */
const leastForRow = 560;
/** Width of the words for a candidate that can't be built, px. */
const reasonWidth = 190;

/**
 * Sections of all candidates at one scale (px per m), mouths in one line, with diameters, length, steps, slots and phase
 * centre. A candidate that can't be built keeps its place, with its reason.
 * @throws {RangeError} no candidates; a profile that is none (see `wallFeatures`); a phase centre that isn't finite
 */
export function hornsToScale(horns: readonly DrawnHorn[]): Drawing {
  if (horns.length === 0) throw new RangeError("hornsToScale: must have at least one candidate; got none");
  for (const { label, phaseCenter } of horns)
    if (phaseCenter !== undefined) requireNumber(`hornsToScale: phase centre of ${label}`, phaseCenter, { unit: "m" });
  const alt = `Sections to one scale, mouths level. ${horns.map(inWords).join(" ")}`;
  return { alt, data: rows(horns), draw: ({ document, width }) => draw(svgPen(document), width, alt, horns) };
}

function inWords(horn: DrawnHorn): string {
  if (!isRealizable(horn)) return `${horn.label}: not realisable. ${horn.candidate.reason}`;
  const { candidate, label, phaseCenter } = horn;
  const notes = wallNotes(candidate).map(({ lines }) => lines.join(" "));
  const facts = [
    `mouth ${millimetres(2 * candidate.apertureRadius)} mm`,
    `throat ${millimetres(2 * candidate.throatRadius)} mm`,
    `length ${millimetres(candidate.length)} mm`,
    `outside ${millimetres(candidate.outerDiameter)} mm`,
    ...notes,
  ];
  const center =
    phaseCenter === undefined
      ? ""
      : `; phase centre ${decimal(Math.abs(toMm(phaseCenter)), 0)} mm ${phaseCenter > 0 ? "in front of" : "behind"} the mouth`;
  return `${label}: ${listed(facts)}${center}.`;
}

function rows(horns: readonly DrawnHorn[]): (string | number)[][] {
  const head = ["candidate", "z (mm)", "inner radius (mm)"];
  const body = horns
    .filter(isRealizable)
    .flatMap(({ label, candidate: { profile } }) =>
      profile.z.map((z, i) => [label, toMm(z), toMm(profile.radius[i]!)]),
    );
  return [head, ...body];
}

const leastGap = 24;

/** Width of each place of a row at a scale, px. */
function placeWidths(row: readonly DrawnHorn[], scale: number): number[] {
  return row.map((horn) => {
    if (!isRealizable(horn)) return reasonWidth;
    const { left, right } = sideRoom(horn.candidate, scale);
    return left + right;
  });
}

/** Largest scale at which a row fits; the width grows with the scale, so halving the interval finds it. */
function scaleFor(row: readonly DrawnHorn[], width: number): number {
  const fits = (scale: number): boolean =>
    placeWidths(row, scale).reduce((sum, wide) => sum + wide, leastGap * (row.length - 1)) <= width;
  if (!row.some(isRealizable) || fits(largestScale)) return largestScale;
  let [low, high] = [0, largestScale];
  while (high - low > 0.5) {
    const middle = (low + high) / 2;
    if (fits(middle)) low = middle;
    else high = middle;
  }
  return Math.max(low, 1);
}

function draw(pen: Pen, width: number, alt: string, horns: readonly DrawnHorn[]): Element {
  const perRow = width < leastForRow ? 1 : horns.length <= 4 ? horns.length : Math.ceil(horns.length / 2);
  const lines = Array.from({ length: Math.ceil(horns.length / perRow) }, (_, i) =>
    horns.slice(i * perRow, (i + 1) * perRow),
  );
  const longest = Math.max(0, ...horns.filter(isRealizable).map(({ candidate }) => candidate.length));
  const scale = Math.min(
    largestScale,
    longest > 0 ? tallest / longest : largestScale,
    ...lines.map((row) => scaleFor(row, width)),
  );
  const parts: Element[] = [];
  let top = 14;
  for (const row of lines) {
    const drawn = drawRow(pen, row, { top, width, scale });
    parts.push(...drawn.elements);
    top = drawn.bottom + 40;
  }
  const foot = drawFoot(pen, { top: top - 12, width, scale: longest > 0 ? scale : undefined }, horns);
  parts.push(...foot.elements);
  return drawingRoot(pen, { width, height: foot.bottom + 8 }, alt, ...parts);
}

function drawRow(
  pen: Pen,
  row: readonly DrawnHorn[],
  { top, width, scale }: { top: number; width: number; scale: number },
): { elements: Element[]; bottom: number } {
  const alone = row.length === 1;
  const widths = alone && !row.some(isRealizable) ? [width] : placeWidths(row, scale);
  const spare = width - widths.reduce((sum, wide) => sum + wide, 0);
  const gap = alone ? 0 : Math.min(72, spare / (row.length - 1));
  const elements: Element[] = [];
  let bottom = top;
  let left = alone && row.every(isRealizable) ? Math.max(0, spare / 2) : 0;
  row.forEach((horn, i) => {
    const { label, candidate } = horn;
    const title = (x: number) =>
      text(pen, x, top, label, { bold: true, size: textSize.title, fill: kindStyle(candidate.kind).words });
    if (isRealizable(horn)) {
      const axisX = left + sideRoom(horn.candidate, scale).left;
      elements.push(title(alone ? 0 : axisX - (horn.candidate.outerDiameter / 2) * scale));
      const place = { axisX, mouthY: top + 70, scale, phaseCenter: horn.phaseCenter };
      const section = hornSection(pen, horn.candidate, place);
      elements.push(section.element);
      bottom = Math.max(bottom, section.bottom);
    } else {
      elements.push(title(left));
      const words = unrealizable(pen, left, top + 24, widths[i]!, candidate.reason);
      elements.push(words.element);
      bottom = Math.max(bottom, words.bottom);
    }
    left += widths[i]! + gap;
  });
  return { elements, bottom };
}

/** The scale bar and what the drawing doesn't say by itself. */
function drawFoot(
  pen: Pen,
  { top, width, scale }: { top: number; width: number; scale?: number },
  horns: readonly DrawnHorn[],
): { elements: Element[]; bottom: number } {
  if (scale === undefined) return { elements: [], bottom: top };
  const barMm = roundStep(45 / (scale / 1000));
  const bar = (barMm * scale) / 1000;
  const barWords = `${barMm} mm`;
  const y = top + 18;
  const elements: Element[] = [
    pen("path", { d: `M0.5 ${y - 6}v6h${bar.toFixed(2)}v-6`, stroke: ink, "stroke-width": 1 }),
    text(pen, bar + 9, y + 1, barWords),
  ];
  const real = horns.filter(isRealizable);
  const walls = new Set(real.map(({ candidate }) => millimetres(wallThickness(candidate))));
  const wall = walls.size === 1 ? `; walls are drawn at their ${[...walls][0]} mm` : "";
  const center = real.some(({ phaseCenter }) => phaseCenter !== undefined)
    ? " The half-filled circle is the phase centre, by its distance from the mouth."
    : "";
  const words = `Dimensions in millimetres. Cut metal is hatched${wall}.${center}`;
  const indent = bar + 9 + textWidth(barWords, textSize.drawing) + 22;
  const beside = width - indent > 300;
  const lines = wrapText(words, beside ? width - indent : width, textSize.drawing);
  const first = beside ? y + 1 : y + 26;
  elements.push(textBlock(pen, beside ? indent : 0, first, lines, { fill: secondary, leading: 18 }));
  return { elements, bottom: first + (lines.length - 1) * 18 };
}
