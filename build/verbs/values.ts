// hornbook values: evaluates a notebook here and prints its numbers.

import { type Plain, type StudyValues, studyValues } from "../../runtime/plain-values.ts";
import type { Study } from "../../runtime/study.ts";
import { EXIT, Failure } from "../command/failure.ts";
import { didYouMean } from "../command/near-names.ts";
import { startProgress } from "../command/progress.ts";
import type { Verb } from "../command/verb.ts";
import { evaluateHeadless } from "../headless-study.ts";
import { findNotebook } from "../notebook-place.ts";
import { readSets, SET_HELP } from "../set-givens.ts";
import { valuesCsv } from "../values-csv.ts";
import { tellFailures } from "./failed-cells.ts";

export const verb: Verb = {
  help: `hornbook values <notebook> [--set NAME=VALUE]… [--only A,B] [--csv]

Evaluates a notebook without a page and prints one JSON object: { notebook, givens, cells, warnings, failed }. Numbers are in SI.
A number that isn't finite is null, and a warning names it. Nothing else goes to standard output.

${SET_HELP}
  --only A,B         only these cells (warnings and failures of the others stay in)
  --csv              the cells as CSV (RFC 4180) instead: a list of objects gives rows, lists give columns, cells with equally
                     many rows stand side by side; cells that don't fit together are written long, one number a row

Exit code: 0 all cells have a value, 1 a cell failed (the others are printed), 2 the arguments or the file can't be used.

  hornbook values notebooks/trade-study.ts
  hornbook values notebooks/trade-study.ts --set "dishDiameter=1.8 m" --set fOverD=0.5 --only trade --csv
`,
  options: {
    set: { type: "string", multiple: true },
    only: { type: "string", multiple: true },
    csv: { type: "boolean" },
  },
  positionals: [{ name: "notebook" }],
  async run(args, { projectRoot }) {
    const place = findNotebook(args.positionals[0]!, projectRoot);
    const texts = await readSets(args.texts("set"), projectRoot);
    const progress = startProgress();
    try {
      let only: string[] | undefined;
      const { study, close } = await evaluateHeadless(place, projectRoot, texts, progress, (fresh) => {
        only = chosenCells(fresh, args.texts("only"));
      });
      try {
        const values = studyValues(study);
        if (only)
          values.cells = Object.fromEntries(Object.entries(values.cells).filter(([name]) => only?.includes(name)));
        progress.end();
        const failures = tellFailures(study);
        process.stdout.write(
          args.switch("csv") ? valuesCsv(only ? inOrder(values.cells, only) : values.cells) : valuesJson(values),
        );
        return failures > 0 ? EXIT.found : EXIT.ok;
      } finally {
        await close();
      }
    } finally {
      progress.end();
    }
  },
};

/** The cells of `--only`, or undefined for all. @throws {Failure} a cell that isn't there */
function chosenCells(study: Study, only: readonly string[]): string[] | undefined {
  if (only.length === 0) return undefined;
  const chosen = only.flatMap((list) => list.split(",")).map((name) => name.trim());
  const names = study.cells.filter(({ role, hidden }) => role === "value" && !hidden).map(({ name }) => name);
  for (const name of chosen) {
    if (names.includes(name)) continue;
    if (study.givens.some((given) => given.name === name)) {
      throw new Failure(`--only: ${name} is a given; --only chooses results, and givens are always printed.`);
    }
    const named = names.filter((one) => !one.includes(" "));
    throw new Failure(`--only: ${study.file} has no cell ${name || '""'}.${didYouMean(name, named)}`);
  }
  return [...new Set(chosen)];
}

const inOrder = (cells: Record<string, Plain>, names: readonly string[]): Record<string, Plain> =>
  Object.fromEntries(names.flatMap((name) => (Object.hasOwn(cells, name) ? [[name, cells[name]!]] : [])));

/** One JSON object, a line for each cell, so that two runs can be compared line by line. */
export function valuesJson(values: StudyValues): string {
  const lines = (record: Record<string, unknown>) => {
    const entries = Object.entries(record).map(
      ([name, value]) => `    ${JSON.stringify(name)}: ${JSON.stringify(value)}`,
    );
    return entries.length > 0 ? `{\n${entries.join(",\n")}\n  }` : "{}";
  };
  const list = (items: readonly unknown[]) =>
    items.length > 0 ? `[\n${items.map((item) => `    ${JSON.stringify(item)}`).join(",\n")}\n  ]` : "[]";
  return `{
  "notebook": ${JSON.stringify(values.notebook)},
  "givens": ${lines(values.givens)},
  "cells": ${lines(values.cells)},
  "warnings": ${list(values.warnings)},
  "failed": ${list(values.failed)}
}
`;
}
