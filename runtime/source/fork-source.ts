// A notebook taken up for another dish: the same text with new givens, saying where it came from.

import { child, field, type Node } from "../compile/syntax.ts";
import {
  argumentsOf,
  callOf,
  type Edit,
  propertyOf,
  rewritten,
  type SourceView,
  textOf,
  valueNode,
  viewSource,
} from "./edit.ts";
import { withPaths } from "./imports.ts";
import { givenEdits } from "./keep-givens.ts";
import { stringLiteral } from "./literal.ts";
import { inheritedEdits } from "./rationale-source.ts";

export interface ForkDetails {
  /** the new study's title */
  name: string;
  /** what it is forked from, as a reader knows it: "notebooks/trade-study.ts", "ridge.html" */
  from: string;
  /** "2026-11-30" */
  today: string;
  /** new texts of givens */
  texts: Readonly<Record<string, string>>;
  /** where a relative import leads from the new place; none: the place is the same */
  moved?: (specifier: string) => string;
}

/**
 * The source of a fork: a first line that says what it was forked from and when, the new givens and title written in, every
 * rationale marked as inherited. All else stays as it was.
 * @throws {RewriteRefused} a name that is no given, a source that can't be read
 */
export function forkSource(source: string, file: string, details: ForkDetails): string {
  const view = viewSource(source, file);
  const { name, from, today, texts, moved } = details;
  const line = `// Forked from ${oneLine(from)} on ${today}: ${oneLine(name)}.\n`;
  // of a fork of a fork, the newest line says enough: the older one stands in the file that it names
  const start = source.startsWith("\ufeff") ? 1 : 0;
  const former = /^\/\/ Forked from [^\n]*\n/.exec(source.slice(start))?.[0].length ?? 0;
  return rewritten(view, [
    { start, end: start + former, text: line },
    ...givenEdits(view, texts),
    ...titleEdits(view, name),
    ...inheritedEdits(view, from),
    ...(moved ? withPaths(view, moved) : []),
  ]);
}

const oneLine = (text: string): string => text.replace(/[\s\u2028\u2029]+/g, " ").trim();

/** The title of head({ title: "…" }), where it is a plain text. */
function titleEdits(view: SourceView, name: string): Edit[] {
  for (const draft of view.module.drafts) {
    const statement = draft.node.type === "ExpressionStatement" ? child(draft.node, "expression") : undefined;
    const call = statement?.type === "CallExpression" ? statement : callOf(draft)?.call;
    const callee = call && child(call, "callee");
    if (!call || callee?.type !== "Identifier" || field(callee, "name") !== "head") continue;
    const title = valueNode(propertyOf(argumentsOf(call)[0], "title"));
    if (textOf(title) === undefined) return [];
    return [{ start: (title as Node).start, end: (title as Node).end, text: stringLiteral(oneLine(name)) }];
  }
  return [];
}

/** A file name for a study's name: "Ridge, 1.8 m" is ridge-1-8-m. */
export function fileNameFor(name: string): string {
  const words = name
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .toLowerCase()
    .match(/[a-z0-9]+/g);
  return (words ?? []).join("-").slice(0, 60).replace(/-$/, "");
}
