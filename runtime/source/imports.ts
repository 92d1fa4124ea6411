// The import that a notebook takes its vocabulary from: names added to it, and paths that lead from another folder.

import { isVocabularyModule } from "../compile/known-globals.ts";
import { child, children, field, identifierName, type Node } from "../compile/syntax.ts";
import { type Edit, RewriteRefused, type SourceView } from "./edit.ts";

const LINE = 120;

const specifierText = (statement: Node): string => String(field(child(statement, "source") as Node, "value"));

/**
 * Adds names of the vocabulary to its import, in order, on one line if they fit.
 * @throws {RewriteRefused} the notebook imports no vocabulary by name
 */
export function withVocabulary({ source, file, parsed, module }: SourceView, names: readonly string[]): Edit[] {
  const missing = names.filter((name) => module.imports.get(name)?.imported !== name);
  if (missing.length === 0) return [];
  const statement = parsed.statements.find(
    (one) =>
      one.type === "ImportDeclaration" &&
      field(one, "importKind") !== "type" &&
      isVocabularyModule(specifierText(one)) &&
      children(one, "specifiers").every(({ type }) => type === "ImportSpecifier"),
  );
  if (!statement)
    throw new RewriteRefused(`${file} imports no vocabulary by name, so ${missing.join(", ")} can't be added`);
  const specifiers = children(statement, "specifiers").map((one) => ({
    key: identifierName(child(one, "imported")).toLowerCase(),
    text: source.slice(one.start, one.end),
  }));
  for (const name of missing) {
    const after = specifiers.findIndex(({ key }) => key > name.toLowerCase());
    specifiers.splice(after < 0 ? specifiers.length : after, 0, { key: name.toLowerCase(), text: name });
  }
  const from = source.slice((child(statement, "source") as Node).start, (child(statement, "source") as Node).end);
  const tail = source.slice((child(statement, "source") as Node).end, statement.end);
  const texts = specifiers.map(({ text }) => text);
  const line = `import { ${texts.join(", ")} } from ${from}${tail}`;
  const text =
    line.length <= LINE ? line : `import {\n${texts.map((one) => `  ${one},\n`).join("")}} from ${from}${tail}`;
  return [{ start: statement.start, end: statement.end, text }];
}

/** Makes every relative import and re-export lead where `moved` says. */
export function withPaths({ parsed, source }: SourceView, moved: (specifier: string) => string): Edit[] {
  return parsed.statements.flatMap((statement) => {
    const from = /^(Import|Export)/.test(statement.type) ? child(statement, "source") : undefined;
    const specifier = from && field(from, "value");
    if (!from || typeof specifier !== "string" || !specifier.startsWith(".")) return [];
    const text = JSON.stringify(moved(specifier));
    return text === source.slice(from.start, from.end) ? [] : [{ start: from.start, end: from.end, text }];
  });
}
