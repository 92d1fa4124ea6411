// First dimensions of the smooth-wall cone.

import type { Warning } from "../../check.ts";
import { speedOfLight } from "../../constants.ts";
import { cutoffFrequency, cutoffRadius, TE11, TE21, TM01 } from "../../guide/mode.ts";
import { levelAt } from "../../pattern/cuts.ts";
import type { Candidate } from "../candidate.ts";
import { coarseThetaCountFor } from "../kind.ts";
import { mouthForTaper } from "../mouth.ts";
import { ghz, largestRadiusWaves, metSentence, refusedByDiameter, refusedByMouth, refusedByTaper } from "../refusal.ts";
import {
  checkedLimits,
  cutoffFactor,
  type FeedRequirement,
  type HornLimits,
  nearCutoffWarnings,
} from "../requirement.ts";
import { type SmoothGeometry, smoothDimensions, smoothProfile } from "./geometry.ts";
import { te11Pattern } from "./model.ts";

/** Throat over TE11 cutoff at the lower band edge, where the mouth allows it. Common practice: 1.15 to 1.25. */
const throatFactor = 1.2;
/** Distance that TM01 keeps from the upper band edge where the throat can give it. */
const tm01Margin = 1.01;

/**
 * Dimensions a smooth-wall cone: throat from the band (1.15 to 1.2 times the TE11 cutoff at its lower edge, as far down as it
 * takes to keep TM01 cut off at its upper edge), mouth and length from the wanted mean taper at the rim and the wanted phase
 * error, solved on the closed-form pattern itself.
 *
 * @throws {RangeError} illegal requirement or limits (see `checkedLimits`)
 */
export function smoothHorn(requirement: FeedRequirement, limits: HornLimits = {}): Candidate {
  const known = checkedLimits("smoothHorn", requirement, limits);
  const refused = refusedByTaper("smooth", requirement);
  if (refused) return refused;
  const { bandLow, bandCenter, bandHigh, halfAngle, feedTaperDb } = requirement;
  const wavelength = speedOfLight / bandCenter;

  const cutoff = cutoffRadius(TE11, bandLow);
  const singleModed = cutoffRadius(TM01, bandHigh) / tm01Margin / cutoff;
  const throat = cutoff * Math.min(throatFactor, Math.max(cutoffFactor.throat, singleModed));
  const found = mouthForTaper({
    taperOf: (flare) =>
      -levelAt(te11Pattern(flare, bandCenter, coarseThetaCountFor(flare.radius, bandCenter)), halfAngle).meanDb,
    wantedDb: feedTaperDb,
    smallest: cutoff * cutoffFactor.mouth,
    largest: largestRadiusWaves * wavelength,
    startRadiusFor: (radius) => Math.min(throat, radius),
    wavelength,
    phaseError: known.phaseError,
    maxFlareLength: known.maxLength,
  });
  if (!found.found)
    return refusedByMouth("smooth", found, {
      requirement,
      limits: known,
      smallestMouth: `${cutoffFactor.mouth} times the TE11 cutoff radius at ${ghz(bandLow)}`,
      pattern: "TE11",
      otherLength: 0,
    });

  const { flare } = found;
  const geometry: SmoothGeometry = { flare, wall: known.wall };
  const outerDiameter = 2 * (flare.radius + known.wall);
  const tooWide = refusedByDiameter("smooth", outerDiameter, { requirement, limits: known });
  if (tooWide) return tooWide;
  return {
    feasible: true,
    kind: "smooth",
    reason: `${metSentence(requirement, known, { ...found.flare, shortened: found.shortened })}; in the throat TM01 travels above ${ghz(cutoffFrequency(TM01, flare.startRadius))}, TE21 above ${ghz(cutoffFrequency(TE21, flare.startRadius))}.`,
    profile: smoothProfile(geometry),
    throatRadius: flare.startRadius,
    apertureRadius: flare.radius,
    length: flare.length,
    outerDiameter,
    dimensions: smoothDimensions(geometry),
    geometry,
    warnings: [...nearCutoffWarnings(flare.startRadius / cutoff), ...throatWarnings(flare.startRadius, bandHigh)],
  };
}

/** TM01 or TE21 in the throat: a body of revolution doesn't raise them, a skewed transition before it does. */
function throatWarnings(throatRadius: number, bandHigh: number): Warning[] {
  const start = cutoffFrequency(TM01, throatRadius);
  if (bandHigh <= start) return [];
  const te21 = cutoffFrequency(TE21, throatRadius);
  const also = bandHigh > te21 ? `, TE21 above ${ghz(te21)}` : "";
  return [
    {
      code: "outside-validated-range",
      text: `TM01 travels in the throat above ${ghz(start)}${also}. The horn itself doesn't raise it, but an off-centre or skewed transition before it does, and the model holds TE11 alone.`,
    },
  ];
}
