// Narrow resonances between the samples of a sweep: found by counting, then located.

import { speedOfLight } from "../constants.ts";
import type { Answer } from "./outcome.ts";
import type { Prepared } from "./prepared.ts";
import { portReactances } from "./resonance-count.ts";
import { sweep } from "./sweep.ts";

/** A resonance narrower than the distance of the samples beside it. */
export interface Resonance {
  /** Hz */
  frequency: number;
  /** Hz, at half power, within a factor of two */
  width: number;
  /** largest departure of S11 or an amplitude at the mouth from what its neighbourhood would have without it */
  swing: number;
}

interface Sample {
  frequency: number;
  /** resonances below it, for each reactance at the ports */
  below: number[];
}

/** An interval is divided into so many at once. */
const parts = 8;
/** Resolution at first, as a share of the samples' distance; and at last, as a share of the frequency. */
const firstResolution = 1 / 64;
const lastResolution = 1e-8;
/** What spreads over more than this share of the samples' distance is for the samples to show. */
const widestShare = 1 / 4;

/** Between samples so far apart that they step over more, wide or narrow, none is looked for. */
const mostPassed = 4;
/** A resonance that moves no amplitude by more is not worth a name. */
const leastSwing = 2e-3;
/** Modes at the mouth that are looked at. */
const watchedModes = 6;

/**
 * Resonances so narrow that the samples may have stepped over them: those that the reactances at the ports put close together
 * between the same two samples.
 *
 * @param frequencies ascending, with their `answers`
 * @accuracy centre to the width, which is within a factor of two; those of the corrugated horn near 8.5 GHz, test/cells/matching
 * @source   Wittrick & Williams 1971 for the count; the rest by definition of a Lorentzian line
 */
export function narrowResonances(
  prepared: Prepared,
  frequencies: number[],
  answers: Answer[],
): { found: Resonance[]; unsearched: number } {
  let unsearched = 0;
  const given = frequencies.map((frequency, i): Sample => ({ frequency, below: answers[i]!.resonancesBelow }));
  const found = given.slice(1).flatMap((high, i) => {
    if (passedMost(given[i]!, high) > mostPassed) {
      unsearched++;
      return [];
    }
    const ends = [given[i]!, ...aroundCutoffs(prepared, given[i]!.frequency, high.frequency), high];
    return ends.flatMap((to, e) => {
      // Every second gap is the nothing at a cutoff itself.
      if (e % 2 === 0) return [];
      const from = ends[e - 1]!;
      const passed = to.below.filter((count, reactance) => count > from.below[reactance]!).length;
      return passed < portReactances.length ? [] : resonancesBetween(prepared, from, to);
    });
  });
  return { found, unsearched };
}

/** Resonances between two samples for the reactance that has most there. */
const passedMost = (low: Sample, high: Sample): number =>
  Math.max(...high.below.map((count, reactance) => count - low.below[reactance]!));

/** Samples just below and above every cutoff of a port between two frequencies: what closes the port changes there. */
function aroundCutoffs(prepared: Prepared, low: number, high: number): Sample[] {
  const { chain, table } = prepared;
  const cutoffs = [chain.guides[0]!, chain.guides.at(-1)!].flatMap(({ radius }) =>
    Array.from(table.chi, (chi) => (chi * speedOfLight) / (2 * Math.PI * radius)).filter((f) => f > low && f < high),
  );
  const frequencies = cutoffs.sort((a, b) => a - b).flatMap((cutoff) => [cutoff * (1 - 1e-9), cutoff * (1 + 1e-9)]);
  if (frequencies.length === 0) return [];
  const solved = sweep(prepared, frequencies);
  return frequencies.map((frequency, i) => ({ frequency, below: solved[i]!.resonancesBelow }));
}

function resonancesBetween(prepared: Prepared, from: Sample, to: Sample): Resonance[] {
  const samples = [from, to];
  const distance = to.frequency - from.frequency;

  /** Where the count for a reactance reaches `count`. Counts rise: each crossing has its own, however close they lie. */
  const crossing = (reactance: number, count: number, resolution: number): number => {
    for (;;) {
      const i = samples.findIndex((sample) => sample.below[reactance]! >= count);
      const [low, high] = [samples[i - 1]!, samples[i]!];
      const step = (high.frequency - low.frequency) / parts;
      if (step * parts <= resolution) return (low.frequency + high.frequency) / 2;
      const inside = Array.from({ length: parts - 1 }, (_, n) => low.frequency + step * (n + 1));
      const solved = sweep(prepared, inside);
      samples.splice(i, 0, ...inside.map((frequency, n) => ({ frequency, below: solved[n]!.resonancesBelow })));
    }
  };
  const all = from.below.flatMap((first, reactance) =>
    Array.from({ length: Math.max(0, to.below[reactance]! - first) }, (_, n): Crossing => {
      const count = first + n + 1;
      return { reactance, count, at: crossing(reactance, count, distance * firstResolution) };
    }),
  );
  return clusters(all, distance * widestShare).flatMap((cluster): Resonance[] => {
    let resolution = distance * firstResolution;
    let best: Lorentzian | undefined;
    while (resolution > lastResolution * from.frequency) {
      resolution /= parts;
      best = lorentzian(cluster.map((one) => ({ ...one, at: crossing(one.reactance, one.count, resolution) })));
      if (best && best.width > 8 * resolution) break;
    }
    if (!best || !(best.width < distance * widestShare)) return [];
    const seen = asSeen(prepared, best.frequency, Math.max(best.width, resolution));
    return seen.swing > leastSwing && seen.width < distance * widestShare ? [seen] : [];
  });
}

/** The reactances' width is a lower bound where several ports share the resonance: the width at which it shows most. */
function asSeen(prepared: Prepared, frequency: number, atLeast: number): Resonance {
  let best: Resonance = { frequency, width: atLeast, swing: swingAt(prepared, frequency, atLeast) };
  for (let width = 2 * atLeast; width < 200 * atLeast; width *= 2) {
    const swing = swingAt(prepared, frequency, width);
    if (swing < best.swing) break;
    best = { frequency, width, swing };
  }
  return best;
}

/** Places within a resonance, in widths; the outermost two tell what would be without it. */
const places = [-3, -0.75, -0.4, -0.12, 0.12, 0.4, 0.75, 3];

function swingAt(prepared: Prepared, frequency: number, width: number): number {
  const solved = sweep(
    prepared,
    places.map((place) => frequency + place * width),
  );
  const values = solved.map(({ reflected, outgoing }) => [
    reflected.re[0]!,
    reflected.im[0]!,
    ...outgoing.re.subarray(0, watchedModes),
    ...outgoing.im.subarray(0, watchedModes),
  ]);
  const [first, last] = [values[0]!, values.at(-1)!];
  return Math.max(
    ...values.map((row, i) => {
      const share = (places[i]! - places[0]!) / (places.at(-1)! - places[0]!);
      return Math.max(...row.map((value, n) => Math.abs(value - (first[n]! + share * (last[n]! - first[n]!)))));
    }),
  );
}

type Lorentzian = Pick<Resonance, "frequency" | "width">;

/** Where one reactance at the ports has its resonance number `count`. */
interface Crossing {
  reactance: number;
  count: number;
  /** Hz */
  at: number;
}

/** Groups of crossings of at least three reactances, one each, within a span. */
function clusters(all: Crossing[], span: number): Crossing[][] {
  const left = [...all].sort((a, b) => a.at - b.at);
  const found: Crossing[][] = [];
  for (let i = 0; i < left.length; ) {
    const group: Crossing[] = [];
    for (let j = i; j < left.length && left[j]!.at - left[i]!.at <= span; j++) {
      if (group.some(({ reactance }) => reactance === left[j]!.reactance)) break;
      group.push(left[j]!);
    }
    if (group.length >= 3) found.push(group);
    i += group.length >= 3 ? group.length : 1;
  }
  return found;
}

/**
 * Centre and width of a resonance from where reactances 90° apart in reflection put it: f0 + ½Γ·tan(θ + n·45°). The two
 * differences of opposite ones, A and B, give 1/Γ² = 1/A² + 1/B²; one that lies far off adds nothing.
 */
function lorentzian(cluster: Crossing[]): Lorentzian | undefined {
  const at = portReactances.map((_, reactance) => cluster.find((one) => one.reactance === reactance)?.at);
  const pairs = [
    [at[0], at[2]],
    [at[1], at[3]],
  ].filter((pair): pair is [number, number] => pair[0] !== undefined && pair[1] !== undefined);
  const differences = pairs.map(([a, b]) => Math.abs(a - b));
  const width = 1 / Math.sqrt(differences.reduce((total, difference) => total + 1 / difference ** 2, 0));
  // The nearer pair lies on both sides of the centre, off it by less than half its distance.
  const nearest = differences.indexOf(Math.min(...differences));
  const [a, b] = pairs[nearest]!;
  return { frequency: (a + b) / 2, width };
}
