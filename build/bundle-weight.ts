// What a bundle consists of: how much each package and room weighs in it, and whose work it holds.

import { readFile } from "node:fs/promises";
import { join } from "node:path";
import type { Metafile } from "esbuild";

export interface Weight {
  /** "@observablehq/plot", "cells/horn" */
  name: string;
  /** in the bundle as written */
  bytes: number;
}

const packageOf = (path: string): string | undefined => path.match(/.*node_modules\/((?:@[^/]+\/)?[^/]+)/)?.[1];

/** Bytes by package, and by room of the project, the heaviest first. */
export function bundleWeights(metafile: Metafile): Weight[] {
  const weights = new Map<string, number>();
  for (const output of Object.values(metafile.outputs)) {
    for (const [path, { bytesInOutput }] of Object.entries(output.inputs)) {
      const name =
        packageOf(path) ??
        path
          .replace(/^notebook:/, "")
          .split("/")
          .slice(0, 2)
          .join("/");
      weights.set(name, (weights.get(name) ?? 0) + bytesInOutput);
    }
  }
  return [...weights].map(([name, bytes]) => ({ name, bytes })).sort((a, b) => b.bytes - a.bytes);
}

/** "d3-array 3.2.4 (ISC)" for each package in the bundle, sorted. */
export async function packageNotices(metafile: Metafile, projectRoot: string): Promise<string[]> {
  const folders = new Set<string>();
  for (const path of Object.keys(metafile.inputs)) {
    const folder = path.match(/.*node_modules\/(?:@[^/]+\/)?[^/]+/)?.[0];
    if (folder) folders.add(folder);
  }
  const notices = await Promise.all(
    [...folders].map(async (folder) => {
      const { name, version, license } = JSON.parse(await readFile(join(projectRoot, folder, "package.json"), "utf8"));
      return `${name} ${version} (${typeof license === "string" ? license : "see package"})`;
    }),
  );
  return [...new Set(notices)].sort();
}
