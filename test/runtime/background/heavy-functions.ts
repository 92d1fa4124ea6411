// What the workers of these tests run. Time is spent in loops, as physics spends it: a busy worker hears nothing meanwhile.
import type { Progress } from "../../../runtime/vocabulary.ts";

const spend = (ms: number): void => {
  const end = performance.now() + ms;
  while (performance.now() < end);
};

export const add = (a: number, b: number): number => a + b;

/** Counts its starts in shared memory, then works without listening. */
export function deaf(starts: Int32Array, ms: number, label: string): string {
  Atomics.add(starts, 0, 1);
  spend(ms);
  Atomics.add(starts, 1, 1);
  return label;
}

export function reporting(steps: number, ms: number, progress?: Progress): string {
  for (let i = 1; i <= steps; i++) {
    spend(ms);
    progress?.(i / steps);
  }
  return "done";
}

export async function asynchronous(ms: number): Promise<{ typed: Float64Array; map: Map<string, number> }> {
  await new Promise((resolve) => setTimeout(resolve, ms));
  return { typed: Float64Array.of(1, 2, 3), map: new Map([["a", 1]]) };
}

export function refuses(value: number): never {
  throw new RangeError(`refuses: value must be positive; got ${value}`);
}

export function throwsText(): never {
  throw "only text";
}

export const unsendable = (): (() => number) => () => 1;

export const forever = (): never => {
  for (;;);
};

export function exits(code: number): never {
  process.exit(code);
}

export function exhausts(): number {
  const hoard: number[][] = [];
  for (;;) hoard.push(new Array(100_000).fill(hoard.length));
}

export async function failsLater(): Promise<never> {
  setTimeout(() => {
    throw new Error("nobody caught this");
  }, 0);
  return new Promise<never>(() => {});
}
