import { parseHTML } from "linkedom";
import { describe, expect, test } from "vitest";
import { openingHeading, phrase, prose, safeLink } from "../../../runtime/page/prose.ts";

function said(markdown: string): Element {
  const { document } = parseHTML("<!doctype html><html><body><div></div></body></html>");
  const root = document.querySelector("div")!;
  root.append(...prose(document as unknown as Document, markdown));
  return root as unknown as Element;
}

describe("prose", () => {
  test("paragraphs, emphasis, code, lists, tables and headings become elements", () => {
    const root = said(
      "## Trade\n\nA *thin* **wall** of `2 mm`.\n\n- one\n- two\n\n| a | b |\n|---|---|\n| 1 | 2 |\n\n### Detail",
    );
    expect([...root.children].map((child) => child.localName)).toEqual(["h2", "p", "ul", "table", "h3"]);
    expect(root.querySelector("em")?.textContent).toBe("thin");
    expect(root.querySelector("code")?.textContent).toBe("2 mm");
    expect(root.querySelectorAll("li").length).toBe(2);
    expect(root.querySelector("th")?.getAttribute("scope")).toBe("col");
  });

  test("raw HTML shows as the text it is", () => {
    const root = said('<script>alert(1)</script>\n\nIn line <img src=x onerror="alert(1)"> too, and <b>bold</b>.');
    expect(root.querySelector("script, img, b")).toBeNull();
    expect(root.textContent).toContain("<script>alert(1)</script>");
    expect(root.textContent).toContain('<img src=x onerror="alert(1)">');
  });

  test("a link that could run or read something is only its words", () => {
    for (const href of [
      "javascript:alert(1)",
      "JaVaScRiPt:alert(1)",
      "data:text/html,x",
      "vbscript:x",
      "file:///etc/passwd",
      "&#106;avascript:alert(1)",
      "java&#10;script:x",
      "//host/x",
    ]) {
      const root = said(`[words](<${href}>)`);
      expect(root.querySelector("a"), href).toBeNull();
      expect(root.textContent, href).toBe("words");
    }
  });

  test("http, https, mailto and places on the page may be followed", () => {
    for (const href of ["https://example.org/a?b=1", "http://example.org", "mailto:a@example.org", "#trade"])
      expect(said(`[words](${href})`).querySelector("a")?.getAttribute("href")).toBe(href);
    expect(safeLink("https://example.org/\u0001x")).toBeUndefined();
  });

  test("a picture comes from the note itself or not at all", () => {
    expect(said("![a horn](https://example.org/x.png)").querySelector("img")).toBeNull();
    expect(said("![a horn](data:image/svg+xml;base64,PHN2Zz4=)").querySelector("img")).toBeNull();
    const picture = said("![a horn](data:image/png;base64,iVBORw0KGgo=)").querySelector("img");
    expect(picture?.getAttribute("alt")).toBe("a horn");
  });

  test("an entity is decoded once and stays text", () => {
    const root = said("5 &micro;m, &lt;script&gt;x&lt;/script&gt;, &amp;lt;");
    expect(root.querySelector("script")).toBeNull();
    expect(root.textContent).toBe("5\u00a0µm, <script>x</script>, &lt;");
  });

  test("numbers get a true minus and stay with their unit; code keeps what it holds", () => {
    const root = said("From -23.6 dB to -25 dB, on 2026-12-01; `-1 dB`.");
    expect(root.textContent).toBe("From −23.6\u00a0dB to −25\u00a0dB, on 2026-12-01; -1 dB.");
  });

  test("phrase: emphasis without a paragraph", () => {
    const { document } = parseHTML("<p></p>");
    const nodes = phrase(document as unknown as Document, "*f/D* 0.80 & <i>");
    expect(nodes.map((node) => node.textContent).join("")).toBe("f/D 0.80 & <i>");
  });

  test("openingHeading: only a heading that opens the note begins a section", () => {
    expect(openingHeading("## The *field*\n\nbody")).toBe("The field");
    expect(openingHeading("\n# Trade")).toBe("Trade");
    expect(openingHeading("words\n\n## Later")).toBeUndefined();
    expect(openingHeading("### Smaller")).toBeUndefined();
  });
});
