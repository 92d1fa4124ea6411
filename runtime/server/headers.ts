// What every answer of the local server carries, and the content security policy of its page.

import type { OutgoingHttpHeaders } from "node:http";

/**
 * Policy of the live page: everything from this server, nothing from the network, no inline script.
 * @param styleHashes sources such as `'sha256-…'` of style elements that figures bring along
 */
export function pagePolicy(styleHashes: readonly string[] = []): string {
  return [
    "default-src 'none'",
    "script-src 'self' 'wasm-unsafe-eval'",
    ["style-src 'self'", ...styleHashes].join(" "),
    "img-src 'self' data: blob:",
    "connect-src 'self'",
    "worker-src 'self'",
    "base-uri 'none'",
    "form-action 'none'",
    "frame-ancestors 'none'",
  ].join("; ");
}

/** Headers of every answer: no guessing of types, no framing, no use by another site, no address passed on. */
export const COMMON_HEADERS: OutgoingHttpHeaders = {
  "x-content-type-options": "nosniff",
  "x-frame-options": "DENY",
  "referrer-policy": "no-referrer",
  "cross-origin-resource-policy": "same-origin",
  // Both together isolate the page, so that it may share memory with its workers and drop a call at once.
  "cross-origin-opener-policy": "same-origin",
  "cross-origin-embedder-policy": "require-corp",
  "permissions-policy": "camera=(), microphone=(), geolocation=()",
};
