import { createHash } from "node:crypto";
import { gunzipSync } from "node:zlib";
import { parseHTML } from "linkedom";
import { expect, test } from "vitest";
import { exportHtml } from "../../build/export-html.ts";
import { makeRecord } from "../../build/export-record.ts";

const record = makeRecord({
  version: "1.2.3",
  exported: "2031-01-01T00:00:00.000Z",
  notebook: "a.ts",
  files: [{ path: "a.ts", text: "" }],
  givens: {},
});
const sha256 = (text: string) => `'sha256-${createHash("sha256").update(text).digest("base64")}'`;

test("exportHtml: the policy holds the hashes of exactly what is in the file", () => {
  const html = exportHtml({
    title: "A & B <i>",
    firstPaint: '<main><svg style="color: red; font: &quot;x&quot;"><style>.a{b:c}</style></svg></main>',
    style: "body{margin:0}",
    script: 'console.log("</script><!--")',
    record,
    notices: ["package--name 1.0.0 (MIT)"],
  });
  const { document } = parseHTML(html);
  const policy = document.querySelector("meta[http-equiv]")!.getAttribute("content")!;
  const packed = html.match(/<script type="application\/gzip;base64" id="hornbook-packed">([^<]*)<\/script>/)![1]!;
  const live = gunzipSync(Buffer.from(packed, "base64")).toString("utf8");
  expect(live).toBe('console.log("</script><!--")');
  const loader = html.match(/<script>([\s\S]*?)<\/script>/)![1]!;
  expect(policy).toContain(`script-src ${sha256(loader)} ${sha256(live)} 'wasm-unsafe-eval';`);
  expect(policy).toContain(sha256("body{margin:0}"));
  expect(policy).toContain(sha256(".a{b:c}"));
  expect(policy).toContain(sha256('color: red; font: "x"'));
  expect(policy).toMatch(/^default-src 'none';/);
  expect(policy).not.toMatch(/'unsafe-(inline|eval)|https?:|\*/);
  expect(document.title).toBe("A & B <i>");
  expect(html.indexOf("http-equiv")).toBeLessThan(html.indexOf("<style>"));
  expect(html.match(/<!--/g)).toHaveLength(1);
});

test("exportHtml: a still file has neither script nor a right to one", () => {
  const html = exportHtml({ title: "x", firstPaint: "<p>y</p>", style: "", record, notices: [] });
  expect(html).not.toMatch(/<script/i);
  expect(html).toContain("script-src 'none'");
  expect(html).toContain("worker-src 'none'");
});
