// A module's statements as drafts of cells: what each one binds, what it reads, where it stands. Rules are checked afterwards.
import { boundNames } from "./declared-names.ts";
import { type FreeNames, freeNames } from "./scope.ts";
import { type Comment, child, children, field, identifierName, type Node, type ParsedModule } from "./syntax.ts";

export interface Import {
  specifier: string;
  /** exported name, "default" or "*" */
  imported: string;
  node: Node;
}

export interface Draft {
  /** whole: one name or one value; parts: a destructuring, whose names become cells of their own; bad: can't be a cell */
  form: "const" | "parts" | "function" | "class" | "expression" | "bad";
  /** cell name; for parts the hidden cell's */
  name: string;
  /** names it makes known to others, with their nodes */
  binds: Node[];
  /** place in the order of definition */
  order: number;
  /** the statement as it stands in the module, `export` included */
  statement: Node;
  /** the declarator, function, class or expression itself */
  node: Node;
  free: FreeNames;
  /** 1-based line and column of the cell, its last line */
  line: number;
  column: number;
  endLine: number;
  /** the statement with the comment that leads it: offsets in the source, and the line where that begins */
  sourceStart: number;
  sourceEnd: number;
  sourceLine: number;
  /** form "bad": why, in one sentence that follows the place */
  refusal?: string;
}

export interface ModuleDraft {
  drafts: Draft[];
  imports: Map<string, Import>;
  /** names that `declare` says exist, and types: no cells, and no unknown names either */
  ambient: Set<string>;
  /** statements that vanish: re-exports, overload signatures */
  blanks: Node[];
  /** statements that are refused without being a cell */
  refused: { node: Node; refusal: string }[];
}

const nothing: FreeNames = { references: [], calls: [], awaits: false, unerasable: [] };

/** Sorts a module's statements into drafts of cells, imports, and what is kept or blanked. */
export function draftModule(source: string, parsed: ParsedModule): ModuleDraft {
  const module: ModuleDraft = { drafts: [], imports: new Map(), ambient: new Set(), blanks: [], refused: [] };
  const anonymous = new Map<string, number>();
  let previousEnd = 0;
  for (const statement of parsed.statements) {
    const sourceStart = leadingCommentStart(source, parsed.comments, previousEnd, statement.start);
    previousEnd = statement.end;
    const draft: Addition = (form, name, node, details = {}) => {
      module.drafts.push({
        ...{ form, name, node, statement, binds: [], free: nothing, order: module.drafts.length },
        ...{ line: node.loc.start.line, column: node.loc.start.column + 1, endLine: statement.loc.end.line },
        ...{ sourceStart, sourceEnd: statement.end, sourceLine: lineAt(source, sourceStart, statement) },
        ...details,
      });
    };
    const lineName = (): string => {
      const name = `line ${statement.loc.start.line}`;
      const count = (anonymous.get(name) ?? 0) + 1;
      anonymous.set(name, count);
      return count === 1 ? name : `${name} (${count})`;
    };
    sortStatement(statement, module, draft, lineName);
  }
  return module;
}

type Addition = (
  form: Draft["form"],
  name: string,
  node: Node,
  details?: Partial<Pick<Draft, "binds" | "free" | "refusal" | "line" | "column">>,
) => void;

function sortStatement(statement: Node, module: ModuleDraft, draft: Addition, lineName: () => string): void {
  switch (statement.type) {
    case "ImportDeclaration":
      for (const specifier of children(statement, "specifiers")) noteImport(specifier, statement, module);
      return;
    case "ExportNamedDeclaration": {
      const declaration = child(statement, "declaration");
      if (!declaration || declaration.type === "TSDeclareFunction") module.blanks.push(statement);
      else sortDeclaration(declaration, module, draft, lineName);
      return;
    }
    case "ExportAllDeclaration":
      module.blanks.push(statement);
      return;
    case "ExportDefaultDeclaration":
      draft("bad", lineName(), statement, {
        refusal: "a notebook has no default export; give the value a name: export const …",
      });
      return;
    case "TSExportAssignment":
    case "TSImportEqualsDeclaration":
    case "TSNamespaceExportDeclaration":
      module.refused.push({
        node: statement,
        refusal: "write import … from and export const; other module forms are not taken",
      });
      module.blanks.push(statement);
      return;
    case "ExpressionStatement": {
      const expression = child(statement, "expression") as Node;
      draft("expression", lineName(), statement, { free: freeNames([expression]) });
      return;
    }
    case "EmptyStatement":
      return;
  }
  sortDeclaration(statement, module, draft, lineName);
}

function sortDeclaration(node: Node, module: ModuleDraft, draft: Addition, lineName: () => string): void {
  const name = identifierName(child(node, "id"));
  if (field(node, "declare") || node.type === "TSTypeAliasDeclaration" || node.type === "TSInterfaceDeclaration") {
    for (const declared of node.type === "VariableDeclaration" ? children(node, "declarations") : [node]) {
      for (const bound of boundNames((child(declared, "id") ?? declared) as Node))
        module.ambient.add(identifierName(bound));
    }
    return;
  }
  switch (node.type) {
    case "VariableDeclaration":
      sortVariables(node, draft);
      return;
    case "FunctionDeclaration":
      draft("function", name, node, { binds: [child(node, "id") as Node], free: freeNames([node]) });
      return;
    case "ClassDeclaration":
      draft("class", name, node, { binds: [child(node, "id") as Node], free: freeNames([node]) });
      return;
    case "TSDeclareFunction":
      module.blanks.push(node);
      return;
    case "TSEnumDeclaration":
      draft("bad", name, node, {
        binds: [child(node, "id") as Node],
        refusal: `${name} is an enum, which leaves code behind; write a const object or a union of texts`,
      });
      return;
    case "TSModuleDeclaration":
      draft("bad", lineName(), node, {
        refusal: "a namespace leaves code behind; put its contents in a file beside the notebook",
      });
      return;
  }
  draft("bad", lineName(), node, {
    refusal: `${statementWords(node)} can't stand at top level, where a notebook has const, function, class and shown values; put it in a function`,
  });
}

function sortVariables(node: Node, draft: Addition): void {
  const kind = String(field(node, "kind"));
  for (const declarator of children(node, "declarations")) {
    const pattern = child(declarator, "id") as Node;
    const binds = boundNames(pattern);
    if (kind !== "const") {
      for (const bound of binds) {
        draft("bad", identifierName(bound), declarator, {
          binds: [bound],
          refusal: `${identifierName(bound)} is declared with ${kind}; a cell has one value, so write const`,
        });
      }
      continue;
    }
    const init = child(declarator, "init");
    const free = freeNames(init ? [init] : [], [pattern]);
    if (pattern.type === "Identifier") draft("const", identifierName(pattern), declarator, { binds, free });
    else draft("parts", `{ ${binds.map(identifierName).join(", ")} }`, declarator, { binds, free });
  }
}

function noteImport(specifier: Node, statement: Node, module: ModuleDraft): void {
  const local = child(specifier, "local") as Node;
  const imported = child(specifier, "imported");
  const name = imported ? identifierName(imported) || String(field(imported, "value")) : undefined;
  module.imports.set(identifierName(local), {
    specifier: String(field(child(statement, "source") as Node, "value")),
    imported: name ?? (specifier.type === "ImportNamespaceSpecifier" ? "*" : "default"),
    node: local,
  });
}

function statementWords(node: Node): string {
  const words: Record<string, string> = {
    IfStatement: "if",
    ForStatement: "a for loop",
    ForInStatement: "a for loop",
    ForOfStatement: "a for loop",
    WhileStatement: "a while loop",
    DoWhileStatement: "a do loop",
    SwitchStatement: "switch",
    TryStatement: "try",
    ThrowStatement: "throw",
    BlockStatement: "a block",
    LabeledStatement: "a label",
    DebuggerStatement: "debugger",
  };
  return words[node.type] ?? "this statement";
}

/** Start of the comment that leads a statement: its lines follow one another without a blank one, and none is the tail of a line before. */
function leadingCommentStart(source: string, comments: readonly Comment[], after: number, start: number): number {
  let from = start;
  for (let i = lastBefore(comments, start); i >= 0; i--) {
    const comment = comments[i] as Comment;
    if (comment.start < after || /\S|\n\s*\n/.test(source.slice(comment.end, from))) break;
    const lineStart = source.lastIndexOf("\n", comment.start - 1) + 1;
    if (lineStart < after && source.slice(lineStart, after).trim() !== "") break;
    from = comment.start;
  }
  return from;
}

function lastBefore(comments: readonly Comment[], position: number): number {
  let low = 0;
  let high = comments.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((comments[middle] as Comment).end <= position) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}

function lineAt(source: string, position: number, statement: Node): number {
  const between = source.slice(position, statement.start).match(/\n/g)?.length ?? 0;
  return statement.loc.start.line - between;
}
