// Reading a drawing back: what stands where, in px.

import type { Drawing } from "../../../cells/figures/index.ts";
import { headlessDocument } from "./examples.ts";

export function drawnAt(drawing: Drawing, width = 760): Element {
  return drawing.draw({ document: headlessDocument(), width });
}

export function textsOf(drawn: Element): string[] {
  return [...drawn.querySelectorAll("text")].map((text) => text.textContent ?? "");
}

/** Points of a path of M and L steps (commas or spaces), one array a stroke. */
export function strokes(path: Element): [number, number][][] {
  const d = path.getAttribute("d") ?? "";
  return d
    .split("M")
    .slice(1)
    .map((stroke) => {
      const points: [number, number][] = [];
      for (const [, kind, pair] of `L${stroke.replace(/Z$/i, "")}`.matchAll(/([LlHV])([^LlHV]+)/g)) {
        const [x, y] = pair!.trim().split(/[ ,]+/).map(Number) as [number, number];
        const [lastX, lastY] = points.at(-1) ?? [0, 0];
        if (kind === "H") points.push([x, lastY]);
        else if (kind === "V") points.push([lastX, x]);
        else points.push(kind === "l" ? [lastX + x, lastY + y] : [x, y]);
      }
      return points;
    });
}

/** One set of axes: its curves in its own px, and the scales read back from its tick words. */
export interface ReadPanel {
  x: (px: number) => number;
  y: (px: number) => number;
  /** curves by colour and dash, "" for solid */
  curves: { stroke: string; dash: string; points: [number, number][] }[];
  element: Element;
}

const number = (words: string): number => Number.parseFloat(words.replace("−", "-"));

/** The panels of a drawing: every inner svg. Scales come from the tick words and where they stand, not from the code that drew. */
export function panelsOf(drawn: Element): ReadPanel[] {
  return [...drawn.querySelectorAll("svg")].map((element) => {
    const ticks = [...element.querySelectorAll("text")].map((tick) => {
      const [x, y] = tick
        .getAttribute("transform")!
        .match(/-?[\d.]+/g)!
        .map(Number) as [number, number];
      return { x, y, upright: tick.closest("g[text-anchor=end]") !== null, value: number(tick.textContent ?? "") };
    });
    const scale = (along: { at: number; value: number }[]) => {
      const [first, last] = [along[0]!, along.at(-1)!];
      return (px: number) => first.value + ((px - first.at) / (last.at - first.at)) * (last.value - first.value);
    };
    const upright = ticks.filter((tick) => tick.upright).map(({ y, value }) => ({ at: y, value }));
    const level = ticks.filter((tick) => !tick.upright).map(({ x, value }) => ({ at: x, value }));
    // Curves alone are joined round: ticks and marks aren't.
    const curves = [...element.querySelectorAll("path")]
      .map((path) => ({ path, group: path.closest("g[stroke-linejoin=round]") }))
      .flatMap(({ path, group }) => {
        if (!group || !path.getAttribute("d")) return [];
        const stroke = group.getAttribute("stroke") ?? "";
        return [{ stroke, dash: group.getAttribute("stroke-dasharray") ?? "", points: strokes(path).flat() }];
      });
    return { x: scale(level), y: scale(upright), curves, element };
  });
}

/** y of a curve at an x, both in the units of the axes; straight between points. */
export function valueAt(panel: ReadPanel, points: readonly [number, number][], x: number): number {
  const i = points.findIndex(([px], k) => k > 0 && panel.x(px) >= x && panel.x(points[k - 1]![0]) <= x);
  if (i < 0) return Number.NaN;
  const [[x0, y0], [x1, y1]] = [points[i - 1]!, points[i]!];
  const share = (x - panel.x(x0)) / (panel.x(x1) - panel.x(x0));
  return panel.y(y0 + share * (y1 - y0));
}
