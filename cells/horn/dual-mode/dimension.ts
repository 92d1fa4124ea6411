// First dimensions of the dual-mode horn.

import { speedOfLight } from "../../constants.ts";
import { cutoffRadius, propagationConstant, TE11, TE12, TM11 } from "../../guide/mode.ts";
import { brentRoot } from "../../math/roots.ts";
import type { Candidate, UnrealizableHorn } from "../candidate.ts";
import type { Flare } from "../flare.ts";
import { type MouthFound, mouthForTaper } from "../mouth.ts";
import {
  db,
  ghz,
  largestRadiusWaves,
  metSentence,
  mm,
  refusedByDiameter,
  refusedByMouth,
  refusedByTaper,
  unrealizable,
} from "../refusal.ts";
import {
  checkedLimits,
  cutoffFactor,
  type FeedRequirement,
  type HornLimits,
  type KnownLimits,
  largestPhaseError,
} from "../requirement.ts";
import { balancedMouth } from "./balance.ts";
import { type DualModeGeometry, dualModeDimensions, dualModeLength, dualModeProfile } from "./geometry.ts";
import { stepCoupling, stepLaunch } from "./step.ts";
import { travelToMouth } from "./travel.ts";

/** Margins in radius, common practice: TM11 above cutoff at the lower band edge; TE12, and TM11 before the step, below it at the upper. */
const tm11Margin = 1.05;
const cutOffMargin = 0.97;
/** Diameter behind the step where the window allows it, wavelengths at band centre: in the middle of 1.22…1.70. */
const preferredStepDiameter = 1.37;
/** Narrow over wide radius at the step, a little inside what `stepCoupling` accepts. */
const leastStep = 0.61;
const largestStep = 0.975;
/** Decay of the step's TM11 toward the throat that the input guide gives, Np: 20 dB. */
const inputDecay = Math.LN10;

/**
 * Dimensions a dual-mode horn (Potter 1963): the mouth from the wanted mean taper at the rim and the wanted phase error; the
 * mode ratio that makes E- and H-plane equal at the rim angle; the step that launches that ratio; the straight that brings
 * both modes in phase at the mouth at band centre, through straight and flare, at the smallest whole number of turns.
 *
 * The step's radii lie in the window where over the whole band TM11 travels behind the step and not before it, and TE12
 * doesn't travel behind it. A dish that asks for a mouth narrower than the window is too deep for this kind.
 *
 * Against mode matching of a horn of this kind (half flare angle 14°) the closed form's phase between the modes at the mouth is
 * 25° off at the frequency of balance, which moves that frequency by about 3 %; directivity there agrees to 0.02 dB, and
 * levels in the main lobe to 0.2 dB (test/cells/horn/dual-mode/model). Below it, near TM11's cutoff, it is rough.
 *
 * @throws {RangeError} illegal requirement or limits (see `checkedLimits`)
 * @source Potter, "A new horn antenna with suppressed sidelobes and equal beamwidths", Microwave J. 6(6), 71–78, 1963
 */
export function dualModeHorn(requirement: FeedRequirement, limits: HornLimits = {}): Candidate {
  const known = checkedLimits("dualModeHorn", requirement, limits);
  const refused = refusedByTaper("dualMode", requirement);
  if (refused) return refused;
  const window = stepWindow(requirement);
  if (window.low >= window.high)
    return unrealizable(
      "dualMode",
      `The band is too wide for one step: at ${ghz(requirement.bandLow)} TM11 asks a radius of at least ${mm(window.low)} behind the step, at ${ghz(requirement.bandHigh)} TE12 allows at most ${mm(window.high)}.`,
    );

  // A longer horn than allowed is tried again with more phase error: the phasing length doesn't follow it smoothly.
  let first: Attempt | undefined;
  for (const phaseError of phaseErrorsFrom(known.phaseError, known.maxLength)) {
    const attempt = dimensioned(requirement, { ...known, phaseError }, window);
    if ("feasible" in attempt) return first ? tooLong(first, known) : attempt;
    if (dualModeLength(attempt.geometry) <= known.maxLength) return candidate(attempt, requirement, known);
    first ??= attempt;
  }
  return tooLong(first!, known);
}

interface Attempt {
  geometry: DualModeGeometry;
  planeDifferenceDb: number;
}

interface StepWindow {
  low: number;
  high: number;
}

/** Radii behind the step at which TM11 travels and TE12 doesn't, over the band, with margins. */
function stepWindow({ bandLow, bandHigh }: FeedRequirement): StepWindow {
  return { low: tm11Margin * cutoffRadius(TM11, bandLow), high: cutOffMargin * cutoffRadius(TE12, bandHigh) };
}

function phaseErrorsFrom(wanted: number, maxLength: number): number[] {
  if (maxLength === Number.POSITIVE_INFINITY) return [wanted];
  return [0, 0.25, 0.5, 0.75, 1].map((share) => wanted + share * (largestPhaseError - wanted));
}

/**
 * A horn that keeps to one phase error, whatever its length; or why not. Where no guide before the preferred step gives the
 * ratio, the ends of the window are tried: a narrower step lets the guide before it be narrower too.
 */
function dimensioned(
  requirement: FeedRequirement,
  limits: KnownLimits,
  window: StepWindow,
): Attempt | UnrealizableHorn {
  const middle = (preferredStepDiameter / 2) * (speedOfLight / requirement.bandCenter);
  const preferred = Math.min(window.high, Math.max(window.low, middle));
  const first = withStep({ stepRadius: preferred, smallest: window.low }, requirement, limits);
  if (!("feasible" in first)) return first;
  for (const stepRadius of [window.low, window.high]) {
    const other = withStep({ stepRadius, smallest: window.low }, requirement, limits);
    if (!("feasible" in other)) return other;
  }
  return first;
}

function withStep(
  { stepRadius, smallest }: { stepRadius: number; smallest: number },
  requirement: FeedRequirement,
  limits: KnownLimits,
): Attempt | UnrealizableHorn {
  const { bandCenter, halfAngle, feedTaperDb } = requirement;
  const wavelength = speedOfLight / bandCenter;
  const found: MouthFound = mouthForTaper({
    taperOf: (flare) => balancedMouth(flare, bandCenter, halfAngle).taperDb,
    wantedDb: feedTaperDb,
    smallest,
    largest: largestRadiusWaves * wavelength,
    startRadiusFor: (radius) => Math.min(stepRadius, radius),
    wavelength,
    phaseError: limits.phaseError,
    maxFlareLength: Number.POSITIVE_INFINITY,
  });
  if (!found.found)
    return refusedByMouth("dualMode", found, {
      requirement,
      limits,
      smallestMouth: `${tm11Margin} times the radius below which TM11 can't travel at ${ghz(requirement.bandLow)}`,
      pattern: "dual-mode",
      otherLength: 0,
    });

  const { flare } = found;
  const { ratio: modeRatio, planeDifferenceDb } = balancedMouth(flare, bandCenter, halfAngle);
  if (!(modeRatio > 0))
    return unrealizable(
      "dualMode",
      `At a mouth of ${mm(flare.radius)} radius TE11 alone is already as wide in the E-plane as in the H-plane toward the rim; TM11 would only widen it further.`,
    );
  const inputRadius = inputForRatio(flare.startRadius, modeRatio, requirement);
  if (typeof inputRadius !== "number") return inputRadius;
  return { geometry: phased({ flare, inputRadius, modeRatio, wall: limits.wall }, bandCenter), planeDifferenceDb };
}

/** Radii that the guide before a step may have, m: TE11 travels over the band, TM11 doesn't, and there is a step to speak of. */
export function inputBounds(
  stepRadius: number,
  { bandLow, bandHigh }: Pick<FeedRequirement, "bandLow" | "bandHigh">,
): { narrowest: number; widest: number } {
  return {
    narrowest: Math.max(cutoffFactor.throat * cutoffRadius(TE11, bandLow), leastStep * stepRadius),
    widest: Math.min(cutOffMargin * cutoffRadius(TM11, bandHigh), largestStep * stepRadius),
  };
}

/** Radius before the step that launches the wanted ratio at band centre, or why there is none. */
function inputForRatio(
  stepRadius: number,
  modeRatio: number,
  { bandLow, bandCenter, bandHigh }: FeedRequirement,
): number | UnrealizableHorn {
  const { narrowest, widest } = inputBounds(stepRadius, { bandLow, bandHigh });
  const ratioOf = (radius: number): number => stepLaunch(stepCoupling(radius, stepRadius), bandCenter).ratio;
  const most = narrowest < widest ? ratioOf(narrowest) : 0;
  const least = narrowest < widest ? ratioOf(widest) : 0;
  if (modeRatio > most || modeRatio < least)
    return unrealizable(
      "dualMode",
      `A step to ${mm(stepRadius)} radius can't launch the TM11 wanted, ${modeRatio.toFixed(3)} of TE11 in amplitude: over the band the guide before it may have ${mm(narrowest)} to ${mm(widest)} radius (TE11 travels, TM11 doesn't), which gives ${most.toFixed(3)} to ${least.toFixed(3)}.`,
    );
  return brentRoot((radius) => ratioOf(radius) - modeRatio, narrowest, widest, { tolerance: 1e-7 * stepRadius });
}

/** Adds the straight that brings both modes in phase at the mouth, and the input guide. */
function phased(
  { flare, inputRadius, modeRatio, wall }: { flare: Flare; inputRadius: number; modeRatio: number; wall: number },
  bandCenter: number,
): DualModeGeometry {
  const stepRadius = flare.startRadius;
  const decay = propagationConstant(TM11, inputRadius, bandCenter).re;
  const wavelength = speedOfLight / bandCenter;
  const inputLength = Math.min(wavelength, Math.max(wavelength / 4, inputDecay / decay));
  const bare = { inputRadius, inputLength, stepRadius, straightLength: 0, flare, wall, modeRatio, turns: 0 };
  const lead =
    stepLaunch(stepCoupling(inputRadius, stepRadius), bandCenter).phaseLead +
    travelToMouth(TE11, bare, bandCenter).phase -
    travelToMouth(TM11, bare, bandCenter).phase;
  const perLength =
    propagationConstant(TE11, stepRadius, bandCenter).im - propagationConstant(TM11, stepRadius, bandCenter).im;
  const turns = Math.max(1, Math.ceil(lead / (2 * Math.PI)));
  return { ...bare, straightLength: (2 * Math.PI * turns - lead) / perLength, turns };
}

function candidate(
  { geometry, planeDifferenceDb }: Attempt,
  requirement: FeedRequirement,
  limits: KnownLimits,
): Candidate {
  const { flare, turns, modeRatio } = geometry;
  const outerDiameter = 2 * (flare.radius + limits.wall);
  const tooWide = refusedByDiameter("dualMode", outerDiameter, { requirement, limits });
  if (tooWide) return tooWide;
  const length = dualModeLength(geometry);
  const met = metSentence(requirement, limits, {
    phaseError: flare.phaseError,
    shortened: flare.phaseError > limits.phaseError * (1 + 1e-9),
    length,
  });
  const planes =
    Math.abs(planeDifferenceDb) < 0.01
      ? "both planes equal"
      : `the planes as equal as this phase error lets it, ${db(planeDifferenceDb)} apart,`;
  const slow = turns > 1 ? `; TE11 falls ${turns} turns behind TM11 on the way, which narrows the band` : "";
  return {
    feasible: true,
    kind: "dualMode",
    reason: `${met}; TM11 ${(20 * Math.log10(modeRatio)).toFixed(1).replace("-", "−")} dB against TE11 makes ${planes} at the rim${slow}; the closed form places this balance to about 3 % in frequency.`,
    profile: dualModeProfile(geometry),
    throatRadius: geometry.inputRadius,
    apertureRadius: flare.radius,
    length,
    outerDiameter,
    dimensions: dualModeDimensions(geometry),
    geometry,
    warnings: [],
  };
}

function tooLong({ geometry }: Attempt, limits: KnownLimits): UnrealizableHorn {
  return unrealizable(
    "dualMode",
    `The horn would be ${mm(dualModeLength(geometry))} long for a phase error of ${limits.phaseError} wavelengths, ${mm(geometry.straightLength)} of it to bring TM11 in phase, where ${mm(limits.maxLength)} is allowed; up to ${largestPhaseError} wavelengths no shorter one fits.`,
  );
}
