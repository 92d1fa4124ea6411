// A notebook that ends the program, waits for ever or fails where nobody catches: a sentence, and never exit code 0.

import { expect, test } from "vitest";
import { isOneSentence, ownFolder, run, writeNotebook } from "./run-command.ts";

const quiet = "export const quiet = 1;\n";

test.each([
  [
    "waits for ever",
    "export const stuck = await new Promise(() => {});\nexport const next = stuck;\n",
    /: stuck waits for something that never comes\.$/m,
  ],
  [
    "ends the program as if all were well",
    "export const end = (globalThis as never as { process: { exit(code: number): void } }).process.exit(0);\n",
    /: a cell ended the program, so nothing was found out\.$/m,
  ],
  [
    "leaves a promise that fails",
    'export const left = (() => { Promise.reject(new Error("boom\\nat once")); return 1; })();\nexport const wait = await new Promise((go) => setTimeout(go, 50));\n',
    /: something that a cell left running failed: boom\.?$/m,
  ],
  [
    "leaves a timer that throws",
    'export const left = (() => { setTimeout(() => { throw new Error("late"); }, 1); return 1; })();\nexport const wait = await new Promise((go) => setTimeout(go, 50));\n',
    /: something that a cell left running failed: late\.?$/m,
  ],
])("values: a notebook that %s", async (_words, text, sentence) => {
  const folder = await ownFolder();
  const { code, out, err } = await run(["values", await writeNotebook(folder, "odd.ts", quiet + text)]);
  expect([code, out, err.trim().split("\n").length]).toEqual([1, "", 1]);
  expect(err).toMatch(sentence);
  expect(err).not.toMatch(/\bat .*:\d+:\d+/);
});

test("check, export and fork: none of them takes it for finished", async () => {
  const folder = await ownFolder();
  const path = await writeNotebook(folder, "odd.ts", "export const stuck = await new Promise(() => {});\n");
  for (const args of [
    ["check", path],
    ["export", path, "-o", "odd.html"],
    ["fork", path, "--name", "Odd again"],
  ]) {
    const { code, err } = await run(args, { cwd: folder });
    expect([args[0], code, isOneSentence(err)]).toEqual([args[0], 1, true]);
  }
});
