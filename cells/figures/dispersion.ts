// Dispersion of a corrugated wall: which hybrid modes travel where, and how fast.

import { requireNumber, requirePositive } from "../check.ts";
import { toGHz } from "../units.ts";
import type { Drawing } from "./drawing.ts";
import { type Axis, roundAxis } from "./kit/axis.ts";
import { aboveFloor, lastPoint } from "./kit/curve-points.ts";
import { limitWords } from "./kit/limit-words.ts";
import { kindStyle, paper, secondary, textSize } from "./kit/palette.ts";
import { band, curve, panel, panelRoom, referenceLine, uprights } from "./kit/panel.ts";
import { spread } from "./kit/spread.ts";
import { drawingRoot, type Pen, svgPen, text, textBlock } from "./kit/svg.ts";
import { textWidth, wrapText } from "./kit/text-width.ts";
import { decimal, gigahertz } from "./kit/words.ts";

/** One mode over frequency. */
export interface DispersionCurve {
  /** "HE11" */
  label: string;
  /** Hz, rising */
  frequency: readonly number[];
  /** β/k; null where the mode doesn't travel, above 1 where it is slow */
  phaseConstantRatio: readonly (number | null)[];
}

export interface DispersionOptions {
  /** Hz, band of the study: tinted */
  bandLow: number;
  /** Hz */
  bandHigh: number;
  /** frequencies worth an upright, Hz, with their words: "balanced", "EH12 begins" */
  marks?: readonly { frequency: number; words: string }[];
  /** β/k at the end of the axis, default 1.6: a slow wave runs to infinity where a slot is a quarter wave deep */
  largestRatio?: number;
}

const dashes = [undefined, "7 3.5", "1.8 3", "9 3 2 3"];

/**
 * β/k of hybrid modes over frequency; above the line at 1 a mode is bound to the wall and slow.
 * @throws {RangeError} no curves, lengths that differ, band edges out of order
 */
export function dispersion(curves: readonly DispersionCurve[], options: DispersionOptions): Drawing {
  const low = requirePositive("dispersion: band, lower edge", options.bandLow, "Hz");
  const high = requireNumber("dispersion: band, upper edge", options.bandHigh, { min: low, unit: "Hz" });
  const largest = requireNumber("dispersion: largest ratio", options.largestRatio ?? 1.6, { above: 1 });
  if (curves.length === 0) throw new RangeError("dispersion: must have at least one mode; got none");
  for (const { label, frequency, phaseConstantRatio } of curves)
    if (frequency.length !== phaseConstantRatio.length || frequency.length === 0)
      throw new RangeError(
        `dispersion: ${label} must have one ratio a frequency, at least one; got ${phaseConstantRatio.length} and ${frequency.length}`,
      );
  for (const { frequency, words } of options.marks ?? []) requirePositive(`dispersion: ${words}`, frequency, "Hz");
  const alt = altText(curves, options, largest);
  const known = { curves, low, high, largest, marks: options.marks ?? [] };
  return { alt, data: rows(curves), draw: ({ document, width }) => draw(svgPen(document), width, alt, known) };
}

interface Known {
  curves: readonly DispersionCurve[];
  low: number;
  high: number;
  largest: number;
  marks: readonly { frequency: number; words: string }[];
}

function altText(
  curves: readonly DispersionCurve[],
  { bandLow, bandHigh, marks = [] }: DispersionOptions,
  largest: number,
): string {
  const words = (ratio: number): string => (ratio > largest ? `beyond ${decimal(largest, 1)}` : decimal(ratio, 2));
  const each = curves.map(({ label, frequency, phaseConstantRatio }) => {
    const travelling = frequency.filter((_, i) => phaseConstantRatio[i] !== null);
    if (travelling.length === 0) return `${label} doesn't travel.`;
    const ratios = phaseConstantRatio.filter((ratio): ratio is number => ratio !== null);
    return `${label} from ${gigahertz(travelling[0]!)} to ${gigahertz(travelling.at(-1)!)} GHz, β/k ${words(Math.min(...ratios))} to ${words(Math.max(...ratios))}.`;
  });
  const places = marks.map(({ frequency, words: what }) => `${what} ${gigahertz(frequency)} GHz`);
  const more = places.length > 0 ? ` Marked: ${places.join(", ")}.` : "";
  return `Phase constant over that of free space, of the modes of the corrugated wall; the band is ${gigahertz(bandLow)} to ${gigahertz(bandHigh)} GHz. ${each.join(" ")}${more}`;
}

function rows(curves: readonly DispersionCurve[]): (string | number)[][] {
  const body = curves.flatMap(({ label, frequency, phaseConstantRatio }) =>
    frequency.map((f, i) => [label, toGHz(f), phaseConstantRatio[i] ?? ""]),
  );
  return [["mode", "frequency (GHz)", "beta/k (ratio)"], ...body];
}

function draw(pen: Pen, width: number, alt: string, { curves, low, high, largest, marks }: Known): Element {
  const style = kindStyle("corrugated");
  const labelRoom = Math.max(...curves.map(({ label }) => textWidth(label, textSize.axis))) + 22;
  const frame = {
    left: panelRoom.left,
    top: 34,
    width: width - panelRoom.left - labelRoom,
    height: width >= 560 ? 250 : 210,
  };
  const points = curves.map(({ frequency, phaseConstantRatio }) => {
    const shown = phaseConstantRatio.map((ratio) => (ratio === null || ratio > largest ? Number.NaN : ratio));
    return aboveFloor(frequency.map(toGHz), shown, 0);
  });
  const all = [
    ...curves.flatMap(({ frequency }) => frequency),
    low,
    high,
    ...marks.map(({ frequency }) => frequency),
  ].map(toGHz);
  const free = roundAxis(all, { count: width >= 560 ? 8 : 4 });
  const x: Axis = { ...free, domain: [Math.min(...all), Math.max(...all)] };
  x.ticks = free.ticks.filter((tick) => tick >= x.domain[0] && tick <= x.domain[1]);
  const y = roundAxis([0, largest], { count: 4 });
  const markedGHz = marks.map(({ frequency }) => toGHz(frequency));
  const drawn = panel(
    pen,
    frame,
    { x, y },
    {
      under: [band(toGHz(low), toGHz(high))],
      over: [
        referenceLine(1),
        uprights(markedGHz),
        ...points.map((one, i) => curve(one, { color: style.line, width: 1.9, dash: dashes[i % dashes.length] })),
      ],
    },
  );
  const ends = points.map((one) => lastPoint(one));
  const visible = ends.flatMap((end, i) => (end ? [{ end, label: curves[i]!.label }] : []));
  const placed = spread(
    visible.map(({ end }) => drawn.yAt(end[1])),
    14.5,
    frame.top,
    frame.top + frame.height,
  );
  const elements = [
    text(pen, 0, 14, "β/k, over frequency in GHz", { bold: true, size: 13 }),
    drawn.element,
    limitWords(pen, "slow above 1", 1, { frame, drawn, curves: points, uprights: markedGHz, fill: secondary }),
    ...visible.map(({ end, label }, i) =>
      text(pen, drawn.xAt(end[0]) + 7, placed[i]! + 4, label, {
        size: textSize.axis,
        fill: style.words,
        halo: paper,
      }),
    ),
  ];
  const words = marks.map(({ frequency, words: what }) => `${what}: ${gigahertz(frequency)} GHz`).join("; ");
  const lines = words
    ? wrapText(`Uprights: ${words}. The band is tinted.`, width, textSize.drawing)
    : ["The band is tinted."];
  const below = frame.top + frame.height + 46;
  elements.push(textBlock(pen, 0, below, lines, { fill: secondary, leading: 18 }));
  return drawingRoot(pen, { width, height: below + (lines.length - 1) * 18 + 8 }, alt, ...elements);
}
