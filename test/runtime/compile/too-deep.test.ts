// Source that nests deeper than the stack: a problem in words, in the compiler and in every change to the source.

import { expect, test } from "vitest";
import { compileNotebook } from "../../../runtime/compile.ts";
import { addNote } from "../../../runtime/source/cells.ts";
import { forkSource } from "../../../runtime/source/fork-source.ts";

const deep: Record<string, (depth: number) => string> = {
  parentheses: (n) => "(".repeat(n) + "1" + ")".repeat(n),
  lists: (n) => "[".repeat(n) + "]".repeat(n),
  templates: (n) => "`${".repeat(n) + "1" + "}`".repeat(n),
  functions: (n) => "() => ".repeat(n) + "1",
  "a sum": (n) => "1 + ".repeat(n) + "1",
  calls: (n) => "f" + "()".repeat(n),
  types: (n) => `1 as ${"A<".repeat(n)}1${">".repeat(n)}`,
};

test.each(Object.keys(deep))("%s, from a hundred to a hundred thousand deep", (kind) => {
  const outcomes = [100, 400, 1600, 6400, 25_600, 102_400].map((depth) => {
    const source = `import { note } from "../runtime/index.ts";\nconst a = ${deep[kind]!(depth)};\n`;
    const { problems, cells } = compileNotebook(source, "a.ts");
    const unreadable = problems.filter(({ kind }) => kind === "parse");
    for (const change of [
      () => addNote(source, "a.ts", "a", "words"),
      () => forkSource(source, "a.ts", { name: "b", from: "a.ts", today: "2026-12-01", texts: {} }),
    ])
      try {
        change();
      } catch (error) {
        expect(error).toMatchObject({ name: "RewriteRefused", message: expect.stringContaining("a.ts can't be read") });
      }
    if (unreadable.length === 0) return cells.length;
    expect(unreadable[0]!.message).toContain("nested too deeply");
    return "too deep";
  });
  expect(outcomes[0]).toBe(1);
});
