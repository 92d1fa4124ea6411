// One quantity over frequency, a curve a candidate, labels at the curves' ends.

import type { FeedKind } from "../horn/horn-profile.ts";
import { toGHz } from "../units.ts";
import { type Axis, roundAxis } from "./kit/axis.ts";
import { aboveFloor, chosenPoints, lastPoint, seriesPoints } from "./kit/curve-points.ts";
import { limitWords } from "./kit/limit-words.ts";
import { control, kindStyle, type LineStyle, lineStroke, secondary, textSize } from "./kit/palette.ts";
import { band, curve, type Frame, limitLine, marks, type Point, panel, uprights } from "./kit/panel.ts";
import { spread } from "./kit/spread.ts";
import { coordinate, type Pen, text } from "./kit/svg.ts";
import { textWidth } from "./kit/text-width.ts";
import { decimal, gigahertz } from "./kit/words.ts";

/** A curve of one panel. */
export interface BandCurve {
  /** short, at the curve's right end: "smooth" */
  label: string;
  kind: FeedKind;
  style: LineStyle;
  /** Hz, rising */
  frequency: readonly number[];
  /** in the panel's unit; null where there is none */
  value: readonly (number | null)[];
}

export interface BandPanelSpec {
  /** with its unit: "Aperture efficiency, %" */
  title: string;
  curves: readonly BandCurve[];
  /** a wanted value in the panel's unit */
  limit?: { value: number; asked: "below" | "above" };
  /** lower end of the axis where values can fall without bound; what lies under it isn't drawn */
  floor?: number;
  /** least height of the axis in the panel's unit, so that noise isn't shown as a trend */
  leastSpan?: number;
}

export interface BandEdges {
  /** Hz */
  low: number;
  /** Hz */
  high: number;
}

const labelSize = textSize.axis;
/** Curves of these styles are named in the legend, not at their ends. */
const isLabelled = ({ style }: BandCurve): boolean => style === "full";

/** The name of a curve at its end; an arrow where it ends below the floor. */
const endLabel = ({ label }: BandCurve, hidden: boolean): string => (hidden ? `${label} ↓` : label);

/** Room for the labels at the right of a frame, px. */
export function labelRoom(panels: readonly BandPanelSpec[]): number {
  const labels = panels.flatMap(({ curves, floor = -Infinity }) =>
    curves.filter(isLabelled).map((curve) => {
      const hidden = !((curve.value.findLast((v) => v !== null) ?? -Infinity) >= floor);
      return textWidth(endLabel(curve, hidden), labelSize);
    }),
  );
  return Math.max(0, ...labels) + 20;
}

/** @param frame box of the data; title above and frequencies below need 30 px each */
export function bandPanel(
  pen: Pen,
  frame: Frame,
  spec: BandPanelSpec,
  edges: { band: BandEdges; agreed?: BandEdges },
): Element[] {
  const { low, high } = edges.band;
  const x = frequencyAxis(spec.curves, edges.band);
  const floor = spec.floor ?? -Infinity;
  const shown = spec.curves.flatMap(({ value }) => value.filter((v): v is number => v !== null && v >= floor));
  const y = roundAxis(spec.limit ? [...shown, ...aroundLimit(spec.limit.value, shown)] : shown, {
    count: 4,
    leastSpan: spec.leastSpan,
  });
  const points = spec.curves.map(({ frequency, value }): Point[] =>
    aboveFloor(
      frequency.map(toGHz),
      value.map((v) => v ?? Number.NaN),
      y.domain[0],
    ),
  );
  const [bandLow, bandHigh] = [toGHz(low), toGHz(high)];
  const drawn = panel(
    pen,
    frame,
    { x, y },
    {
      under: edges.agreed ? [band(toGHz(edges.agreed.low), toGHz(edges.agreed.high))] : [],
      over: [
        uprights([bandLow, bandHigh]),
        ...(spec.limit ? [limitLine(spec.limit.value)] : []),
        ...spec.curves.flatMap((one, i) =>
          curveMarks(one, points[i]!, { low: bandLow, high: bandHigh, floor: y.domain[0] }),
        ),
      ],
    },
  );
  const elements: Element[] = [
    text(pen, frame.left - 46, frame.top - 16, spec.title, { bold: true, size: 13 }),
    drawn.element,
    text(pen, (drawn.xAt(bandLow) + drawn.xAt(bandHigh)) / 2, frame.top + frame.height + 18, "GHz", {
      size: textSize.axis,
      fill: secondary,
      anchor: "middle",
    }),
    ...endLabels(pen, frame, spec.curves, points, drawn.yAt),
  ];
  if (spec.limit) {
    const words = `asked: ${spec.limit.asked} ${y.format(spec.limit.value)}`;
    elements.push(
      limitWords(pen, words, spec.limit.value, { frame, drawn, curves: points, uprights: [bandLow, bandHigh] }),
    );
  }
  return elements;
}

/** A limit line never lies on the frame, where it would look like an axis. */
function aroundLimit(limit: number, values: readonly number[]): number[] {
  const span = Math.max(limit, ...values) - Math.min(limit, ...values);
  return [limit - 0.04 * span, limit + 0.04 * span];
}

/** From the first frequency to the last with a little air, ticks at the band's edges. */
function frequencyAxis(curves: readonly BandCurve[], { low, high }: BandEdges): Axis {
  const all = curves.flatMap(({ frequency }) => frequency).map(toGHz);
  const first = Math.min(toGHz(low), ...all);
  const last = Math.max(toGHz(high), ...all);
  const air = 0.03 * (last - first) || 0.01 * last;
  return {
    domain: [first - air, last + air],
    ticks: low === high ? [toGHz(low)] : [toGHz(low), toGHz(high)],
    format: (value) => gigahertz(value * 1e9),
  };
}

/** @param inside GHz, and the lower end of the axis: marks stand on computed points within */
function curveMarks(
  { kind, style, frequency, value }: BandCurve,
  points: readonly Point[],
  inside: { low: number; high: number; floor: number },
) {
  const { line, mark } = kindStyle(kind);
  if (style === "measured") return [marks(chosenPoints(points, 40), "times", lineStroke.measured.color ?? line, 2.4)];
  const { width, dash, color = line } = lineStroke[style];
  const stroke = curve(points, { color, width, dash });
  if (style !== "full") return [stroke];
  const within = seriesPoints(frequency.map(toGHz), value).filter(
    ([at, v]) => at >= inside.low - 1e-9 && at <= inside.high + 1e-9 && v >= inside.floor,
  );
  return [stroke, marks(chosenPoints(within, 5), mark, line)];
}

/** Labels in the kind's own words' colour, moved apart where lines end close together; an arrow marks a curve below the floor. */
function endLabels(
  pen: Pen,
  frame: Frame,
  curves: readonly BandCurve[],
  points: readonly (readonly Point[])[],
  yAt: (value: number) => number,
): Element[] {
  const bottom = frame.top + frame.height;
  const ends = curves
    .map((one, i) => ({ one, end: lastPoint(points[i]!) }))
    .filter(({ one }) => isLabelled(one) && one.value.some((v) => v !== null))
    .map(({ one, end }) => ({ one, y: end ? yAt(end[1]) : bottom, hidden: !end }));
  const placed = spread(
    ends.map(({ y }) => y),
    14.5,
    frame.top + 3,
    bottom - 3,
  );
  const left = frame.left + frame.width;
  return ends.flatMap(({ one, y, hidden }, i) => {
    const at = placed[i]!;
    const words = text(pen, left + 10, at + 4, endLabel(one, hidden), {
      size: labelSize,
      fill: kindStyle(one.kind).words,
    });
    if (hidden || Math.abs(at - y) < 3) return [words];
    const leader = `M${coordinate(left + 1)} ${coordinate(y)}L${coordinate(left + 8)} ${coordinate(at)}`;
    return [pen("path", { d: leader, stroke: control, "stroke-width": 0.8 }), words];
  });
}

/** Smallest and largest of a curve, in words: "60.1 to 62.4", "60.1" where they round alike, "below −60" under a floor. */
export function rangeWords(value: readonly (number | null)[], digits: number, floor = -Infinity): string {
  const known = value.filter((v): v is number => v !== null && Number.isFinite(v));
  if (known.length === 0) return "no value";
  const words = (v: number): string => (v < floor ? `below ${decimal(floor, 0)}` : decimal(v, digits));
  const [low, high] = [words(Math.min(...known)), words(Math.max(...known))];
  return low === high ? low : `${low} to ${high}`;
}
