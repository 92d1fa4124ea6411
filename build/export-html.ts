// One HTML file: what was computed can be read at once and without scripts; then, unless it is a still one, the study wakes up.
// Nothing in it asks the network for anything, and its policy forbids it.

import { createHash } from "node:crypto";
import { type ExportRecord, recordElement } from "./export-record.ts";
import { packedScript } from "./packed-script.ts";

export interface ExportParts {
  /** plain text */
  title: string;
  /** HTML of the page's root, made headless */
  firstPaint: string;
  style: string;
  /** the live page's classic script, which its workers run too; none: a still file */
  script?: string;
  record: ExportRecord;
  /** packages whose code the script holds, with version and licence */
  notices: readonly string[];
}

const hashSource = (text: string): string => `'sha256-${createHash("sha256").update(text, "utf8").digest("base64")}'`;

const escapeText = (text: string): string =>
  text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;");

/** Style text that can stand in a style element: its end tag can only be inside a string, where the escape means the same. */
export function styleText(style: string): string {
  return style.replace(/<\/(style)/gi, "<\\/$1");
}

/** The policy's sources for the style elements and style attributes that figures brought into the first paint. */
function stylesWithin(html: string): string[] {
  const elements = [...html.matchAll(/<style[^>]*>([\s\S]*?)<\/style>/gi)].map((match) => match[1]!);
  const attributes = [...html.matchAll(/\sstyle="([^"]*)"/gi)].map((match) => unescapeAttribute(match[1]!));
  const sources = [...new Set([...elements, ...attributes])].map(hashSource);
  return attributes.length > 0 ? ["'unsafe-hashes'", ...sources] : sources;
}

const unescapeAttribute = (text: string): string =>
  text.replaceAll("&quot;", '"').replaceAll("&lt;", "<").replaceAll("&gt;", ">").replaceAll("&amp;", "&");

/** The whole file. */
export function exportHtml({ title, firstPaint, style, script, record, notices }: ExportParts): string {
  const css = styleText(style);
  const live = script === undefined ? undefined : packedScript(script);
  const policy = [
    "default-src 'none'",
    live === undefined ? "script-src 'none'" : `script-src ${live.texts.map(hashSource).join(" ")} 'wasm-unsafe-eval'`,
    ["style-src", hashSource(css), ...stylesWithin(firstPaint)].join(" "),
    "img-src data: blob:",
    live === undefined ? "worker-src 'none'" : "worker-src blob:",
    "base-uri 'none'",
    "form-action 'none'",
  ].join("; ");
  return [
    "<!doctype html>",
    '<html lang="en">',
    "<head>",
    '<meta charset="utf-8">',
    `<meta name="generator" content="${record.program} ${escapeText(record.version)}">`,
    `<meta http-equiv="Content-Security-Policy" content="${policy}">`,
    '<meta name="viewport" content="width=device-width, initial-scale=1">',
    '<meta name="referrer" content="no-referrer">',
    `<title>${escapeText(title)}</title>`,
    `<style>${css}</style>`,
    "</head>",
    "<body>",
    `<div id="study">${firstPaint}</div>`,
    recordElement(record, { still: live === undefined }),
    ...(notices.length === 0 ? [] : [`<!-- The script holds: ${notices.join("; ").replaceAll("--", "- -")} -->`]),
    ...(live === undefined ? [] : [live.html]),
    "</body>",
    "</html>",
    "",
  ].join("\n");
}
