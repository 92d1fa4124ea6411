// The state of the study in a sentence, in the margin of the head; spoken, too, when it has come to rest.

import { html, setAttribute, showWhen } from "./dom.ts";
import { placeId } from "./frame.ts";
import { shownKind } from "./kind.ts";
import type { PageContext } from "./options.ts";
import { firstShownReader } from "./readers.ts";
import { countStates, rationaleSentence, stateDetail, stateSentence } from "./words.ts";

/** How long a study must rest before its state is spoken, ms. */
const rest = 1200;

export interface StateNote {
  readonly element: HTMLElement;
  /** heard by a screen reader only */
  readonly spoken: HTMLElement;
  update(): void;
  dispose(): void;
}

export function stateNote(context: PageContext): StateNote {
  const { document, study, live } = context;
  const sentence = html(document, "p", { class: "sentence" });
  const detail = html(document, "p");
  const link = html(document, "a", { href: "#" });
  const go = html(document, "p", {}, link);
  const element = html(
    document,
    "aside",
    { class: "beside state-of-study", "aria-label": "State of this study" },
    html(document, "p", { class: "sort" }, "State of this study"),
    sentence,
    detail,
    go,
  );
  const spoken = html(document, "p", { class: "unseen", role: "status" });
  let timer: ReturnType<typeof setTimeout> | undefined;
  let last: string | undefined;

  /** Where the first thing stands that isn't current; a failure speaks louder than a wait. */
  const worst = (): { id: string; words: string } | undefined => {
    for (const [state, words] of [
      ["failed", "failed"],
      ["behind", "behind"],
      ["working", "working"],
    ] as const) {
      const cell = study.cells.find(
        (candidate) => candidate.state === state && candidate.role === "value" && !candidate.hidden,
      );
      if (!cell) continue;
      const kind = shownKind(cell);
      const place =
        kind && kind !== "margin" && kind !== "head" ? cell : (firstShownReader(study.cells, cell.name) ?? cell);
      return {
        id: placeId(place.name),
        words: `Go to the first that ${state === "failed" ? "has failed" : `is ${words}`}`,
      };
    }
    return undefined;
  };

  return {
    element,
    spoken,
    update() {
      const count = countStates(study.cells);
      const said = [stateSentence(count), rationaleSentence(study.cells)].filter(Boolean).join(" ");
      if (sentence.textContent !== said) sentence.textContent = said;
      detail.textContent = stateDetail(count);
      const place = worst();
      showWhen(go, place !== undefined);
      if (place) {
        setAttribute(link, "href", `#${place.id}`);
        link.textContent = place.words;
      }
      if (!live) return;
      last ??= said;
      clearTimeout(timer);
      timer = setTimeout(() => {
        if (said !== last) spoken.textContent = said;
        last = said;
      }, rest);
    },
    dispose: () => clearTimeout(timer),
  };
}
