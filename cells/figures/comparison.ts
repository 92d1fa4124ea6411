// Two patterns of one horn in one figure, and how far they lie apart.

import { requireNumber } from "../check.ts";
import type { FeedKind } from "../horn/horn-profile.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import { toDeg } from "../units.ts";
import { cutPanel, measuredWords, thetaAxis } from "./cut-panel.ts";
import type { Drawing } from "./drawing.ts";
import { roundAxis } from "./kit/axis.ts";
import { seriesPoints } from "./kit/curve-points.ts";
import { cutLevels } from "./kit/cut-levels.ts";
import { legendRow } from "./kit/legend.ts";
import { cutStroke, kindStyle, type LineStyle, lineStroke, secondary, textSize } from "./kit/palette.ts";
import { band, curve, panel, panelRoom, uprights } from "./kit/panel.ts";
import { type PatternDifference, patternDifference } from "./kit/pattern-difference.ts";
import { drawingRoot, type Pen, svgPen, text, textBlock } from "./kit/svg.ts";
import { wrapText } from "./kit/text-width.ts";
import { decimal, degrees, gigahertz } from "./kit/words.ts";

export interface ComparedPattern {
  /** "mode matching", "measured, 24 November" */
  model: string;
  pattern: FeedPattern;
}

export interface ComparisonOptions {
  /** "Smooth cone" */
  label: string;
  kind: FeedKind;
  /** rad, rim of the dish */
  halfAngle: number;
  /** how the second is drawn, default "second"; "measured" for marks */
  style?: LineStyle;
  /** rad, end of the axis and of the comparison, default π/2 */
  thetaMax?: number;
  /** dB against boresight, default −30: the comparison leaves out where the first is lower */
  floorDb?: number;
}

/**
 * The cuts of two patterns over each other, below them the difference (second less first) with its rms in both planes.
 * @throws {RangeError} not patterns, angles or floor out of range
 */
export function comparison(first: ComparedPattern, second: ComparedPattern, options: ComparisonOptions): Drawing {
  const { thetaMax = Math.PI / 2, floorDb = -30 } = options;
  const halfAngle = requireNumber("comparison: half-angle", options.halfAngle, {
    above: 0,
    below: Math.PI / 2,
    unit: "rad",
  });
  const difference = patternDifference(first.pattern, second.pattern, { thetaMax, floorDb });
  const words = `Difference (${second.model} less ${first.model}) from 0° to ${degrees(thetaMax, 0)}, where ${first.model} is above ${decimal(floorDb, 0)} dB: rms ${rmsWords(difference)}.`;
  const alt = `${options.label} at ${gigahertz(first.pattern.frequency)} GHz, ${first.model} and ${second.model}, dB against boresight; the rim of the dish is at ${degrees(halfAngle)}. ${words}`;
  const known = { first, second, options, thetaMax, halfAngle, difference, words };
  return { alt, data: rows(known), draw: ({ document, width }) => draw(svgPen(document), width, alt, known) };
}

interface Known {
  first: ComparedPattern;
  second: ComparedPattern;
  options: ComparisonOptions;
  thetaMax: number;
  halfAngle: number;
  difference: PatternDifference;
  words: string;
}

const rmsOrNone = (value: number): string => (Number.isFinite(value) ? decimal(value, 2) : "none");
const rmsWords = ({ ePlaneRmsDb, hPlaneRmsDb }: PatternDifference): string =>
  `E ${rmsOrNone(ePlaneRmsDb)}, H ${rmsOrNone(hPlaneRmsDb)} dB`;

function rows({ first, second, difference }: Known): (string | number)[][] {
  const { thetaDeg, ePlaneDb, hPlaneDb } = difference;
  const less = `${second.model} less ${first.model}`;
  const head = ["theta (deg)", `E-plane, ${less} (dB)`, `H-plane, ${less} (dB)`];
  const known = (value: number): number | string => (Number.isFinite(value) ? value : "");
  return [head, ...thetaDeg.map((theta, i) => [theta, known(ePlaneDb[i]!), known(hPlaneDb[i]!)])];
}

function draw(pen: Pen, width: number, alt: string, known: Known): Element {
  const { first, second, options, thetaMax, halfAngle, difference, words } = known;
  const { kind, label, style = "second" } = options;
  const color = kindStyle(kind).line;
  const legend = legendRow(
    pen,
    14,
    width,
    [
      { words: "E-plane", ...cutStroke.e },
      { words: "H-plane", ...cutStroke.h },
      { words: "cross-polar, 45°", ...cutStroke.cross },
      {
        words: style === "measured" ? `${second.model}: ${measuredWords}` : second.model,
        ...lineStroke[style],
        dash: undefined,
      },
    ],
    `dB below the axis, ${gigahertz(first.pattern.frequency)} GHz`,
  );
  const titleY = legend.bottom + 32;
  const title = text(pen, 0, titleY, `${label}, ${first.model}`, {
    bold: true,
    size: textSize.title,
    fill: kindStyle(kind).words,
  });
  const frameWidth = Math.min(width, 640) - panelRoom.left - panelRoom.right;
  const upper = { left: panelRoom.left, top: titleY + 20, width: frameWidth, height: Math.min(260, 0.62 * frameWidth) };
  const cuts = cutPanel(
    pen,
    upper,
    [
      { style: "full", levels: cutLevels(first.pattern, thetaMax) },
      { style, levels: cutLevels(second.pattern, thetaMax) },
    ],
    { halfAngle, thetaMax, color },
  );
  const lowerTitleY = upper.top + upper.height + 52;
  const lowerTitle = text(pen, 0, lowerTitleY, "Difference, dB", { bold: true, size: 13 });
  const lower = { ...upper, top: lowerTitleY + 16, height: 92 };
  const { thetaDeg, ePlaneDb, hPlaneDb } = difference;
  const y = roundAxis([0, ...ePlaneDb, ...hPlaneDb], { count: 4, leastSpan: 0.5 });
  const rim = toDeg(halfAngle);
  const drawn = panel(
    pen,
    lower,
    { x: thetaAxis(thetaMax), y },
    {
      under: [band(rim, toDeg(thetaMax))],
      over: [
        uprights([rim]),
        curve(seriesPoints(thetaDeg, hPlaneDb), { color, ...cutStroke.h }),
        curve(seriesPoints(thetaDeg, ePlaneDb), { color, ...cutStroke.e }),
      ],
    },
  );
  const lines = wrapText(words, Math.min(width, 640), textSize.drawing);
  const below = lower.top + lower.height + 44;
  const foot = textBlock(pen, 0, below, lines, { fill: secondary, leading: 18 });
  const height = below + (lines.length - 1) * 18 + 8;
  return drawingRoot(pen, { width, height }, alt, ...legend.elements, title, ...cuts, lowerTitle, drawn.element, foot);
}
