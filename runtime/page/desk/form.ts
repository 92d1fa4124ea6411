// A form in the report column: labels over fields, one button that does it, one that leaves it, a sentence on what came of it.

import { html } from "../dom.ts";

export interface FormField {
  name: string;
  label: string;
  value?: string;
  /** a sentence below the field */
  hint?: string;
  /** several lines of text */
  lines?: number;
  /** id of a datalist of proposals */
  list?: string;
  options?: readonly string[];
}

export interface FormParts {
  title: string;
  fields: readonly FormField[];
  /** what stands between the fields and the buttons */
  inside?: readonly HTMLElement[];
  submit: string;
  /** does the work; a sentence closes the form, a thrown error's sentence keeps it open */
  send: (values: Record<string, string>) => Promise<string>;
  /** the form is away: the sentence that remains, none if it was left */
  closed: (sentence?: string) => void;
}

let count = 0;

/** One labelled field. */
export function formField(document: Document, field: FormField): { element: HTMLElement; input: HTMLInputElement } {
  const id = `write-${++count}`;
  const described = field.hint ? `${id}-hint` : undefined;
  const attributes = { id, name: field.name, "aria-describedby": described, autocomplete: "off" };
  const input = (
    field.options
      ? html(document, "select", attributes, ...field.options.map((option) => html(document, "option", {}, option)))
      : field.lines
        ? html(document, "textarea", { ...attributes, rows: field.lines, spellcheck: true })
        : html(document, "input", { ...attributes, type: "text", list: field.list })
  ) as HTMLInputElement;
  input.value = field.value ?? "";
  const element = html(
    document,
    "div",
    { class: "entry" },
    html(document, "label", { for: id }, field.label),
    input,
    field.hint ? html(document, "p", { class: "hint", id: described }, field.hint) : undefined,
  );
  return { element, input };
}

/** The form, ready to stand in the page; its first field takes the focus once it does. */
export function writeForm(document: Document, parts: FormParts): HTMLFormElement {
  const fields = parts.fields.map((field) => ({ name: field.name, ...formField(document, field) }));
  const said = html(document, "p", { class: "answer", role: "alert" });
  const submit = html(document, "button", { type: "submit" }, parts.submit);
  const leave = html(document, "button", { type: "button" }, "leave it");
  const form = html(
    document,
    "form",
    { class: "writing", "aria-label": parts.title, novalidate: true },
    html(document, "p", { class: "title" }, parts.title),
    ...fields.map(({ element }) => element),
    ...(parts.inside ?? []),
    html(document, "p", { class: "acts" }, submit, " ", leave),
    said,
  );
  let sending = false;
  form.addEventListener("submit", (event) => {
    event.preventDefault();
    if (sending) return;
    sending = true;
    submit.setAttribute("aria-disabled", "true");
    const values = Object.fromEntries(fields.map(({ name, input }) => [name, input.value]));
    parts
      .send(values)
      .then((sentence) => parts.closed(sentence))
      .catch((error: unknown) => {
        said.textContent = error instanceof Error ? error.message : String(error);
      })
      .finally(() => {
        sending = false;
        submit.removeAttribute("aria-disabled");
      });
  });
  leave.addEventListener("click", () => parts.closed());
  form.addEventListener("keydown", (event) => {
    if (event.key !== "Escape") return;
    event.preventDefault();
    parts.closed();
  });
  return form;
}
