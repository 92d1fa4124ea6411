// From eliminated fields to wave amplitudes at the throat and at the mouth.

import { type Complex, type ComplexVector, complexVector } from "../math/complex.ts";
import type { Guide } from "./chain.ts";
import type { RealMatrix } from "./couplings.ts";
import { guardedGammaSquared, matchedAdmittance } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { flangedMouth, multiplied } from "./mouth-termination.ts";
import { solvePorts } from "./ports.ts";
import { negativeEigenvalues } from "./resonance-count.ts";
// from "./ports.ts";

/** One frequency's answer to a wave of 1 W (TE11 unless asked otherwise) at the start of the profile; principal √Z. */
export interface Answer {
  /** of the throat's modes that travel in the band, TE11 first, at the start of the profile */
  reflected: ComplexVector;
  /** of the modes of the last guide, at the mouth */
  outgoing: ComplexVector;
  /** of the last aperture's functions, for unit voltage of the wave coming in at the end of the first guide */
  lastField: ComplexVector;
  /** 1 less all that travelling modes carry away */
  powerError: number;
  /** largest ratio of a diagonal element to its pivot in the elimination: rounding is magnified by up to so much */
  cancellation: number;
  /** resonances below this frequency for each of `portReactances` at the ports */
  resonancesBelow: number[];
}

/** What the elimination leaves for one frequency ("lane"). */
interface Eliminated {
  k: number;
  lane: number;
  lanes: number;
  /** [count × ports × lanes]: fields of the last aperture for unit port currents, sign reversed */
  x: Float64Array;
  /** [ports × ports × lanes], lower half: port voltages for unit port currents, sign reversed. The mouth's come first. */
  t: Float64Array;
  count: number;
  first: Guide;
  last: Guide;
  inPorts: number;
  outPorts: number;
  portTerm: number;
  /** mode that comes in */
  incident: number;
  /** functions of the last aperture in the modes of the last guide */
  right: RealMatrix;
  table: ModeTable;
  cancellation: number;
  /** the mouth stands in an infinite flange, not in a guide that goes on */
  flange: boolean;
  /** negative pivots and resonances of shorted guides */
  shorted: number;
}

export function answerAt(from: Eliminated): Answer {
  const { k, lane, lanes, x, t, count, first, last, inPorts, outPorts, portTerm, incident, right, table } = from;
  const size = inPorts + outPorts;
  const impedance = new Float64Array(size * size);
  for (let p = 0; p < size; p++) {
    for (let q = 0; q <= p; q++) {
      impedance[p * size + q] = impedance[q * size + p] = -t[(p * size + q) * lanes + lane]!;
    }
  }
  const gammaSquared = (guide: Guide, n: number): number => guardedGammaSquared(table.chi[n]! / guide.radius, k);
  const matched = (guide: Guide, n: number): Complex => matchedAdmittance(isTE(n), gammaSquared(guide, n), k);
  const loads = Array.from({ length: size }, (_, p) =>
    p < outPorts ? matched(last, p) : matched(first, p - outPorts),
  );
  const mouth = from.flange && outPorts > 0 ? flangedMouth(last, outPorts, k, table) : undefined;
  const { voltage, current } = solvePorts({
    impedance,
    loads,
    driven: outPorts + incident,
    inside: portTerm,
    together: mouth?.admittance,
  });
  const resonancesBelow = negativeEigenvalues(from.shorted, impedance, loads, portTerm);
  const drive = loads[outPorts + incident]!;

  const outgoing = complexVector(last.modeCount);
  const lastField = complexVector(count);
  for (let p = 0; p < count; p++) {
    let re = 0;
    let im = 0;
    for (let q = 0; q < size; q++) {
      const value = -x[(p * size + q) * lanes + lane]!;
      re += value * current.re[q]!;
      im += value * current.im[q]!;
    }
    lastField.re[p] = re;
    lastField.im[p] = im;
    for (let n = 0; n < last.modeCount; n++) {
      const share = right.values[n * right.columns + p]!;
      outgoing.re[n]! += share * re;
      outgoing.im[n]! += share * im;
    }
  }
  let carried = 0;
  const inward = gammaSquared(first, incident);
  const atMouth = mouth?.forward({ re: voltage.re.slice(0, outPorts), im: voltage.im.slice(0, outPorts) });
  for (let n = 0; n < last.modeCount; n++) {
    const load = matched(last, n);
    if (atMouth && n < outPorts) {
      outgoing.re[n] = atMouth.re[n]!;
      outgoing.im[n] = atMouth.im[n]!;
    }
    toWave(outgoing, n, load, drive);
    if (!mouth && load.im > 0) carried += outgoing.re[n]! ** 2 + outgoing.im[n]! ** 2;
    if (!(atMouth && n < outPorts)) travel(outgoing, n, gammaSquared(last, n), last.length);
    travel(outgoing, n, inward, first.length);
  }
  if (mouth) carried += radiated(mouth.admittance, voltage, outPorts) / drive.im;
  const reflected = complexVector(inPorts);
  for (let n = 0; n < inPorts; n++) {
    const load = loads[outPorts + n]!;
    reflected.re[n] = voltage.re[outPorts + n]! - (n === incident ? 1 : 0);
    reflected.im[n] = voltage.im[outPorts + n]!;
    toWave(reflected, n, load, drive);
    if (load.im > 0) carried += reflected.re[n]! ** 2 + reflected.im[n]! ** 2;
    travel(reflected, n, inward, first.length);
    travel(reflected, n, gammaSquared(first, n), first.length);
  }
  return { reflected, outgoing, lastField, powerError: 1 - carried, cancellation: from.cancellation, resonancesBelow };
}

/** Im v*·Y·v: power into jη0·Y. */
function radiated(admittance: ComplexVector, voltage: ComplexVector, ports: number): number {
  const current = multiplied(admittance, voltage, ports);
  let sum = 0;
  for (let n = 0; n < ports; n++) sum += voltage.re[n]! * current.im[n]! - voltage.im[n]! * current.re[n]!;
  return sum;
}

/** A mode's voltage for unit voltage of the wave coming in → its wave amplitude for one of unit amplitude: × √(Z_in/Z). */
export function toWave(vector: ComplexVector, n: number, load: Complex, drive: Complex): void {
  // Z = jη0/y: real for a travelling mode, +j or −j times something else, whose principal root is turned by ±π/4.
  const size = Math.sqrt(Math.hypot(load.re, load.im) / drive.im);
  const turn = load.im > 0 ? 0 : load.re > 0 ? -Math.PI / 4 : Math.PI / 4;
  rotate(vector, n, size, turn);
}

/** × e^{−γ·length} */
function travel(vector: ComplexVector, n: number, gammaSquared: number, length: number): void {
  const gamma = Math.sqrt(Math.abs(gammaSquared));
  if (gammaSquared > 0) rotate(vector, n, Math.exp(-gamma * length), 0);
  else rotate(vector, n, 1, -gamma * length);
}

function rotate({ re, im }: ComplexVector, n: number, size: number, turn: number): void {
  const c = size * Math.cos(turn);
  const d = size * Math.sin(turn);
  const x = re[n]!;
  const y = im[n]!;
  re[n] = c * x - d * y;
  im[n] = d * x + c * y;
}
