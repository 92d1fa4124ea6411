// A cell's source replaced, a note added after a cell.

import { draftNamed, type Edit, RewriteRefused, rewritten, type SourceView, viewSource } from "./edit.ts";
import { withVocabulary } from "./imports.ts";
import { proseTemplate } from "./literal.ts";

/**
 * Replaces a cell's source, the comment that leads it included: what the page showed is what is replaced.
 * @throws {RewriteRefused} the new text doesn't read, or leaves the notebook with a problem it didn't have
 */
export function replaceCell(source: string, file: string, cell: string, text: string): string {
  const view = viewSource(source, file);
  const { sourceStart: start, sourceEnd: end } = draftNamed(view, cell);
  // a text without its closing brace would take up the cells that follow it
  const alone = viewAlone(text, file, source.slice(0, start).split("\n").length);
  if (alone.module.drafts.length === 0 && text.trim() !== "")
    throw new RewriteRefused(`${file}: the new text of ${cell} holds no cell`);
  return rewritten(view, [{ start, end, text: text.trim() === "" ? "" : text.replace(/^\n+|\s+$/g, "") }]);
}

/** The new text by itself; a problem is told at its line of the whole file. */
function viewAlone(text: string, file: string, line: number): SourceView {
  try {
    return viewSource(text, file);
  } catch (error) {
    if (error instanceof RewriteRefused && error.line !== undefined)
      throw new RewriteRefused(error.message, error.line + line - 1);
    throw error;
  }
}

/** Names of the cells that stand before a place, which prose written there may read. */
export function namesBefore({ module }: SourceView, position: number): Set<string> {
  return new Set(
    module.drafts
      .filter(({ sourceEnd }) => sourceEnd <= position)
      .flatMap(({ form, name, binds, node }) =>
        form === "parts"
          ? binds.map((bind) => (bind as unknown as { name: string }).name)
          : node.type === "ExpressionStatement"
            ? []
            : [name],
      ),
  );
}

/** A statement on its own, a blank line after what stands before it. */
export function insertAfter(view: SourceView, position: number, statement: string): Edit {
  const rest = /^[ \t]*;?[ \t]*(\/\/[^\n]*)?/.exec(view.source.slice(position))?.[0] ?? "";
  const at = position + rest.length;
  return { start: at, end: at, text: `\n\n${statement}` };
}

/**
 * Adds a note after a cell.
 * @param markdown `${expression}` is live; everything else is the note's own text
 * @throws {RewriteRefused} no such cell, an expression that does more than read
 */
export function addNote(source: string, file: string, after: string, markdown: string): string {
  const view = viewSource(source, file);
  const { sourceEnd } = draftNamed(view, after);
  if (markdown.trim() === "") throw new RewriteRefused("the note has no text");
  const inside = proseTemplate(markdown.trim(), namesBefore(view, sourceEnd));
  const names = /\bshow\(/.test(inside) ? ["note", "show"] : ["note"];
  return rewritten(view, [...withVocabulary(view, names), insertAfter(view, sourceEnd, `note\`${inside}\`;`)]);
}
