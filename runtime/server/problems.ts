// What the page says above the study when the file as saved can't be used, or the server is gone. Text only.

import type { ProblemPlace } from "./open-state.ts";

export interface ProblemPanel {
  /** @param kept true: the study below is the last good version */
  show(places: readonly ProblemPlace[], kept: boolean): void;
  away(away: boolean): void;
}

export function problemPanel(document: Document, before: Element): ProblemPanel {
  const panel = document.createElement("section");
  panel.id = "hornbook-problems";
  panel.setAttribute("role", "alert");
  const lost = document.createElement("p");
  lost.id = "hornbook-away";
  lost.setAttribute("role", "status");
  lost.textContent = "The local server has stopped: the study goes on, but saves are no longer followed.";
  return {
    show(places, kept) {
      if (places.length === 0) return panel.remove();
      const heading = document.createElement("h2");
      heading.textContent = kept ? "The file as saved can’t be used" : "The notebook can’t be used yet";
      const list = document.createElement("ul");
      for (const { file, line, text } of places) {
        const item = document.createElement("li");
        const where = document.createElement("code");
        where.textContent = line > 0 ? `${file}:${line}` : file;
        item.append(where, ` ${text}`);
        list.append(item);
      }
      const rest = document.createElement("p");
      rest.textContent = kept
        ? "Below is the study as it was before. It is taken up again at the next save."
        : "It is shown as soon as it is saved whole.";
      panel.replaceChildren(heading, list, rest);
      before.before(panel);
    },
    away(away) {
      if (away) before.before(lost);
      else lost.remove();
    },
  };
}
