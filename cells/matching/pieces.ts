// A profile read as pieces: straight guides and tapers, with or without an abrupt step between two of them.

import { requirePositive } from "../check.ts";
import type { HornProfile } from "../guide/horn-profile.ts";
import { type Pocket, withoutPockets } from "./pockets.ts";

/** A stretch of wall without a step: a guide where both radii are equal, else a taper. m */
export interface Piece {
  length: number;
  startRadius: number;
  endRadius: number;
  /** of a slot that is wider at its bottom: the rooms behind its walls */
  pockets?: Pocket[];
}

/** m: points closer than this along z stand in one plane; far below any tolerance, and far above rounding. */
export const planeTolerance = 1e-8;

/**
 * The pieces of a profile, from the throat on; neighbours that continue each other as guides are one. Zero-length pieces
 * vanish, equal radii are no step.
 * @throws {TypeError} z or radius missing
 * @throws {RangeError} fewer than two points, lengths that differ, a radius not positive, z that falls other than
 *   into a pocket, no length at all
 */
export function profilePieces(given: HornProfile): Piece[] {
  checkProfile(given);
  const { profile, pockets } = withoutPockets(given);
  const { z, radius } = profile;
  const pieces: Piece[] = [];
  let from = z[0]!;
  for (let i = 1; i < z.length; i++) {
    const length = z[i]! - from;
    if (length <= planeTolerance) continue;
    const startRadius = radius[i - 1]!;
    const endRadius = radius[i]!;
    from = z[i]!;
    const before = pieces.at(-1);
    if (before && isGuide(before) && startRadius === endRadius && before.endRadius === startRadius) {
      before.length += length;
    } else {
      pieces.push({ length, startRadius, endRadius });
    }
  }
  if (pieces.length === 0) {
    throw new RangeError(
      `bandAnalysis: the profile must have a length; all its points lie within ${planeTolerance * 1e3} mm`,
    );
  }
  for (const pocket of pockets) attach(pocket, pieces, z[0]!);
  return pieces;
}

/** Gives a pocket to the slot that it opens into. */
function attach(pocket: Pocket, pieces: Piece[], start: number): void {
  let from = start;
  for (const [p, piece] of pieces.entries()) {
    const plane = pocket.side === "start" ? from : from + piece.length;
    from += piece.length;
    const neighbour = pieces[pocket.side === "start" ? p - 1 : p + 1];
    if (!isGuide(piece) || piece.startRadius !== pocket.outerRadius) continue;
    if (Math.abs(plane - pocket.z) > pocketTolerance || !neighbour) continue;
    const tooth = pocket.side === "start" ? neighbour.endRadius : neighbour.startRadius;
    if (!(pocket.innerRadius > tooth)) break;
    piece.pockets = [...(piece.pockets ?? []), pocket];
    return;
  }
  throw new RangeError(
    `bandAnalysis: the pocket at z = ${pocket.z * 1e3} mm, radius ${pocket.innerRadius * 1e3} to ${pocket.outerRadius * 1e3} mm, must lie behind the wall of a slot as deep as itself and outside the bore beside it`,
  );
}

/** m: pieces too short to count may have been left out before a pocket. */
const pocketTolerance = 1e-6;

export const isGuide = ({ startRadius, endRadius }: Piece): boolean => startRadius === endRadius;

function checkProfile({ z, radius }: HornProfile): void {
  if (!Array.isArray(z) || !Array.isArray(radius)) {
    throw new TypeError("bandAnalysis: profile must have arrays z and radius, in m");
  }
  if (z.length < 2 || z.length !== radius.length) {
    throw new RangeError(
      `bandAnalysis: profile must have as many z as radii, at least two; got ${z.length} and ${radius.length}`,
    );
  }
  for (let i = 0; i < z.length; i++) {
    requirePositive(`bandAnalysis: profile radius ${i + 1}`, radius[i], "m");
    if (!Number.isFinite(z[i])) {
      throw new RangeError(`bandAnalysis: profile z ${i + 1} must be a finite number of m; got ${z[i]}`);
    }
  }
}
