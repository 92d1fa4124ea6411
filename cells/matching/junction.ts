// One step between two matched guides.

import { requireInteger, requirePositive } from "../check.ts";
import { speedOfLight } from "../constants.ts";
import { cutoffFrequency, modeName } from "../guide/mode.ts";
import { type ComplexVector, complexVector } from "../math/complex.ts";
import { createKernel } from "../math/kernel/kernel.ts";
import { apertureModeList } from "../radiation/aperture-pattern.ts";
import { chainOf } from "./chain.ts";
import { guardedGammaSquared, matchedAdmittance } from "./line.ts";
import { createMemory } from "./memory.ts";
import { isTE } from "./mode-table.ts";
import { toWave } from "./outcome.ts";
import { bandOf, prepareChain } from "./solve.ts";
import { sweep } from "./sweep.ts";

export interface StepOptions {
  /** m */
  leftRadius: number;
  /** m */
  rightRadius: number;
  /** Hz */
  frequency: number;
  /** modes to list on each side, by rising cutoff (TE11, TM11, TE12, …); default 6 */
  modeCount?: number;
  /** index of the mode that comes in from the left; default 0, TE11 */
  incident?: number;
  /** functions in the aperture; default 21 */
  functions?: number;
}

/** Wave amplitudes (principal √Z) for unit amplitude coming in from the left, reference plane at the step. */
export interface StepScattering {
  /** back on the left, [modeCount] */
  reflected: ComplexVector;
  /** on to the right, [modeCount] */
  transmitted: ComplexVector;
  /** 1 less the power of the travelling modes */
  powerError: number;
}

/**
 * Scattering of an abrupt step of radius, either way; each guide goes on matched.
 * @throws {RangeError} radii, frequency not positive; the incoming mode doesn't travel on the left
 * @accuracy 1e-5 absolute, evanescent modes included, for radii 15 → 19.6 mm and 11 → 14 mm at 10 GHz (test/cells/matching/junction)
 */
export function stepScattering(options: StepOptions): StepScattering {
  const { leftRadius, rightRadius, frequency, modeCount = 6, incident = 0, functions = 21 } = options;
  requirePositive("stepScattering: leftRadius", leftRadius, "m");
  requirePositive("stepScattering: rightRadius", rightRadius, "m");
  requirePositive("stepScattering: frequency", frequency, "Hz");
  requireInteger("stepScattering: modeCount", modeCount, { min: 1, max: 40 });
  requireInteger("stepScattering: incident", incident, { min: 0, max: 100 });
  requireInteger("stepScattering: functions", functions, { min: 3, max: 31 });
  const mode = apertureModeList(incident + 1)[incident]!;
  const cutoff = cutoffFrequency(mode, leftRadius);
  if (frequency <= cutoff) {
    throw new RangeError(
      `stepScattering: frequency must be above the ${modeName(mode)} cutoff on the left, ${(cutoff / 1e9).toPrecision(6)} GHz; got ${frequency / 1e9} GHz`,
    );
  }
  const band = bandOf([frequency]);
  const memory = createMemory(createKernel());
  const pieces = [leftRadius, rightRadius].map((radius) => ({ length: 0, startRadius: radius, endRadius: radius }));
  const chain = chainOf(pieces, {
    edgeFunctions: functions,
    modeCount: 4 * functions,
    sections: [1, 1],
    highestWaveNumber: band.high,
  });
  const prepared = prepareChain(memory, chain, band);
  const { bases, table } = prepared;
  const [answer] = sweep(prepared, [frequency], { incident });
  const { outgoing, lastField, powerError } = answer!;

  const k = (2 * Math.PI * frequency) / speedOfLight;
  const load = (n: number) => matchedAdmittance(isTE(n), guardedGammaSquared(table.chi[n]! / leftRadius, k), k);
  const reflected = complexVector(modeCount);
  const { values, columns } = bases[0]!.left.modes;
  for (let n = 0; n < modeCount; n++) {
    for (let p = 0; p < columns; p++) {
      reflected.re[n]! += values[n * columns + p]! * lastField.re[p]!;
      reflected.im[n]! += values[n * columns + p]! * lastField.im[p]!;
    }
    if (n === incident) reflected.re[n]! -= 1;
    toWave(reflected, n, load(n), load(incident));
  }
  return {
    reflected,
    transmitted: { re: outgoing.re.slice(0, modeCount), im: outgoing.im.slice(0, modeCount) },
    powerError,
  };
}
