// background() as a running cell receives it.
import type { BackgroundJob } from "../background/pool.ts";

export type Heavy = (...args: never[]) => unknown;
export type Progress = (fraction: number) => void;
export type StartJob = (heavy: Heavy, args: readonly unknown[], onProgress: Progress) => BackgroundJob;

/** Calls that live as long as the evaluation that made them is wanted: `jobs` are cancelled when it is not. */
export function backgroundCalls(jobs: Set<BackgroundJob>, start: StartJob, onProgress: Progress) {
  const call = async (heavy: Heavy, args: unknown[]): Promise<unknown> => {
    if (typeof heavy !== "function") throw new TypeError(`background: needs a function first; got ${typeof heavy}`);
    const job = start(heavy, args, onProgress);
    jobs.add(job);
    try {
      return await job.result;
    } finally {
      jobs.delete(job);
    }
  };
  return (heavy: Heavy, ...args: unknown[]): Promise<unknown> => {
    const result = call(heavy, args);
    // A cell that doesn't wait for its call must not bring the process down when the call is cancelled.
    result.catch(() => {});
    return result;
  };
}

/**
 * The name under which a worker knows a function. An imported one is found by itself; a function of the notebook by the cell that
 * holds it, for the worker makes its own.
 */
export function nameOfHeavy(
  heavy: Heavy,
  functions: Readonly<Record<string, Heavy>>,
  cellValue: (cell: string) => unknown,
): string {
  const names = Object.keys(functions);
  const name = names.find((one) => functions[one] === heavy) ?? names.find((one) => cellValue(one) === heavy);
  if (name !== undefined) return name;
  const called = heavy.name || "the function";
  throw new TypeError(`background: ${called} must be called by the name it is imported or defined under`);
}
