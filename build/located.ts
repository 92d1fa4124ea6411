// What is wrong at which place of which file, and bundling errors turned into such sentences.

import type { Message } from "esbuild";

export interface Located {
  /** label of the file: "notebooks/trade-study.ts" */
  file: string;
  /** 1-based; 0 when unknown */
  line: number;
  text: string;
}

/** "notebooks/a.ts:12: imports …" */
export function locatedText({ file, line, text }: Located): string {
  return line > 0 ? `${file}:${line}: ${text}` : `${file}: ${text}`;
}

/** Turns esbuild's message into a sentence of ours. `label` writes a path as reports do. */
export function fromEsbuild(message: Message, label: (path: string) => string, fallbackFile: string): Located {
  const { location } = message;
  return {
    file: location ? label(location.file) : fallbackFile,
    line: location?.line ?? 0,
    text: ownWords(message, label),
  };
}

function ownWords({ text, notes }: Message, label: (path: string) => string): string {
  const unresolved = text.match(/^Could not resolve "([^"]+)"/)?.[1];
  if (unresolved !== undefined) {
    if (/^\.{0,2}\//.test(unresolved)) return `imports "${unresolved}", and there is no such file`;
    if (unresolved.startsWith("node:") || notes.some((note) => note.text.includes("built into node"))) {
      return `imports "${unresolved}", which no browser has: a notebook must run in the page too`;
    }
    return `imports the package "${unresolved}", which isn't installed`;
  }
  const missing = text.match(/^No matching export in "([^"]+)" for import "([^"]+)"/);
  if (missing) return `imports "${missing[2]}", which ${label(missing[1]!)} doesn't export`;
  return text;
}
