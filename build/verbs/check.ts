// hornbook check: everything that can be wrong with a notebook, in one report.

import { studyValues } from "../../runtime/plain-values.ts";
import { isShown } from "../../runtime/shown.ts";
import type { Study } from "../../runtime/study.ts";
import { BundleFailure, ownFiles } from "../bundle.ts";
import { EXIT } from "../command/failure.ts";
import { type Progress, startProgress } from "../command/progress.ts";
import type { Verb } from "../command/verb.ts";
import { checkFigures, DRAWN_WIDTHS } from "../draw-check.ts";
import { evaluateHeadless, type HeadlessStudy } from "../headless-study.ts";
import { locatedText } from "../located.ts";
import { findNotebook, type NotebookPlace } from "../notebook-place.ts";
import { readSets, SET_HELP } from "../set-givens.ts";

/** One line of the report, and what it found. */
interface Section {
  name: string;
  verdict: string;
  fails: boolean;
  /** shown below, one a line; may also be there when nothing fails */
  details: string[];
}

export const verb: Verb = {
  help: `hornbook check <notebook> [--set NAME=VALUE]…

Looks for what can be wrong with a notebook and prints a report:

  types      the file and those beside it pass TypeScript's strict check
  structure  no cycle, no name twice, no unknown name, every import is there
  cells      every cell has a value
  numbers    every number is finite
  figures    every figure draws, with caption and text alternative
  warnings   all that travel with a value are listed; one that stands nowhere on the page is a finding
  rationales each stands as agreed: no number it rests on has moved, and none is only inherited

${SET_HELP}

Exit code: 0 nothing found, 1 something found, 3 nothing but rationales that have moved or are inherited, 2 the arguments or
the file can't be used.

  hornbook check notebooks/trade-study.ts
`,
  options: { set: { type: "string", multiple: true } },
  positionals: [{ name: "notebook" }],
  async run(args, { projectRoot }) {
    const place = findNotebook(args.positionals[0]!, projectRoot);
    const texts = await readSets(args.texts("set"), projectRoot);
    const progress = startProgress();
    try {
      const sections = await inspect(place, projectRoot, texts, progress);
      progress.end();
      process.stdout.write(report(place.label, sections));
      const bad = sections.filter(({ fails }) => fails).map(({ name }) => name);
      if (bad.length === 0) return EXIT.ok;
      return bad.every((name) => name === RATIONALES) ? EXIT.rationales : EXIT.found;
    } finally {
      progress.end();
    }
  },
};

async function inspect(
  place: NotebookPlace,
  projectRoot: string,
  texts: Record<string, string>,
  progress: Progress,
): Promise<Section[]> {
  let headless: HeadlessStudy | undefined;
  let broken: BundleFailure | undefined;
  try {
    headless = await evaluateHeadless(place, projectRoot, texts, progress);
  } catch (error) {
    if (!(error instanceof BundleFailure)) throw error;
    broken = error;
  }
  try {
    progress.say(`${place.label}: checking types`);
    const files = headless ? ownFiles(headless.bundle.inputs, place, projectRoot) : [place.path];
    const { typeProblems } = await import("../type-check.ts");
    const types = typeProblems(files, projectRoot).map(locatedText);
    const sections = [section("types", types, "pass")];
    if (broken) sections.push(section("structure", broken.places.map(locatedText), ""));
    if (headless) {
      progress.say(`${place.label}: drawing`);
      sections.push(...inspectStudy(headless));
    }
    return sections;
  } finally {
    await headless?.close();
  }
}

function inspectStudy({ study, bundle }: HeadlessStudy): Section[] {
  const { warnings, failed } = studyValues(study);
  const problems = bundle.compiled?.problems ?? [];
  const structure = [
    ...problems.map(({ file, line, message, cell }) => `${file}:${line}: ${cell ? `${cell}: ` : ""}${message}`),
    ...bundle.warnings.map(locatedText),
  ];
  const results = study.cells.filter(({ hidden }) => !hidden).length;
  const figures = checkFigures(study);
  const ofRationales = warnings.filter(({ code }) => code === "moved" || code === "inherited");
  const doubts = warnings.filter((warning) => warning.code !== "not-finite" && !ofRationales.includes(warning));
  const hidden = doubts.filter(({ shown }) => !shown).length;
  return [
    section("structure", structure, "sound"),
    {
      name: "cells",
      verdict: failed.length > 0 ? `${failed.length} of ${results} failed` : `all ${results} have a value`,
      fails: failed.length > 0,
      details: failed.map(
        ({ cell, reason, began, file, line, path }) =>
          `${file}:${line}: ${cell}: ${reason}${began === cell ? "" : ` (${path.join(" → ")})`}`,
      ),
    },
    section(
      "numbers",
      warnings.filter(({ code }) => code === "not-finite").map(({ text }) => text),
      "all finite",
    ),
    {
      name: "figures",
      verdict:
        figures.findings.length > 0
          ? found(figures.findings.length)
          : `${figures.count} drawn at ${DRAWN_WIDTHS.join(" and ")} px`,
      fails: figures.findings.length > 0,
      details: figures.findings.map(({ cell, line, text }) => `${study.file}:${line}: ${cell} ${text}`),
    },
    {
      name: "warnings",
      verdict:
        doubts.length === 0
          ? "none"
          : hidden > 0
            ? `${hidden} of ${doubts.length} not shown`
            : `${doubts.length}, all shown`,
      fails: hidden > 0,
      details: doubts.map(
        ({ cell, code, text, shown }) => `${cell}: ${shown ? "" : "NOT SHOWN ON THE PAGE: "}${code}: ${text}`,
      ),
    },
    section(
      RATIONALES,
      ofRationales.map(({ cell, code, text }) => `${study.file}:${study.cell(cell).line}: ${cell} ${code}: ${text}`),
      agreedWords(study),
    ),
  ];
}

const RATIONALES = "rationales";

function agreedWords(study: Study): string {
  const count = study.cells.filter(({ value }) => isShown(value) && value.shows === "rationale").length;
  return count === 0 ? "none written" : count === 1 ? "1, as agreed" : `${count}, all as agreed`;
}

const found = (count: number): string => (count === 1 ? "1 finding" : `${count} findings`);

function section(name: string, details: string[], fine: string): Section {
  return { name, verdict: details.length > 0 ? found(details.length) : fine, fails: details.length > 0, details };
}

function report(label: string, sections: Section[]): string {
  const lines = sections.flatMap(({ name, verdict, fails, details }) => [
    `  ${name.padEnd(11)}${fails ? "✗ " : "✓ "}${verdict}`,
    ...details.map((detail) => `      ${detail}`),
  ]);
  const bad = sections.filter(({ fails }) => fails).map(({ name }) => name);
  const last = bad.length > 0 ? `${label}: something was found in ${bad.join(", ")}.` : `${label}: nothing was found.`;
  return `${label}\n\n${lines.join("\n")}\n\n${last}\n`;
}
