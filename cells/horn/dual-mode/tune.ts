// The dual-mode horn balanced by mode matching: the step and the phasing length solved so that both planes are one at the rim.

import type { Warning } from "../../check.ts";
import { speedOfLight } from "../../constants.ts";
import { createMatcher } from "../../matching/index.ts";
import { levelAt } from "../../pattern/cuts.ts";
import { patternInterpolant } from "../../pattern/interpolant.ts";
import { aperturePattern } from "../../radiation/aperture-pattern.ts";
import { fieldToDb } from "../../units.ts";
import type { Candidate, RealizableHorn } from "../candidate.ts";
import { flareOfLength } from "../flare.ts";
import { checkedLimits, type FeedRequirement, type HornLimits } from "../requirement.ts";
import { inputBounds } from "./dimension.ts";
import { type DualModeGeometry, dualModeDimensions, dualModeLength, dualModeProfile } from "./geometry.ts";

/** Analyses at band centre that a solution may take. */
const mostAnalyses = 40;
/** (E − H)/(E + H) at the rim counts as nothing below this: −50 dB. */
const balanced = 3e-3;
/** dB by which the taper at the rim may miss. */
const taperReached = 0.02;

/** Radius before the step, phasing length, mouth radius, m. */
type Unknowns = [inputRadius: number, straightLength: number, mouthRadius: number];

/**
 * Balances a dual-mode horn at band centre by mode matching of its wall: the radius before the step (how much TM11), the phasing
 * length (in which phase) and the mouth (how wide a beam) are solved for
 *
 *   E(ψ) = H(ψ)   in amplitude and phase at the rim,   φ-mean level at the rim = wanted taper
 *
 * by Newton's method with differences. The radius behind the step and the flare's length stay. Off band centre the modes run out
 * of phase: about 3 to 10 % of bandwidth for low cross-polar (Turrin 1967, Pickett et al. 1984, common practice).
 *
 * A horn that can't be balanced within the window of its step, or would exceed a limit, comes back as it was, with a warning.
 *
 * @param horn        first dimensions by `dualModeHorn`; one that isn't feasible passes through
 * @throws {RangeError} illegal requirement or limits; a horn of another kind
 */
export function tuneDualMode(
  horn: Candidate,
  requirement: FeedRequirement,
  limits: HornLimits = {},
  progress?: (share: number) => void,
): Candidate {
  if (!horn.feasible) return horn;
  if (horn.kind !== "dualMode") throw new RangeError(`tuneDualMode: horn must be dualMode; got ${horn.kind}`);
  const known = checkedLimits("tuneDualMode", requirement, limits);
  const start = horn.geometry as DualModeGeometry;
  const { bandCenter, halfAngle, feedTaperDb } = requirement;
  const wavelength = speedOfLight / bandCenter;
  const { narrowest, widest } = inputBounds(start.stepRadius, requirement);
  const matcher = createMatcher();
  const built = ([inputRadius, straightLength, mouthRadius]: Unknowns): DualModeGeometry => ({
    ...start,
    inputRadius,
    straightLength,
    flare: flareOfLength({ startRadius: start.stepRadius, radius: mouthRadius }, start.flare.length, wavelength),
  });
  const allowed = ([inputRadius, straightLength, mouthRadius]: Unknowns): Unknowns => [
    Math.min(widest, Math.max(narrowest, inputRadius)),
    Math.max(0.01 * wavelength, straightLength),
    Math.max(1.001 * start.stepRadius, mouthRadius),
  ];
  let analyses = 0;
  const missesOf = (at: Unknowns): { misses: [number, number, number]; modeRatio: number } => {
    progress?.(Math.min(0.99, ++analyses / mostAnalyses));
    const { apertureModes } = matcher.band(dualModeProfile(built(at)), { frequencies: [bandCenter] });
    const modes = apertureModes[0]!;
    const pattern = aperturePattern(modes);
    const interpolant = patternInterpolant(pattern);
    const [e, h] = [interpolant.ePlane(halfAngle), interpolant.hPlane(halfAngle)];
    const sum = { re: e.re + h.re, im: e.im + h.im };
    const less = { re: e.re - h.re, im: e.im - h.im };
    const power = sum.re ** 2 + sum.im ** 2;
    const { re, im } = modes.amplitudes;
    return {
      misses: [
        (less.re * sum.re + less.im * sum.im) / power,
        (less.im * sum.re - less.re * sum.im) / power,
        // in tenths of a bel, of the size of the other two
        (-levelAt(pattern, halfAngle).meanDb - feedTaperDb) / 10,
      ],
      modeRatio: Math.hypot(re[1]!, im[1]!) / Math.hypot(re[0]!, im[0]!),
    };
  };
  const size = ([a, b, c]: readonly number[]): number => Math.hypot(a!, b!, c!);
  const done = ([a, b, c]: readonly number[]): boolean =>
    Math.hypot(a!, b!) < balanced && Math.abs(c!) < taperReached / 10;
  let at: Unknowns = allowed([start.inputRadius, start.straightLength, start.flare.radius]);
  let found = missesOf(at);
  const first = Math.hypot(found.misses[0], found.misses[1]);
  while (!done(found.misses) && analyses < mostAnalyses - 6) {
    const steps: Unknowns = [1e-3 * at[0], 5e-3 * wavelength, 1e-3 * at[2]];
    const columns = steps.map((step, i) => {
      const moved = at.map((value, j) => (i === j ? value + step : value)) as Unknowns;
      return missesOf(moved).misses.map((value, k) => (value - found.misses[k]!) / step);
    });
    const change = solved3(columns, found.misses);
    if (!change) break;
    let better: { at: Unknowns; found: typeof found } | undefined;
    for (let share = 1; share > 0.1 && !better && analyses < mostAnalyses; share /= 2) {
      const next = allowed(at.map((value, i) => value - share * change[i]!) as Unknowns);
      const there = missesOf(next);
      if (size(there.misses) < size(found.misses)) better = { at: next, found: there };
    }
    if (!better) break;
    ({ at, found } = better);
  }
  progress?.(1);
  const geometry: DualModeGeometry = { ...built(at), modeRatio: found.modeRatio };
  const [length, outerDiameter] = [dualModeLength(geometry), 2 * (geometry.flare.radius + known.wall)];
  const left = Math.hypot(found.misses[0], found.misses[1]);
  if (!done(found.misses)) return untuned(horn, `it was left at ${levelText(left)} at the rim`);
  if (length > known.maxLength || outerDiameter > known.maxDiameter)
    return untuned(horn, `balanced, it would be ${mm(length)} long and ${mm(outerDiameter)} wide, over a limit`);
  return {
    ...horn,
    reason: `Meets the feed taper of ${feedTaperDb.toFixed(2)} dB at the rim and is balanced there at band centre by mode matching, ${mm(length)} long: the planes differ by ${levelText(left)} of their sum, first dimensions by ${levelText(first)}.`,
    profile: dualModeProfile(geometry),
    throatRadius: geometry.inputRadius,
    apertureRadius: geometry.flare.radius,
    length,
    outerDiameter,
    dimensions: dualModeDimensions(geometry),
    geometry,
  };
}

const mm = (value: number): string => `${(1e3 * value).toFixed(1)} mm`;
const levelText = (value: number): string => `${fieldToDb(Math.max(value, 1e-6)).toFixed(0).replace("-", "−")} dB`;

function untuned(horn: RealizableHorn, why: string): RealizableHorn {
  const warning: Warning = {
    code: "outside-validated-range",
    text: `The dual-mode horn could not be balanced by mode matching within the window of its step: ${why}. Its first dimensions stand.`,
  };
  return { ...horn, warnings: [...horn.warnings, warning] };
}

/** x of A·x = b by Cramer's rule, A given by columns; null for a singular A. */
function solved3(columns: readonly number[][], right: readonly number[]): number[] | null {
  const determinant = ([a, b, c]: readonly (readonly number[])[]): number =>
    a![0]! * (b![1]! * c![2]! - b![2]! * c![1]!) -
    b![0]! * (a![1]! * c![2]! - a![2]! * c![1]!) +
    c![0]! * (a![1]! * b![2]! - a![2]! * b![1]!);
  const whole = determinant(columns);
  if (!(Math.abs(whole) > 0)) return null;
  return columns.map((_, i) => determinant(columns.map((column, j) => (i === j ? right : column))) / whole);
}
