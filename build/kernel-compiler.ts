// The kernel's WebAssembly from its AssemblyScript, and the module that carries it: build/kernel.mjs writes it.

import { readFileSync } from "node:fs";
import asc from "assemblyscript/asc";

const flags = ["-O3", "--noAssert", "--runtime", "stub", "--enable", "simd", "--importMemory"];

export async function compileKernel(): Promise<Uint8Array> {
  const source = readFileSync(new URL("../cells/math/kernel/assembly/index.ts", import.meta.url), "utf8");
  let binary: Uint8Array | undefined;
  const { error, stderr } = await asc.main(["index.ts", "--outFile", "kernel.wasm", ...flags], {
    readFile: (name: string) => (name === "index.ts" ? source : null),
    writeFile: (name: string, contents: string | Uint8Array) => {
      if (name === "kernel.wasm" && typeof contents !== "string") binary = contents;
    },
    listFiles: () => null,
  });
  if (error || !binary) throw new Error(`kernel: AssemblyScript says\n${stderr.toString()}`);
  return binary;
}

export function kernelModule(binary: Uint8Array): string {
  const lines =
    Buffer.from(binary)
      .toString("base64")
      .match(/.{1,110}/g) ?? [];
  return `// Written by build/kernel.mjs from assembly/index.ts; test/cells/math/kernel compiles it again and compares.

export const kernelBase64 = [
${lines.map((line) => `  "${line}",`).join("\n")}
].join("");
`;
}
