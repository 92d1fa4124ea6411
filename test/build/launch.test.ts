// The starter, in a small project of its own: bundles once, notices every change, does without what it can.

import { spawn } from "node:child_process";
import { cp, mkdir, readdir, rm, symlink, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { expect, test } from "vitest";
import { ownFolder, projectRoot } from "./run-command.ts";

async function smallProject(): Promise<string> {
  const folder = await ownFolder();
  await mkdir(join(folder, "build"));
  await mkdir(join(folder, "node_modules"));
  for (const name of ["launch.mjs", "hornbook.mjs"])
    await cp(join(projectRoot, "build", name), join(folder, "build", name));
  for (const name of ["esbuild", "@esbuild"]) {
    await symlink(join(projectRoot, "node_modules", name), join(folder, "node_modules", name));
  }
  await writeFile(join(folder, "build/word.ts"), 'export const word: string = "first";\n');
  await writeFile(
    join(folder, "build/cli.ts"),
    `import { word } from "./word.ts";
export async function main(argv: string[], { projectRoot }: { projectRoot: string }): Promise<number> {
  if (argv[0] === "fail") throw new Error("no way");
  console.log(JSON.stringify({ word, argv, projectRoot }));
  return 3;
}
`,
  );
  return folder;
}

function start(folder: string, ...args: string[]): Promise<{ code: number | null; out: string; err: string }> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [join(folder, "build/hornbook.mjs"), ...args], { cwd: "/" });
    let out = "";
    let err = "";
    child.stdout.on("data", (part) => {
      out += part;
    });
    child.stderr.on("data", (part) => {
      err += part;
    });
    child.on("close", (code) => resolve({ code, out, err }));
  });
}

test("launch: runs main with the arguments, from any folder, and passes its exit code on", async () => {
  const folder = await smallProject();
  const { code, out, err } = await start(folder, "a", "--b");
  expect([code, err]).toEqual([3, ""]);
  expect(JSON.parse(out)).toMatchObject({ word: "first", argv: ["a", "--b"] });
});

test("launch: a bundle is used again as long as nothing changed, and not a moment longer", async () => {
  const folder = await smallProject();
  await start(folder);
  // Without the bundler only what was kept can run.
  await rm(join(folder, "node_modules/esbuild"));
  expect(JSON.parse((await start(folder)).out).word).toBe("first");
  await symlink(join(projectRoot, "node_modules/esbuild"), join(folder, "node_modules/esbuild"));
  await writeFile(join(folder, "build/word.ts"), 'export const word: string = "other";\n');
  expect(JSON.parse((await start(folder)).out).word).toBe("other");
  await writeFile(join(folder, "build/word.ts"), 'export const word: string = "first";\n');
  expect(JSON.parse((await start(folder)).out).word).toBe("first");
});

test("launch: several at once all run, and leave no rest", async () => {
  const folder = await smallProject();
  const outcomes = await Promise.all(Array.from({ length: 4 }, () => start(folder)));
  expect(outcomes.map(({ code, err }) => [code, err])).toEqual(Array.from({ length: 4 }, () => [3, ""]));
  const kept = await readdir(join(folder, "node_modules/.cache/hornbook"));
  expect(kept.filter((name) => name.startsWith("new-") || /\.json\.\d+$/.test(name))).toEqual([]);
});

test("launch: where packages are away it says what to do; where nothing can be kept it runs all the same", async () => {
  const folder = await smallProject();
  await rm(join(folder, "node_modules/esbuild"));
  const away = await start(folder);
  expect([away.code, away.out]).toEqual([1, ""]);
  expect(away.err).toMatch(/^hornbook: the packages it needs aren't installed; run "npm ci" in .* first\.\n$/);
  await symlink(join(projectRoot, "node_modules/esbuild"), join(folder, "node_modules/esbuild"));
  await writeFile(join(folder, "node_modules/.cache"), "a file where the folder should be");
  const unkept = await start(folder);
  expect([unkept.code, unkept.err]).toEqual([3, ""]);
});

test("launch: an error and a source that can't be bundled are one line each", async () => {
  const folder = await smallProject();
  const failed = await start(folder, "fail");
  expect([failed.code, failed.err]).toEqual([1, "hornbook: no way\n"]);
  await writeFile(join(folder, "build/word.ts"), "export const word: string = ;\n");
  const torn = await start(folder);
  expect([torn.code, torn.err]).toEqual([1, 'hornbook: build/word.ts:1: Unexpected ";"\n']);
});
