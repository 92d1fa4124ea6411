// The dish in section: where its rim stands as the feed sees it, and how small the feed is beside it.

import { requireNumber } from "../check.ts";
import { outerWall, wallThickness } from "../horn/workshop/metal.ts";
import type { Dish } from "../reflector/dish.ts";
import { toDeg, toMm } from "../units.ts";
import type { Drawing } from "./drawing.ts";
import type { SectionedHorn } from "./horn-section.ts";
import { chainLine, dimension } from "./kit/dimension.ts";
import { facts, factsHeight } from "./kit/facts.ts";
import { control, ink, paper, secondary, tint } from "./kit/palette.ts";
import { coordinate, drawingRoot, type Pen, pathThrough, svgPen, text, textBlock } from "./kit/svg.ts";
import { textWidth } from "./kit/text-width.ts";
import { decimal, degrees, length } from "./kit/words.ts";

export interface DishSectionOptions {
  /** the feed to draw at the focus */
  feed?: SectionedHorn;
  /** m on the feed's axis, the point that stands at the focus; default 0, its mouth */
  phaseCenter?: number;
  /** what the dish asks, beside the drawing (below it on a narrow page): label and value with unit */
  facts?: readonly (readonly [label: string, value: string])[];
}

/** Tallest drawing of the aperture, px, and width of the facts beside it. */
const tallest = 300;
const factsWidth = 306;

/**
 * Section of a front-fed paraboloid: rays from the focus to the rim and between, half-angle, focal length, depth, diameter
 * and the way to the rim, with the feed to scale.
 * @throws {RangeError} a dish whose numbers aren't finite and positive; phase centre not finite
 */
export function dishSection(dish: Dish, options: DishSectionOptions = {}): Drawing {
  for (const [name, value] of Object.entries({
    diameter: dish.diameter,
    "focal length": dish.focalLength,
    depth: dish.depth,
  }))
    requireNumber(`dishSection: ${name}`, value, { above: 0, unit: "m" });
  requireNumber("dishSection: phase centre", options.phaseCenter ?? 0, { unit: "m" });
  const alt = altText(dish, options);
  return { alt, data: rows(dish), draw: ({ document, width }) => draw(svgPen(document), width, alt, dish, options) };
}

/** Focus to rim, m. */
const rimDistance = ({ focalLength, depth }: Dish): number => focalLength + depth;

function altText(dish: Dish, { feed, facts: asked = [] }: DishSectionOptions): string {
  const { diameter, focalLength, fOverD, halfAngle, depth } = dish;
  const feedWords = feed
    ? ` The feed, ${length(feed.length)} long and ${length(feed.outerDiameter)} wide, is drawn to scale at the focus.`
    : "";
  const more = asked.map(([label, value]) => ` ${label}: ${value}.`).join("");
  return `Section of a paraboloid ${length(diameter)} in diameter, focal length ${length(focalLength)} (f/D ${decimal(fOverD, 2)}), ${length(depth)} deep. From the focus the rim stands at ${degrees(halfAngle)} to the axis, ${length(rimDistance(dish))} away.${feedWords}${more}`;
}

function rows({ diameter, focalLength, fOverD, halfAngle, depth }: Dish): (string | number)[][] {
  return [
    ["diameter (m)", "focal length (m)", "f/D", "half-angle to the rim (deg)", "depth (mm)"],
    [diameter, focalLength, fOverD, toDeg(halfAngle), toMm(depth)],
  ];
}

function draw(pen: Pen, width: number, alt: string, dish: Dish, options: DishSectionOptions): Element {
  const asked = options.facts ?? [];
  const beside = asked.length > 0 && width >= 640;
  const section = drawSection(pen, beside ? width - factsWidth - 24 : width, dish, options);
  const parts = [...section.elements];
  let height = section.height;
  if (asked.length > 0) {
    const tall = factsHeight(asked.length);
    const top = beside ? 2 : height + 18;
    parts.push(facts(pen, { left: beside ? width - factsWidth : 0, top, width: beside ? factsWidth : width }, asked));
    height = Math.max(height, top + tall);
  }
  return drawingRoot(pen, { width, height: height + 6 }, alt, ...parts);
}

function drawSection(
  pen: Pen,
  width: number,
  dish: Dish,
  options: DishSectionOptions,
): { elements: Element[]; height: number } {
  const { diameter, focalLength, depth, halfAngle } = dish;
  const { feed, phaseCenter = 0 } = options;
  // What sticks out behind the focus needs room; the mouth of a horn with its phase centre inside stands before it.
  const behind = feed ? feed.length + phaseCenter : 0;
  const [leftRoom, rightRoom] = [46, 58];
  const reach = Math.max(focalLength + Math.max(0, behind), depth);
  const scale = Math.min(tallest / diameter, (width - leftRoom - rightRoom) / reach);
  const half = (diameter / 2) * scale;
  const top = 46;
  const axisY = top + half;
  const vertexX = leftRoom;
  const x = (z: number): number => vertexX + z * scale;
  const focusX = x(focalLength);
  const rimX = x(depth);
  const curve = Array.from({ length: 41 }, (_, i): [number, number] => {
    const r = ((i - 20) / 20) * (diameter / 2);
    return [x((r * r) / (4 * focalLength)), axisY - r * scale];
  });
  const focus: [number, number] = [focusX, axisY];
  const rays = [-0.68, -0.34, 0.34, 0.68].flatMap((share) => {
    const r = share * (diameter / 2);
    const onDish: [number, number] = [x((r * r) / (4 * focalLength)), axisY - r * scale];
    return [pathThrough([focus, onDish, [rimX + 20, onDish[1]]])];
  });
  const bottomY = axisY + half + 30;
  const elements: Element[] = [
    pen("path", { d: pathThrough([...curve, focus], true), fill: tint }),
    pen("path", { d: rays.join(""), stroke: control, "stroke-width": 0.7, "stroke-opacity": 0.6 }),
    chainLine(pen, [vertexX - 14, axisY], [x(reach) + 36, axisY]),
    pen("path", { d: pathThrough([curve.at(-1)!, focus, curve[0]!]), stroke: ink, "stroke-width": 1 }),
    pen("path", { d: pathThrough(curve), stroke: ink, "stroke-width": 3, "stroke-linecap": "round" }),
    ...angleArc(pen, focus, halfAngle, focalLength * scale, half),
    ...dimensions(pen, { dish, scale, vertexX, rimX, focusX, axisY, half, bottomY, top }),
    ...(feed ? feedAtFocus(pen, feed, { x: focusX + phaseCenter * scale, axisY, scale, width }) : []),
    pen("circle", { cx: focusX, cy: axisY, r: 2.4, fill: ink, stroke: paper, "stroke-width": 0.8 }),
  ];
  return { elements, height: bottomY + 10 };
}

/** The half-angle between axis and upper rim ray, with its words where the cone is wide enough for them. */
function angleArc(
  pen: Pen,
  [fx, fy]: readonly [number, number],
  halfAngle: number,
  focalPx: number,
  half: number,
): Element[] {
  const words = degrees(halfAngle);
  const wide = textWidth(words, 12.5);
  // Far enough from the focus that the words fit between axis and ray, at the middle of the angle.
  const fitting = Math.min(
    (wide / 2 + 12) / Math.sin(Math.min(halfAngle, Math.PI / 3)),
    0.62 * Math.hypot(focalPx, half),
  );
  const radius = Math.max(34, Math.min(fitting, 96));
  const end = [fx - radius * Math.cos(halfAngle), fy - radius * Math.sin(halfAngle)] as const;
  const arc = `M${coordinate(fx - radius)} ${coordinate(fy)}A${coordinate(radius)} ${coordinate(radius)} 0 0 1 ${coordinate(end[0])} ${coordinate(end[1])}`;
  const at = radius + 8 + wide / 2;
  const middle = halfAngle / 2;
  return [
    pen("path", { d: arc, stroke: secondary, "stroke-width": 0.8 }),
    text(pen, fx - at * Math.cos(middle), fy - at * Math.sin(middle) + 4, words, { anchor: "middle", halo: tint }),
  ];
}

interface SectionFrame {
  dish: Dish;
  scale: number;
  vertexX: number;
  rimX: number;
  focusX: number;
  axisY: number;
  half: number;
  bottomY: number;
  top: number;
}

function dimensions(pen: Pen, frame: SectionFrame): Element[] {
  const { dish, vertexX, rimX, focusX, axisY, half, bottomY, top } = frame;
  const upper = axisY - half;
  const depthY = top - 20;
  // Above the middle of the upper ray, turned along it.
  const slope = Math.atan2(half, focusX - rimX);
  const [middleX, middleY] = [(rimX + focusX) / 2, (upper + axisY) / 2];
  const rayWords = length(rimDistance(dish));
  const turned = slope < 1.2;
  return [
    dimension(pen, {
      along: "y",
      from: upper,
      to: axisY + half,
      at: vertexX - 22,
      extendFrom: [rimX - 5, rimX - 5],
      words: length(dish.diameter),
    }),
    dimension(pen, {
      along: "x",
      from: vertexX,
      to: focusX,
      at: bottomY,
      extendFrom: [axisY + 6, axisY + 10],
      words: `focal length ${length(dish.focalLength)}`,
      place: focusX - vertexX > textWidth(`focal length ${length(dish.focalLength)}`, 12.5) + 16 ? "on" : "after",
    }),
    dimension(pen, {
      along: "x",
      from: vertexX,
      to: rimX,
      at: depthY,
      extendFrom: [axisY - 6, upper - 5],
      words: `depth ${length(dish.depth)}`,
      place: rimX - vertexX > 110 ? "on" : "after",
    }),
    text(
      pen,
      turned ? middleX + 7 * Math.sin(slope) : middleX + 8,
      turned ? middleY - 7 * Math.cos(slope) : middleY,
      rayWords,
      { anchor: turned ? "middle" : "start", turn: turned ? toDeg(slope) : undefined },
    ),
  ];
}

/** The feed's outline, mouth toward the dish. */
function feedAtFocus(
  pen: Pen,
  feed: SectionedHorn,
  { x, axisY, scale, width }: { x: number; axisY: number; scale: number; width: number },
): Element[] {
  const { profile, length: long, outerDiameter } = feed;
  const outer = outerWall(profile, wallThickness(feed));
  const upper = outer.map(([z, r]): [number, number] => [x - z * scale, axisY - r * scale]);
  const lower = [...outer].reverse().map(([z, r]): [number, number] => [x - z * scale, axisY + r * scale]);
  const bottom = Math.min(axisY - (outerDiameter / 2) * scale - 14, axisY - 18);
  const left = x + (long * scale) / 2 + 4;
  const oneLine = left + textWidth("feed, to scale", 12.5) <= width;
  const words = oneLine ? ["feed, to scale"] : ["feed,", "to scale"];
  return [
    pen("path", {
      d: pathThrough([...upper, ...lower], true),
      fill: paper,
      stroke: ink,
      "stroke-width": 0.9,
      "stroke-linejoin": "round",
    }),
    textBlock(pen, Math.min(left, width - 48), bottom - 15 * (words.length - 1), words, { leading: 15 }),
  ];
}
