// hornbook export: a notebook with its results as one HTML file.

import { resolve } from "node:path";
import { EXIT, Failure } from "../command/failure.ts";
import { startProgress } from "../command/progress.ts";
import { projectVersion, readerFolder } from "../command/surroundings.ts";
import type { Verb } from "../command/verb.ts";
import { evaluateHeadless } from "../headless-study.ts";
import { type MadeExport, makeExport } from "../make-export.ts";
import { findNotebook } from "../notebook-place.ts";
import { readSets, SET_HELP } from "../set-givens.ts";
import { requireWritable, writeWhole } from "../write-export.ts";
import { tellFailures } from "./failed-cells.ts";

/** kB of 1000 bytes that a mail takes without a second thought. */
const BUDGET_KB = { live: 700, still: 250 };

export const verb: Verb = {
  help: `hornbook export <notebook> [-o FILE] [--set NAME=VALUE]… [--still] [--force]

Evaluates a notebook and writes it as one HTML file that needs no network and no server: the results can be read at once, also
with scripts off; then the givens can be turned. The file carries the notebook's source, the givens, version, date and digests.

  -o, --out FILE     where to; without it the notebook's name with .html, here. "-" writes to standard output
${SET_HELP}
  --still            no script at all: a report to read and print
  --force            overwrite even a file that isn't an exported study (an exported one is replaced without asking)

The file is put in place whole or not at all. Exit code: 0 written, 1 written but a cell failed (the page says so), 2 the
arguments or the file can't be used.

  hornbook export notebooks/trade-study.ts
  hornbook export notebooks/trade-study.ts --set "dishDiameter=1.8 m" --still -o report.html
`,
  options: {
    out: { type: "string", short: "o" },
    set: { type: "string", multiple: true },
    still: { type: "boolean" },
    force: { type: "boolean" },
  },
  positionals: [{ name: "notebook" }],
  async run(args, context) {
    const { projectRoot } = context;
    const place = findNotebook(args.positionals[0]!, projectRoot);
    const out =
      args.text("out") ??
      place.label
        .split("/")
        .at(-1)!
        .replace(/\.m?ts$/, ".html");
    if (out === "") throw new Failure("--out needs a file name.");
    const path = resolve(readerFolder(projectRoot), out);
    const still = args.switch("still");
    if (path === place.path) throw new Failure(`--out ${out} is the notebook itself.`);
    if (out !== "-") await requireWritable(path, out, args.switch("force"));
    const texts = await readSets(args.texts("set"), projectRoot);
    const progress = startProgress();
    try {
      const headless = await evaluateHeadless(place, projectRoot, texts, progress);
      try {
        progress.say(`${place.label}: writing`);
        const made = await makeExport(headless, {
          ...{ place, projectRoot, still },
          version: await projectVersion(context),
          now: exportDate(),
        });
        progress.end();
        if (out === "-") process.stdout.write(made.html);
        else await writeWhole(path, out, made.html);
        process.stderr.write(`${out === "-" ? "standard output" : out}: ${sizeWords(made, still)}\n`);
        return tellFailures(headless.study) > 0 ? EXIT.found : EXIT.ok;
      } finally {
        await headless.close();
      }
    } finally {
      progress.end();
    }
  },
};

/** Now, or the time that SOURCE_DATE_EPOCH (reproducible-builds.org) sets, so that an export can be repeated to the byte. */
function exportDate(): Date {
  const epoch = process.env.SOURCE_DATE_EPOCH;
  return epoch !== undefined && /^\d{1,12}$/.test(epoch) ? new Date(1000 * Number(epoch)) : new Date();
}

function sizeWords({ html, weights }: MadeExport, still: boolean): string {
  const kB = Buffer.byteLength(html) / 1000;
  const budget = still ? BUDGET_KB.still : BUDGET_KB.live;
  const size = `${kB.toFixed(0)} kB, ${still ? "without script" : "live"}`;
  if (kB <= budget) return size;
  const heavy = weights.slice(0, 5).map(({ name, bytes }) => `${name} ${(bytes / 1000).toFixed(0)} kB`);
  return `${size}; over the ${budget} kB aimed at${heavy.length > 0 ? `: ${heavy.join(", ")}` : ""}`;
}
