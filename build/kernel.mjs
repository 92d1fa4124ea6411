// Compiles cells/math/kernel/assembly to WebAssembly and writes it into cells/math/kernel/binary.ts: node build/kernel.mjs

import { writeFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

// Node 20 runs no TypeScript by itself.
const compiler = fileURLToPath(new URL("kernel-compiler.ts", import.meta.url));
const { outputFiles } = await build({
  entryPoints: [compiler],
  bundle: true,
  write: false,
  format: "esm",
  platform: "node",
  packages: "external",
  define: { "import.meta.url": JSON.stringify(new URL("kernel-compiler.ts", import.meta.url).href) },
});
const bundled = fileURLToPath(new URL("../node_modules/.kernel-compiler.mjs", import.meta.url));
writeFileSync(bundled, outputFiles[0].text);
const { compileKernel, kernelModule } = await import(bundled);
const binary = await compileKernel();
writeFileSync(fileURLToPath(new URL("../cells/math/kernel/binary.ts", import.meta.url)), kernelModule(binary));
process.stdout.write(`cells/math/kernel/binary.ts: ${binary.length} bytes of WebAssembly\n`);
