// Texts from outside as TypeScript: whatever they hold, they come out as the value of one literal.

import {
  child,
  children,
  field,
  identifierName,
  memberPath,
  type Node,
  parseModule,
  unwrapped,
} from "../compile/syntax.ts";
import { keyName, RewriteRefused, textOf } from "./edit.ts";

/** A string literal in double quotes. Line separators are escaped, so that a literal never spans lines. */
export function stringLiteral(text: string): string {
  return JSON.stringify(text).replaceAll("\u2028", "\\u2028").replaceAll("\u2029", "\\u2029");
}

/** Text of many lines as a template without holes, as a person would write a table of numbers. */
export function textLiteral(text: string): string {
  if (!/\n/.test(text) || /\r/.test(text)) return stringLiteral(text);
  return `\`${templateText(text)}\``;
}

/** The inside of a template in which nothing is live. */
const templateText = (text: string): string =>
  text.replaceAll("\\", "\\\\").replaceAll("`", "\\`").replaceAll("${", "\\${").replaceAll("\r", "\\r");

/**
 * Prose from the page as the inside of a template: `${expression}` is live, everything else is text.
 * @param known names of cells that an expression may read
 * @throws {RewriteRefused} an expression that is anything but numbers and texts of cells
 */
export function proseTemplate(text: string, known: ReadonlySet<string>): string {
  let out = "";
  let at = 0;
  for (;;) {
    const start = text.indexOf("${", at);
    if (start < 0) return out + templateText(text.slice(at));
    const end = text.indexOf("}", start);
    if (end < 0) throw new RewriteRefused(`"${text.slice(start, start + 40)}" is never closed by "}"`);
    out += `${templateText(text.slice(at, start))}\${${safeExpression(text.slice(start + 2, end), known)}}`;
    at = end + 1;
  }
}

const OPERATORS = new Set(["+", "-", "*", "/", "**"]);

/**
 * An expression that only reads: names of cells, their fields, numbers, texts, sums and show(…).
 * @returns it, trimmed
 * @throws {RewriteRefused} with what is not allowed
 */
export function safeExpression(text: string, known: ReadonlySet<string>): string {
  const trimmed = text.trim();
  const refuse = (why: string): never => {
    throw new RewriteRefused(`"${trimmed.slice(0, 60)}" ${why}; write a cell's name, a field of it, or show(…) of one`);
  };
  const { statements, problems, comments } = parseModule(`(${trimmed}\n);`);
  const statement = statements[0];
  if (trimmed === "" || problems.length > 0 || statements.length !== 1 || comments.length > 0 || !statement)
    return refuse("can't be read as one expression");
  // what a node consists of, after a look at the node itself
  const partsOf = (node: Node): (Node | undefined)[] => {
    switch (node.type) {
      case "Identifier":
        return known.has(identifierName(node))
          ? []
          : refuse(`reads ${identifierName(node)}, which is no cell before it`);
      case "Literal":
        return ["number", "string"].includes(typeof field(node, "value"))
          ? []
          : refuse("holds something else than numbers and texts");
      case "MemberExpression": {
        const property = child(node, "property");
        if (field(node, "computed") && property?.type !== "Literal")
          return refuse("looks a field up by something that is no plain number or text");
        const name = field(node, "computed") ? String(property && field(property, "value")) : identifierName(property);
        if (/^(constructor|prototype|__proto__)$/.test(name)) return refuse("reaches behind the values");
        return [child(node, "object")];
      }
      case "ChainExpression":
        return [child(node, "expression")];
      case "UnaryExpression":
        return field(node, "operator") === "-"
          ? [child(node, "argument")]
          : refuse("uses an operator that isn't arithmetic");
      case "BinaryExpression":
        return OPERATORS.has(String(field(node, "operator")))
          ? [child(node, "left"), child(node, "right")]
          : refuse("uses an operator that isn't arithmetic");
      case "CallExpression":
        return memberPath(child(node, "callee") as Node)?.join(".") === "show"
          ? children(node, "arguments")
          : refuse("calls something else than show");
      default:
        return refuse("does more than read");
    }
  };
  const look = (node: Node | undefined): void => {
    if (!node) refuse("is incomplete");
    else for (const part of partsOf(unwrapped(node))) look(part);
  };
  look(child(statement, "expression"));
  return trimmed;
}

/** The value of an expression made of literals alone; undefined for any other. */
export function literalValue(node: Node | undefined): unknown {
  if (!node) return undefined;
  const inner = unwrapped(node);
  switch (inner.type) {
    case "Literal":
      return field(inner, "value") ?? undefined;
    case "TemplateLiteral":
      return textOf(inner);
    case "UnaryExpression": {
      const value = literalValue(child(inner, "argument"));
      return field(inner, "operator") === "-" && typeof value === "number" ? -value : undefined;
    }
    case "ArrayExpression": {
      const values = children(inner, "elements").map(literalValue);
      return values.includes(undefined) ? undefined : values;
    }
    case "ObjectExpression": {
      const entries = children(inner, "properties").map((property) => {
        const key = child(property, "key");
        return [key && !field(property, "computed") ? keyName(key) : undefined, literalValue(child(property, "value"))];
      });
      return entries.flat().includes(undefined) ? undefined : Object.fromEntries(entries);
    }
    default:
      return undefined;
  }
}
