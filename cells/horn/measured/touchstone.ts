// Match of a built horn from a one-port Touchstone file.

import type { Complex } from "../../math/complex.ts";

/** A file that is no one-port Touchstone file; the message names the file, the line and what was expected. */
export class TouchstoneError extends Error {
  override name = "TouchstoneError";
  readonly line: number;
  constructor(file: string, line: number, message: string) {
    super(`${file}, line ${line}: ${message}`);
    this.line = line;
  }
}

export interface MeasuredMatch {
  /** Hz, ascending */
  frequencies: number[];
  /** [frequencyCount] */
  s11: Complex[];
  /** ohm, to which S11 refers */
  reference: number;
}

const units: Record<string, number> = { hz: 1, khz: 1e3, mhz: 1e6, ghz: 1e9 };
const forms = ["ma", "db", "ri"] as const;
type Form = (typeof forms)[number];
const longestText = 20_000_000;
const decimal = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
/** Keywords of version 2 that say nothing about S11 of a one-port. */
const passed = new Set(["two-port data order", "matrix format", "mixed-mode order"]);

interface Options {
  unit: number;
  form: Form;
  reference: number;
}

/**
 * Reads a one-port file, version 1 or 2: option line in any order and case (default `# GHz S MA R 50`), comments from `!`, the
 * keywords of version 2. Only S-parameters; numbers of one frequency may stand on several lines.
 *
 * @param file what messages call it; default "match"
 * @throws {TouchstoneError} another parameter than S, more than one port, noise data, a word that is no number, frequencies that
 *         don't rise, |S11| above 2 (no passive horn, and most likely another format), an end that is missing
 * @source Touchstone File Format Specification, version 2.0, IBIS Open Forum, 2009, from memory
 */
export function readTouchstone(text: string, file = "match"): MeasuredMatch {
  if (text.length > longestText) throw new TouchstoneError(file, 1, `at most ${longestText} characters are read`);
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\r|\n/);
  let options: Options | undefined;
  let version = 1;
  let ended = false;
  let announced: number | undefined;
  let keywordReference: number | undefined;
  const words: { word: string; line: number }[] = [];
  lines.forEach((raw, i) => {
    const line = i + 1;
    const content = raw.split("!", 1)[0]!.trim();
    if (content === "") return;
    if (ended) throw new TouchstoneError(file, line, "nothing is expected after [End]");
    if (content.startsWith("#")) {
      if (words.length > 0) throw new TouchstoneError(file, line, "the option line is expected before the numbers");
      options ??= readOptions(content, file, line);
      return;
    }
    if (content.startsWith("[")) {
      const [, keyword = "", rest = ""] = /^\[([^\]]*)\]\s*(.*)$/.exec(content) ?? [];
      const number = () => numberOf(rest, file, line, `[${keyword}]`);
      switch (keyword.trim().toLowerCase()) {
        case "version":
          version = number();
          if (version < 2 || version >= 3)
            throw new TouchstoneError(file, line, `a version from 2.0 below 3 is expected; got ${rest}`);
          return;
        case "number of ports":
          if (number() !== 1) throw new TouchstoneError(file, line, `one port is expected; got ${rest}`);
          return;
        case "number of frequencies":
          announced = number();
          return;
        case "reference":
          keywordReference = number();
          if (!(keywordReference > 0))
            throw new TouchstoneError(file, line, `a reference above 0 ohm is expected; got ${rest}`);
          return;
        case "network data":
          return;
        case "end":
          ended = true;
          return;
        case "noise data":
        case "number of noise frequencies":
          throw new TouchstoneError(file, line, "noise data has no place in the file of a horn");
        default:
          if (passed.has(keyword.trim().toLowerCase())) return;
          throw new TouchstoneError(file, line, `a keyword of Touchstone 2 is expected; got [${keyword}]`);
      }
    }
    for (const word of content.split(/\s+/)) words.push({ word, line });
  });
  if (version >= 2 && !ended) throw new TouchstoneError(file, lines.length, "[End] is expected in a file of version 2");
  const { unit, form, reference } = options ?? { unit: 1e9, form: "ma" as const, reference: 50 };
  if (words.length === 0) throw new TouchstoneError(file, lines.length, "at least one frequency is expected; got none");
  if (words.length % 3 !== 0)
    throw new TouchstoneError(
      file,
      words.at(-1)!.line,
      `three numbers a frequency are expected, as a one-port has; got ${words.length} numbers in all`,
    );
  const match: MeasuredMatch = { frequencies: [], s11: [], reference: keywordReference ?? reference };
  for (let i = 0; i < words.length; i += 3) {
    const [f, a, b] = [0, 1, 2].map((k) => {
      const { word, line } = words[i + k]!;
      return numberOf(word, file, line, ["frequency", "first number of S11", "second number of S11"][k]!);
    }) as [number, number, number];
    const { line } = words[i]!;
    const frequency = f * unit;
    const last = match.frequencies.at(-1);
    if (!(frequency > 0 && Number.isFinite(frequency)))
      throw new TouchstoneError(file, line, `a frequency above 0 is expected; got ${words[i]!.word}`);
    if (last !== undefined && frequency <= last)
      throw new TouchstoneError(file, line, `frequencies must rise; got ${words[i]!.word} after ${last / unit}`);
    const s11 = complexOf(form, a, b);
    if (!(Math.hypot(s11.re, s11.im) <= 2))
      throw new TouchstoneError(
        file,
        line,
        `|S11| of at most 1 is expected; got ${a} ${b} in the form ${form.toUpperCase()}`,
      );
    match.frequencies.push(frequency);
    match.s11.push(s11);
  }
  if (announced !== undefined && announced !== match.frequencies.length)
    throw new TouchstoneError(
      file,
      lines.length,
      `${announced} frequencies are announced; got ${match.frequencies.length}`,
    );
  return match;
}

function readOptions(content: string, file: string, line: number): Options {
  const options: Options = { unit: 1e9, form: "ma", reference: 50 };
  const words = content.slice(1).trim().toLowerCase().split(/\s+/).filter(Boolean);
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    if (units[word] !== undefined) options.unit = units[word];
    else if ((forms as readonly string[]).includes(word)) options.form = word as Form;
    else if (word === "r") options.reference = numberOf(words[++i] ?? "", file, line, "the reference after R");
    else if (/^[yzgh]$/.test(word))
      throw new TouchstoneError(file, line, `S-parameters are expected; got ${word.toUpperCase()}-parameters`);
    else if (word !== "s")
      throw new TouchstoneError(file, line, `an option like "# GHz S MA R 50" is expected; got ${word.slice(0, 40)}`);
  }
  if (!(options.reference > 0)) throw new TouchstoneError(file, line, "a reference above 0 ohm is expected after R");
  return options;
}

function numberOf(word: string, file: string, line: number, what: string): number {
  const text = word.trim();
  const value = decimal.test(text) ? Number(text) : Number.NaN;
  if (Number.isFinite(value)) return value;
  throw new TouchstoneError(
    file,
    line,
    `a number is expected as ${what}; got ${text === "" ? "nothing" : text.slice(0, 40)}`,
  );
}

function complexOf(form: Form, a: number, b: number): Complex {
  if (form === "ri") return { re: a, im: b };
  const size = form === "db" ? 10 ** (a / 20) : a;
  const angle = (b * Math.PI) / 180;
  return { re: size * Math.cos(angle), im: size * Math.sin(angle) };
}
