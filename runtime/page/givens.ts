// The givens as a table, and what can be done with them all.

import type { GivenView } from "../study.ts";
import { holdChildren, html, setAttribute } from "./dom.ts";
import { type GivenRow, givenRow, givenShape } from "./given-row.ts";
import { marginNote, noteSignature } from "./margin.ts";
import type { Block, PageContext } from "./options.ts";
import type { GivensEntry } from "./plan-entries.ts";
import { differs } from "./scale.ts";
import { capital, countWord } from "./words.ts";

function differSentence(count: number): string {
  if (count === 0) return "All values are as in the file.";
  return count === 1 ? "One value differs from the file." : `${capital(countWord(count))} values differ from the file.`;
}

/** The line below the givens: keep, go back, and whatever else the page was given to do. */
function actionLine(context: PageContext): { element: HTMLElement; update(givens: readonly GivenView[]): void } {
  const { document, study, options, writing } = context;
  const said = html(document, "span", { class: "said", role: "status" });
  const changed = () => study.givens.filter(differs);
  const act = async (work: () => unknown) => {
    try {
      const sentence = await work();
      if (typeof sentence === "string") said.textContent = sentence;
    } catch (error) {
      said.textContent = error instanceof Error ? error.message : String(error);
    }
  };
  const button = (label: string, work: () => unknown, needsChange: boolean) => {
    const element = html(document, "button", { type: "button" }, label);
    element.addEventListener("click", () => {
      if (!needsChange || changed().length > 0) void act(work);
    });
    return { element, needsChange };
  };
  const { keep } = options;
  const kept = keep && (() => keep(Object.fromEntries(changed().map((given) => [given.name, given.text]))));
  const keeps = writing ? writing.keepGivens : kept;
  const buttons = [
    ...(keeps ? [button("Keep these values", keeps, true)] : []),
    button("Back to the values in the file", () => study.reset(), true),
    ...(writing
      ? [button("Undo the last write", writing.undo, false), button("Fork this study", () => writing.fork(), false)]
      : []),
    ...(options.actions ?? []).map((action) => button(action.label, action.act, false)),
  ];
  const line = html(document, "div", { class: "actions" }, ...buttons.map((each) => each.element), said);
  const element = writing ? html(document, "div", {}, line, writing.host) : line;
  let count = -1;
  return {
    element,
    update(givens) {
      const now = givens.filter(differs).length;
      // A button that has nothing to do stays in its place: taking it away would take the focus along.
      for (const { element: each, needsChange } of buttons)
        setAttribute(each, "aria-disabled", needsChange && now === 0 ? "true" : undefined);
      if (now !== count) said.textContent = differSentence(now);
      count = now;
    },
  };
}

export function givensBlock(context: PageContext): Block<GivensEntry> {
  const { document, study, still } = context;
  const column = (className: string, label: string, unseen = false) =>
    html(
      document,
      "th",
      { scope: "col", role: "columnheader", class: className },
      unseen ? html(document, "span", { class: "unseen" }, label) : label,
    );
  const head = html(
    document,
    "tr",
    { role: "row" },
    column("quantity", "Quantity"),
    column(still ? "value wide" : "value", "Value"),
    still ? undefined : column("turn", "Slider", true),
    column("why", "Why"),
  );
  const body = html(document, "tbody", { role: "rowgroup" });
  const table = html(
    document,
    "table",
    { role: "table", class: "givens" },
    html(document, "thead", { role: "rowgroup" }, head),
    body,
  );
  const actions = still ? undefined : actionLine(context);
  const element = html(document, "div", { class: "block given-table" });
  const rows = new Map<string, { row: GivenRow; shape: string }>();
  let loose: HTMLElement[] = [];
  let signature = "";

  return {
    element,
    update(entry) {
      const elements = entry.givens.map((given) => {
        const shape = givenShape(given);
        let kept = rows.get(given.name);
        if (!kept || kept.shape !== shape) rows.set(given.name, (kept = { row: givenRow(context, given), shape }));
        kept.row.update(
          given,
          entry.notes.filter((note) => note.row === given.name),
        );
        return kept.row.element;
      });
      holdChildren(body, elements);
      const others = entry.notes.filter((note) => note.row === undefined);
      const next = noteSignature(others);
      if (next !== signature) loose = others.map((note) => marginNote(context, note));
      signature = next;
      actions?.update(study.givens);
      holdChildren(element, [...loose, table, ...(actions && entry.last ? [actions.element] : [])]);
    },
  };
}
