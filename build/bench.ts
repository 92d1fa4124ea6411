// The benchmark: runs what is named (or all) and prints one JSON object, { name: { figure: value } }. Speed claims come from here.

import { Failure } from "./command/failure.ts";
import { didYouMean } from "./command/near-names.ts";
import { startProgress } from "./command/progress.ts";
import type { CommandContext } from "./command/verb.ts";

/** A figure that can't be had on this machine is null. */
export type Figures = Record<string, number | null>;

export interface Bench {
  /** runs it once; `say` tells a waiting person what goes on */
  run(context: CommandContext, say: (text: string) => void): Promise<Figures>;
}

/** One file a name. */
const BENCHES: Record<string, { about: string; load: () => Promise<{ bench: Bench }> }> = {
  "control-turn": {
    about: "one turn of a given of the whole trade study, to repaint",
    load: () => import("./bench/control-turn.ts"),
  },
  matching: {
    about: "mode matching of two horns over 9–12 GHz, a frequency",
    load: () => import("./bench/matching.ts"),
  },
};

const names = Object.keys(BENCHES);

const HELP = `npm run -s bench -- [name…]     prints { name: { figure: value } }; all of them when none is named

${names.map((name) => `  ${name.padEnd(14)} ${BENCHES[name]!.about}`).join("\n")}

Times are in ms. Ratios are against build/bench/yardstick.py, run beside it (python3 with NumPy); null where there is none.
`;

/** Exit code 0, 1 when a benchmark could not be run, 2 for a name that isn't there. */
export async function main(argv: string[], context: CommandContext): Promise<number> {
  if (argv.includes("--help") || argv.includes("-h")) {
    process.stdout.write(HELP);
    return 0;
  }
  const progress = startProgress();
  try {
    const unknown = argv.find((name) => !Object.hasOwn(BENCHES, name));
    if (unknown !== undefined) throw new Failure(`there is no benchmark "${unknown}".${didYouMean(unknown, names)}`);
    const results: Record<string, Figures> = {};
    for (const name of argv.length > 0 ? argv : names) {
      const { bench } = await BENCHES[name]!.load();
      results[name] = await bench.run(context, (text) => progress.say(`${name}: ${text}`));
    }
    progress.end();
    process.stdout.write(`${JSON.stringify(results)}\n`);
    return 0;
  } catch (error) {
    progress.end();
    process.stderr.write(`bench: ${error instanceof Error ? error.message : String(error)}\n`);
    if (process.env.HORNBOOK_TRACE === "1") console.error(error);
    return error instanceof Failure ? error.exitCode : 1;
  }
}
