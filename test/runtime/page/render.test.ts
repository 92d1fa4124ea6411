import { parseHTML } from "linkedom";
import { beforeAll, describe, expect, test } from "vitest";
import { renderStudy } from "../../../runtime/page/render.ts";
import { type FakeCell, FakeStudy } from "./fake-study.ts";
import { curves, sampleStudy } from "./sample-study.ts";

function page(study: FakeStudy, still = false): { html: string; root: Element } {
  const { document } = parseHTML("<!doctype html><html><body></body></html>");
  const html = renderStudy(study, { document: document as unknown as Document, still });
  const { document: reader } = parseHTML(`<!doctype html><html><body><div id="study">${html}</div></body></html>`);
  return { html, root: reader.querySelector("#study") as unknown as Element };
}

const note = (name: string, markdown: string, more: Partial<FakeCell> = {}): FakeCell => ({
  name,
  source: "note`…`;",
  value: () => ({ shows: "note", markdown }),
  ...more,
});

describe("renderStudy: the sample", () => {
  let html: string;
  let root: Element;
  beforeAll(() => {
    ({ html, root } = page(sampleStudy()));
  });

  test("one main, one title, headings in order, every section labelled by its own", () => {
    expect(root.querySelectorAll("main").length).toBe(1);
    expect([...root.querySelectorAll("h1")].map((heading) => heading.textContent)).toEqual([
      "A feed for the northern mast",
    ]);
    const levels = [...root.querySelectorAll("h1, h2, h3, h4")].map((heading) => Number(heading.localName[1]));
    for (const [index, level] of levels.entries()) expect(level).toBeLessThanOrEqual((levels[index - 1] ?? 0) + 1);
    for (const section of root.querySelectorAll("section"))
      expect(root.querySelector(`#${section.getAttribute("aria-labelledby")}`)?.parentElement?.closest("section")).toBe(
        section,
      );
  });

  test("the lead is written last and stands first; plain values stand nowhere", () => {
    expect(root.querySelector(".opening .lead")?.textContent).toContain("The dual-mode horn for the 2.40\u00a0m dish");
    expect(root.querySelector("#report .lead")).toBeNull();
    expect(root.querySelector('[data-cell="requirement"], [data-cell="sweep"]')).toBeNull();
  });

  test("givens that follow each other make one table under the heading before them", () => {
    const tables = root.querySelectorAll(".givens");
    expect(tables.length).toBe(1);
    expect(tables[0]!.closest("section")?.getAttribute("id")).toBe("given");
    expect(tables[0]!.querySelectorAll("tbody tr").length).toBe(7);
    for (const input of tables[0]!.querySelectorAll("input[type=text], select, textarea, input[type=checkbox]"))
      expect(root.querySelector(`label[for="${input.id}"]`)?.textContent).toBeTruthy();
  });

  test("a note stands in the row it speaks of, with one letter on both; a reading has none; an empty note is away", () => {
    const row = root.querySelector('.results tr[data-row="crossPolar"]')!;
    const letter = row.querySelector("th sup.letter")!;
    expect(row.querySelector(".beside .letter")?.textContent).toBe(letter.lastChild?.textContent);
    expect(row.querySelector(".beside .sort")?.textContent).toContain("Warning");
    expect(root.querySelector('.beside[data-mark="reading"] .letter')).toBeNull();
    expect(root.querySelector('[data-cell="line 40"], [data-cell="line 96"]')).toBeNull();
    const letters = [...root.querySelectorAll(".beside span.letter")].map((each) => each.textContent);
    expect(letters).toEqual([..."abcde"]);
  });

  test("every result tells its state in words", () => {
    const said = (name: string) => root.querySelector(`[data-cell="${name}"] .foot .line`)?.textContent;
    expect(said("patterns")).toContain("current");
    expect(said("band")).toContain("working, 62\u00a0%");
    expect(said("fine")).toContain("behind");
    expect(said("fine")).toContain("computed for earlier values");
    expect(said("measured")).toContain("failed");
    expect(root.querySelector(".state-of-study .sentence")?.textContent).toBe(
      "One result is behind, two are working and three have failed.",
    );
    expect(root.querySelector(".state-of-study a")?.getAttribute("href")).toBe("#at-measured");
  });

  test("a failed figure names the cell where it began, its place, the reason and the way; a failed value that nothing shows has its line", () => {
    const figure = root.querySelector('[data-cell="measured"] .content')!.textContent!;
    for (const part of ["rangeCuts", "notebooks/sample.ts:71", "the E-plane file ends at 92°", "rangeCuts → measured"])
      expect(figure).toContain(part);
    expect(root.querySelector('.lost[data-cell="lonely"]')?.textContent).toContain("zero is not a length");
    expect(root.querySelector('.lost[data-cell="rangeCuts"]')).toBeNull();
  });

  test("code under a result: its own source and the values declared since the result before, with file and lines", () => {
    const code = root.querySelector('[data-cell="patterns"] details.code')!;
    expect(code.querySelector("pre")?.textContent).toContain("const requirement = feedRequirement({");
    expect(code.querySelector("pre")?.textContent).toContain("const patterns = figure(");
    const { line, endLine } = sampleStudy().cell("patterns");
    expect(code.querySelector(".place")?.textContent).toContain(`notebooks/sample.ts, lines `);
    expect(code.querySelector(".place")?.textContent).toContain(`${line} to ${endLine}`);
    expect(root.querySelector('[data-cell="band"] details.code pre')?.textContent).not.toContain("feedRequirement");
  });

  test("a figure is a picture with a text alternative, also in words", () => {
    const figure = root.querySelector('[data-cell="patterns"]')!;
    expect(figure.querySelector(".drawing > *")?.getAttribute("role")).toBe("img");
    expect(figure.querySelector(".drawing > *")?.getAttribute("aria-label")).toContain("11\u00a0dB down");
    expect(figure.querySelector(".words p")?.textContent).toContain("11\u00a0dB down");
    expect(figure.querySelector("svg polyline")).not.toBeNull();
  });

  test("nothing that a strict content policy would stop: no script, no handler, no style attribute, no address to fetch", () => {
    const every = [...root.querySelectorAll("*")];
    expect(root.querySelector("script, style, iframe, object, embed, link")).toBeNull();
    for (const element of every)
      for (const attribute of element.attributes) {
        expect(attribute.name, element.outerHTML.slice(0, 80)).not.toMatch(/^(?:on|style$|srcset$|formaction$)/);
        if (attribute.name === "src") expect(attribute.value).toMatch(/^data:/);
      }
    expect(html).not.toMatch(/javascript:/i);
  });
});

describe("renderStudy: other studies", () => {
  test("still: values as text, no control at all", () => {
    const { root } = page(sampleStudy(), true);
    expect(root.querySelector("input, select, textarea, button")).toBeNull();
    expect(root.querySelector('[data-row="dishDiameter"] .value')?.textContent).toBe("2.4\u00a0m");
    expect(root.querySelector('[data-row="polarizer"] .value')?.textContent).toBe("on");
  });

  test("givens before any heading are headed Given; a title stands in where no head is", () => {
    const { root } = page(
      new FakeStudy(
        [{ name: "a", text: "1 m" }, { name: "b", value: () => 1 }, { name: "c", text: "2 m" }, note("n", "words")],
        "notebooks/first-look.ts",
      ),
    );
    expect(root.querySelector("h1")?.textContent).toBe("first-look");
    expect(root.querySelector("h2")?.textContent).toBe("Given");
    expect(root.querySelectorAll(".givens").length).toBe(1);
    expect(root.querySelectorAll(".givens tbody tr").length).toBe(2);
  });

  test("two sections of one title have places of their own", () => {
    const { root } = page(new FakeStudy([note("a", "## Trade"), note("b", "## Trade"), note("c", "## Ünïcode — π!")]));
    expect([...root.querySelectorAll("section")].map((section) => section.id)).toEqual(["trade", "trade-2", "unicode"]);
  });

  test("a note beside a value that isn't shown stands with the first thing that shows it", () => {
    const { root } = page(
      new FakeStudy([
        { name: "plain", value: () => 3 },
        { name: "between", inputs: ["plain"], value: () => 4 },
        note("first", "first"),
        note("second", "second", { inputs: ["between"] }),
        {
          name: "m",
          beside: "plain",
          source: "margin(plain)`x`",
          value: () => ({ shows: "margin", mark: "warning", markdown: "Mind this." }),
        },
      ]),
    );
    expect(root.querySelector('[data-cell="second"] .beside')?.textContent).toContain("Mind this.");
  });

  test("a drawing that throws says so, and the rest of the page stands", () => {
    const broken = {
      alt: "none",
      draw: () => {
        throw new Error("no room for 3 horns");
      },
    };
    const { root } = page(
      new FakeStudy([
        { name: "f", source: "const f = figure()", value: () => ({ shows: "figure", caption: "c", drawing: broken }) },
        note("n", "after"),
      ]),
    );
    expect(root.querySelector('[data-cell="f"] .content')?.textContent).toContain("no room for 3 horns");
    expect(root.querySelector('[data-cell="n"]')?.textContent).toContain("after");
  });

  test("markup in every text is only text", () => {
    const evil = '</textarea></title></noscript>"><script>window.ran=1</script><img src=x onerror=window.ran=1>';
    const shown = (value: unknown, name: string): FakeCell => ({
      name,
      source: `const ${name} = "${evil}"; // </script>${evil}`,
      value: () => value,
    });
    const failure = { reason: evil, cell: evil, file: evil, line: 1, path: [evil, evil] };
    const study = new FakeStudy(
      [
        shown({ shows: "head", document: evil, title: evil, facts: [[evil, evil]] }, "h"),
        shown({ shows: "lead", markdown: evil }, "l"),
        note("n", `## ${evil}\n\n${evil}`),
        { name: "g", text: evil, form: "text", label: evil, why: evil, unit: evil },
        {
          name: "c",
          text: "a",
          form: "choice",
          label: evil,
          why: evil,
          options: ["a", evil],
          refusal: { entered: evil, message: evil },
        },
        shown(
          { shows: "figure", title: evil, caption: evil, basis: evil, drawing: { ...curves(evil, 9), data: [[evil]] } },
          "f",
        ),
        shown(
          {
            shows: "table",
            title: evil,
            caption: evil,
            basis: evil,
            columns: [{ label: evil, kind: evil }],
            rows: [
              { key: evil, label: evil, under: evil, cells: [{ text: evil, word: evil, verdict: evil }] },
              { label: evil, cells: evil },
            ],
          },
          "t",
        ),
        { ...shown({ shows: "margin", mark: evil, row: evil, markdown: evil }, "m"), beside: "t" },
        shown({ shows: "caution", title: evil, markdown: evil }, "k"),
        { name: evil, source: evil, state: "failed", failure },
      ],
      evil,
    );
    for (const still of [false, true]) {
      const { html, root } = page(study, still);
      expect(root.querySelector("script, img")).toBeNull();
      for (const element of root.querySelectorAll("*"))
        for (const { name } of element.attributes) expect(name).not.toMatch(/^on/);
      expect(root.querySelector("h1")?.textContent).toBe(evil);
      expect(html).not.toContain("<script");
    }
  });
});
