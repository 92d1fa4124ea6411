// Runs the real command, as a reader would, from a folder of its own.

import { type ChildProcess, spawn } from "node:child_process";
import { cp, mkdtemp, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach } from "vitest";

export const projectRoot = dirname(dirname(dirname(fileURLToPath(import.meta.url))));
export const fixtures = join(projectRoot, "test/build/fixtures");
export const smallNotebook = join(fixtures, "small.ts");
const command = join(projectRoot, "build/hornbook.mjs");

let folders: string[] = [];
let children: ChildProcess[] = [];

afterEach(async () => {
  await Promise.all(
    children.map(
      (child) =>
        new Promise<void>((resolve) => {
          if (child.exitCode !== null || child.signalCode !== null) return resolve();
          child.on("close", () => resolve());
          child.kill("SIGKILL");
        }),
    ),
  );
  children = [];
  await Promise.all(folders.map((folder) => rm(folder, { recursive: true, force: true })));
  folders = [];
});

/** A folder that is gone after the test. */
export async function ownFolder(): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), "command-"));
  folders.push(folder);
  return folder;
}

/** The runtime's path in a notebook that stands anywhere. */
export const runtimeImport = JSON.stringify(join(projectRoot, "runtime/index.ts"));

/** Writes a notebook into a folder; `VOCABULARY` in the text becomes the path of the vocabulary. */
export async function writeNotebook(folder: string, name: string, text: string): Promise<string> {
  const path = join(folder, name);
  await writeFile(path, text.replaceAll('"VOCABULARY"', runtimeImport));
  return path;
}

/** The small notebook and the file beside it, in a folder of their own, to be changed by the test. */
export async function copySmall(folder: string): Promise<string> {
  await cp(join(fixtures, "ring.ts"), join(folder, "ring.ts"));
  const text = await readFile(smallNotebook, "utf8");
  return writeNotebook(folder, "small.ts", text.replace('"../../../runtime/index.ts"', '"VOCABULARY"'));
}

export interface Outcome {
  code: number | null;
  out: string;
  /** standard error without what it said of its progress, which depends on how busy the machine is */
  err: string;
  /** the lines on its progress */
  progress: string;
}

/** A line that says what takes more than a second. */
const progressLine = /^[^:\n]+: (?:bundling|checking types|drawing|writing|evaluating(?:, .*)?)\n/gm;

export interface RunOptions {
  cwd?: string;
  env?: Record<string, string | undefined>;
}

function start(args: readonly string[], { cwd, env }: RunOptions): ChildProcess {
  const child = spawn(process.execPath, [command, ...args], {
    cwd: cwd ?? tmpdir(),
    env: { ...process.env, INIT_CWD: undefined, HORNBOOK_TRACE: undefined, DISPLAY: undefined, ...env },
    stdio: ["ignore", "pipe", "pipe"],
  });
  children.push(child);
  return child;
}

/** Runs a command to its end. */
export function run(args: readonly string[], options: RunOptions = {}): Promise<Outcome> {
  return new Promise((resolve, reject) => {
    const child = start(args, options);
    let out = "";
    let err = "";
    child.stdout?.on("data", (part) => {
      out += part;
    });
    child.stderr?.on("data", (part) => {
      err += part;
    });
    child.on("error", reject);
    child.on("close", (code) =>
      resolve({
        code,
        out,
        err: err.replaceAll(progressLine, ""),
        progress: (err.match(progressLine) ?? []).join(""),
      }),
    );
  });
}

export interface OpenCommand {
  url: string;
  child: ChildProcess;
  /** all that it said on standard error so far */
  said(): string;
  /** resolves with the exit code */
  ended: Promise<number | null>;
}

/** Starts `open` and waits for its address. */
export function runOpen(args: readonly string[], options: RunOptions = {}): Promise<OpenCommand> {
  return new Promise((resolve, reject) => {
    const child = start(["open", "--no-browser", ...args], options);
    let out = "";
    let err = "";
    const ended = new Promise<number | null>((done) => child.on("close", done));
    child.stdout?.on("data", (part) => {
      out += part;
      const url = out.match(/http:\/\/127\.0\.0\.1:\d+\//)?.[0];
      if (url) resolve({ url, child, said: () => err, ended });
    });
    child.stderr?.on("data", (part) => {
      err += part;
    });
    child.on("error", reject);
    child.on("close", (code) => reject(new Error(`open ended with ${code}: ${err}`)));
  });
}

/** Checks that an error is what a person can read: one sentence, no stack, no path of the program's own files. */
export function isOneSentence(err: string): boolean {
  const lines = err.trimEnd().split("\n");
  return lines.length === 1 && /^hornbook: .+[.?!]$/.test(lines[0]!) && !/\bat .*:\d+:\d+/.test(err);
}
