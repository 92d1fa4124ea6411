// Draws every figure of a study without a browser, at the widths of a desk and of a phone, and looks at what came out.

import { isShown } from "../runtime/shown.ts";
import type { Study } from "../runtime/study.ts";
import { headlessDocument } from "./make-export.ts";

export const DRAWN_WIDTHS = [760, 354];

export interface FigureFinding {
  cell: string;
  line: number;
  text: string;
}

/** How many figures there are, and what is wrong with them. */
export function checkFigures(study: Study): { count: number; findings: FigureFinding[] } {
  const document = headlessDocument();
  const findings: FigureFinding[] = [];
  let count = 0;
  for (const { name, line, state, value } of study.cells) {
    if (state === "failed" || !isShown(value) || value.shows !== "figure") continue;
    count++;
    const tell = (text: string) => findings.push({ cell: name, line, text });
    if (value.drawing.alt.trim() === "") tell("has no text alternative");
    if (value.caption.trim() === "") tell("has no caption");
    for (const width of DRAWN_WIDTHS) {
      try {
        const { outerHTML } = value.drawing.draw({ document, width });
        const odd = outerHTML.match(/[^<>"]{0,30}\b(NaN|Infinity|undefined)\b[^<>"]{0,20}/)?.[0].trim();
        if (odd !== undefined) tell(`at ${width} px it holds "${odd}"`);
        else if (!outerHTML.includes("<svg")) tell(`at ${width} px it isn't a drawing`);
      } catch (error) {
        tell(`can't be drawn at ${width} px: ${error instanceof Error ? error.message : String(error)}`);
      }
    }
  }
  return { count, findings };
}
