import { mkdtemp, rename, rm, unlink, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { type FileWatch, watchFiles } from "../../../runtime/server/watch-files.ts";

let folder: string;
let watch: FileWatch | undefined;

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), "watch-"));
});
afterEach(async () => {
  watch?.close();
  await rm(folder, { recursive: true, force: true });
});

/** A watch whose reports can be awaited one by one. */
async function follow(files: string[], options?: { lookMs: number }) {
  const reports: string[][] = [];
  const waiting: ((report: string[]) => void)[] = [];
  watch = watchFiles((changed) => {
    const next = waiting.shift();
    if (next) next(changed);
    else reports.push(changed);
  }, options);
  await watch.follow(files);
  return {
    reports,
    next: () =>
      reports.length > 0
        ? Promise.resolve(reports.shift()!)
        : new Promise<string[]>((resolve, reject) => {
            waiting.push(resolve);
            setTimeout(() => reject(new Error("no report")), 4000);
          }),
  };
}

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

test("watchFiles: a save by rewriting is one report", async () => {
  const file = join(folder, "a.ts");
  await writeFile(file, "one");
  const { next, reports } = await follow([file]);
  await writeFile(file, "two");
  expect(await next()).toEqual([file]);
  await pause(150);
  expect(reports).toEqual([]);
});

test("watchFiles: a save by renaming over is seen, again and again", async () => {
  const file = join(folder, "a.ts");
  await writeFile(file, "0");
  const { next } = await follow([file]);
  for (const text of ["1", "2", "3"]) {
    await writeFile(`${file}~`, text);
    await rename(`${file}~`, file);
    expect(await next()).toEqual([file]);
  }
});

test("watchFiles: a save by deleting and creating is one report, of the new content", async () => {
  const file = join(folder, "a.ts");
  await writeFile(file, "one");
  const { next, reports } = await follow([file]);
  await unlink(file);
  await pause(40);
  await writeFile(file, "two");
  expect(await next()).toEqual([file]);
  await pause(250);
  expect(reports).toEqual([]);
});

test("watchFiles: an empty moment between truncation and writing isn't reported", async () => {
  const file = join(folder, "a.ts");
  await writeFile(file, "one");
  const { next, reports } = await follow([file]);
  await writeFile(file, "");
  await pause(60);
  await writeFile(file, "two");
  expect(await next()).toEqual([file]);
  await pause(250);
  expect(reports).toEqual([]);
});

test("watchFiles: touching without change, and files beside, are no change", async () => {
  const file = join(folder, "a.ts");
  await writeFile(file, "one");
  const { reports } = await follow([file]);
  await writeFile(file, "one");
  await writeFile(join(folder, "other.ts"), "x");
  await pause(250);
  expect(reports).toEqual([]);
});

test("watchFiles: a file that is away is reported when it comes, and when it goes", async () => {
  const file = join(folder, "late.ts");
  const { next } = await follow([file]);
  await writeFile(file, "here");
  expect(await next()).toEqual([file]);
  await unlink(file);
  expect(await next()).toEqual([file]);
});

test("watchFiles: the set can be replaced", async () => {
  const a = join(folder, "a.ts");
  const b = join(folder, "b.ts");
  await writeFile(a, "1");
  await writeFile(b, "1");
  const { next, reports } = await follow([a]);
  await watch!.follow([b]);
  await writeFile(a, "2");
  await pause(150);
  expect(reports).toEqual([]);
  await writeFile(b, "2");
  expect(await next()).toEqual([b]);
});
