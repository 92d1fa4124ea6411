// The syntax tree as the compiler reads it: ESTree with TypeScript's additions, by @babel/parser.
import { parse } from "@babel/parser";

export interface Position {
  /** 1-based */
  line: number;
  /** 0-based, as the parser counts */
  column: number;
}

/** Any node. Fields beyond these are read through `child` and `children`, which check what they find. */
export interface Node {
  type: string;
  start: number;
  end: number;
  loc: { start: Position; end: Position };
}

export interface Comment {
  start: number;
  end: number;
}

export interface SyntaxProblem {
  message: string;
  line: number;
  /** 1-based */
  column: number;
}

export interface ParsedModule {
  statements: Node[];
  comments: Comment[];
  problems: SyntaxProblem[];
  /** positions of names declared twice in one scope, which the parser reports and the compiler words itself at top level */
  redeclared: SyntaxProblem[];
}

interface ParserError {
  message: string;
  reasonCode?: string;
  loc?: { line: number; column: number };
}

const NOTHING: ParsedModule = { statements: [], comments: [], problems: [], redeclared: [] };

/** The parser descends with the source and so does the compiler; where the stack ends, there is no line to name. */
export const TOO_DEEP: SyntaxProblem = {
  message: "an expression in it is nested too deeply, or is a sum of thousands of terms",
  ...{ line: 1, column: 1 },
};

/** Parses a TypeScript module; a file that cannot be read gives no statements and at least one problem. */
export function parseModule(source: string): ParsedModule {
  try {
    const file = parse(source, {
      sourceType: "module",
      plugins: ["typescript", ["estree", { classFeatures: true }]],
      errorRecovery: true,
      attachComment: false,
    });
    const errors = (file.errors ?? []) as unknown as ParserError[];
    return {
      statements: file.program.body as unknown as Node[],
      comments: (file.comments ?? []) as unknown as Comment[],
      problems: errors.filter((error) => error.reasonCode !== "VarRedeclaration").map(syntaxProblem),
      redeclared: errors.filter((error) => error.reasonCode === "VarRedeclaration").map(syntaxProblem),
    };
  } catch (error) {
    if (error instanceof RangeError) return { ...NOTHING, problems: [TOO_DEEP] };
    const problem = error as ParserError;
    if (!problem.loc) throw error;
    return { ...NOTHING, problems: [syntaxProblem(problem)] };
  }
}

function syntaxProblem(error: ParserError): SyntaxProblem {
  const { line, column } = error.loc ?? { line: 1, column: 0 };
  return { message: error.message.replace(/\s*\(\d+:\d+\)/, "").replace(/\.$/, ""), line, column: column + 1 };
}

export function isNode(value: unknown): value is Node {
  return typeof value === "object" && value !== null && typeof (value as Node).type === "string";
}

/** A field that holds one node, if it does. */
export function child(node: Node, key: string): Node | undefined {
  const value = (node as unknown as Record<string, unknown>)[key];
  return isNode(value) ? value : undefined;
}

/** A field that holds a list of nodes; holes (as in `[, a]`) are left out. */
export function children(node: Node, key: string): Node[] {
  const value = (node as unknown as Record<string, unknown>)[key];
  return Array.isArray(value) ? value.filter(isNode) : [];
}

/** A field that holds text or a flag. */
export function field(node: Node, key: string): unknown {
  return (node as unknown as Record<string, unknown>)[key];
}

/** The name of an identifier node, "" for anything else. */
export function identifierName(node: Node | undefined): string {
  return node?.type === "Identifier" ? String(field(node, "name")) : "";
}

const WRAPPERS = new Set([
  ...["TSAsExpression", "TSSatisfiesExpression", "TSNonNullExpression", "TSTypeAssertion", "TSInstantiationExpression"],
  "ParenthesizedExpression",
]);

/** True for `x as T`, `x!`, `x satisfies T`: syntax around an expression that vanishes. */
export const isWrapper = (node: Node): boolean => WRAPPERS.has(node.type);

/** The expression inside `x as T`, `x!`, `(x)`. */
export function unwrapped(node: Node): Node {
  let inner = node;
  while (isWrapper(inner)) inner = child(inner, "expression") as Node;
  return inner;
}

/** `a.b.c` as ["a", "b", "c"]; undefined if the expression is anything but names and points. */
export function memberPath(node: Node): string[] | undefined {
  const inner = unwrapped(node);
  if (inner.type === "Identifier") return [identifierName(inner)];
  if (inner.type !== "MemberExpression" || field(inner, "computed")) return undefined;
  const object = memberPath(child(inner, "object") as Node);
  const property = identifierName(child(inner, "property"));
  return object && property ? [...object, property] : undefined;
}

/** The identifier at the root of `a.b[0].c!`. */
export function rootIdentifier(node: Node): Node | undefined {
  let inner = unwrapped(node);
  while (inner.type === "MemberExpression") inner = unwrapped(child(inner, "object") as Node);
  return inner.type === "Identifier" ? inner : undefined;
}
