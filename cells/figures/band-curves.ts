// What the candidates do over the band: one panel a quantity.

import { requireNumber, requirePositive } from "../check.ts";
import type { FeedKind } from "../horn/horn-profile.ts";
import { toGHz, toMm } from "../units.ts";
import { type BandCurve, type BandEdges, type BandPanelSpec, bandPanel, labelRoom, rangeWords } from "./band-panel.ts";
import type { Drawing } from "./drawing.ts";
import { columns } from "./kit/columns.ts";
import { legendRow } from "./kit/legend.ts";
import { type LineStyle, lineStroke, secondary, textSize } from "./kit/palette.ts";
import { panelRoom } from "./kit/panel.ts";
import { drawingRoot, type Pen, svgPen, textBlock } from "./kit/svg.ts";
import { wrapText } from "./kit/text-width.ts";
import { decimal, gigahertz } from "./kit/words.ts";

/** One frequency of one candidate; null where a quantity has no value there. */
export interface BandPoint {
  /** Hz */
  frequency: number;
  /** power ratio, 0…1 */
  apertureEfficiency: number | null;
  /** dB against boresight copolar */
  crossPolarPeakDb: number | null;
  /** m on the axis, negative inside the horn */
  phaseCenterM: number | null;
  /** dB, positive, space loss included */
  edgeTaperDb: number | null;
}

/** One candidate by one model over the band. P holds what the quantities read. */
export interface BandSeries<P extends { frequency: number } = BandPoint> {
  /** short, at the line's end: "smooth" */
  label: string;
  kind: FeedKind;
  points: readonly P[];
  /** "mode matching" */
  model?: string;
  /** default "full"; other styles are named in a legend by their model */
  style?: LineStyle;
}

/** A candidate that can't be built is named beneath, with its reason. */
export interface BandGap {
  label: string;
  kind: FeedKind;
  reason: string;
}

/** A panel: what to show of a point, in which unit. */
export interface BandQuantity<P extends { frequency: number } = BandPoint> {
  /** with its unit: "Aperture efficiency, %" */
  title: string;
  value: (point: P) => number | null;
  /** decimals in the words */
  digits: number;
  floor?: number;
  leastSpan?: number;
  limit?: BandPanelSpec["limit"];
}

export interface BandCurvesOptions<P extends { frequency: number } = BandPoint> {
  /** Hz */
  bandLow: number;
  /** Hz */
  bandHigh: number;
  /** Hz, the band that was agreed: tinted */
  agreed?: BandEdges;
  /** dB against boresight copolar, negative: highest cross-polar asked */
  crossPolarLimitDb?: number;
  /** power ratio: least aperture efficiency asked */
  efficiencyLimit?: number;
  /** other panels than efficiency, cross-polar, phase centre and edge taper */
  quantities?: readonly BandQuantity<P>[];
}

/** Cross-polar below this isn't drawn: an ideal horn has none. */
const crossPolarFloorDb = -60;

/** The four panels that a trade looks at first. */
export function standardQuantities(
  limits: { crossPolarLimitDb?: number; efficiencyLimit?: number } = {},
): BandQuantity[] {
  const { crossPolarLimitDb, efficiencyLimit } = limits;
  return [
    {
      title: "Aperture efficiency, %",
      value: ({ apertureEfficiency }) => (apertureEfficiency === null ? null : 100 * apertureEfficiency),
      digits: 1,
      leastSpan: 4,
      limit: efficiencyLimit === undefined ? undefined : { value: 100 * efficiencyLimit, asked: "above" },
    },
    {
      title: "Highest cross-polar, dB",
      value: ({ crossPolarPeakDb }) => crossPolarPeakDb,
      digits: 1,
      leastSpan: 8,
      floor: crossPolarFloorDb,
      limit: crossPolarLimitDb === undefined ? undefined : { value: crossPolarLimitDb, asked: "below" },
    },
    {
      title: "Phase centre, mm from the mouth (− inside)",
      value: ({ phaseCenterM }) => (phaseCenterM === null ? null : toMm(phaseCenterM)),
      digits: 1,
      leastSpan: 4,
    },
    { title: "Edge taper, dB, space loss included", value: ({ edgeTaperDb }) => edgeTaperDb, digits: 1, leastSpan: 2 },
  ];
}

/**
 * Small multiples over frequency, two by two (under each other on a narrow page). Each kind has its colour and mark, each
 * line its name at the right end; the band's edges are uprights, what is asked a line with its words.
 * @throws {RangeError} band edges out of order, no candidates, a series without points
 */
export function bandCurves<P extends { frequency: number } = BandPoint>(
  entries: readonly (BandSeries<P> | BandGap)[],
  options: BandCurvesOptions<P>,
): Drawing {
  const low = requirePositive("bandCurves: band, lower edge", options.bandLow, "Hz");
  const high = requireNumber("bandCurves: band, upper edge", options.bandHigh, { min: low, unit: "Hz" });
  if (entries.length === 0) throw new RangeError("bandCurves: must have at least one candidate; got none");
  for (const entry of entries)
    if (isSeries(entry) && entry.points.length === 0)
      throw new RangeError(`bandCurves: ${entry.label} must have at least one frequency; got none`);
  // Without quantities of its own a caller's points are BandPoints: the default of P.
  const quantities = options.quantities ?? (standardQuantities(options) as unknown as readonly BandQuantity<P>[]);
  const series = entries.filter((entry) => isSeries(entry));
  const known: Known = {
    lines: series.map(({ label, model, style = "full" }) => ({ label, model, style })),
    gaps: entries.flatMap((entry) => (isSeries(entry) ? [] : [entry])),
    edges: { band: { low, high }, agreed: options.agreed },
    panels: quantities.map((quantity) => specOf(quantity, series)),
  };
  const alt = altText(known, quantities);
  return {
    alt,
    data: rows(series, quantities),
    draw: ({ document, width }) => draw(svgPen(document), width, alt, known),
  };
}

function isSeries<P extends { frequency: number }>(entry: BandSeries<P> | BandGap): entry is BandSeries<P> {
  return "points" in entry;
}

interface Known {
  lines: { label: string; model?: string; style: LineStyle }[];
  gaps: BandGap[];
  edges: { band: BandEdges; agreed?: BandEdges };
  panels: BandPanelSpec[];
}

function specOf<P extends { frequency: number }>(
  quantity: BandQuantity<P>,
  series: readonly BandSeries<P>[],
): BandPanelSpec {
  const curves = series.map(({ label, kind, style = "full", points }): BandCurve => {
    const value = points.map((point) => {
      const one = quantity.value(point);
      return one === null || Number.isNaN(one) ? null : one;
    });
    return { label, kind, style, frequency: points.map(({ frequency }) => frequency), value };
  });
  const { title, limit, floor, leastSpan } = quantity;
  return { title, curves, limit, floor, leastSpan };
}

function altText<P extends { frequency: number }>(
  { lines, gaps, edges, panels }: Known,
  quantities: readonly BandQuantity<P>[],
): string {
  const each = panels.map(({ title, curves, limit }, i) => {
    const { digits, floor } = quantities[i]!;
    const values = curves.map(({ label, value }, k) => {
      const { model } = lines[k]!;
      const name = model && curves.filter((other) => other.label === label).length > 1 ? `${label}, ${model}` : label;
      return `${name} ${rangeWords(value, digits, floor)}`;
    });
    return `${title}: ${values.join("; ")}${limit ? `; asked: ${limit.asked} ${decimal(limit.value, digits)}` : ""}.`;
  });
  const missing = gaps.map(({ label, reason }) => `${label}: not realisable. ${reason}`);
  return `From ${gigahertz(edges.band.low)} to ${gigahertz(edges.band.high)} GHz. ${[...each, ...missing].join(" ")}`;
}

function rows<P extends { frequency: number }>(
  series: readonly BandSeries<P>[],
  quantities: readonly BandQuantity<P>[],
): (string | number)[][] {
  const unitLast = (title: string): string => {
    const [name, ...unit] = title.split(", ");
    return unit.length > 0 ? `${name} (${unit.join(", ")})` : title;
  };
  const head = ["candidate", "model", "frequency (GHz)", ...quantities.map(({ title }) => unitLast(title))];
  const body = series.flatMap(({ label, model = "", points }) =>
    points.map((point) => [label, model, toGHz(point.frequency), ...quantities.map(({ value }) => value(point) ?? "")]),
  );
  return [head, ...body];
}

function draw(pen: Pen, width: number, alt: string, { lines, gaps, edges, panels }: Known): Element {
  const parts: Element[] = [];
  let top = 14;
  const others = lines.filter(({ style }) => style !== "full");
  if (others.length > 0) {
    const styles = [...new Map(others.map(({ style, model = "another model" }) => [style, model]))];
    const first = lines.find(({ style }) => style === "full")?.model;
    const legend = legendRow(pen, 14, width, [
      ...(first ? [{ words: first, ...lineStroke.full }] : []),
      ...styles.map(([style, words]) => ({ words, ...lineStroke[style] })),
    ]);
    parts.push(...legend.elements);
    top = legend.bottom + 34;
  }
  const grid = columns(panels.length, width, 330, 28);
  const right = labelRoom(panels);
  const height = 138;
  const pitch = height + 92;
  panels.forEach((spec, i) => {
    const frame = {
      left: grid.left(i) + panelRoom.left,
      top: top + 16 + Math.floor(i / grid.count) * pitch,
      width: grid.width - panelRoom.left - right,
      height,
    };
    if (spec.curves.length > 0) parts.push(...bandPanel(pen, frame, spec, edges));
  });
  let bottom = top + 16 + Math.ceil(panels.length / grid.count) * pitch - 56;
  if (panels.every(({ curves }) => curves.length === 0)) bottom = top - 26;
  for (const { label, reason } of gaps) {
    const words = wrapText(
      `${label[0]!.toUpperCase()}${label.slice(1)}, not realisable: ${reason}`,
      width,
      textSize.drawing,
    );
    parts.push(textBlock(pen, 0, bottom + 24, words, { fill: secondary, leading: 18 }));
    bottom += 24 + (words.length - 1) * 18;
  }
  return drawingRoot(pen, { width, height: bottom + 10 }, alt, ...parts);
}
