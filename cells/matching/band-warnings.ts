// Where a band analysis is in doubt, in sentences that travel with it.

import type { Warning } from "../check.ts";
import { cutoffFrequency, TE11 } from "../guide/mode.ts";
import type { Convergence } from "./convergence.ts";

/** Power missing beyond this is said. */
const saidPowerError = 1e-9;

interface Doubts {
  frequencies: number[];
  powerBalance: number[];
  convergence: Convergence;
  mouthRadius: number;
}

export function bandWarnings({ frequencies, powerBalance, convergence, mouthRadius }: Doubts): Warning[] {
  const warnings: Warning[] = [];
  const inGHz = (frequency: number): string => (frequency / 1e9).toPrecision(6);
  if (!convergence.reached) {
    const worst = convergence.reflectionErrors.indexOf(convergence.reflectionError);
    warnings.push({
      code: "precision-loss",
      text: `Mode matching has not reached the wanted error: S11 is good to ${convergence.reflectionError.toExponential(1)} (worst at ${inGHz(frequencies[worst]!)} GHz), the field at the mouth to ${convergence.crossPolarErrorDb.toFixed(0)} dB. A narrow resonance near a frequency of the sweep is the usual cause; sample finer there.`,
    });
  }
  const lost = powerBalance.reduce(
    (worst, error, i) => (Math.abs(error) > Math.abs(powerBalance[worst]!) ? i : worst),
    0,
  );
  if (!(Math.abs(powerBalance[lost]!) <= saidPowerError)) {
    warnings.push({
      code: "singular",
      text: `Power balance fails by ${powerBalance[lost]!.toExponential(1)} at ${inGHz(frequencies[lost]!)} GHz, where rounding is magnified by a resonance; shift that frequency by a few kHz to confirm.`,
    });
  }
  const cutoff = cutoffFrequency(TE11, mouthRadius);
  const below = frequencies.filter((frequency) => frequency <= cutoff);
  if (below.length > 0) {
    warnings.push({
      code: "outside-validated-range",
      text: `No mode travels at the mouth below ${inGHz(cutoff)} GHz: everything is reflected there, and what leaks out depends on the mouth's own surroundings, which are left out.`,
    });
  }
  return warnings;
}
