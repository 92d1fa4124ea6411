// One given: quantity, value, slider, reason; "was …" where it differs from the file, a sentence where an entry was refused.

import type { GivenView } from "../study.ts";
import { html, nameId, setAttribute, showWhen } from "./dom.ts";
import { type Field, field } from "./field.ts";
import { letterMarks, noteSignature } from "./margin.ts";
import type { PageContext } from "./options.ts";
import type { PlannedNote } from "./plan-entries.ts";
import { phrase } from "./prose.ts";
import { differs } from "./scale.ts";
import { slider } from "./slider.ts";
import { notesCell } from "./table.ts";
import { typeset } from "./typography.ts";

export interface GivenRow {
  readonly element: HTMLElement;
  update(given: GivenView, notes: readonly PlannedNote[]): void;
}

/** What of a given, when it changes, asks for another row. */
export function givenShape(given: GivenView): string {
  return JSON.stringify([given.name, given.form, given.label, given.options]);
}

export function givenRow(context: PageContext, first: GivenView): GivenRow {
  const { document, still } = context;
  const { name } = first;
  const id = `given-${nameId(name)}`;
  const enter = (text: string) => context.enter(name, text);
  const control: Field = field(context, first, id, enter);
  const marks = html(document, "span");
  const label = still ? html(document, "span") : html(document, "label", { for: id });
  const was = html(document, "span", { class: "was" });
  const refusal = html(document, "p", { class: "refusal", id: `${id}-refusal`, "aria-live": "polite" });
  const why = html(document, "span");
  const turn = first.form === "quantity" && !still ? slider(context, first, enter) : undefined;
  const wide = !turn;
  const labelCell = html(document, "th", { scope: "row", role: "rowheader" }, label, marks);
  const cells = [
    labelCell,
    html(document, "td", { role: "cell", class: wide ? "value wide" : "value" }, control.element, was),
    ...(turn ? [html(document, "td", { role: "cell", class: "turn" }, turn.element)] : []),
    html(document, "td", { role: "cell", class: "why" }, refusal, why),
  ];
  const element = html(
    document,
    "tr",
    { role: "row", id: `row-${nameId(name)}`, "data-row": name, "data-form": first.form },
    ...cells,
  );
  const input = ["input", "textarea", "select"].includes(control.element.localName)
    ? control.element
    : control.element.querySelector("input, textarea");
  let signature = "";

  return {
    element,
    update(given, notes) {
      control.update(given);
      const changed = differs(given);
      turn?.update(given, changed);
      if (label.textContent !== given.label) label.replaceChildren(...phrase(document, given.label));
      const short = given.defaultText.length <= 40 && !given.defaultText.includes("\n");
      was.textContent = changed ? (short ? `was ${typeset(given.defaultText)}` : "differs from the file") : "";
      showWhen(was, changed);
      const stands = given.text.length <= 40 ? typeset(given.text) : "The value before";
      const said = given.refusal ? `${given.refusal.message.replace(/[.\s]+$/, "")}. ${stands} stands.` : "";
      if (refusal.textContent !== said) refusal.textContent = said;
      if (why.textContent !== given.why) why.replaceChildren(...phrase(document, given.why));
      if (input) {
        setAttribute(input, "aria-invalid", given.refusal ? "true" : undefined);
        setAttribute(input, "aria-describedby", given.refusal ? `${id}-refusal` : undefined);
      }
      const next = noteSignature(notes);
      if (next === signature) return;
      signature = next;
      marks.replaceChildren(...letterMarks(document, notes));
      element.querySelector(".notes")?.remove();
      if (notes.length > 0) element.prepend(notesCell(context, notes));
    },
  };
}
