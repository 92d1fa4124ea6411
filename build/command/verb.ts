// What a verb of the command line is, and how its arguments are read.

import { type ParseArgsConfig, parseArgs } from "node:util";
import { Failure } from "./failure.ts";
import { didYouMean } from "./near-names.ts";

type Options = NonNullable<ParseArgsConfig["options"]>;

/** What every verb knows of its surroundings. */
export interface CommandContext {
  /** folder of package.json */
  projectRoot: string;
}

/** Arguments after reading: the last of a single option counts, repeated ones are kept in order. */
export interface Arguments {
  positionals: string[];
  /** text of a single option */
  text(option: string): string | undefined;
  /** texts of an option that may be repeated */
  texts(option: string): string[];
  switch(option: string): boolean;
}

export interface Verb {
  /** printed by `--help` */
  help: string;
  options: Options;
  /** names of the positional arguments, for the sentence when one is missing or too many */
  positionals: { name: string; optional?: boolean }[];
  /** returns the exit code */
  run(args: Arguments, context: CommandContext): Promise<number>;
}

/**
 * Reads the arguments of a verb.
 * @throws {Failure} unknown option, option without its value, value for a switch, too few or too many positionals
 */
export function readArguments(
  verbName: string,
  verb: Pick<Verb, "options" | "positionals">,
  argv: string[],
): Arguments {
  const seeHelp = ` See "hornbook ${verbName} --help".`;
  const { tokens, positionals } = parseArgs({
    args: argv,
    options: verb.options,
    allowPositionals: true,
    strict: false,
    tokens: true,
  });
  const texts = new Map<string, string[]>();
  const switches = new Set<string>();
  for (const token of tokens) {
    if (token.kind !== "option") continue;
    const option = verb.options[token.name];
    if (!option) {
      const names = Object.keys(verb.options).map((name) => `--${name}`);
      const near = token.rawName.startsWith("--") ? didYouMean(`--${token.name}`, names) : "";
      throw new Failure(`${verbName} has no option ${token.rawName}.${near || seeHelp}`);
    }
    if (option.type === "boolean") {
      if (token.value !== undefined) {
        throw new Failure(`${token.rawName} is a switch and takes no value; got "${token.value}".`);
      }
      switches.add(token.name);
    } else {
      if (token.value === undefined) throw new Failure(`${token.rawName} needs a value.${seeHelp}`);
      const list = texts.get(token.name) ?? [];
      if (list.length > 0 && !option.multiple) throw new Failure(`${token.rawName} is given twice; give it once.`);
      texts.set(token.name, [...list, token.value]);
    }
  }
  const least = verb.positionals.filter((p) => !p.optional).length;
  if (positionals.length < least) {
    throw new Failure(`${verbName} needs ${article(verb.positionals[positionals.length]!.name)}.${seeHelp}`);
  }
  if (positionals.length > verb.positionals.length) {
    const extra = positionals[verb.positionals.length];
    throw new Failure(`${verbName} doesn't know what to do with "${extra}".${seeHelp}`);
  }
  return {
    positionals,
    text: (option) => texts.get(option)?.at(-1),
    texts: (option) => texts.get(option) ?? [],
    switch: (option) => switches.has(option),
  };
}

const article = (noun: string): string => `${/^[aeiou]/.test(noun) ? "an" : "a"} ${noun}`;
