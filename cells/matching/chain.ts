// A horn as a chain of uniform guides: tapers become staircases, and each guide gets its number of modes.

import { isGuide, type Piece } from "./pieces.ts";
import type { Pocket } from "./pockets.ts";

/** A uniform guide of the chain, m. */
export interface Guide {
  radius: number;
  length: number;
  /** modes carried, by rising cutoff */
  modeCount: number;
}

/**
 * What the wall does between guide i and guide i + 1, and so what the field in the aperture is expanded in:
 * "smooth": a step of a taper's staircase; modes of the smaller guide, coupled as in the taper.
 * "step": a shallow step of the metal; modes of the smaller guide.
 * "edge": a step of the metal; functions with the field's behaviour at its edge.
 */
export type ApertureKind = "smooth" | "step" | "edge";

export interface Aperture {
  kind: ApertureKind;
  /** basis functions, those of pockets included */
  count: number;
  /** pocket that opens into the larger guide here, and how many of its modes are functions */
  pocket?: { ring: Pocket; count: number };
}

export interface Chain {
  guides: Guide[];
  apertures: Aperture[];
}

export interface Fineness {
  /** functions at an edge up to three wavelengths wide; more at a wider one */
  edgeFunctions: number;
  /** modes in tapers and at shallow steps */
  modeCount: number;
  /** steps of each taper, by its place among the pieces */
  sections: number[];
  /** 1/m, the highest of the band */
  highestWaveNumber: number;
}

/** A step whose smaller radius is above this share of the larger is shallow. */
const shallowAbove = 0.96;

/**
 * Chain of the pieces. A taper of n steps has guides of radii in a geometric series from its first to its last, the
 * boundaries at the geometric means between: symmetric about every guide, so that the error is even in the step.
 */
export function chainOf(pieces: Piece[], fineness: Fineness): Chain {
  const guides: Guide[] = [];
  const smooth: boolean[] = [];
  /** by the place of the aperture */
  const pockets = new Map<number, Pocket>();
  const append = (radius: number, length: number, isSmooth: boolean): void => {
    const before = guides.at(-1);
    if (before && before.radius === radius) before.length += length;
    else {
      if (before) smooth.push(isSmooth);
      guides.push({ radius, length, modeCount: fineness.modeCount });
    }
  };
  pieces.forEach((piece, p) => {
    const { startRadius, endRadius, length } = piece;
    if (isGuide(piece)) {
      append(startRadius, length, false);
      for (const pocket of piece.pockets ?? []) {
        pockets.set(pocket.side === "start" ? guides.length - 2 : guides.length - 1, pocket);
      }
      return;
    }
    const n = fineness.sections[p]!;
    const step = Math.log(endRadius / startRadius) / n;
    const along = (share: number): number => (length * Math.expm1(step * share)) / Math.expm1(step * n);
    for (let i = 0; i <= n; i++) {
      const radius = i === 0 ? startRadius : i === n ? endRadius : startRadius * Math.exp(step * i);
      append(radius, along(Math.min(n, i + 0.5)) - along(Math.max(0, i - 0.5)), i > 0);
    }
  });
  if (guides.length === 1) {
    // A bare guide: an aperture in its middle, which does nothing.
    const half = { ...guides[0]!, length: guides[0]!.length / 2 };
    guides.splice(0, 1, half, { ...half });
    smooth.push(true);
  }
  const apertures = smooth.map((isSmooth, i): Aperture => {
    if (isSmooth) return { kind: "smooth", count: fineness.modeCount };
    const [a, b] = [guides[i]!.radius, guides[i + 1]!.radius];
    const ring = pockets.get(i);
    if (ring) {
      const pocketCount = Math.max(4, fineness.edgeFunctions - 3);
      const count = edgeFunctionsAt(Math.min(a, b), fineness) + pocketCount;
      return { kind: "edge", count, pocket: { ring, count: pocketCount } };
    }
    return isShallow(a, b)
      ? { kind: "step", count: fineness.modeCount }
      : { kind: "edge", count: edgeFunctionsAt(Math.min(a, b), fineness) };
  });
  apertures.forEach((aperture, i) => {
    const small = Math.min(guides[i]!.radius, guides[i + 1]!.radius);
    for (const g of [i, i + 1]) raiseModeCount(guides[g]!, aperture, small, g === 0 || g === guides.length - 1);
  });
  return { guides, apertures };
}

const isShallow = (a: number, b: number): boolean => Math.min(a, b) > shallowAbove * Math.max(a, b);

/** Whether any step of the metal is deep enough for edge functions. */
export function hasEdges(pieces: Piece[]): boolean {
  return pieces.some((piece, p) => piece.pockets || (p > 0 && !isShallow(pieces[p - 1]!.endRadius, piece.startRadius)));
}

/** Travelling modes for which the level's number of functions is meant: those of an aperture three wavelengths wide. */
const meantTravelling = 6;

/** Functions at an edge of this radius. About 2ka/π modes travel there: the zeros of J1 and J1′ lie π/2 apart. */
function edgeFunctionsAt(radius: number, { edgeFunctions, highestWaveNumber }: Fineness): number {
  return edgeFunctions + Math.max(0, Math.ceil((2 * highestWaveNumber * radius) / Math.PI) - meantTravelling - 1);
}

/** κ = χ·a/b up to which a sum over modes is explicit at an edge; its tail beyond is known to 1e-5 of the whole there. */
const edgeReach = 60;
/** γL up to which the modes of a short guide are taken as reaching its other end. */
const lineReach = 5;
const mostModes = 600;

/** Enough modes for the sums at this aperture. They are only summed: the number of unknowns is the aperture's. */
function raiseModeCount(guide: Guide, { kind, count }: Aperture, small: number, matched: boolean): void {
  if (kind === "edge") {
    const toOtherEnd = matched ? 0 : (lineReach * guide.radius) / guide.length;
    const reach = Math.max(((edgeReach + 10 * Math.max(0, count - 11)) * guide.radius) / small, toOtherEnd);
    guide.modeCount = Math.max(guide.modeCount, 2 * Math.ceil(Math.min(reach / Math.PI, mostModes / 2)));
  } else if (kind === "step") {
    guide.modeCount = Math.max(guide.modeCount, Math.round((count * guide.radius) / small));
  }
}
