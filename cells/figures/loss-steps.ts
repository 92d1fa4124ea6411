// Where the gain goes: each loss hangs from where the one before it ended.

import { requireNumber } from "../check.ts";
import type { FeedKind } from "../horn/horn-profile.ts";
import type { DishPerformance } from "../reflector/efficiency.ts";
import { powerToDb } from "../units.ts";
import type { Drawing } from "./drawing.ts";
import { roundStep } from "./kit/axis.ts";
import { columns } from "./kit/columns.ts";
import { control, hairline, ink, kindStyle, paper, secondary, textSize } from "./kit/palette.ts";
import { coordinate, drawingRoot, haloAttributes, type Pen, svgPen, text, textBlock } from "./kit/svg.ts";
import { textWidth, wrapText } from "./kit/text-width.ts";
import { unrealizable } from "./kit/unrealizable.ts";
import { decibels, decimal, percent } from "./kit/words.ts";

export interface LossStep {
  /** "spillover" */
  label: string;
  /** power ratio, above 0, at most 1 */
  efficiency: number;
  /** the same for every feed: drawn hollow and grey */
  common?: boolean;
}

export interface LossEntry {
  /** "Smooth cone" */
  label: string;
  kind: FeedKind;
  steps: readonly LossStep[];
  /** what it comes to, beneath the sum: "gain 44.07 dBi" */
  result?: string;
}

/** A candidate that can't be built keeps its place. */
export interface LossGap {
  label: string;
  kind: FeedKind;
  reason: string;
}

/** A step's efficiency may exceed 1 by this: rounding of a loss that is none. */
const rounding = 1e-9;

/** The sub-efficiencies of a dish with a feed as steps, in the order in which the field meets them. */
export function performanceSteps(performance: DishPerformance, names: { surface?: string } = {}): LossStep[] {
  return [
    { label: "illumination", efficiency: performance.illuminationEfficiency },
    { label: "spillover", efficiency: performance.spilloverEfficiency },
    { label: "phase", efficiency: performance.phaseEfficiency },
    { label: "cross-polar", efficiency: performance.polarizationEfficiency },
    { label: "blockage", efficiency: performance.blockageEfficiency },
    { label: names.surface ?? "surface", efficiency: performance.surfaceEfficiency, common: true },
    { label: "ohmic", efficiency: performance.radiationEfficiency },
  ];
}

/**
 * Bars that hang left to right from 0 dB, one a loss, with the total efficiency beneath; all candidates on one scale.
 * @param note a sentence beneath: from what the losses count
 * @throws {RangeError} no candidates, a candidate without steps, an efficiency outside (0, 1]
 */
export function lossSteps(entries: readonly (LossEntry | LossGap)[], note?: string): Drawing {
  if (entries.length === 0) throw new RangeError("lossSteps: must have at least one candidate; got none");
  for (const entry of entries) {
    if (!("steps" in entry)) continue;
    if (entry.steps.length === 0)
      throw new RangeError(`lossSteps: ${entry.label} must have at least one step; got none`);
    for (const { label, efficiency } of entry.steps)
      requireNumber(`lossSteps: ${label} of ${entry.label}`, efficiency, { above: 0, max: 1 + rounding });
  }
  const alt = altText(entries, note);
  return { alt, data: rows(entries), draw: ({ document, width }) => draw(svgPen(document), width, alt, entries, note) };
}

/** dB, 0 or negative */
const lossDb = ({ efficiency }: LossStep): number => Math.min(0, powerToDb(efficiency));
const totalOf = ({ steps }: LossEntry): number =>
  steps.reduce((product, { efficiency }) => product * Math.min(1, efficiency), 1);

function altText(entries: readonly (LossEntry | LossGap)[], note?: string): string {
  const each = entries.map((entry) => {
    if (!("steps" in entry)) return `${entry.label}: not realisable. ${entry.reason}`;
    const total = totalOf(entry);
    const steps = entry.steps.map((step) => `${step.label} ${decimal(lossDb(step), 2)}`).join(", ");
    return `${entry.label}: ${percent(total)} in all, ${decibels(powerToDb(total), 2)} (${steps} dB)${entry.result ? `; ${entry.result}` : ""}.`;
  });
  return `Losses from 0 dB, step by step. ${each.join(" ")}${note ? ` ${note}` : ""}`;
}

function rows(entries: readonly (LossEntry | LossGap)[]): (string | number)[][] {
  const head = ["candidate", "loss", "efficiency (ratio)", "level (dB)", "sum (dB)"];
  const body = entries.flatMap((entry) => {
    if (!("steps" in entry)) return [];
    let sum = 0;
    return entry.steps.map((step) => [entry.label, step.label, step.efficiency, lossDb(step), (sum += lossDb(step))]);
  });
  return [head, ...body];
}

const rowPitch = 31;
const barHeight = 7;
/** Room for the values at the right, px: no bar runs under them. */
const valueRoom = 42;

function draw(pen: Pen, width: number, alt: string, entries: readonly (LossEntry | LossGap)[], note?: string): Element {
  const grid = columns(entries.length, width, 210, 26);
  const deepest = Math.min(-0.5, ...entries.map((entry) => ("steps" in entry ? powerToDb(totalOf(entry)) : 0)));
  const box = Math.min(grid.width, 420);
  const perDb = (box - valueRoom) / -deepest;
  const parts: Element[] = [];
  let top = 16;
  let bottom = top;
  entries.forEach((entry, i) => {
    if (i > 0 && i % grid.count === 0) top = bottom + 40;
    const drawn = onePlace(pen, entry, { left: grid.left(i), top, width: box, perDb, deepest });
    parts.push(...drawn.elements);
    bottom = Math.max(bottom, drawn.bottom);
  });
  const common = entries.some((entry) => "steps" in entry && entry.steps.some((step) => step.common));
  const words = [note, common ? "Hollow grey bars are common to every feed." : undefined].filter(Boolean).join(" ");
  if (words) {
    const lines = wrapText(words, width, textSize.drawing);
    parts.push(textBlock(pen, 0, bottom + 30, lines, { fill: secondary, leading: 18 }));
    bottom += 30 + (lines.length - 1) * 18;
  }
  return drawingRoot(pen, { width, height: bottom + 8 }, alt, ...parts);
}

interface LossPlace {
  left: number;
  top: number;
  width: number;
  perDb: number;
  deepest: number;
}

function onePlace(pen: Pen, entry: LossEntry | LossGap, place: LossPlace): { elements: Element[]; bottom: number } {
  const { left, top, width, perDb, deepest } = place;
  const style = kindStyle(entry.kind);
  const title = text(pen, left, top, entry.label, { bold: true, size: textSize.title, fill: style.words });
  if (!("steps" in entry)) {
    const words = unrealizable(pen, left, top + 24, width, entry.reason);
    return { elements: [title, words.element], bottom: words.bottom };
  }
  const axisY = top + 26;
  const first = axisY + 10;
  const foot = first + entry.steps.length * rowPitch + 4;
  const bars: Element[] = scaleLines(pen, { ...place, axisY, foot });
  const words: Element[] = [title];
  const labels: Element[] = [];
  let x = left;
  entry.steps.forEach((step, i) => {
    const y = first + i * rowPitch;
    const value = lossDb(step);
    // A loss too small to see is still a mark.
    const bar = Math.max(-value * perDb, 1.2);
    const barY = y + 18;
    if (i > 0)
      bars.push(
        pen("path", {
          d: `M${coordinate(x)} ${barY - rowPitch + barHeight}V${barY}`,
          stroke: control,
          "stroke-width": 0.8,
        }),
      );
    bars.push(
      pen("rect", {
        x,
        y: barY,
        width: bar,
        height: barHeight,
        ...(step.common ? { fill: hairline, stroke: control, "stroke-width": 0.8 } : { fill: style.line }),
      }),
    );
    labels.push(
      text(pen, left, y + 12, step.label),
      text(pen, left + width, y + 12, decimal(value, 2), { anchor: "end" }),
    );
    x = left + Math.min(-deepest * perDb, x - left - value * perDb);
  });
  const total = totalOf(entry);
  const totalY = foot + 22;
  const lines = entry.result ? wrapText(entry.result, width, textSize.drawing) : [];
  words.push(
    pen("path", { d: `M${coordinate(left)} ${foot}h${coordinate(width)}`, stroke: ink }),
    text(pen, left, totalY, percent(total), { bold: true, size: 16 }),
    text(pen, left + width, totalY, `${decibels(powerToDb(total), 2)} in all`, { anchor: "end" }),
    textBlock(pen, left, totalY + 22, lines, { fill: secondary, leading: 18 }),
  );
  return {
    elements: [...bars, pen("g", haloAttributes(paper), ...labels), ...words],
    bottom: totalY + (lines.length > 0 ? 22 + (lines.length - 1) * 18 : 0),
  };
}

function scaleLines(pen: Pen, at: LossPlace & { axisY: number; foot: number }): Element[] {
  const step = roundStep(Math.max(-at.deepest / 3.2, 56 / at.perDb));
  const digits = step < 1 ? 1 : 0;
  const count = Math.floor(-at.deepest / step + 1e-9);
  return Array.from({ length: count + 1 }, (_, i) => {
    const x = at.left + i * step * at.perDb;
    const words = i === 0 ? "0 dB" : decimal(-i * step, digits);
    const fits = x + textWidth(words, textSize.axis) / 2 <= at.left + at.width - 4;
    return pen(
      "g",
      {},
      pen("path", { d: `M${coordinate(x + 0.5)} ${at.axisY + 4}V${at.foot}`, stroke: hairline }),
      fits
        ? text(pen, x, at.axisY, words, { size: textSize.axis, fill: secondary, anchor: i === 0 ? "start" : "middle" })
        : undefined,
    );
  });
}
