// Reads a reference file that stands beside this one.

import { readFileSync } from "node:fs";

export function readReference(name: string): string {
  return readFileSync(new URL(name, import.meta.url), "utf8");
}
