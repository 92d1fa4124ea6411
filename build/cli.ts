// The command line: finds the verb, reads its arguments, turns whatever goes wrong into one sentence and an exit code.

import { EXIT, Failure } from "./command/failure.ts";
import { didYouMean } from "./command/near-names.ts";
import { projectVersion } from "./command/surroundings.ts";
import { type CommandContext, readArguments, type Verb } from "./command/verb.ts";

/** In the order of the help. Each verb is loaded only when it is asked for, so that help comes at once. */
const VERBS: Record<string, { usage: string; summary: string; load: () => Promise<{ verb: Verb }> }> = {
  open: {
    usage: "open [notebook]",
    summary: "show a notebook in the browser, live, and again at every save",
    load: () => import("./verbs/open.ts"),
  },
  values: {
    usage: "values <notebook>",
    summary: "evaluate it here and print its numbers as JSON or CSV",
    load: () => import("./verbs/values.ts"),
  },
  export: {
    usage: "export <notebook>",
    summary: "write it as one HTML file to send to others",
    load: () => import("./verbs/export.ts"),
  },
  fork: {
    usage: "fork <notebook|export.html>",
    summary: "write a study of your own from another, with new givens",
    load: () => import("./verbs/fork.ts"),
  },
  check: {
    usage: "check <notebook>",
    summary: "types, cycles, every cell, figure, warning and rationale",
    load: () => import("./verbs/check.ts"),
  },
};

function overallHelp(): string {
  const width = Math.max(...Object.values(VERBS).map(({ usage }) => usage.length));
  const lines = Object.values(VERBS).map(({ usage, summary }) => `  ${usage.padEnd(width)}   ${summary}`);
  return `Hornbook: live notebooks for trade studies of reflector feeds.

Use:  hornbook VERB …        (in the project: npm run -s hornbook -- VERB …)

${lines.join("\n")}

"hornbook VERB --help" tells each verb's options with examples; "hornbook --version" the version.
A notebook is a TypeScript file; those at hand are in notebooks/.

Exit code: ${EXIT.ok} all well, ${EXIT.found} a cell failed or check found something, ${EXIT.arguments} the arguments can't be used,
${EXIT.rationales} check found only rationales that have moved or are inherited.
HORNBOOK_TRACE=1 adds the stack to an error.
`;
}

/** Runs one command. Returns its exit code; prints its own errors. */
export async function main(argv: string[], context: CommandContext): Promise<number> {
  try {
    return await run(argv, context);
  } catch (error) {
    const known = error instanceof Failure;
    const sentence = error instanceof Error ? error.message : String(error);
    process.stderr.write(`hornbook: ${known ? sentence : `something unforeseen: ${sentence.split("\n")[0]}`}\n`);
    if (process.env.HORNBOOK_TRACE === "1") console.error(error);
    else if (!known) process.stderr.write("hornbook: HORNBOOK_TRACE=1 shows where.\n");
    return known ? error.exitCode : EXIT.found;
  }
}

async function run(argv: string[], context: CommandContext): Promise<number> {
  const [name, ...rest] = argv;
  if (name === undefined) {
    process.stderr.write(overallHelp());
    return EXIT.arguments;
  }
  if (name === "--help" || name === "-h" || name === "help") {
    if (name === "help" && rest[0] !== undefined) return run([rest[0], "--help"], context);
    process.stdout.write(overallHelp());
    return EXIT.ok;
  }
  if (name === "--version") {
    process.stdout.write(`${await projectVersion(context)}\n`);
    return EXIT.ok;
  }
  if (!Object.hasOwn(VERBS, name)) {
    throw new Failure(`there is no verb "${name}".${didYouMean(name, Object.keys(VERBS))}`);
  }
  const { verb } = await VERBS[name]!.load();
  const beforeEnd = rest.includes("--") ? rest.slice(0, rest.indexOf("--")) : rest;
  if (beforeEnd.includes("--help") || beforeEnd.includes("-h")) {
    process.stdout.write(verb.help);
    return EXIT.ok;
  }
  return verb.run(readArguments(name, verb, rest), context);
}
