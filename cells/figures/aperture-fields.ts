// The fields at the mouth: mode plus mode makes the mouth of a horn.

import { requireNumber } from "../check.ts";
import type { FeedKind } from "../horn/horn-profile.ts";
import { toMm } from "../units.ts";
import type { Drawing } from "./drawing.ts";
import { type ApertureField, fieldPlate, largestStrength, strengthAtWall } from "./field-plate.ts";
import { hairline, ink, kindStyle, secondary, textSize } from "./kit/palette.ts";
import { coordinate, drawingRoot, type Pen, svgPen, text } from "./kit/svg.ts";
import { wrapText } from "./kit/text-width.ts";
import { decimal, gigahertz, percent } from "./kit/words.ts";

export interface FieldPlateEntry {
  /** "TE11", "Dual-mode mouth" */
  label: string;
  /** colours the label of a horn's mouth; left out for a bare mode */
  kind?: FeedKind;
  field: ApertureField;
  /** how it follows from the plate before: a further term, the sum, or something else beside it */
  follows?: "plus" | "equals" | "beside";
  /** share of the power that passes the mouth, 0…1 */
  powerShare?: number;
  /** deg, phase against the first mode of the sum, positive ahead; said where it isn't 0 */
  phaseDeg?: number;
  /** further words beneath */
  under?: string;
}

/** A horn that can't be built leaves its mouth empty. */
export interface FieldPlateGap {
  label: string;
  kind: FeedKind;
  follows?: FieldPlateEntry["follows"];
  reason: string;
}

const signs = { plus: "+", equals: "=", beside: "" } as const;

/**
 * Plates of the electric field, E-plane upright, each to its own largest strength, in a row (two by two on a narrow page).
 * @param frequency Hz, for the words; left out where the fields don't belong to one
 * @throws {RangeError} no plates; a field that isn't finite or has fewer than two samples; a share outside 0…1
 */
export function apertureFields(plates: readonly (FieldPlateEntry | FieldPlateGap)[], frequency?: number): Drawing {
  if (plates.length === 0) throw new RangeError("apertureFields: must have at least one plate; got none");
  for (const plate of plates) if ("field" in plate) checkPlate(plate);
  const alt = altText(plates, frequency);
  return { alt, data: rows(plates), draw: ({ document, width }) => draw(svgPen(document), width, alt, plates) };
}

function checkPlate({ label, field, powerShare }: FieldPlateEntry): void {
  const { eRho, ePhi } = field;
  if (eRho.length < 2 || eRho.length !== ePhi.length)
    throw new RangeError(
      `apertureFields: ${label} must have as many samples of E_ρ as of E_φ, at least two; got ${eRho.length} and ${ePhi.length}`,
    );
  for (let i = 0; i < eRho.length; i++) {
    requireNumber(`apertureFields: E_ρ of ${label}`, eRho[i]);
    requireNumber(`apertureFields: E_φ of ${label}`, ePhi[i]);
  }
  if (powerShare !== undefined)
    requireNumber(`apertureFields: share of power of ${label}`, powerShare, { min: 0, max: 1 + 1e-9 });
}

/** "80 % of the power, 8° ahead" */
function underWords({ powerShare, phaseDeg, under }: FieldPlateEntry): string {
  const parts: string[] = [];
  if (powerShare !== undefined) parts.push(`${percent(powerShare, powerShare < 0.1 ? 1 : 0)} of the power`);
  if (phaseDeg !== undefined && Math.abs(phaseDeg) >= 0.5)
    parts.push(`${decimal(Math.abs(phaseDeg), 0)}° ${phaseDeg > 0 ? "ahead" : "behind"}`);
  if (under) parts.push(under);
  return parts.join(", ");
}

function altText(plates: readonly (FieldPlateEntry | FieldPlateGap)[], frequency?: number): string {
  const each = plates.map((plate) => {
    if (!("field" in plate)) return ` ${plate.label}: not realisable. ${plate.reason}`;
    const { ePlane, hPlane } = strengthAtWall(plate.field);
    const words = underWords(plate);
    const how = { plus: " plus", equals: " gives", beside: "" }[plate.follows ?? "beside"];
    return `${how} ${plate.label}${words ? ` (${words})` : ""}: at the wall ${percent(ePlane, 0)} of the largest strength in the E-plane, ${percent(hPlane, 0)} in the H-plane;`;
  });
  const at = frequency === undefined ? "" : ` at ${gigahertz(frequency)} GHz`;
  return `Electric field over the aperture${at}, E-plane upright.${each.join("").replace(/;$/, ".")}`;
}

function rows(plates: readonly (FieldPlateEntry | FieldPlateGap)[]): (string | number)[][] {
  const head = ["plate", "rho (mm)", "E_rho in the E-plane (of the largest)", "E_phi in the H-plane (of the largest)"];
  const body = plates.flatMap((plate) => {
    if (!("field" in plate)) return [];
    const { radius, eRho, ePhi } = plate.field;
    const largest = largestStrength(plate.field) || 1;
    return Array.from({ length: eRho.length }, (_, i) => [
      plate.label,
      toMm((radius * i) / (eRho.length - 1)),
      eRho[i]! / largest,
      ePhi[i]! / largest,
    ]);
  });
  return [head, ...body];
}

function draw(pen: Pen, width: number, alt: string, plates: readonly (FieldPlateEntry | FieldPlateGap)[]): Element {
  const perRow = width >= 600 ? Math.min(plates.length, 4) : Math.min(plates.length, 2);
  const sign = width >= 600 ? 36 : 26;
  // A sign before the first plate of a row (the second row of a narrow page begins with "=") shifts all rows alike.
  const lead = plates.some(({ follows = "beside" }, i) => i % perRow === 0 && signs[follows]) ? sign : 0;
  const radius = Math.min(82, (width - lead - sign * (perRow - 1)) / perRow / 2 - 1);
  const pitch = perRow > 1 ? Math.min((width - lead - 2 * radius - 2) / (perRow - 1), 2 * radius + 2 * sign) : 0;
  const parts: Element[] = [];
  let top = 4;
  for (let start = 0; start < plates.length; start += perRow) {
    let bottom = top;
    plates.slice(start, start + perRow).forEach((plate, i) => {
      const cx = lead + radius + 1 + i * pitch;
      const place = { cx, cy: top + radius, radius, room: 2 * Math.min(radius + 10, width - cx, cx) };
      const follows = plate.follows ?? "beside";
      const between = i === 0 ? lead / 2 : cx - pitch / 2;
      if (signs[follows])
        parts.push(text(pen, between, place.cy + 7, signs[follows], { size: 22, fill: secondary, anchor: "middle" }));
      else if (i > 0)
        parts.push(
          pen("path", { d: `M${coordinate(between)} ${top - 2}v${coordinate(2 * radius + 44)}`, stroke: hairline }),
        );
      const drawn = onePlate(pen, plate, place);
      parts.push(...drawn.elements);
      bottom = Math.max(bottom, drawn.bottom);
    });
    top = bottom + 26;
  }
  return drawingRoot(pen, { width, height: top - 18 }, alt, ...parts);
}

function onePlate(
  pen: Pen,
  plate: FieldPlateEntry | FieldPlateGap,
  { cx, cy, radius, room }: { cx: number; cy: number; radius: number; room: number },
): { elements: Element[]; bottom: number } {
  const gap = !("field" in plate);
  const fill = plate.kind ? kindStyle(plate.kind).words : ink;
  const titleY = cy + radius + 25;
  const words = gap ? `not realisable: ${plate.reason}` : underWords(plate);
  const lines = words ? wrapText(words, room, textSize.axis) : [];
  const elements = [
    gap
      ? pen("circle", { cx, cy, r: radius, stroke: secondary, "stroke-width": 0.8, "stroke-dasharray": "3 3" })
      : fieldPlate(pen, plate.field, cx, cy, radius),
    text(pen, cx, titleY, plate.label, { bold: true, size: 13, fill, anchor: "middle" }),
    ...lines.map((line, i) =>
      text(pen, cx, titleY + 19 + i * 16, line, { size: textSize.axis, fill: secondary, anchor: "middle" }),
    ),
  ];
  return { elements, bottom: titleY + 19 + Math.max(0, lines.length - 1) * 16 };
}
