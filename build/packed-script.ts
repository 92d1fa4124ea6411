// The script of an exported file, compressed: a third of its size, unpacked by the browser itself before it runs.

import { gzipSync } from "node:zlib";

/** Unpacks the data block before it and runs it in its place; the policy holds the hashes of both. */
const LOADER = `(async () => {
  const packed = document.getElementById("hornbook-packed");
  try {
    const bytes = Uint8Array.from(atob(packed.textContent), (letter) => letter.charCodeAt(0));
    const text = await new Response(new Blob([bytes]).stream().pipeThrough(new DecompressionStream("gzip"))).text();
    const live = document.createElement("script");
    live.id = "hornbook-live";
    live.textContent = text;
    packed.replaceWith(live);
  } catch (error) {
    const said = document.createElement("p");
    said.setAttribute("role", "alert");
    said.textContent = "The givens can\\u2019t be turned in this browser (" + error + "); the results are as exported.";
    document.getElementById("study").before(said);
  }
})();`;

export interface PackedScript {
  /** the two script elements */
  html: string;
  /** texts that run, for the policy's hashes */
  texts: string[];
}

/** Text as gzip in base64, the same on every machine. */
export function packed(text: string): string {
  const bytes = gzipSync(text, { level: 9 });
  // RFC 1952: byte 9 names the file system it was packed on; 255 is "unknown".
  bytes[9] = 255;
  return bytes.toString("base64");
}

/** A classic script, packed to stand in an HTML file. The same code gives the same bytes on every machine. */
export function packedScript(code: string): PackedScript {
  const block = `<script type="application/gzip;base64" id="hornbook-packed">${packed(code)}</script>`;
  return { html: `${block}\n<script>${LOADER}</script>`, texts: [LOADER, code] };
}
