// Runs a TypeScript entry of build/ under plain Node: bundles it once with esbuild, keeps the bundle as long as no source
// changed, imports it. Plain JavaScript, since Node 20 runs no TypeScript.

import { createHash } from "node:crypto";
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join, relative, sep } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";

const projectRoot = dirname(dirname(fileURLToPath(import.meta.url)));

/**
 * Bundles build/<entry>, imports it and sets the exit code from its `main(argv, { projectRoot })`.
 * @param {string} entry file name in build/, "cli.ts"
 */
export async function launch(entry) {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    return stop(`needs Node 20.19 or later; this is Node ${process.versions.node}.`);
  }
  if (process.env.HORNBOOK_TRACE === "1") process.setSourceMapsEnabled(true);
  process.stdout.on("error", (error) => {
    // The reader of a pipe has left (`| head`): nothing is lost that anyone waits for.
    if (error.code === "EPIPE") process.exit(process.exitCode ?? 0);
    throw error;
  });
  try {
    const file = (await kept(entry)) ?? (await bundle(entry));
    const { main } = await import(pathToFileURL(file).href);
    process.exitCode = await main(process.argv.slice(2), { projectRoot });
  } catch (error) {
    stop(sentence(error));
    if (process.env.HORNBOOK_TRACE === "1") console.error(error);
  }
}

function stop(text) {
  process.stderr.write(`hornbook: ${text}\n`);
  process.exitCode = 1;
}

/** One line on what went wrong; a bundling error says where. */
function sentence(error) {
  const first = error?.errors?.[0];
  if (first) return `${first.location?.file ?? "build"}:${first.location?.line ?? 0}: ${first.text}`;
  return error instanceof Error ? error.message.split("\n")[0] : String(error);
}

/** Where bundles are kept: beside the packages, so that their imports resolve; a folder of its own when that can't be written. */
function cacheFolder() {
  const folder = join(projectRoot, "node_modules", ".cache", "hornbook");
  try {
    mkdirSync(folder, { recursive: true });
    return folder;
  } catch {
    const own = mkdtempSync(join(tmpdir(), "hornbook-"));
    symlinkSync(join(projectRoot, "node_modules"), join(own, "node_modules"), "junction");
    process.on("exit", () => rmSync(own, { recursive: true, force: true }));
    return own;
  }
}

/** Removes bundles that nobody has used for two weeks. */
function sweep(folder) {
  const oldest = Date.now() - 14 * 86_400_000;
  for (const name of readdirSync(folder)) {
    const path = join(folder, name);
    if (/^(new-.*|[0-9a-f]{16})$/.test(name) && statSync(path).mtimeMs < oldest)
      rmSync(path, { recursive: true, force: true });
  }
}

const digest = (data) => createHash("sha256").update(data).digest("hex");

/** The bundle of an earlier run, if every source is as it was then. */
async function kept(entry) {
  const folder = join(projectRoot, "node_modules", ".cache", "hornbook");
  try {
    const list = JSON.parse(readFileSync(join(folder, `${entry}.json`), "utf8"));
    for (const [path, was] of Object.entries(list.inputs)) {
      if (digest(readFileSync(join(projectRoot, path))) !== was) return undefined;
    }
    const file = join(folder, list.output);
    return existsSync(file) ? file : undefined;
  } catch {
    return undefined;
  }
}

async function bundle(entry) {
  let esbuild;
  try {
    esbuild = await import("esbuild");
  } catch {
    throw new Error(`the packages it needs aren't installed; run "npm ci" in ${projectRoot} first.`);
  }
  const result = await esbuild.build({
    absWorkingDir: projectRoot,
    entryPoints: [join("build", entry)],
    outdir: "out",
    outExtension: { ".js": ".mjs" },
    entryNames: "[name]",
    bundle: true,
    splitting: true,
    write: false,
    format: "esm",
    platform: "node",
    target: "node20",
    packages: "external",
    sourcemap: true,
    metafile: true,
    logLevel: "silent",
    loader: { ".py": "text" },
  });
  const inputs = {};
  for (const path of [...Object.keys(result.metafile.inputs), "package-lock.json"]) {
    if (existsSync(join(projectRoot, path))) inputs[path] = digest(readFileSync(join(projectRoot, path)));
  }
  const hash = digest(JSON.stringify(inputs)).slice(0, 16);
  const folder = cacheFolder();
  const fresh = mkdtempSync(join(folder, "new-"));
  const from = join(projectRoot, "out");
  for (const file of result.outputFiles) {
    const path = join(fresh, relative(from, file.path));
    mkdirSync(dirname(path), { recursive: true });
    writeFileSync(path, file.contents);
  }
  // Two runs may build at once: each writes a folder of its own, and the first to rename wins.
  const home = join(folder, hash);
  sweep(folder);
  try {
    renameSync(fresh, home);
  } catch {
    if (!existsSync(home)) throw new Error(`can't write ${home}.`);
    rmSync(fresh, { recursive: true, force: true });
  }
  const output = [hash, entry.replace(/\.ts$/, ".mjs")].join("/");
  const list = join(folder, `${entry}.json`);
  writeFileSync(`${list}.${process.pid}`, JSON.stringify({ inputs, output }));
  renameSync(`${list}.${process.pid}`, list);
  return join(folder, output.split("/").join(sep));
}
