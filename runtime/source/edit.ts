// Changes to a notebook's source by stretches of text, so that everything else stays as it was written, byte for byte.

import { type Draft, draftModule, type ModuleDraft } from "../compile/draft.ts";
import {
  child,
  children,
  field,
  identifierName,
  memberPath,
  type Node,
  type ParsedModule,
  parseModule,
  TOO_DEEP,
  unwrapped,
} from "../compile/syntax.ts";
import { compileNotebook } from "../compile.ts";

/** Replaces a stretch of the source; start = end inserts. */
export interface Edit {
  start: number;
  end: number;
  text: string;
}

/** A change that can't be made; the message is one sentence, the line is of the file as it would have been. */
export class RewriteRefused extends Error {
  override name = "RewriteRefused";
  readonly line?: number;
  constructor(message: string, line?: number) {
    super(message);
    this.line = line;
  }
}

/** A notebook's source as the changes look at it. */
export interface SourceView {
  source: string;
  file: string;
  parsed: ParsedModule;
  module: ModuleDraft;
}

/** @throws {RewriteRefused} the source can't be read: then nothing in it is changed */
export function viewSource(source: string, file: string): SourceView {
  const parsed = parseModule(source);
  const problem = parsed.problems[0];
  if (problem) throw new RewriteRefused(`${file} can't be read: ${problem.message}`, problem.line);
  try {
    return { source, file, parsed, module: draftModule(source, parsed) };
  } catch (error) {
    if (error instanceof RangeError) throw new RewriteRefused(`${file} can't be read: ${TOO_DEEP.message}`);
    throw error;
  }
}

/**
 * Makes the changes, and looks at the result: it must read and have no problem that wasn't there before.
 * @throws {RewriteRefused} a change that would spoil the notebook
 */
export function rewritten({ source, file }: Pick<SourceView, "source" | "file">, edits: readonly Edit[]): string {
  // new lines end as the file's own do, and what has no place in UTF-8 is what a reader of the file would find
  const lineEnd = /\r?\n/.exec(source)?.[0] ?? "\n";
  let text = "";
  let at = 0;
  for (const edit of [...edits].sort((a, b) => a.start - b.start || a.end - b.end)) {
    text += source.slice(at, edit.start) + wellFormed(edit.text).replace(/\r?\n/g, lineEnd);
    at = edit.end;
  }
  text += source.slice(at);
  const known = new Set(compileNotebook(source, file).problems.map(({ message }) => message));
  const problem = compileNotebook(text, file).problems.find(({ message }) => !known.has(message));
  if (problem) throw new RewriteRefused(problem.message, problem.line);
  return text;
}

/** Halves of surrogate pairs that stand alone become U+FFFD, as writing them to a file would make them. */
const wellFormed = (text: string): string => text.replace(/\p{Surrogate}/gu, "\ufffd");

/** @throws {RewriteRefused} no cell of that name */
export function draftNamed({ module, file }: SourceView, name: string): Draft {
  const found = module.drafts.find((draft) => draft.name === name);
  if (!found) throw new RewriteRefused(`${file} has no cell ${name}`);
  return found;
}

/** The call that is a const's whole value, and the words that lead to what is called: given.choice. */
export function callOf(draft: Draft): { call: Node; path: string[] } | undefined {
  const init = draft.form === "const" ? child(draft.node, "init") : undefined;
  const call = init && unwrapped(init);
  if (call?.type !== "CallExpression") return undefined;
  const path = memberPath(child(call, "callee") as Node);
  return path && { call, path };
}

export const argumentsOf = (call: Node): Node[] => children(call, "arguments");

/** A property of an object literal, by its plain name. */
export function propertyOf(object: Node | undefined, name: string): Node | undefined {
  if (object?.type !== "ObjectExpression") return undefined;
  return children(object, "properties").find((property) => {
    const key = child(property, "key");
    return property.type === "Property" && !field(property, "computed") && key !== undefined && keyName(key) === name;
  });
}

/** "agreed" of `agreed: …` and of `"agreed": …`. */
export const keyName = (key: Node): string => identifierName(key) || String(field(key, "value") ?? "");

export const valueNode = (property: Node | undefined): Node | undefined => property && child(property, "value");

/** The text of a string literal or of a template without holes; undefined for anything else. */
export function textOf(node: Node | undefined): string | undefined {
  if (node?.type === "Literal" && typeof field(node, "value") === "string") return String(field(node, "value"));
  if (node?.type !== "TemplateLiteral" || children(node, "expressions").length > 0) return undefined;
  const [quasi] = children(node, "quasis");
  const value = quasi && (field(quasi, "value") as { cooked?: string } | undefined);
  return value?.cooked;
}

/** Start of the line on which a position stands. */
export const lineStart = (source: string, position: number): number => source.lastIndexOf("\n", position - 1) + 1;

/** The white space with which the line of a position begins. */
export const indentAt = (source: string, position: number): string =>
  /^[ \t]*/.exec(source.slice(lineStart(source, position)))?.[0] ?? "";

/** Removes a property with its comma, and its line if nothing else stands there. */
export function withoutProperty(source: string, property: Node): Edit {
  let { start, end } = property;
  const comma = /^\s*,/.exec(source.slice(end));
  if (comma) end += comma[0].length;
  const from = lineStart(source, start);
  const rest = source.indexOf("\n", end);
  if (source.slice(from, start).trim() === "" && rest >= 0 && source.slice(end, rest).trim() === "") {
    return { start: from, end: rest + 1, text: "" };
  }
  if (!comma) {
    const before = /,\s*$/.exec(source.slice(0, start));
    if (before) start -= before[0].length;
  } else end += /^[ \t]*/.exec(source.slice(end))?.[0].length ?? 0;
  return { start, end, text: "" };
}
