// The compiled module: the source edited in place, so that every line stays on its line, and a table of cells after its last.

import type { Draft, ModuleDraft } from "./draft.ts";
import { isVocabularyModule } from "./known-globals.ts";
import type { CellDraft, CheckedModule } from "./parts.ts";
import { identifierName, type Node } from "./syntax.ts";

interface Edit {
  start: number;
  end: number;
  text: string;
}

export function emitModule(file: string, source: string, module: ModuleDraft, checked: CheckedModule): string {
  const prefix = freshPrefix(source);
  const edits: Edit[] = module.blanks.map((node) => ({
    start: node.start,
    end: node.end,
    text: blank(source, node.start, node.end),
  }));
  const defines = new Map<Draft, string>();
  const byStatement = new Map<Node, Draft[]>();
  for (const draft of module.drafts) {
    const drafts = byStatement.get(draft.statement) ?? [];
    byStatement.set(draft.statement, drafts);
    drafts.push(draft);
  }
  const whole = new Map(checked.cells.filter((cell) => cell.part === undefined).map((cell) => [cell.draft, cell]));
  for (const [statement, drafts] of byStatement) {
    const cells = drafts.map((draft) => whole.get(draft) as CellDraft);
    if (drafts.every((draft, i) => draft.form === "bad" || cells[i]?.problem !== undefined)) {
      edits.push({ start: statement.start, end: statement.end, text: blank(source, statement.start, statement.end) });
      continue;
    }
    drafts.forEach((draft, i) => {
      const place = `${statement.loc.start.line}${i === 0 ? "" : `_${i}`}`;
      defines.set(draft, `${prefix}${place}_${label(draft)}`);
    });
    edits.push(...statementEdits(source, statement, drafts, cells, defines, module));
  }
  return applied(source, edits) + table(file, source, checked, defines, prefix);
}

/** Each declaration keeps its text and becomes the body of a function of the cells it reads, which returns what it declares. */
function statementEdits(
  source: string,
  statement: Node,
  drafts: readonly Draft[],
  cells: readonly CellDraft[],
  defines: ReadonlyMap<Draft, string>,
  module: ModuleDraft,
): Edit[] {
  const edits: Edit[] = [];
  let from = statement.start;
  drafts.forEach((draft, i) => {
    const cell = cells[i] as CellDraft;
    const parameters = [...cell.inputs, ...(cell.background ? [backgroundAlias(module)] : [])].join(", ");
    const opening = `${i === 0 ? "const " : ", "}${defines.get(draft)} = ${draft.free.awaits ? "async " : ""}(${parameters}) => {`;
    const { start, end } = textRange(draft);
    const keyword =
      draft.form === "const" || draft.form === "parts" ? " const " : draft.form === "expression" ? " return (" : " ";
    edits.push({ start: from, end: start, text: opening + blank(source, from, start) + keyword });
    if (cell.problem !== undefined) edits.push({ start, end, text: blank(source, start, end).replace(/^/, "_ = 0") });
    if (cell.declareAt !== undefined && cell.problem === undefined) {
      edits.push({ start: cell.declareAt, end: cell.declareAt, text: ".declare" });
    }
    edits.push({ start: end, end, text: closing(draft) });
    from = end;
  });
  // What is left of the statement is its semicolon, if it was written.
  edits.push({ start: from, end: statement.end, text: `;${blank(source, from, statement.end)}` });
  return edits;

  function textRange(draft: Draft): { start: number; end: number } {
    if (draft.form !== "expression") return draft.node;
    const end = source[statement.end - 1] === ";" ? statement.end - 1 : statement.end;
    return { start: statement.start, end };
  }
}

function closing(draft: Draft): string {
  switch (draft.form) {
    case "expression":
      return "); }";
    case "parts":
      return `; return { ${draft.binds.map(identifierName).join(", ")} }; }`;
    default:
      return `; return ${identifierName(draft.binds[0])}; }`;
  }
}

function backgroundAlias(module: ModuleDraft): string {
  for (const [local, { imported, specifier }] of module.imports) {
    if (imported === "background" && isVocabularyModule(specifier)) return local;
  }
  return "background";
}

/** The cells, in source order, and the functions a worker may be asked for. */
function table(
  file: string,
  source: string,
  checked: CheckedModule,
  defines: ReadonlyMap<Draft, string>,
  prefix: string,
): string {
  const text = `${prefix}source`;
  const cells = checked.cells.map(({ draft, part, declareAt: _, ...info }) => {
    const define =
      info.problem !== undefined
        ? `() => { throw new Error(${JSON.stringify(info.problem)}); }`
        : part !== undefined
          ? `(whole) => whole[${JSON.stringify(part)}]`
          : defines.get(draft);
    return `{ ...${JSON.stringify(info)}, source: ${text}.slice(${draft.sourceStart}, ${draft.sourceEnd}), define: ${define} }`;
  });
  const { imports, cells: names } = checked.backgroundFunctions;
  const functions = [
    ...imports.map((name) => `${JSON.stringify(name)}: ${name}`),
    ...names.map((name) => `${JSON.stringify(name)}: (...args) => ${prefix}plain(${JSON.stringify(name)})(...args)`),
  ];
  const lines = [
    `const ${text} = ${JSON.stringify(source)};`,
    `const ${prefix}cells = [\n${cells.map((cell) => `  ${cell},`).join("\n")}\n];`,
    ...(names.length
      ? [
          `const ${prefix}plain = (name) => { const cell = ${prefix}cells.find((one) => one.name === name); return cell.define(...cell.inputs.map(${prefix}plain)); };`,
        ]
      : []),
    `const ${prefix}notebook = { file: ${JSON.stringify(file)}, source: ${text}, cells: ${prefix}cells, backgroundFunctions: { ${functions.join(", ")} } };`,
    `export { ${prefix}notebook as notebook };`,
  ];
  return `${source === "" || source.endsWith("\n") ? "" : "\n"}${lines.join("\n")}\n`;
}

/** A prefix that no name of the source begins with; a digit follows it, so that it collides with no name made from one. */
function freshPrefix(source: string): string {
  let prefix = "cell$";
  while (source.includes(prefix)) prefix += "$";
  return prefix;
}

const label = (draft: Draft): string =>
  draft.form === "parts" ? "parts" : draft.name.replace(/[^\w$\u00aa-\uffff]/g, "");

/** Only the line breaks of a stretch of source. */
const blank = (source: string, start: number, end: number): string =>
  source.slice(start, end).replace(/[^\r\n\u2028\u2029]+/g, "");

function applied(source: string, edits: readonly Edit[]): string {
  let out = "";
  let at = 0;
  for (const { start, end, text } of [...edits].sort((a, b) => a.start - b.start || a.end - b.end)) {
    out += source.slice(at, start) + text;
    at = end;
  }
  return out + source.slice(at);
}
