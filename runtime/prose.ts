// Prose with live numbers: what a tagged template of the vocabulary makes of the values between its words.
import { significant } from "./shown-number.ts";

/**
 * Joins a tagged template into Markdown. Numbers get four significant figures; text is escaped, so that a name or a given's text
 * never becomes markup; a note or `markdown(…)` is taken as Markdown; a list is joined by commas.
 * @throws {TypeError | RangeError} a value without a place in prose: undefined, NaN, an object
 */
export function prose(where: string, strings: TemplateStringsArray, values: readonly unknown[]): string {
  const words = strings.map((cooked, index) => cooked ?? strings.raw[index] ?? "");
  let text = "";
  words.forEach((word, index) => {
    text += word;
    if (index < values.length) text += inProse(where, values[index], index);
  });
  return dedent(text);
}

function inProse(where: string, value: unknown, index: number): string {
  switch (typeof value) {
    case "number":
      if (!Number.isFinite(value))
        throw new RangeError(`${where}: value ${index + 1} in the text must be finite; got ${value}`);
      return significant(value);
    case "string":
      return escapeMarkdown(value);
    case "boolean":
      return value ? "yes" : "no";
    case "bigint":
      return String(value);
  }
  if (Array.isArray(value)) return value.map((item) => inProse(where, item, index)).join(", ");
  const markdown = (value as { markdown?: unknown } | null | undefined)?.markdown;
  if (typeof markdown === "string") return markdown;
  const got = value === null ? "null" : typeof value === "object" ? "an object" : typeof value;
  throw new TypeError(`${where}: value ${index + 1} in the text must be a number or text; got ${got}`);
}

/** Plain text as Markdown that reads as that very text: marks, links, HTML, lists and headings lose their meaning. */
export function escapeMarkdown(text: string): string {
  return text
    .replace(/\s*[\r\n\u2028\u2029]\s*/g, " ")
    .replace(/[\\`*_{}[\]<>()#|~!&$^@]/g, "\\$&")
    .replace(/:(?=\/\/)/g, "\\:")
    .replace(/www\./gi, (match) => `${match.slice(0, 3)}\\.`)
    .replace(/^(\s*)([-+=])/, "$1\\$2")
    .replace(/^(\s*\d+)(?=[.)](\s|$))/, "$1\\");
}

/** The indentation that all lines share, taken away; first line and blank lines don't count. */
function dedent(text: string): string {
  const lines = text.split("\n");
  const indents = lines
    .slice(1)
    .filter((line) => line.trim() !== "")
    .map((line) => /^ */.exec(line)?.[0].length ?? 0);
  const shared = indents.length ? Math.min(...indents) : 0;
  return [lines[0] ?? "", ...lines.slice(1).map((line) => line.slice(shared))].join("\n").trim();
}
