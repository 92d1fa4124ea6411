// Where a band analysis is in doubt, in sentences that travel with it.

import type { Warning } from "../check.ts";
import { cutoffFrequency, TE11 } from "../guide/mode.ts";
import type { Convergence } from "./convergence.ts";
import type { Resonance } from "./resonances.ts";

/** Power missing beyond this is said. */
const saidPowerError = 1e-9;

interface Doubts {
  frequencies: number[];
  powerBalance: number[];
  convergence: Convergence;
  resonances: Resonance[];
  /** intervals between frequencies in which narrow resonances were not looked for */
  unsearched: number;
  mouthRadius: number;
}

export function bandWarnings({
  frequencies,
  powerBalance,
  convergence,
  resonances,
  unsearched,
  mouthRadius,
}: Doubts): Warning[] {
  const warnings: Warning[] = [];
  const inGHz = (frequency: number): string => (frequency / 1e9).toPrecision(6);
  if (!convergence.reached) {
    const worst = convergence.reflectionErrors.indexOf(convergence.reflectionError);
    warnings.push({
      code: "precision-loss",
      text: `Mode matching has not reached the wanted error: S11 is good to ${convergence.reflectionError.toExponential(1)} (worst at ${inGHz(frequencies[worst]!)} GHz), the field at the mouth to ${convergence.crossPolarErrorDb.toFixed(0)} dB. A steep or strongly reflecting part of the wall is the usual cause; compare with a finer level.`,
    });
  }
  if (resonances.length > 0) {
    const names = resonances.map(
      ({ frequency, width }) => `${(frequency / 1e9).toFixed(4)} GHz (about ${(width / 1e6).toPrecision(2)} MHz wide)`,
    );
    warnings.push({
      code: "singular",
      text: `The horn traps ${names.length === 1 ? "a narrow resonance" : `${names.length} narrow resonances`} between the frequencies asked for: ${names.join(", ")}. Match and pattern are spoilt there; corrugations do this at the low edge of their band. Raise the lowest frequency or change the depths of the first slots; sample finer there to confirm.`,
    });
  }
  if (unsearched > 0) {
    warnings.push({
      code: "outside-validated-range",
      text: `The frequencies lie so far apart that in ${unsearched === 1 ? "one gap" : `${unsearched} gaps`} between them narrow resonances were not looked for; ask for more frequencies to have them found.`,
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
