// A figure in the report column: drawn for the width there is, drawn again only when its value or that width changes.

import type { Figure } from "../shown.ts";
import { html, idPart } from "./dom.ts";
import { emptyContent, frame } from "./frame.ts";
import type { Block, PageContext } from "./options.ts";
import type { ShownEntry } from "./plan-entries.ts";
import { csvText, saveText, svgText } from "./save.ts";
import { typeset } from "./typography.ts";

export function figureBlock(context: PageContext, first: ShownEntry, titleLevel: () => 2 | 3): Block<ShownEntry> {
  const { document, live } = context;
  const parts = frame(context, first.cell, "figure");
  const { content } = parts;
  let drawn: { value: unknown; width: number; failed: boolean } | undefined;
  let drawing: Element | undefined;

  const draw = (figure: Figure, width: number): Node => {
    try {
      drawing = figure.drawing.draw({ document, width });
      // in a file the label says it already; a drawing that is saved says it itself
      if (!live) drawing.querySelector("desc")?.remove();
      const picture = html(document, "div", { role: "img", "aria-label": typeset(figure.drawing.alt) }, drawing);
      return html(document, "div", { class: "drawing" }, picture);
    } catch (error) {
      drawing = undefined;
      const reason = error instanceof Error ? error.message : String(error);
      return html(document, "p", { class: "failure" }, `This figure could not be drawn: ${reason}`);
    }
  };

  return {
    element: parts.element,
    update(entry) {
      const { cell } = entry;
      const failed = cell.state === "failed";
      const figure = failed ? undefined : (cell.value as Figure | undefined);
      const width = context.width();
      if (!drawn || drawn.value !== cell.value || drawn.width !== width || drawn.failed !== failed || failed) {
        // The place keeps its height while there is no drawing in it, so what stands below doesn't jump.
        if (live) content.style.minHeight = figure ? "" : `${content.offsetHeight}px`;
        content.replaceChildren(figure ? draw(figure, width) : emptyContent(context, cell));
        drawn = { value: cell.value, width, failed };
      }
      const file = idPart(cell.name);
      const data = figure?.drawing.data;
      const saves = [];
      if (data)
        saves.push({
          label: "numbers",
          describes: "save the numbers as CSV",
          save: () => saveText(document, `${file}.csv`, "text/csv", csvText(data)),
        });
      if (figure && drawing)
        saves.push({
          label: "drawing",
          describes: "save the drawing as SVG",
          save: () => {
            const text = drawing && svgText(drawing);
            if (text) saveText(document, `${file}.svg`, "image/svg+xml", text);
          },
        });
      for (const { label, extension, type, text } of figure?.drawing.files ?? [])
        saves.push({
          label,
          describes: `save as ${label} file`,
          save: () => saveText(document, `${file}.${extension}`, type, text()),
        });
      parts.update(
        entry,
        {
          title: figure?.title,
          caption: figure?.caption,
          foot: { basis: figure?.basis, words: figure?.drawing.alt, saves },
        },
        entry.notes,
        titleLevel(),
      );
    },
  };
}
