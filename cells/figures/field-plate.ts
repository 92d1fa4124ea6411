// One plate: the electric field over a round aperture, seen from the front, as darts over a pale tint.

import { contours } from "d3-contour";
import { fieldTint, ink, paper } from "./kit/palette.ts";
import { coordinate, type Pen } from "./kit/svg.ts";

/**
 * Transverse electric field of azimuthal order one over a round aperture, at one instant, to any scale:
 *
 *   E_ρ = eRho(ρ) cos φ,   E_φ = ePhi(ρ) sin φ
 *
 * with ρ even from 0 to the wall. A field polarized along x has ePhi(0) = −eRho(0).
 */
export interface ApertureField {
  /** m */
  radius: number;
  /** [sampleCount], ρ = i·radius/(sampleCount − 1) */
  eRho: ArrayLike<number>;
  /** [sampleCount] */
  ePhi: ArrayLike<number>;
}

/**
 * Samples a field given point by point (`modeField`, `hybridField`): E_ρ in the E-plane (φ = 0), E_φ in the H-plane (φ = 90°).
 * @param at field at ρ (m) and φ (rad)
 * @throws {RangeError} radius not positive, fewer than two samples
 */
export function sampledField(
  radius: number,
  at: (rho: number, phi: number) => { eRho: number; ePhi: number },
  sampleCount = 33,
): ApertureField {
  if (!(radius > 0) || !Number.isFinite(radius))
    throw new RangeError(`sampledField: radius must be a positive length in m; got ${radius}`);
  if (!(sampleCount >= 2)) throw new RangeError(`sampledField: sampleCount must be at least 2; got ${sampleCount}`);
  const rho = Array.from({ length: sampleCount }, (_, i) => (radius * i) / (sampleCount - 1));
  return {
    radius,
    eRho: rho.map((r) => at(r, 0).eRho),
    ePhi: rho.map((r) => at(r, Math.PI / 2).ePhi),
  };
}

/** Sum of fields over one aperture, each with its amplitude (√(2Z)·a of a power wave, or any common scale), at the instant of phase 0. */
export function sumOfFields(terms: readonly { field: ApertureField; amplitude: number }[]): ApertureField {
  const first = terms[0]?.field;
  if (!first) throw new RangeError("sumOfFields: must have at least one field; got none");
  const count = first.eRho.length;
  for (const { field } of terms)
    if (field.eRho.length !== count || field.ePhi.length !== count || field.radius !== first.radius)
      throw new RangeError(
        `sumOfFields: all fields must have one radius and one number of samples; got ${first.radius} m with ${count} and ${field.radius} m with ${field.eRho.length}`,
      );
  const sum = (part: "eRho" | "ePhi"): number[] =>
    Array.from({ length: count }, (_, i) =>
      terms.reduce((total, { field, amplitude }) => total + amplitude * field[part][i]!, 0),
    );
  return { radius: first.radius, eRho: sum("eRho"), ePhi: sum("ePhi") };
}

/** Field at a point of the unit disc, x along the polarization; outside, as at the wall. */
function fieldAt(field: ApertureField, x: number, y: number): [ex: number, ey: number] {
  const r = Math.hypot(x, y);
  const [cos, sin] = r > 0 ? [x / r, y / r] : [1, 0];
  const at = Math.min(r, 1) * (field.eRho.length - 1);
  const i = Math.min(Math.floor(at), field.eRho.length - 2);
  const share = at - i;
  const along = (samples: ArrayLike<number>): number => samples[i]! + share * (samples[i + 1]! - samples[i]!);
  const rho = along(field.eRho) * cos;
  const phi = along(field.ePhi) * sin;
  return [rho * cos - phi * sin, rho * sin + phi * cos];
}

/** Largest strength over the aperture; it lies in one of the two principal planes. */
export function largestStrength({ eRho, ePhi }: ApertureField): number {
  let largest = 0;
  for (let i = 0; i < eRho.length; i++) largest = Math.max(largest, Math.abs(eRho[i]!), Math.abs(ePhi[i]!));
  return largest;
}

/** Strength of the field at the wall over its largest: E-plane (normal to the metal) and H-plane (along it), 0…1. */
export function strengthAtWall(field: ApertureField): { ePlane: number; hPlane: number } {
  const largest = largestStrength(field) || 1;
  const last = field.eRho.length - 1;
  return { ePlane: Math.abs(field.eRho[last]!) / largest, hPlane: Math.abs(field.ePhi[last]!) / largest };
}

// Cells across a plate for the level lines: fine enough for a smooth outline, light enough to redraw at every turn.
const cells = 20;
const levels = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9];

/** Units of a plate's own coordinates in a px: whole numbers in quarters keep the drawing small. */
const perPx = 4;

/** The plate, its centre at (cx, cy); E-plane upright. */
export function fieldPlate(pen: Pen, field: ApertureField, cx: number, cy: number, radius: number): SVGElement {
  const size = radius * perPx;
  return pen(
    "g",
    { transform: `translate(${coordinate(cx)} ${coordinate(cy)})` },
    pen("circle", { r: radius, fill: paper }),
    pen(
      "g",
      { transform: `scale(${1 / perPx})` },
      ...tintLayers(field, size).map((d) => pen("path", { d, fill: fieldTint, "fill-opacity": "0.085" })),
      pen("path", { d: darts(field, size), fill: ink }),
    ),
    pen("circle", { r: radius, stroke: ink, "stroke-width": 1.1 }),
  );
}

/** Closed path through points of the plate's own coordinates, written as steps between whole numbers. */
function closedPath(points: readonly (readonly [number, number])[]): string {
  let [lastX, lastY] = [0, 0];
  let d = "";
  points.forEach(([x, y], i) => {
    const [wholeX, wholeY] = [Math.round(x), Math.round(y)];
    const [stepX, stepY] = [wholeX - lastX, wholeY - lastY];
    if (i === 0) d += `M${wholeX} ${wholeY}l`;
    else if (stepX !== 0 || stepY !== 0) d += `${stepX} ${stepY} `;
    [lastX, lastY] = [wholeX, wholeY];
  });
  return `${d.trimEnd().replace(/l$/, "")}z`;
}

/** One pale layer for each tenth of the largest strength: where all lie over each other the field is strongest. */
function tintLayers(field: ApertureField, size: number): string[] {
  const largest = largestStrength(field) || 1;
  const strength: number[] = [];
  const toDisc = (i: number): number => ((i + 0.5) / cells) * 2 - 1;
  for (let row = 0; row < cells; row++)
    for (let column = 0; column < cells; column++) {
      // upward on the plate is x, the direction of polarization; rightward is y
      const [ex, ey] = fieldAt(field, -toDisc(row), toDisc(column));
      strength.push(Math.hypot(ex, ey) / largest);
    }
  const lines = contours().size([cells, cells]).smooth(true);
  return levels.flatMap((level) => {
    const { coordinates } = lines.contour(strength, level);
    const d = coordinates.flatMap((polygon) =>
      polygon.map((ring) =>
        closedPath(
          ring.slice(0, -1).map(([u, v]) => {
            const [x, y] = [(u! / cells) * 2 - 1, (v! / cells) * 2 - 1];
            // Outside the disc the strength is that at the wall, so level lines run radially there: pulling them in is exact.
            const shrink = size / Math.max(1, Math.hypot(x, y));
            return [x * shrink, y * shrink];
          }),
        ),
      ),
    );
    return d.length > 0 ? [d.join("")] : [];
  });
}

/** Slender triangles along the field on a triangular grid; length and width follow the strength, the middle is on the grid. */
function darts(field: ApertureField, size: number): string {
  const largest = largestStrength(field) || 1;
  const pitch = 0.215;
  const rowPitch = pitch * 0.87;
  const rows = Math.floor(1 / rowPitch);
  let d = "";
  for (let row = -rows; row <= rows; row++) {
    const up = row * rowPitch;
    const shift = row % 2 === 0 ? 0 : 0.5;
    for (let column = -6; column <= 6; column++) {
      const right = (column + shift) * pitch;
      if (Math.hypot(up, right) > 0.95) continue;
      const [ex, ey] = fieldAt(field, up, right);
      const strength = Math.hypot(ex, ey) / largest;
      if (strength < 0.03) continue;
      // unit vector on the page: rightward is y of the field, downward is −x
      const [ux, uy] = [ey / (strength * largest), -ex / (strength * largest)];
      const half = (0.035 + 0.185 * strength) / 2;
      const wide = 0.012 + 0.026 * strength;
      let [x, y] = [right, -up];
      // A dart that would cross the wall steps back along itself.
      for (const end of [half, -half]) {
        const over = Math.hypot(x + ux * end, y + uy * end) - 0.98;
        if (over > 0) [x, y] = [x - ux * over * Math.sign(end), y - uy * over * Math.sign(end)];
      }
      d += closedPath([
        [(x + ux * half) * size, (y + uy * half) * size],
        [(x - ux * half - uy * wide) * size, (y - uy * half + ux * wide) * size],
        [(x - ux * half + uy * wide) * size, (y - uy * half - ux * wide) * size],
      ]);
    }
  }
  return d;
}
