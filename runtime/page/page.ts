// The whole page as elements, for a browser and for a file alike.

import type { CellView } from "../study.ts";
import { codeNodes } from "./code.ts";
import { contentsList } from "./contents.ts";
import { holdChildren, html } from "./dom.ts";
import { type HeadPart, headPart } from "./head.ts";
import { leadBlock } from "./note.ts";
import type { Block, PageContext } from "./options.ts";
import { planStudy } from "./plan.ts";
import type { PlannedNote } from "./plan-entries.ts";
import { BlockStore, updateSection } from "./section.ts";
import { stateNote } from "./state-note.ts";

export interface Page {
  /** what goes into the root */
  readonly elements: HTMLElement[];
  readonly head: HeadPart;
  update(): void;
  dispose(): void;
}

/** The last line: where all this comes from, and the whole source one click away. */
function imprint(context: PageContext): { element: HTMLElement; update(): void } {
  const { document, study, options, live } = context;
  const source = html(document, "code");
  const pre = html(document, "pre", { tabindex: 0, role: "region", "aria-label": "source" }, source);
  const whole = html(
    document,
    "details",
    { class: "opens code", id: "code-whole" },
    html(document, "summary", {}, "source"),
    pre,
  );
  let shown = "";
  const fill = () => {
    if (shown === study.source) return;
    shown = study.source;
    source.replaceChildren(...codeNodes(document, shown));
  };
  whole.addEventListener("toggle", () => (whole as HTMLDetailsElement).open && fill());
  const said = [options.imprint, `Source ${study.file}.`].filter(Boolean).join(" ");
  const element = html(document, "footer", {}, html(document, "p", {}, said), live ? whole : undefined);
  return { element, update: () => live && shown && fill() };
}

export function buildPage(context: PageContext): Page {
  const { document, study, live, still } = context;
  const head = headPart(context);
  const state = stateNote(context);
  const contents = contentsList(context);
  const store = new BlockStore(context);
  const foot = imprint(context);
  const opening = html(document, "div", { class: "opening" });
  const skip = html(document, "a", { class: "skip", href: "#report" }, "Skip to the report");
  const report = html(document, "div", { id: "report", tabindex: -1 });
  const asleep =
    live || still
      ? undefined
      : html(
          document,
          "noscript",
          {},
          html(document, "p", { class: "asleep" }, "Scripts are off: the values below can be read, not turned."),
        );
  head.facts.before(state.element);
  const main = html(document, "main", {}, head.element, opening, report, foot.element);
  const sections = new Map<string, HTMLElement>();
  let lead: { cell: CellView; block: Block<{ cell: CellView; notes: readonly PlannedNote[] }> } | undefined;

  return {
    elements: live ? [skip, main, state.spoken] : [skip, main],
    head,
    update() {
      const plan = planStudy(study);
      head.update(plan.head);
      state.update();
      contents.update(plan.sections);
      if (!plan.lead) lead = undefined;
      else if (lead?.cell.name !== plan.lead.name)
        lead = { cell: plan.lead, block: leadBlock(context, { cell: plan.lead, notes: plan.leadNotes }) };
      if (lead && plan.lead) lead.block.update({ cell: plan.lead, notes: plan.leadNotes });
      holdChildren(opening, [contents.element, ...(lead ? [lead.block.element] : []), ...(asleep ? [asleep] : [])]);

      store.begin();
      const keys = new Set(plan.sections.map((section) => section.key));
      for (const key of sections.keys()) if (!keys.has(key)) sections.delete(key);
      const elements = plan.sections.map((section) => {
        const kept = sections.get(section.key) ?? html(document, "section");
        sections.set(section.key, kept);
        updateSection(context, store, kept, section);
        return kept;
      });
      store.end();
      holdChildren(report, elements);
      foot.update();
    },
    dispose: state.dispose,
  };
}
