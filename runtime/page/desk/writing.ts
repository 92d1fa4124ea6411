// What the page writes through the desk: values kept, studies forked, notes and rationales written, cells changed.

import type { Desk, DeskAnswer, RationaleDraft } from "../../desk.ts";
import type { Rationale } from "../../shown.ts";
import type { CellView, Study } from "../../study.ts";
import { html } from "../dom.ts";
import { differs } from "../scale.ts";
import { type FormParts, writeForm } from "./form.ts";
import { numberAt, numberPaths } from "./numbers.ts";
import { rationaleInSource } from "./rationale-in-source.ts";
import { restedRows } from "./rested-rows.ts";

/** Offered by a page that has a desk; every act opens its form, or says at once what came of it. */
export interface Writing {
  /** where a form stands for the whole study: below the givens */
  readonly host: HTMLElement;
  /** a place for forms in the foot of a result */
  hostFor(cell: CellView): HTMLElement;
  keepGivens(): Promise<string>;
  undo(): Promise<string>;
  fork(): void;
  addNote(cell: CellView): void;
  addRationale(cell: CellView): void;
  editRationale(cell: string): void;
  agreeAgain(cell: string): void;
}

/** The name a reader signs with, kept by the browser for the next time. */
const signature = {
  get: (window: Window | null): string => {
    try {
      return window?.localStorage.getItem("hornbook-author") ?? "";
    } catch {
      return "";
    }
  },
  set: (window: Window | null, name: string): void => {
    try {
      window?.localStorage.setItem("hornbook-author", name);
    } catch {
      // a browser that keeps nothing asks again
    }
  },
};

/** The sentence of a write that was done. @throws {Error} with the sentence of one that wasn't */
async function done(answer: Promise<DeskAnswer>): Promise<string> {
  const found = await answer;
  if (found.ok) return found.sentence;
  throw new Error(found.sentence);
}

export function createWriting(document: Document, study: Study, desk: Desk): Writing {
  const window = document.defaultView;
  const host = newHost(document);
  const hosts = new Map<string, HTMLElement>();

  const open = (place: HTMLElement, make: (closed: FormParts["closed"]) => HTMLElement): void => {
    const form = make((sentence) => {
      const back = place.previousElementSibling?.querySelector("button");
      place.replaceChildren(...(sentence ? [html(document, "p", { class: "answer", role: "status" }, sentence)] : []));
      (back as HTMLElement | null | undefined)?.focus();
    });
    place.replaceChildren(form);
    form.querySelector<HTMLElement>("input, textarea, select, button")?.focus();
    form.scrollIntoView({ block: "nearest" });
  };
  const base = () => ({ base: study.source });
  const hostFor = (cell: CellView): HTMLElement => {
    let found = hosts.get(cell.name);
    if (!found) hosts.set(cell.name, (found = newHost(document)));
    return found;
  };
  /** where the forms of a rationale stand: in the foot of what it stands beside */
  const besideHost = (name: string): HTMLElement => {
    const beside = study.cell(name).beside;
    const place = beside === undefined ? undefined : hosts.get(beside);
    return place?.isConnected ? place : host;
  };
  const rationaleOf = (name: string) => study.cell(name).value as Rationale | undefined;

  const rationaleForm = (
    place: HTMLElement,
    details: {
      title: string;
      submit: string;
      draft: RationaleDraft;
      of: CellView;
      send: (draft: RationaleDraft, now: number[]) => Promise<DeskAnswer>;
    },
  ) => {
    const { draft } = details;
    const rows = restedRows(document, draft.numbers, numberPaths(study, details.of));
    open(place, (closed) =>
      writeForm(document, {
        title: details.title,
        fields: [
          { name: "decision", label: "What is decided", value: draft.decision, hint: "One sentence." },
          { name: "chosen", label: "Chosen", value: draft.chosen, hint: "The candidate, in the study's own word." },
          {
            name: "reasons",
            label: "Reasons",
            value: draft.reasons,
            lines: 5,
            // biome-ignore lint/suspicious/noTemplateCurlyInString: it is what the reader is to write
            hint: 'Markdown; a live number is written as ${show(trade.rows[2].gainDbi, "dBi", 1)}.',
          },
          { name: "author", label: "Who agrees", value: draft.author },
        ],
        inside: [rows.element],
        submit: details.submit,
        send: (values) => {
          const numbers = rows.read();
          const now = numbers.map(({ label, expression }) => {
            const value = numberAt(study, expression);
            if (value === undefined)
              throw new Error(
                `${label || "A number"} has no value now: ${expression || "nothing"} leads to no number.`,
              );
            return value;
          });
          signature.set(window, values.author ?? "");
          const written = { ...(values as unknown as RationaleDraft), numbers };
          return done(details.send(written, now));
        },
        closed,
      }),
    );
  };

  return {
    host,
    hostFor,
    keepGivens: () => {
      const texts = Object.fromEntries(study.givens.filter(differs).map(({ name, text }) => [name, text]));
      return done(desk.keepGivens({ ...base(), texts }));
    },
    undo: () => done(desk.undo(base())),
    fork: () =>
      open(host, (closed) =>
        writeForm(document, {
          title: "Fork this study for another dish",
          fields: [
            {
              name: "",
              label: "Name of the new study",
              hint: "Its title and its file's name. No file is overwritten.",
            },
            ...study.givens
              .filter(({ form }) => form !== "text")
              .map((given) => ({
                ...{ name: given.name, label: given.label, value: given.text },
                options: given.form === "choice" ? given.options : given.form === "switch" ? ["on", "off"] : undefined,
              })),
          ],
          submit: "write the fork",
          send: ({ "": name = "", ...entered }) => {
            const given = (of: string) => study.givens.find((one) => one.name === of)!;
            const texts = Object.fromEntries(
              Object.entries(entered).filter(([of, text]) => text !== given(of).defaultText),
            );
            if (name.trim() === "") throw new Error("The new study needs a name.");
            return done(desk.fork({ name, texts }));
          },
          closed,
        }),
      ),
    addNote: (cell) =>
      open(hostFor(cell), (closed) =>
        writeForm(document, {
          title: "A note after this result",
          fields: [
            {
              name: "markdown",
              label: "Note",
              lines: 4,
              // biome-ignore lint/suspicious/noTemplateCurlyInString: it is what the reader is to write
              hint: 'Markdown; a live number is written as ${show(requirement.feedTaperDb, "dB", 1)}.',
            },
          ],
          submit: "write it into the notebook",
          send: ({ markdown = "" }) => done(desk.addNote({ ...base(), after: cell.name, markdown })),
          closed,
        }),
      ),
    addRationale: (cell) =>
      rationaleForm(hostFor(cell), {
        title: "A rationale beside this result",
        submit: "agree and write it down",
        of: cell,
        draft: { decision: "", chosen: "", reasons: "", author: signature.get(window), numbers: [] },
        send: (draft, now) => desk.addRationale({ ...base(), beside: cell.name, draft, now }),
      }),
    editRationale: (name) => {
      const cell = study.cell(name);
      const written = rationaleInSource(cell.source, rationaleOf(name));
      rationaleForm(besideHost(name), {
        title: "The rationale's words and numbers",
        submit: "write the changes",
        of: study.cell(cell.beside ?? name),
        draft: { ...written, author: written.author || signature.get(window) },
        send: (draft, now) => desk.editRationale({ ...base(), cell: name, draft, now }),
      });
    },
    agreeAgain: (name) =>
      open(besideHost(name), (closed) => {
        const rationale = rationaleOf(name);
        const numbers = rationale?.numbers ?? [];
        return writeForm(document, {
          title: `Agree to the numbers as they are now: ${rationale?.decision ?? ""}`,
          fields: [{ name: "author", label: "Who agrees", value: signature.get(window) || rationale?.author }],
          submit: "agree",
          send: ({ author = "" }) => {
            const lost = numbers.find(({ now }) => now === null);
            if (lost) throw new Error(`${lost.label} has no value now, so there is nothing to agree to.`);
            signature.set(window, author);
            const now = Object.fromEntries(numbers.map(({ label, now: value }) => [label, value as number]));
            return done(desk.agreeAgain({ ...base(), cell: name, author, now }));
          },
          closed,
        });
      }),
  };
}

const newHost = (document: Document): HTMLElement => html(document, "div", { class: "write-here" });
