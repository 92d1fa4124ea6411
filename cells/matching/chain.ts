// A horn as a chain of uniform guides: tapers become staircases, and each guide gets its number of modes.

import { isGuide, type Piece } from "./pieces.ts";

/** A uniform guide of the chain, m. */
export interface Guide {
  radius: number;
  length: number;
  /** modes carried, by rising cutoff */
  modeCount: number;
}

/** Between guide i and guide i + 1. */
export interface Aperture {
  /** basis functions: the modes of the smaller guide */
  count: number;
  /** the wall goes on smoothly here: a step of a taper's staircase, not of the metal */
  smooth: boolean;
}

export interface Chain {
  guides: Guide[];
  apertures: Aperture[];
}

export interface Fineness {
  /** modes on the smaller side of a step */
  modeCount: number;
  /** sections of each taper, by its place among the pieces; 1 for a guide */
  sections: number[];
}

/**
 * Chain of the pieces. A taper of n steps has guides of radii in a geometric series from its first to its last, the
 * boundaries at the geometric means between: symmetric about every guide, so that the error is even in the step.
 */
export function chainOf(pieces: Piece[], { modeCount, sections }: Fineness): Chain {
  const guides: Guide[] = [];
  const smooth: boolean[] = [];
  const append = (radius: number, length: number, isSmooth: boolean): void => {
    const before = guides.at(-1);
    if (before && before.radius === radius) before.length += length;
    else {
      if (before) smooth.push(isSmooth);
      guides.push({ radius, length, modeCount });
    }
  };
  pieces.forEach((piece, p) => {
    const { startRadius, endRadius, length } = piece;
    if (isGuide(piece)) {
      append(startRadius, length, false);
      return;
    }
    const n = sections[p]!;
    const step = Math.log(endRadius / startRadius) / n;
    const along = (share: number): number => (length * Math.expm1(step * share)) / Math.expm1(step * n);
    for (let i = 0; i <= n; i++) {
      const radius = i === 0 ? startRadius : i === n ? endRadius : startRadius * Math.exp(step * i);
      append(radius, along(Math.min(n, i + 0.5)) - along(Math.max(0, i - 0.5)), i > 0);
    }
  });
  return withModeCounts(guides, smooth, modeCount);
}

/** Each aperture carries `modeCount` modes of its smaller guide, each guide enough for the largest ratio at its two ends. */
function withModeCounts(guides: Guide[], smooth: boolean[], modeCount: number): Chain {
  const apertures: Aperture[] = smooth.map((isSmooth) => ({ count: modeCount, smooth: isSmooth }));
  smooth.forEach((isSmooth, i) => {
    if (isSmooth) return;
    const [left, right] = [guides[i]!, guides[i + 1]!];
    const [small, large] = left.radius < right.radius ? [left, right] : [right, left];
    large.modeCount = Math.max(large.modeCount, Math.round((modeCount * large.radius) / small.radius));
  });
  return { guides, apertures };
}
