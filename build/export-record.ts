// What an exported file says about itself, and reading it back: the source of the notebook and of the files beside it, the
// givens, the version, the date, and a digest of each, so that a study can be taken up again from the file alone.

import { createHash } from "node:crypto";
import { gunzipSync } from "node:zlib";
import { packed } from "./packed-script.ts";

export interface RecordedFile {
  /** from the notebook's folder, with slashes; the notebook itself comes first */
  path: string;
  /** hex digest of the text as UTF-8 */
  sha256: string;
  text: string;
}

export interface ExportRecord {
  format: 1;
  program: string;
  version: string;
  /** ISO 8601, UTC */
  exported: string;
  /** label of the notebook: "notebooks/trade-study.ts" */
  notebook: string;
  files: RecordedFile[];
  /** texts of the givens as they were, by name: "2.4 m" */
  givens: Record<string, string>;
  /** hex digest of the givens as JSON, in their order */
  givensSha256: string;
}

const RECORD_ID = "hornbook-record";

export const sha256Hex = (text: string): string => createHash("sha256").update(text, "utf8").digest("hex");

/** Fills in the digests. */
export function makeRecord(
  facts: Omit<ExportRecord, "format" | "program" | "files" | "givensSha256"> & {
    files: { path: string; text: string }[];
  },
): ExportRecord {
  return {
    format: 1,
    program: "Hornbook",
    version: facts.version,
    exported: facts.exported,
    notebook: facts.notebook,
    files: facts.files.map(({ path, text }) => ({ path, sha256: sha256Hex(text), text })),
    givens: facts.givens,
    givensSha256: sha256Hex(JSON.stringify(facts.givens)),
  };
}

/** JSON that can stand in any element of an HTML file: it holds no `<`. */
export function recordJson(record: ExportRecord): string {
  return JSON.stringify(record)
    .replaceAll("<", "\\u003c")
    .replaceAll("\u2028", "\\u2028")
    .replaceAll("\u2029", "\\u2029");
}

/**
 * The record as an element. A still file has no script element at all, so there an inert template holds it, packed (gzip,
 * base64): nothing in the file reads it, only `fork` does.
 */
export function recordElement(record: ExportRecord, { still }: { still: boolean }): string {
  if (!still) {
    // `&` would begin an entity in some elements; in JSON it can be written as an escape
    const json = recordJson(record).replaceAll("&", "\\u0026");
    return `<script type="application/json" id="${RECORD_ID}">${json}</script>`;
  }
  return `<template id="${RECORD_ID}">${packed(recordJson(record))}</template>`;
}

/** True when a file begins as an export does; looks at its first 4 kB only. */
export function looksExported(beginning: string): boolean {
  return (
    /^<!doctype html>/i.test(beginning) &&
    /<meta name="generator" content="Hornbook [^"]*">/.test(beginning.slice(0, 4096))
  );
}

/**
 * Reads the record of an exported file.
 * @throws {Error} one sentence: no record, not readable, or a digest that doesn't match its text
 */
export function readRecord(htmlText: string): ExportRecord {
  const found = htmlText.match(/<(script|template)(?: type="application\/json")? id="hornbook-record">([^<]*)<\/\1>/);
  const text = found?.[1] === "template" ? unpacked(found[2]!) : found?.[2];
  if (!found) throw new Error("the file carries no study: it isn't an export, or the record was cut out of it");
  let record: ExportRecord;
  try {
    record = JSON.parse(text!);
  } catch (error) {
    throw new Error(`the study carried in the file can't be read: ${(error as Error).message}`);
  }
  if (record.format !== 1) {
    throw new Error(`the file's study is of format ${String(record.format)}; this version reads format 1`);
  }
  if (!isRecordShaped(record)) throw new Error("the study carried in the file is incomplete");
  for (const { path, sha256, text } of record.files) {
    if (sha256Hex(text) !== sha256) throw new Error(`${path} in the file isn't as it was exported: its digest differs`);
  }
  if (sha256Hex(JSON.stringify(record.givens)) !== record.givensSha256) {
    throw new Error("the givens in the file aren't as they were exported: their digest differs");
  }
  return record;
}

/** Largest record that is unpacked: more is no notebook that a person wrote. */
const UNPACKED_LIMIT = 64 * 1024 * 1024;

function unpacked(base64: string): string {
  try {
    return gunzipSync(Buffer.from(base64, "base64"), { maxOutputLength: UNPACKED_LIMIT }).toString("utf8");
  } catch (error) {
    throw new Error(`the study carried in the file can't be unpacked: ${(error as Error).message}`);
  }
}

function isRecordShaped(record: ExportRecord): boolean {
  const isText = (value: unknown) => typeof value === "string";
  return (
    [record.version, record.exported, record.notebook, record.givensSha256].every(isText) &&
    Array.isArray(record.files) &&
    record.files.length > 0 &&
    record.files.every((file) => isText(file?.path) && isText(file.sha256) && isText(file.text)) &&
    typeof record.givens === "object" &&
    record.givens !== null &&
    Object.values(record.givens).every(isText)
  );
}
