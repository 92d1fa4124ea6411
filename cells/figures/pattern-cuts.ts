// Pattern cuts, one panel a candidate: what falls on the dish, what misses it, how pure it is.

import { requireNumber } from "../check.ts";
import type { FeedKind } from "../horn/horn-profile.ts";
import { crossPolarPeakAt, levelAt, levelFloorDb, type PatternLevel } from "../pattern/cuts.ts";
import type { FeedPattern } from "../pattern/feed-pattern.ts";
import { type CutSeries, cutPanel, measuredWords } from "./cut-panel.ts";
import type { Drawing } from "./drawing.ts";
import { columns } from "./kit/columns.ts";
import { cutLevels } from "./kit/cut-levels.ts";
import { legendRow } from "./kit/legend.ts";
import { cutStroke, kindStyle, type LineStyle, lineStroke, secondary, textSize } from "./kit/palette.ts";
import { panelRoom } from "./kit/panel.ts";
import { drawingRoot, type Pen, svgPen, text, textBlock } from "./kit/svg.ts";
import { wrapText } from "./kit/text-width.ts";
import { unrealizable } from "./kit/unrealizable.ts";
import { decibels, decimal, degrees, gigahertz } from "./kit/words.ts";

/** One pattern of one candidate. Patterns of one label share a panel: its models, or a model and a measurement. */
export interface CutEntry {
  /** "Smooth cone" */
  label: string;
  kind: FeedKind;
  pattern: FeedPattern;
  /** "mode matching" */
  model?: string;
  /** default "full" for the first of a label, "second" for the next */
  style?: LineStyle;
}

/** A candidate that can't be built keeps its place. */
export interface CutGap {
  label: string;
  kind: FeedKind;
  reason: string;
}

export interface PatternCutsOptions {
  /** rad, from the axis to the rim of the dish, seen from the feed; below π/2 */
  halfAngle: number;
  /** dB against boresight copolar, negative: highest cross-polar asked */
  crossPolarLimitDb?: number;
  /** rad, end of the axis, default π/2, up to π */
  thetaMax?: number;
}

interface Series extends CutSeries {
  model?: string;
  atRim: PatternLevel;
  peak: { levelDb: number; theta: number };
}

interface Place {
  label: string;
  kind: FeedKind;
  reason?: string;
  series: Series[];
}

/**
 * Small multiples of E-plane (solid), H-plane (dashed) and cross-polar at 45° (dotted), dB against boresight copolar, with
 * the rim as an upright and what misses the dish tinted.
 *
 * @throws {RangeError} no entries, half-angle outside (0, π/2), thetaMax outside (halfAngle, π], or not a pattern
 */
export function patternCuts(entries: readonly (CutEntry | CutGap)[], options: PatternCutsOptions): Drawing {
  const { crossPolarLimitDb, thetaMax = Math.PI / 2 } = options;
  const halfAngle = requireNumber("patternCuts: half-angle", options.halfAngle, {
    above: 0,
    below: Math.PI / 2,
    unit: "rad",
  });
  requireNumber("patternCuts: end of the axis", thetaMax, { above: halfAngle, max: Math.PI, unit: "rad" });
  if (crossPolarLimitDb !== undefined)
    requireNumber("patternCuts: cross-polar limit", crossPolarLimitDb, { max: 0, unit: "dB" });
  if (entries.length === 0) throw new RangeError("patternCuts: must have at least one candidate; got none");
  const places = placesOf(entries, halfAngle, thetaMax);
  const frequency = entries.find((entry) => "pattern" in entry)?.pattern.frequency;
  const known = { places, frequency, halfAngle, thetaMax, crossPolarLimitDb };
  const alt = altText(known);
  return { alt, data: rows(places), draw: ({ document, width }) => draw(svgPen(document), width, alt, known) };
}

interface Known {
  places: Place[];
  frequency?: number;
  halfAngle: number;
  thetaMax: number;
  crossPolarLimitDb?: number;
}

function placesOf(entries: readonly (CutEntry | CutGap)[], halfAngle: number, thetaMax: number): Place[] {
  const places: Place[] = [];
  for (const entry of entries) {
    let place = places.find(({ label }) => label === entry.label);
    if (!place) places.push((place = { label: entry.label, kind: entry.kind, series: [] }));
    if (!("pattern" in entry)) {
      place.reason = entry.reason;
      continue;
    }
    const { pattern, model, style = (["full", "second", "third"] as const)[Math.min(2, place.series.length)]! } = entry;
    place.series.push({
      model,
      style,
      levels: cutLevels(pattern, thetaMax),
      atRim: levelAt(pattern, halfAngle),
      peak: crossPolarPeakAt(pattern, thetaMax),
    });
  }
  return places;
}

const crossWords = (levelDb: number): string => (levelDb <= levelFloorDb ? "none" : decibels(levelDb));
const rimWords = ({ ePlaneDb, hPlaneDb }: PatternLevel): string => `E ${decimal(ePlaneDb, 1)}, H ${decibels(hPlaneDb)}`;

function altText({ places, frequency, halfAngle, thetaMax, crossPolarLimitDb }: Known): string {
  const at = frequency === undefined ? "" : ` at ${gigahertz(frequency)} GHz`;
  const asked = crossPolarLimitDb === undefined ? "" : ` Asked: cross-polar below ${decibels(crossPolarLimitDb)}.`;
  const each = places.map(({ label, reason, series }) => {
    if (series.length === 0) return ` ${label}: not realisable. ${reason}`;
    return series
      .map(({ model, atRim, peak }) => {
        const where = peak.levelDb <= levelFloorDb ? "" : ` at ${degrees(peak.theta, 0)}`;
        return ` ${label}${model ? `, ${model}` : ""}: at the rim ${rimWords(atRim)}; highest cross-polar ${crossWords(peak.levelDb)}${where}.`;
      })
      .join("");
  });
  return `Feed patterns${at} from 0° to ${degrees(thetaMax, 0)}, dB against boresight; the rim of the dish is at ${degrees(halfAngle)}.${each.join("")}${asked}`;
}

function rows(places: Place[]): (string | number)[][] {
  const head = ["candidate", "model", "theta (deg)", "E-plane (dB)", "H-plane (dB)", "cross-polar 45° (dB)"];
  const body = places.flatMap(({ label, series }) =>
    series.flatMap(({ model, levels }) =>
      levels.thetaDeg.map((theta, i) => [
        label,
        model ?? "",
        theta,
        levels.ePlaneDb[i]!,
        levels.hPlaneDb[i]!,
        levels.crossPolarDb[i]!,
      ]),
    ),
  );
  return [head, ...body];
}

function draw(pen: Pen, width: number, alt: string, known: Known): Element {
  const { places, frequency } = known;
  // Each further model once, by how it is drawn.
  const further = new Map(
    places
      .flatMap(({ series }) => series.slice(1))
      .map(({ model = "another model", style }) => [`${style} ${model}`, { model, style }]),
  );
  const legend = legendRow(
    pen,
    14,
    width,
    [
      { words: "E-plane", ...cutStroke.e },
      { words: "H-plane", ...cutStroke.h },
      { words: "cross-polar, 45°", ...cutStroke.cross },
      ...[...further.values()].map(({ model, style }) => ({
        words: style === "measured" ? `${model}: ${measuredWords}` : model,
        ...lineStroke[style],
        dash: undefined,
      })),
    ],
    `dB below the axis${frequency === undefined ? "" : `, ${gigahertz(frequency)} GHz`}`,
  );
  const grid = columns(places.length, width, 220, 26);
  const plotHeight = Math.round(Math.min(240, Math.max(180, grid.width * 0.78)));
  const parts: Element[] = [...legend.elements];
  let top = legend.bottom + 34;
  let bottom = top;
  places.forEach((place, i) => {
    if (i > 0 && i % grid.count === 0) top = bottom + 44;
    const drawn = onePlace(
      pen,
      place,
      { left: grid.left(i), top, width: Math.min(grid.width, 480), height: plotHeight },
      known,
    );
    parts.push(...drawn.elements);
    bottom = Math.max(bottom, drawn.bottom);
  });
  return drawingRoot(pen, { width, height: bottom + 8 }, alt, ...parts);
}

function onePlace(
  pen: Pen,
  place: Place,
  box: { left: number; top: number; width: number; height: number },
  known: Known,
): { elements: Element[]; bottom: number } {
  const { label, kind, series, reason } = place;
  const title = text(pen, box.left, box.top, label, { bold: true, size: textSize.title, fill: kindStyle(kind).words });
  if (series.length === 0) {
    const words = unrealizable(pen, box.left, box.top + 24, box.width, reason ?? "");
    return { elements: [title, words.element], bottom: words.bottom };
  }
  const frame = {
    left: box.left + panelRoom.left,
    top: box.top + 20,
    width: box.width - panelRoom.left - panelRoom.right,
    height: box.height,
  };
  const drawn = cutPanel(pen, frame, series, { ...known, color: kindStyle(kind).line, rimDots: series[0]!.atRim });
  const lines = series.flatMap(({ model, atRim }) =>
    wrapText(`${series.length > 1 && model ? model : "at the rim"}: ${rimWords(atRim)}`, box.width, textSize.drawing),
  );
  const below = frame.top + frame.height + 44;
  const words = textBlock(pen, box.left, below, lines, { fill: secondary });
  return { elements: [title, ...drawn, words], bottom: below + (lines.length - 1) * 17 };
}
