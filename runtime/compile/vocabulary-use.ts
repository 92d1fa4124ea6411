// What a cell's calls into the vocabulary say before anything runs: it is a given, it stands beside a cell, it works in the background.

import type { ModuleDraft } from "./draft.ts";
import { isVocabularyModule } from "./known-globals.ts";
import type { CellDraft, Report } from "./parts.ts";
import { child, children, identifierName, memberPath, type Node, rootIdentifier, unwrapped } from "./syntax.ts";

const GIVEN_FORMS = new Set(["given", "given.choice", "given.switch", "given.text"]);

export function vocabularyUse(
  cell: CellDraft,
  byName: ReadonlyMap<string, CellDraft>,
  module: ModuleDraft,
  report: Report,
  functions: { imports: Set<string>; cells: Set<string> },
): void {
  const { draft } = cell;
  const init = draft.form === "const" ? child(draft.node, "init") : undefined;
  const declaration = init ? unwrapped(init) : undefined;
  const placed = new Set<Node>();
  for (const call of draft.free.calls) {
    const callee = child(call, "callee") as Node;
    const word = vocabularyWord(memberPath(callee), cell, module);
    if (word === undefined) continue;
    const root = rootIdentifier(callee) as Node;
    if (GIVEN_FORMS.has(word)) {
      placed.add(root);
      if (call === declaration) declareGiven(cell, call, callee, report);
      else report("given", `${word}(…) must be alone as the value of a top-level const`, call, cell);
    } else if (word === "margin") {
      placeMargin(cell, call, byName, report, word);
    } else if (word === "rationale") {
      if (call !== declaration)
        report("margin", "rationale(…) must be alone as the value of a top-level const", call, cell);
      else placeMargin(cell, call, byName, report, word);
    } else if (word === "background") {
      placed.add(root);
      if (root !== unwrapped(callee)) report("background", "background must be imported by its own name", call, cell);
      noteBackground(cell, call, byName, module, report, functions);
    }
  }
  for (const { name, node } of draft.free.references) {
    const word = placed.has(node) ? undefined : vocabularyWord([name], cell, module);
    if (word === "given" || word === "background") report(word, `${name} must be called where it stands`, node, cell);
  }
}

/** "given.choice" for a path that leads into the vocabulary, by whatever local name; undefined for any other. */
function vocabularyWord(path: string[] | undefined, cell: CellDraft, module: ModuleDraft): string | undefined {
  const [root, ...rest] = path ?? [];
  if (root === undefined || cell.inputs.includes(root)) return undefined;
  const found = module.imports.get(root);
  if (!found || !isVocabularyModule(found.specifier)) return undefined;
  return (found.imported === "*" ? rest : [found.imported, ...rest]).join(".");
}

function declareGiven(cell: CellDraft, call: Node, callee: Node, report: Report): void {
  cell.role = "given";
  cell.declareAt = unwrapped(callee).end;
  if (cell.inputs.length) {
    const read = cell.inputs.join(", ");
    report(
      "given",
      `${cell.name} is a given, so it can't depend on ${read}; write its default and limits out`,
      call,
      cell,
    );
  }
  if (cell.draft.free.awaits) report("given", `${cell.name} is a given, so it can't await anything`, call, cell);
}

function placeMargin(
  cell: CellDraft,
  call: Node,
  byName: ReadonlyMap<string, CellDraft>,
  report: Report,
  word: string,
): void {
  const argument = children(call, "arguments")[0];
  const root = argument && rootIdentifier(argument);
  const name = identifierName(root);
  if (root && cell.inputs.includes(name) && byName.has(name)) cell.beside ??= name;
  else report("margin", `${word}(…) must name the cell it stands beside as its first argument`, argument ?? call, cell);
}

function noteBackground(
  cell: CellDraft,
  call: Node,
  byName: ReadonlyMap<string, CellDraft>,
  module: ModuleDraft,
  report: Report,
  functions: { imports: Set<string>; cells: Set<string> },
): void {
  cell.background = true;
  const argument = children(call, "arguments")[0];
  const path = argument && memberPath(argument);
  const name = path?.[0] ?? "";
  const local = path?.length === 1;
  const free =
    argument !== undefined && cell.draft.free.references.some(({ node }) => node === rootIdentifier(argument));
  const asCell = free && local ? byName.get(name) : undefined;
  if (asCell) functions.cells.add(name);
  else if (free && module.imports.has(name) && (local || module.imports.get(name)?.imported === "*")) {
    functions.imports.add((path as string[]).join("."));
  } else {
    report(
      "background",
      "background(…) must be given the name of an imported function, or of a function of this notebook, as its first argument",
      argument ?? call,
      cell,
    );
  }
}
