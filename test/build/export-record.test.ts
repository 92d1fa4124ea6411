import { createHash } from "node:crypto";
import { parseHTML } from "linkedom";
import { expect, test } from "vitest";
import { looksExported, makeRecord, readRecord, recordElement } from "../../build/export-record.ts";

const nasty =
  "</script><script>alert(1)</script> <!-- <template></template> &lt; & \" ' ` $" + "{x} \u2028 \u2029 \\ \0 😀 \r\n\t";
const record = makeRecord({
  version: "0.1.0",
  exported: "2031-05-06T07:08:09.000Z",
  notebook: "notebooks/nasty.ts",
  files: [
    { path: "nasty.ts", text: nasty },
    { path: "../beside/helper.ts", text: "export const x = 1;\n" },
  ],
  givens: { dishDiameter: "2.4 m", profile: nasty },
});
const page = (element: string) =>
  `<!doctype html><html><head><title>x</title></head><body><p>text</p>${element}</body></html>`;

test.each([true, false])("export record: reads back exactly (still: %s)", (still) => {
  expect(readRecord(page(recordElement(record, { still })))).toEqual(record);
});

test.each([true, false])(
  "export record: an HTML parser finds one inert element and no script in it (still: %s)",
  (still) => {
    const element = recordElement(record, { still });
    expect(element.match(/</g)).toHaveLength(2);
    const { document } = parseHTML(page(element));
    const scripts = [...document.querySelectorAll("script")].map((script) => script.getAttribute("type"));
    expect(scripts).toEqual(still ? [] : ["application/json"]);
  },
);

test("export record: digests are SHA-256 of the UTF-8 text", () => {
  expect(record.files[0]!.sha256).toBe(createHash("sha256").update(Buffer.from(nasty, "utf8")).digest("hex"));
  // FIPS 180-4 example of "abc", as NIST's example values print it.
  const abc = makeRecord({
    version: "1",
    exported: "",
    notebook: "a.ts",
    files: [{ path: "a.ts", text: "abc" }],
    givens: {},
  });
  expect(abc.files[0]!.sha256).toBe("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
});

test("export record: a changed text, a missing or a broken record is told", () => {
  const html = page(recordElement(record, { still: false }));
  expect(() => readRecord(html.replace("export const x = 1", "export const x = 2"))).toThrow(
    /helper\.ts in the file isn't as it was exported/,
  );
  expect(() => readRecord(html.replace("2.4 m", "2.5 m"))).toThrow(/givens in the file/);
  expect(() => readRecord(page("<p>nothing</p>"))).toThrow(/carries no study/);
  expect(() => readRecord(html.replace('{"format":1,', '{"format":1,,'))).toThrow(/can't be read/);
  expect(() => readRecord(html.replace('"format":1', '"format":9'))).toThrow(/format 9/);
  expect(() => readRecord(html.replace('"files":', '"fils":'))).toThrow(/incomplete/);
});

test("looksExported: only what begins as an export does", () => {
  expect(looksExported('<!doctype html>\n<html lang="en"><head><meta name="generator" content="Hornbook 0.1.0">')).toBe(
    true,
  );
  expect(looksExported('<!doctype html>\n<html><head><meta name="generator" content="Another">')).toBe(false);
  expect(looksExported("# notes")).toBe(false);
});
