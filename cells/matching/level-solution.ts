// A horn at one level of fineness: all solutions of its plan, refined at any frequency of the band.

import { speedOfLight } from "../constants.ts";
import { hasEdges } from "./chain.ts";
import type { Memory } from "./memory.ts";
import { travellingCount } from "./mode-table.ts";
import type { Answer } from "./outcome.ts";
import { isGuide, type Piece } from "./pieces.ts";
import type { Prepared } from "./prepared.ts";
import { type Level, plannedSolutions, type Refined, refine, steepness, taperSteps } from "./refinement.ts";
import type { WaveBand } from "./section-matrices.ts";
import { prepare, solveBand } from "./solve.ts";

export interface LevelSolution {
  level: Level;
  /** the finest of its solutions */
  finest: Prepared;
  /** modes in tapers and at shallow steps; 0 where there are none */
  taperModes: number;
  taperSteps: number;
  tapers: boolean;
  at(frequencies: number[], progress?: (share: number) => void): { refined: Refined[]; finest: Answer[] };
}

export interface LevelTask {
  memory: Memory;
  pieces: Piece[];
  level: Level;
  band: WaveBand;
  /** steps of every taper instead of the level's rule */
  steps: number | undefined;
  /** the mouth stands in an infinite flange */
  flange: boolean;
}

export function solutionAt({ memory, pieces, level, band, steps: fixedSteps, flange }: LevelTask): LevelSolution {
  const byRule = taperSteps(pieces, level.stepsPerWavelength, (2 * Math.PI) / band.high);
  const steps = byRule.map((n, p) => (isGuide(pieces[p]!) ? 1 : (fixedSteps ?? n)));
  const tapers = !pieces.every(isGuide);
  const steep = steepness(pieces);
  const modes = enoughModes(level.taperModes, pieces, band, memory);
  const plan = plannedSolutions(
    { ...level, taperModes: modes },
    { tapers, edges: hasEdges(pieces), pockets: pieces.some((piece) => piece.pockets) },
    { steps, highestWaveNumber: band.high },
  );
  const prepared: Prepared[] = [];
  plan.forEach(({ fineness, fewer }, i) => {
    // A solution with fewer functions is part of the one before it.
    prepared.push(fewer ? prepared[i - 1]! : prepare(memory, pieces, fineness, band));
  });
  const finest = prepared[0]!;
  return {
    level,
    finest,
    tapers,
    taperModes: tapers || finest.chain.apertures.some(({ kind }) => kind === "step") ? modes : 0,
    taperSteps: steps.reduce((sum, n, p) => sum + (isGuide(pieces[p]!) ? 0 : n), 0),
    at(frequencies, progress) {
      const solved = prepared.map((each, s) =>
        solveBand(each, frequencies, {
          fewer: plan[s]!.fewer,
          flange,
          progress: (part) => progress?.((s + part) / prepared.length),
        }),
      );
      const refined = frequencies.map((frequency, f) => {
        const k = (2 * Math.PI * frequency) / speedOfLight;
        const travelling = {
          throat: travellingCount(pieces[0]!.startRadius, k, finest.table),
          mouth: travellingCount(pieces.at(-1)!.endRadius, k, finest.table),
          reflecting: flange,
        };
        const answers = solved.map((each) => each[f]!);
        return refine(plan, answers, { travelling, steep });
      });
      return { refined, finest: solved[0]! };
    },
  };
}

/** Evanescent modes that a taper needs beyond the travelling ones, at the first level. */
const beyondTravelling = 4;

/** The level's modes, or in a wide horn so many more that half of them hold all that travel. Even. */
function enoughModes(taperModes: number, pieces: Piece[], band: WaveBand, memory: Memory): number {
  const widest = pieces.reduce((most, piece) => Math.max(most, piece.startRadius, piece.endRadius), 0);
  const travelling = travellingCount(
    widest,
    band.high,
    memory.table(Math.ceil((2 * band.high * widest) / Math.PI) + 4),
  );
  const least = 2 * (travelling + beyondTravelling);
  return 2 * Math.ceil((taperModes / 2) * Math.max(1, least / 20));
}
