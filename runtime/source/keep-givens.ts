// The texts of givens written into their declarations.

import { child, children, type Node } from "../compile/syntax.ts";
import {
  declareChoice,
  declareQuantity,
  declareSwitch,
  declareText,
  type GivenDeclaration,
  Refusal,
  readGiven,
} from "../given.ts";
import {
  argumentsOf,
  callOf,
  draftNamed,
  type Edit,
  propertyOf,
  RewriteRefused,
  rewritten,
  type SourceView,
  textOf,
  valueNode,
  viewSource,
} from "./edit.ts";
import { literalValue, stringLiteral, textLiteral } from "./literal.ts";

/**
 * Writes what the page's fields say into the source: a quantity's first argument, a choice's default, a switch's true or false,
 * a text.
 *
 * @param texts by name: "2.4 m"
 * @returns the new source
 * @throws {RewriteRefused} a name that is no given, a text that it refuses, a file that can't be read
 */
export function keepGivens(source: string, file: string, texts: Readonly<Record<string, string>>): string {
  const view = viewSource(source, file);
  return rewritten(view, givenEdits(view, texts));
}

export function givenEdits(view: SourceView, texts: Readonly<Record<string, string>>): Edit[] {
  return Object.entries(texts).flatMap(([name, text]) => givenEdit(view, name, text));
}

function givenEdit(view: SourceView, name: string, text: string): Edit[] {
  const found = callOf(draftNamed(view, name));
  const form = found?.path.at(-1);
  if (!found || !form || !["given", "choice", "switch", "text"].includes(form))
    throw new RewriteRefused(`${view.file}: ${name} is no given, so its value can't be kept`);
  const [first, second] = argumentsOf(found.call) as [Node, Node];
  requireTaken(form, first, second, text);
  const replace = (node: Node, words: string): Edit[] =>
    view.source.slice(node.start, node.end) === words ? [] : [{ start: node.start, end: node.end, text: words }];
  switch (form) {
    case "given":
      return textOf(first) === text ? [] : replace(first, stringLiteral(text));
    case "switch":
      return replace(first, text === "on" || text === "true" ? "true" : "false");
    case "text":
      return textOf(first) === text ? [] : replace(first, textLiteral(text));
    default:
      return choiceEdit(view, first, second, text, replace);
  }
}

/** Asks the declaration itself, which is written out in literals, whether it takes the text. @throws {RewriteRefused} */
function requireTaken(form: string, first: Node, second: Node, text: string): void {
  const [value, details] = [literalValue(first), literalValue(second)];
  if (value === undefined || details === undefined) return;
  try {
    readGiven(declarations[form]!(value as never, details as never), text);
  } catch (error) {
    if (error instanceof Refusal) throw new RewriteRefused(error.message);
    throw error;
  }
}

const declarations: Record<string, (value: never, details: never) => GivenDeclaration> = {
  given: declareQuantity,
  choice: declareChoice,
  switch: declareSwitch,
  text: declareText,
};

/** The first option is the default unless `default` says otherwise: it is added, changed, or taken away again. */
function choiceEdit(
  view: SourceView,
  options: Node,
  details: Node,
  text: string,
  replace: (node: Node, words: string) => Edit[],
): Edit[] {
  const known = children(options, "elements").map(textOf);
  if (!known.includes(text)) throw new RewriteRefused(`${view.file}: ${stringLiteral(text)} is none of the options`);
  const property = propertyOf(details, "default");
  if (property) return replace(valueNode(property) as Node, stringLiteral(text));
  if (known[0] === text) return [];
  const last = children(details, "properties").at(-1);
  if (!last) throw new RewriteRefused(`${view.file}: a choice without label and why can't be kept`);
  const start = child(last, "key")?.start ?? last.start;
  const before = view.source.slice(view.source.lastIndexOf("\n", start) + 1, start);
  // on a line of its own like the others, or on theirs
  const addition =
    before.trim() === "" ? `,\n${before}default: ${stringLiteral(text)}` : `, default: ${stringLiteral(text)}`;
  return [{ start: last.end, end: last.end, text: addition }];
}
