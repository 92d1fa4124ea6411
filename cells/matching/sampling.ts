// Further frequencies where a sweep moves fast: across narrow resonances, and between samples that don't foretell each other.

import type { Refined } from "./refinement.ts";
import type { Resonance } from "./resonances.ts";

/** Places of samples across a resonance, in widths. */
const acrossResonance = [-3, -1.5, -0.75, -0.4, -0.15, 0, 0.15, 0.4, 0.75, 1.5, 3];

/** A sample further than this from what its neighbours foretell has samples put on both sides. */
const foretold = 0.02;

export function acrossResonances(resonances: Resonance[], low: number, high: number): number[] {
  return resonances
    .flatMap(({ frequency, width }) => acrossResonance.map((place) => frequency + place * width))
    .filter((frequency) => frequency > low && frequency < high);
}

/**
 * Middles of the intervals beside every sample that the line between its neighbours misses: S11 and each of the first
 * amplitudes at the mouth, these without the phase that they share.
 * @param frequencies ascending
 */
export function whereItMoves(frequencies: number[], refined: Refined[]): number[] {
  const rows = refined.map(({ answer: { reflected, outgoing } }) => {
    const [re, im] = [outgoing.re[0]!, outgoing.im[0]!];
    const size = Math.hypot(re, im) || 1;
    const row = [reflected.re[0]!, reflected.im[0]!];
    for (let n = 0; n < Math.min(4, outgoing.re.length); n++) {
      row.push(
        (outgoing.re[n]! * re + outgoing.im[n]! * im) / size,
        (outgoing.im[n]! * re - outgoing.re[n]! * im) / size,
      );
    }
    return row;
  });
  const wanted = new Set<number>();
  for (let i = 1; i + 1 < rows.length; i++) {
    const [low, here, high] = [frequencies[i - 1]!, frequencies[i]!, frequencies[i + 1]!];
    const share = (here - low) / (high - low);
    const off = rows[i]!.map((value, n) => value - ((1 - share) * rows[i - 1]![n]! + share * rows[i + 1]![n]!));
    // A curve of curvature c is missed by c·h²/2 here and by an eighth of c·h² halfway between samples.
    if (Math.max(...off.map(Math.abs)) <= 4 * foretold) continue;
    wanted.add((low + here) / 2);
    wanted.add((here + high) / 2);
  }
  return [...wanted];
}
