// The benchmark's command line; its figures are no matter of tests.

import { spawnSync } from "node:child_process";
import { join } from "node:path";
import { expect, test } from "vitest";
import { projectRoot } from "./run-command.ts";

const bench = (...args: string[]) =>
  spawnSync(process.execPath, [join(projectRoot, "build/bench.mjs"), ...args], { encoding: "utf8" });

test("bench: help names every benchmark; an unknown name is one sentence, exit 2", () => {
  const help = bench("--help");
  expect([help.status, help.stderr]).toEqual([0, ""]);
  expect(help.stdout).toContain("control-turn");
  const unknown = bench("control-trun");
  expect([unknown.status, unknown.stdout]).toEqual([2, ""]);
  expect(unknown.stderr).toBe('bench: there is no benchmark "control-trun". Did you mean "control-turn"?\n');
});
