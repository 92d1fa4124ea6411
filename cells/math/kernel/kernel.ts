// Small dense linear algebra for two frequencies side by side: WebAssembly with SIMD, or its plain TypeScript twin.

import { kernelBase64 } from "./binary.ts";
import type { KernelFunctions } from "./functions.ts";
import { twinFunctions } from "./twin.ts";

export interface Kernel extends KernelFunctions {
  kind: "WebAssembly" | "TypeScript";
  /** address of so many doubles, not cleared, aligned to 16 bytes */
  alloc(doubles: number): number;
  /** bytes allocated */
  used(): number;
  /** gives back everything allocated */
  reset(): void;
  /** the arena as doubles; asked for anew after `alloc` */
  memory(): Float64Array;
}

/** A kernel with its own memory: WebAssembly where the surroundings allow it, else TypeScript. */
export function createKernel(): Kernel {
  try {
    return webAssemblyKernel();
  } catch {
    // No WebAssembly, no SIMD in it, or a page whose policy forbids it.
    return typeScriptKernel();
  }
}

const pageBytes = 65_536;
/** The kernel's own scratch at the start of memory. */
const reservedBytes = 1_024;

let compiled: WebAssembly.Module | undefined;

export function webAssemblyKernel(): Kernel {
  compiled ??= new WebAssembly.Module(Uint8Array.from(atob(kernelBase64), (char) => char.charCodeAt(0)));
  const wasm = new WebAssembly.Memory({ initial: 16 });
  const { exports } = new WebAssembly.Instance(compiled, { env: { memory: wasm, abort: () => {} } });
  let used = reservedBytes;
  let view = new Float64Array(wasm.buffer);
  return {
    ...(exports as unknown as KernelFunctions),
    kind: "WebAssembly",
    alloc(doubles) {
      const address = used;
      used += 16 * Math.ceil(doubles / 2);
      const missing = used - wasm.buffer.byteLength;
      if (missing > 0) {
        // By half as much again, so that growing stays rare.
        wasm.grow(Math.ceil((missing + wasm.buffer.byteLength / 2) / pageBytes));
        view = new Float64Array(wasm.buffer);
      }
      return address;
    },
    used: () => used,
    reset() {
      used = reservedBytes;
    },
    memory: () => view,
  };
}

export function typeScriptKernel(): Kernel {
  let used = reservedBytes;
  let view = new Float64Array(1 << 16);
  return {
    ...twinFunctions(() => view),
    kind: "TypeScript",
    alloc(doubles) {
      const address = used;
      used += 16 * Math.ceil(doubles / 2);
      if (used > view.byteLength) {
        const grown = new Float64Array((used + view.byteLength) / 8);
        grown.set(view);
        view = grown;
      }
      return address;
    },
    used: () => used,
    reset() {
      used = reservedBytes;
    },
    memory: () => view,
  };
}
