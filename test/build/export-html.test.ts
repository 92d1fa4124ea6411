import { createHash } from "node:crypto";
import { Script } from "node:vm";
import { parseHTML } from "linkedom";
import { expect, test } from "vitest";
import { exportHtml, scriptText } from "../../build/export-html.ts";
import { makeRecord } from "../../build/export-record.ts";

const record = makeRecord({
  version: "1.2.3",
  exported: "2031-01-01T00:00:00.000Z",
  notebook: "a.ts",
  files: [{ path: "a.ts", text: "" }],
  givens: {},
});
const sha256 = (text: string) => `'sha256-${createHash("sha256").update(text).digest("base64")}'`;

test("scriptText: strings, templates and expressions mean what they meant", () => {
  // The HTML Standard, "Restrictions for contents of script elements": both sequences must be escaped.
  const code = String.raw`["</script>", "</SCRIPT >", '<!--', ${"`</script><!-- ${1}`"}, /<\/script>|<!--/u.source, /<!--/.test("<!--")]`;
  const safe = scriptText(code);
  expect(safe).not.toMatch(/<\/script|<!--/i);
  const [run, plain] = [safe, code].map((text) => new Script(text).runInNewContext() as unknown[]);
  expect(run!.slice(0, 4)).toEqual(plain!.slice(0, 4));
  expect(run!.at(-1)).toBe(true);
});

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
  const script = html.match(/<script id="hornbook-live">([\s\S]*?)<\/script>/)![1]!;
  expect(policy).toContain(`script-src ${sha256(script)};`);
  expect(policy).toContain(sha256("body{margin:0}"));
  expect(policy).toContain(sha256(".a{b:c}"));
  expect(policy).toContain(sha256('color: red; font: "x"'));
  expect(policy).toMatch(/^default-src 'none';/);
  expect(policy).not.toMatch(/unsafe-(inline|eval)|https?:|\*/);
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
