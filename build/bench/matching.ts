// Mode matching over a band, geometry work included, on one thread, against the yardstick's linear algebra.

import type { HornProfile } from "../../cells/guide/horn-profile.ts";
import { type BandOptions, bandAnalysis } from "../../cells/matching/index.ts";
import type { Bench, Figures } from "../bench.ts";
import { runYardstick } from "./yardstick.ts";

const WARM_UP = 2;
const RUNS = 5;
const COUNT = 41;

const frequencies = Array.from({ length: COUNT }, (_, i) => 9e9 + (3e9 * i) / (COUNT - 1));

/** m: 36 slots of 3 mm and teeth of 1 mm between radii of 12 and 38 mm, the first eight slots deeper. */
function corrugatedHorn(): HornProfile {
  const points = [
    [-164, 12],
    [-144, 12],
  ];
  for (let n = 0; n < 36; n++) {
    const inner = 12 + (26 * (n + 1)) / 36;
    const outer = inner + (n < 8 ? 13.5 - 0.7 * n : 7.9);
    const z = 4 * n - 144;
    points.push([z, outer], [z + 3, outer], [z + 3, inner], [z + 4, inner]);
  }
  return { z: points.map(([z]) => z! / 1e3), radius: points.map(([, radius]) => radius! / 1e3) };
}

const smoothCone: HornProfile = { z: [-0.12, -0.1, 0], radius: [0.011, 0.011, 0.036] };

export const bench: Bench = {
  async run(_context, say): Promise<Figures> {
    say("the corrugated horn");
    const corrugated = perFrequency(corrugatedHorn(), { frequencies });
    say("the smooth cone in 100 sections");
    const cone = perFrequency(smoothCone, { frequencies, taperSteps: 100 });
    say("running the yardstick");
    const yardstick = (await runYardstick())?.modeMatchingPerFrequency["20"] ?? null;
    const ratio = (time: number) => (yardstick === null ? null : Number((time / yardstick).toFixed(2)));
    return {
      msPerFrequency: Number(corrugated.toFixed(4)),
      coneMsPerFrequency: Number(cone.toFixed(4)),
      yardstickMs: yardstick,
      ratio: ratio(corrugated),
      coneRatio: ratio(cone),
    };
  },
};

/** ms, the best of several runs, as the yardstick's. Nothing is kept from run to run. */
function perFrequency(profile: HornProfile, options: BandOptions): number {
  let best = Number.POSITIVE_INFINITY;
  for (let run = 0; run < WARM_UP + RUNS; run++) {
    const begun = performance.now();
    const { convergence } = bandAnalysis(profile, options);
    const time = performance.now() - begun;
    // With its steps fixed, the cone tries every level and may end short of the default error; its time counts all of them.
    if (options.taperSteps === undefined && !convergence.reached) {
      throw new Error(`matching: the wanted error was not reached; S11 is within ${convergence.reflectionError}`);
    }
    if (run >= WARM_UP) best = Math.min(best, time);
  }
  return best / COUNT;
}
