// A cell's source in an editor on the page. Only the page that `open` serves holds it; loaded when a cell is first opened.

import { defaultKeymap, history, historyKeymap, indentWithTab } from "@codemirror/commands";
import { javascript } from "@codemirror/lang-javascript";
import { bracketMatching, indentOnInput, indentUnit } from "@codemirror/language";
import { type Diagnostic, setDiagnostics } from "@codemirror/lint";
import { EditorState } from "@codemirror/state";
import { drawSelection, EditorView, keymap, lineNumbers } from "@codemirror/view";
import type { Desk } from "../desk.ts";
import type { CellView, Study } from "../study.ts";

/** Quiet as the rest of the page: ink on paper, no colours but the comment's and the fault's. */
const look = EditorView.theme({
  "&": { border: "1px solid #8d9195", fontSize: "13px", backgroundColor: "#fdfcf9", color: "#1f2a33" },
  "&.cm-focused": { outline: "2px solid #1f2a33", outlineOffset: "1px" },
  ".cm-scroller": { fontFamily: "ui-monospace, Menlo, Consolas, 'Liberation Mono', monospace", lineHeight: "19px" },
  ".cm-gutters": { backgroundColor: "#fdfcf9", color: "#616b75", border: "0" },
  ".cm-diagnostic": { color: "#8a3800", borderLeft: "2px solid #8a3800", fontFamily: "sans-serif" },
});

/**
 * Opens an editor in `host`. Ctrl+S or Cmd+S writes the cell into the file; Escape leaves, asking once if something would be lost.
 * The editor stands in a shadow tree, whose style sheets the page's policy lets it adopt.
 */
export function openCellEditor(host: HTMLElement, cell: CellView, study: Study, desk: Desk): void {
  const { ownerDocument: document } = host;
  const base = study.source;
  const before = cell.source;
  const place = document.createElement("div");
  const root = place.attachShadow({ mode: "open" });
  const said = document.createElement("p");
  said.className = "answer";
  said.setAttribute("role", "status");
  const button = (label: string, act: () => void) => {
    const element = document.createElement("button");
    element.type = "button";
    element.textContent = label;
    element.addEventListener("click", act);
    return element;
  };
  let sure = false;
  const changed = () => view.state.doc.toString() !== before;
  const leave = () => {
    if (changed() && !sure) {
      sure = true;
      said.textContent = "What you wrote isn't saved. Leave it once more to drop it.";
      return;
    }
    host.replaceChildren();
    host.closest("details")?.querySelector("summary")?.focus();
  };
  const save = async () => {
    said.textContent = "Writing …";
    const source = view.state.doc.toString();
    // the version the editor was opened on, unless the file on the page is still the same cell: then the newest
    const now = study.cells.find(({ name }) => name === cell.name);
    const answer = await desk.replaceCell({
      base: now?.source === before ? study.source : base,
      cell: cell.name,
      source,
    });
    if (answer.ok) {
      host.replaceChildren();
      host.append(Object.assign(document.createElement("p"), { className: "answer", textContent: answer.sentence }));
      return;
    }
    said.textContent = answer.kept ? `${answer.sentence} What you wrote stays here.` : answer.sentence;
    if (answer.line !== undefined) markLine(answer.line - firstLine, answer.sentence);
  };
  const firstLine = cell.line - before.slice(0, leadingLength(before)).split("\n").length + 1;
  const markLine = (index: number, message: string) => {
    const line = view.state.doc.line(Math.min(Math.max(1, index + 1), view.state.doc.lines));
    const fault: Diagnostic = { from: line.from, to: Math.max(line.to, line.from + 1), severity: "error", message };
    fault.to = Math.min(fault.to, view.state.doc.length);
    view.dispatch(setDiagnostics(view.state, [fault]), { selection: { anchor: line.from }, scrollIntoView: true });
    view.focus();
  };
  const view = new EditorView({
    parent: root,
    root,
    state: EditorState.create({
      doc: before,
      extensions: [
        lineNumbers({ formatNumber: (line) => String(line + firstLine - 1) }),
        history(),
        drawSelection(),
        bracketMatching(),
        indentOnInput(),
        indentUnit.of("  "),
        javascript({ typescript: true }),
        EditorView.lineWrapping,
        EditorView.contentAttributes.of({ "aria-label": `source of ${cell.name}` }),
        keymap.of([
          { key: "Mod-s", preventDefault: true, run: handled(() => void save()) },
          { key: "Escape", run: handled(leave) },
          ...defaultKeymap,
          ...historyKeymap,
          indentWithTab,
        ]),
        EditorView.updateListener.of((update) => {
          if (update.docChanged) sure = false;
        }),
        look,
      ],
    }),
  });
  const acts = document.createElement("p");
  acts.className = "acts";
  acts.append(
    button("save into the file", () => void save()),
    " ",
    button("leave it", leave),
  );
  const hint = document.createElement("p");
  hint.className = "hint";
  hint.textContent = "Ctrl+S or ⌘S saves, Esc leaves. Tab indents; Esc then Tab moves on.";
  host.replaceChildren(place, acts, hint, said);
  view.focus();
}

/** A key's work, after which no other binding of the key is asked. */
const handled = (act: () => void) => () => {
  act();
  return true;
};

/** Characters of the comment that leads a cell. */
function leadingLength(source: string): number {
  return /^(?:\s*(?:\/\/[^\n]*\n|\/\*[\s\S]*?\*\/\s*))*/.exec(source)?.[0].length ?? 0;
}
