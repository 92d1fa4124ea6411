// Where a given is entered: a quantity or short text in a line, a choice, a switch, a long text or a file.

import type { GivenView } from "../study.ts";
import { html, setAttribute } from "./dom.ts";
import type { PageContext } from "./options.ts";
import { plain, typeset } from "./typography.ts";

export interface Field {
  readonly element: HTMLElement;
  update(given: GivenView): void;
}

/** Characters that a file for a text given may have; more is refused before it is read. */
const fileLimit = 4_000_000;

type Enter = (text: string) => void;

function typed(
  context: PageContext,
  given: GivenView,
  enter: Enter,
  input: HTMLInputElement | HTMLTextAreaElement,
): Field["update"] {
  let now = given;
  // A line of text keeps what it holds as it is; a quantity is shown with a printer's signs and read with a parser's.
  const shown = (text: string) => (given.form === "quantity" ? typeset(text) : text);
  const read = () => (given.form === "quantity" ? plain(input.value) : input.value);
  const commit = () => {
    const text = read();
    const before = now.refusal?.entered ?? now.text;
    if (text !== (given.form === "quantity" ? plain(before) : before)) enter(text);
  };
  const multiline = input.localName === "textarea";
  input.addEventListener("keydown", (event) => {
    const { key, ctrlKey, metaKey } = event as KeyboardEvent;
    if (key === "Enter" && (!multiline || ctrlKey || metaKey)) {
      event.preventDefault();
      commit();
    } else if (key === "Escape") {
      input.value = shown(now.text);
      if (now.refusal) enter(now.text);
    }
  });
  input.addEventListener("change", commit);
  return (next) => {
    const before = now.refusal?.entered ?? now.text;
    now = next;
    const after = next.refusal?.entered ?? next.text;
    if (!context.live) {
      if (multiline) input.textContent = after;
      else setAttribute(input, "value", shown(after));
    } else if (input.ownerDocument.activeElement !== input || before !== after || input.value === "") {
      if (input.value !== shown(after)) input.value = shown(after);
    }
  };
}

function choice(context: PageContext, given: GivenView, id: string, enter: Enter): Field {
  const { document, live } = context;
  const options = (given.options ?? []).map((option) => html(document, "option", { value: option }, option));
  const element = html(document, "select", { id, disabled: !live }, ...options);
  element.addEventListener("change", () => enter(element.value));
  return {
    element,
    update({ text }) {
      for (const option of options)
        setAttribute(option, "selected", option.getAttribute("value") === text ? "" : undefined);
      if (live && element.value !== text) element.value = text;
    },
  };
}

function switched(context: PageContext, id: string, enter: Enter): Field {
  const { document, live } = context;
  const box = html(document, "input", { type: "checkbox", id, disabled: !live });
  const word = html(document, "span");
  box.addEventListener("change", () => enter(box.checked ? "on" : "off"));
  return {
    element: html(document, "span", { class: "switch" }, box, word),
    update({ value, text }) {
      const on = typeof value === "boolean" ? value : text === "on";
      setAttribute(box, "checked", on ? "" : undefined);
      if (live) box.checked = on;
      word.textContent = on ? "on" : "off";
    },
  };
}

function longText(context: PageContext, given: GivenView, id: string, enter: Enter): Field {
  const { document, live } = context;
  const area = html(document, "textarea", { id, rows: 4, spellcheck: "false", readonly: !live, wrap: "off" });
  const update = typed(context, given, enter, area);
  const pick = html(document, "input", { type: "file", "aria-label": `${given.label}, from a file`, disabled: !live });
  const said = html(document, "span", { class: "said", role: "status" });
  pick.addEventListener("change", async () => {
    const file = pick.files?.[0];
    pick.value = "";
    if (!file) return;
    const tooLong = file.size > fileLimit;
    said.textContent = tooLong ? `${file.name} has ${file.size} bytes; at most ${fileLimit} are read.` : file.name;
    if (!tooLong) enter(await file.text());
  });
  return { element: html(document, "span", { class: "long" }, area, pick, said), update };
}

/** The control of a given; `enter` hears what was committed. */
export function field(context: PageContext, given: GivenView, id: string, enter: Enter): Field {
  const { document, live, still } = context;
  if (still) {
    const element = html(document, "span", { class: given.text.includes("\n") ? "fixed text" : "fixed" });
    return {
      element,
      update: ({ text, value, form }) =>
        (element.textContent = form === "switch" ? (value === true ? "on" : "off") : typeset(text)),
    };
  }
  if (given.form === "choice") return choice(context, given, id, enter);
  if (given.form === "switch") return switched(context, id, enter);
  if (
    given.form === "text" &&
    (given.defaultText.includes("\n") || given.text.includes("\n") || given.text.length > 60)
  )
    return longText(context, given, id, enter);
  const input = html(document, "input", {
    type: "text",
    id,
    autocomplete: "off",
    spellcheck: "false",
    readonly: !live,
  });
  return { element: input, update: typed(context, given, enter, input) };
}
