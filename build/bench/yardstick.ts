// The yardstick: what NumPy's linear algebra takes on this machine, so that a speed can be told as a ratio.

import { spawn } from "node:child_process";
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import script from "./yardstick.py";

export interface Yardstick {
  /** ms, by matrix size */
  modeMatchingPerFrequency: Record<string, number>;
  complexSolve: Record<string, number>;
}

/** Runs build/bench/yardstick.py on one thread. Null where there is no python3 with NumPy. */
export async function runYardstick(): Promise<Yardstick | null> {
  const folder = await mkdtemp(join(tmpdir(), "yardstick-"));
  try {
    const file = join(folder, "yardstick.py");
    await writeFile(file, script);
    // The library chooses its kernel for this processor by itself; a choice left in the environment may be a slower one.
    const { OPENBLAS_CORETYPE: _type, OPENBLAS_L2_SIZE: _size, ...environment } = process.env;
    for (const python of ["python3", "/usr/bin/python3"]) {
      const text = await output(python, [file], { ...environment, OPENBLAS_NUM_THREADS: "1" });
      if (text === undefined) continue;
      try {
        return JSON.parse(text) as Yardstick;
      } catch {
        // Not the object that it prints: try the next.
      }
    }
    return null;
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** What a program prints, or undefined when it fails or takes over two minutes. */
function output(program: string, args: string[], env: NodeJS.ProcessEnv): Promise<string | undefined> {
  return new Promise((resolve) => {
    const child = spawn(program, args, { env, stdio: ["ignore", "pipe", "ignore"], timeout: 120_000 });
    let text = "";
    child.stdout.on("data", (part) => {
      text += part;
    });
    child.on("error", () => resolve(undefined));
    child.on("close", (code) => resolve(code === 0 ? text : undefined));
  });
}
