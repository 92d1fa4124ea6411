// Names that a cell may use without declaring or importing them.

/** The language itself, and the few services that browser, worker and Node share and that leave a cell pure enough. */
export const KNOWN_GLOBALS: ReadonlySet<string> = new Set(
  `undefined NaN Infinity globalThis Object Function Array Number Boolean String Symbol BigInt Math Date RegExp JSON Intl
   Map Set WeakMap WeakSet WeakRef FinalizationRegistry Promise Proxy Reflect Iterator
   Error AggregateError EvalError RangeError ReferenceError SyntaxError TypeError URIError
   ArrayBuffer SharedArrayBuffer DataView Atomics WebAssembly
   Int8Array Uint8Array Uint8ClampedArray Int16Array Uint16Array Int32Array Uint32Array Float16Array Float32Array Float64Array
   BigInt64Array BigUint64Array
   isNaN isFinite parseInt parseFloat encodeURI encodeURIComponent decodeURI decodeURIComponent
   console setTimeout clearTimeout queueMicrotask structuredClone performance
   URL URLSearchParams TextEncoder TextDecoder AbortController AbortSignal DOMException Blob crypto atob btoa`.split(
    /\s+/,
  ),
);

/** Known to every browser, but a cell that used them would not give the same value in Node, a worker or an export. */
export const IMPURE_GLOBALS: ReadonlySet<string> = new Set(
  `window document self location history navigator localStorage sessionStorage indexedDB caches fetch XMLHttpRequest WebSocket
   EventSource Worker alert confirm prompt requestAnimationFrame process require module exports Buffer __dirname __filename
   setInterval setImmediate eval`.split(/\s+/),
);

/** Names of the vocabulary, to say "import it" when one is missing. */
export const VOCABULARY: ReadonlySet<string> = new Set(
  "given head note lead margin caution figure table show background markdown rationale restsOn".split(" "),
);

/** The module that a notebook imports its vocabulary from. */
export const isVocabularyModule = (specifier: string): boolean =>
  /(^|\/)runtime\/(index|vocabulary)(\.[tj]s)?$/.test(specifier);
