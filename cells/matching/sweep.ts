// The whole horn at a few frequencies at once: real elimination from the throat to the mouth, then the ports.
//
// Unknowns are the fields in the apertures between guides. Each guide adds its lines' admittances, summed over its modes
// in the basis of its two apertures; fields of an aperture are eliminated before those of the next one. The travelling
// modes of throat and mouth stay outside as ports, so that everything inside is real (lossless, times jη0).

import { speedOfLight } from "../constants.ts";
import type { Chain, Guide } from "./chain.ts";
import type { ApertureCouplings } from "./chain-couplings.ts";
import type { RealMatrix } from "./couplings.ts";
import { addGram, eliminate, solveUpper } from "./elimination.ts";
import { guardedGammaSquared, matchedAdmittance, writeLine } from "./line.ts";
import { isTE, type ModeTable } from "./mode-table.ts";
import { solvePorts } from "./ports.ts";

export interface Prepared {
  chain: Chain;
  couplings: ApertureCouplings[];
  table: ModeTable;
}

/** One frequency's answer for a TE11 wave of 1 W, wave amplitudes (principal √Z), re and im interleaved by arrays. */
export interface Answer {
  /** of all modes of the throat that travel in the band, TE11 first; at the start of the profile */
  reflectedRe: Float64Array;
  reflectedIm: Float64Array;
  /** of all modes carried by the last guide, at the mouth */
  outRe: Float64Array;
  outIm: Float64Array;
  /** 1 less all that the travelling modes carry away */
  powerError: number;
}

/** Modes that travel at the highest frequency. */
export function portCount({ radius, modeCount }: Guide, highest: number, table: ModeTable): number {
  const ka = (2 * Math.PI * highest * radius) / speedOfLight;
  let count = 0;
  while (count < modeCount && table.chi[count]! < ka) count++;
  return count;
}

/** @param portTerm a real admittance at the ports inside the elimination, taken off again outside: moves its resonances */
export function sweep(prepared: Prepared, frequencies: number[], highest: number, portTerm = 0): Answer[] {
  const { chain, couplings, table } = prepared;
  const { guides } = chain;
  const lanes = frequencies.length;
  const ks = frequencies.map((f) => (2 * Math.PI * f) / speedOfLight);
  const first = guides[0]!;
  const last = guides.at(-1)!;
  const inPorts = Math.max(1, portCount(first, highest, table));
  const outPorts = portCount(last, highest, table);

  let count = couplings[0]!.count;
  let s = new Float64Array(count * count * lanes);
  addGram(s, couplings[0]!.left, couplings[0]!.left, endLoads(first, inPorts), lanes, true);
  // Port columns at the side of the couplings onward; −Zr of the ports so far accumulates in `tail`.
  let columns = portColumns(couplings[0]!.left, inPorts);
  let portRows: Float64Array | undefined; // [inPorts × count × lanes] with the sign of −x
  let tail = new Float64Array(inPorts * inPorts * lanes);

  for (let a = 0; a < couplings.length; a++) {
    const { right } = couplings[a]!;
    const guide = guides[a + 1]!;
    const isLast = a === couplings.length - 1;
    const line = isLast ? undefined : lines(guide);
    addGram(s, right, right, line ? line.self : endLoads(guide, outPorts), lanes, true);
    const next = isLast ? undefined : couplings[a + 1]!;
    const nextCount = next ? next.count : outPorts;
    const total = nextCount + inPorts;
    const x = new Float64Array(count * total * lanes);
    const t = new Float64Array(total * total * lanes);
    if (next && line) {
      addGram(x, right, next.left, line.transfer, lanes, false, total, -1);
      addGram(t, next.left, next.left, line.self, lanes, true, total);
    } else {
      setColumns(x, portColumns(right, outPorts), count, outPorts, total, 0);
    }
    if (portRows) {
      for (let p = 0; p < count; p++)
        for (let q = 0; q < inPorts; q++)
          for (let l = 0; l < lanes; l++)
            x[(p * total + nextCount + q) * lanes + l] = portRows[(q * count + p) * lanes + l]!;
    } else {
      setColumns(x, columns, count, inPorts, total, nextCount);
    }
    for (let p = 0; p < inPorts; p++)
      for (let q = 0; q <= p; q++)
        for (let l = 0; l < lanes; l++)
          t[((nextCount + p) * total + nextCount + q) * lanes + l] = tail[(p * inPorts + q) * lanes + l]!;
    eliminate(s, x, t, count, total, lanes);
    if (isLast) return finish(s, x, t, count, total);
    const nextS = new Float64Array(nextCount * nextCount * lanes);
    for (let p = 0; p < nextCount; p++)
      for (let q = 0; q <= p; q++)
        for (let l = 0; l < lanes; l++) nextS[(p * nextCount + q) * lanes + l] = t[(p * total + q) * lanes + l]!;
    portRows = new Float64Array(inPorts * nextCount * lanes);
    for (let q = 0; q < inPorts; q++)
      for (let p = 0; p < nextCount; p++)
        for (let l = 0; l < lanes; l++)
          portRows[(q * nextCount + p) * lanes + l] = t[((nextCount + q) * total + p) * lanes + l]!;
    tail = new Float64Array(inPorts * inPorts * lanes);
    for (let p = 0; p < inPorts; p++)
      for (let q = 0; q <= p; q++)
        for (let l = 0; l < lanes; l++)
          tail[(p * inPorts + q) * lanes + l] = t[((nextCount + p) * total + nextCount + q) * lanes + l]!;
    s = nextS;
    count = nextCount;
    columns = [];
  }
  throw new Error("sweep: a chain must have an aperture");

  function endLoads(guide: Guide, ports: number): Float64Array {
    const loads = new Float64Array(guide.modeCount * lanes);
    for (let n = 0; n < guide.modeCount; n++) {
      for (let l = 0; l < lanes; l++) {
        if (n < ports) loads[n * lanes + l] = portTerm;
        else {
          const k = ks[l]!;
          loads[n * lanes + l] = matchedAdmittance(isTE(n), guardedGammaSquared(table.chi[n]! / guide.radius, k), k).re;
        }
      }
    }
    return loads;
  }

  function lines({ radius, length, modeCount }: Guide): { self: Float64Array; transfer: Float64Array } {
    const out = { self: new Float64Array(modeCount * lanes), transfer: new Float64Array(modeCount * lanes) };
    for (let n = 0; n < modeCount; n++) {
      const cutoffNumber = table.chi[n]! / radius;
      for (let l = 0; l < lanes; l++) {
        const k = ks[l]!;
        writeLine(isTE(n), guardedGammaSquared(cutoffNumber, k), { k, length }, out, n * lanes + l);
      }
    }
    return out;
  }

  function setColumns(x: Float64Array, from: number[], rows: number, width: number, total: number, at: number): void {
    for (let p = 0; p < rows; p++)
      for (let q = 0; q < width; q++)
        for (let l = 0; l < lanes; l++) x[(p * total + at + q) * lanes + l] = -from[p * width + q]!;
  }

  function finish(s: Float64Array, x: Float64Array, t: Float64Array, P: number, total: number): Answer[] {
    solveUpper(s, x, P, total, lanes);
    const { right } = couplings.at(-1)!;
    return ks.map((k, l) => {
      const impedance = new Float64Array(total * total);
      for (let p = 0; p < total; p++)
        for (let q = 0; q <= p; q++) {
          const value = -t[(p * total + q) * lanes + l]!;
          impedance[p * total + q] = value;
          impedance[q * total + p] = value;
        }
      const admittance = (guide: Guide, n: number) =>
        matchedAdmittance(isTE(n), guardedGammaSquared(table.chi[n]! / guide.radius, k), k);
      // Ports in the order of the columns: mouth, then throat.
      const loads = Array.from({ length: total }, (_, p) =>
        p < outPorts ? admittance(last, p) : admittance(first, p - outPorts),
      );
      const { voltage, current } = solvePorts(impedance, loads, outPorts, portTerm);
      // Fields of the last aperture, then the modes beyond it.
      const outRe = new Float64Array(last.modeCount);
      const outIm = new Float64Array(last.modeCount);
      for (let p = 0; p < P; p++) {
        let re = 0;
        let im = 0;
        for (let q = 0; q < total; q++) {
          const value = -x[(p * total + q) * lanes + l]!;
          re += value * current.re[q]!;
          im += value * current.im[q]!;
        }
        for (let n = 0; n < last.modeCount; n++) {
          const c = right.values[n * P + p]!;
          outRe[n]! += c * re;
          outIm[n]! += c * im;
        }
      }
      const drive = loads[outPorts]!;
      let carried = 0;
      for (let n = 0; n < last.modeCount; n++) {
        const load = admittance(last, n);
        wave(outRe, outIm, n, load, drive);
        if (load.im > 0) carried += outRe[n]! ** 2 + outIm[n]! ** 2;
        travel(outRe, outIm, n, guardedGammaSquared(table.chi[n]! / last.radius, k), last.length);
      }
      const reflectedRe = new Float64Array(inPorts);
      const reflectedIm = new Float64Array(inPorts);
      for (let n = 0; n < inPorts; n++) {
        const load = loads[outPorts + n]!;
        reflectedRe[n] = voltage.re[outPorts + n]! - (n === 0 ? 1 : 0);
        reflectedIm[n] = voltage.im[outPorts + n]!;
        wave(reflectedRe, reflectedIm, n, load, drive);
        if (load.im > 0) carried += reflectedRe[n]! ** 2 + reflectedIm[n]! ** 2;
        travel(reflectedRe, reflectedIm, n, guardedGammaSquared(table.chi[n]! / first.radius, k), first.length);
        // TE11 travels in over the same length.
        travel(reflectedRe, reflectedIm, n, guardedGammaSquared(table.chi[0]! / first.radius, k), first.length);
      }
      const inward = guardedGammaSquared(table.chi[0]! / first.radius, k);
      for (let n = 0; n < last.modeCount; n++) travel(outRe, outIm, n, inward, first.length);
      return { reflectedRe, reflectedIm, outRe, outIm, powerError: 1 - carried };
    });
  }
}

/** Mode voltage per incident voltage → wave amplitude per incident wave: × √(Z_drive/Z), Z = j/y of the matched line. */
function wave(
  re: Float64Array,
  im: Float64Array,
  n: number,
  load: { re: number; im: number },
  drive: { im: number },
): void {
  // y = jη0/Z: travelling y = jŷ, Z = η0/ŷ; evanescent y real, Z = jη0/y: argument ±π/2, its root turned by ±π/4.
  const size = Math.sqrt(Math.hypot(load.re, load.im) / drive.im);
  const turn = load.im > 0 ? 0 : load.re > 0 ? -Math.PI / 4 : Math.PI / 4;
  rotate(re, im, n, size, turn);
}

/** × e^{−γL} */
function travel(re: Float64Array, im: Float64Array, n: number, gammaSquared: number, length: number): void {
  const gamma = Math.sqrt(Math.abs(gammaSquared));
  if (gammaSquared > 0) rotate(re, im, n, Math.exp(-gamma * length), 0);
  else rotate(re, im, n, 1, -gamma * length);
}

function rotate(re: Float64Array, im: Float64Array, n: number, size: number, turn: number): void {
  const c = size * Math.cos(turn);
  const d = size * Math.sin(turn);
  const x = re[n]!;
  re[n] = c * x - d * im[n]!;
  im[n] = c * im[n]! + d * x;
}

/** The part of an aperture's basis that each port mode sees, [basis × ports]. */
function portColumns(side: RealMatrix, ports: number): number[] {
  const out: number[] = [];
  for (let p = 0; p < side.columns; p++) for (let q = 0; q < ports; q++) out.push(side.values[q * side.columns + p]!);
  return out;
}
