import { parseHTML } from "linkedom";
import { expect, test } from "vitest";
import { codeNodes } from "../../../runtime/page/code.ts";
import { noteLetter } from "../../../runtime/page/plan-notes.ts";
import { csvText } from "../../../runtime/page/save.ts";
import { plain, typeset } from "../../../runtime/page/typography.ts";
import { stateSentence } from "../../../runtime/page/words.ts";

test("stateSentence: all current, and every mixture", () => {
  expect(stateSentence({ current: 41, working: 0, behind: 0, failed: 0 })).toBe("All 41 results are current.");
  expect(stateSentence({ current: 1, working: 0, behind: 0, failed: 0 })).toBe("The result is current.");
  expect(stateSentence({ current: 37, working: 1, behind: 2, failed: 1 })).toBe(
    "Two results are behind, one is working and one has failed.",
  );
  expect(stateSentence({ current: 3, working: 0, behind: 0, failed: 14 })).toBe("14 results have failed.");
  expect(stateSentence({ current: 0, working: 0, behind: 0, failed: 0 })).toBe("There are no results yet.");
});

test("noteLetter: i, l and o are left out, doubles follow z", () => {
  const letters = Array.from({ length: 25 }, (_, index) => noteLetter(index));
  expect(letters.slice(0, 13).join("")).toBe("abcdefghjkmnp");
  expect(letters.slice(22)).toEqual(["z", "aa", "ab"]);
});

test("typeset and plain undo each other for quantities", () => {
  for (const text of ["-23.6 dB", "8.025 GHz", "0.6 mm", "5.8e7 S/m", "290 K", "-40", "1e-3 m"])
    expect(plain(typeset(text))).toBe(text);
  expect(typeset("at most -25 dB (-3 to -4)")).toBe("at most −25\u00a0dB (−3 to −4)");
  expect(typeset("TE-11, well-known, 3 metres, 2026-12-01")).toBe("TE-11, well-known, 3 metres, 2026-12-01");
});

test("csvText: RFC 4180 quoting, full digits, and no text that a spreadsheet would run", () => {
  const text = csvText([
    ["theta, deg", 'say "x"'],
    [0.1 + 0.2, "=1+1"],
    ["-25 dB", "two\nlines"],
  ]);
  expect(text).toBe('"theta, deg","say ""x"""\r\n0.30000000000000004,\'=1+1\r\n-25 dB,"two\nlines"\r\n');
});

test("codeNodes: comments are set back, a comment inside a string is no comment, every character stays", () => {
  const { document } = parseHTML("<p></p>");
  const source = 'const a = "// no"; // yes\nconst b = `/* no */`; /* yes\n too */ const c = 1 / 2; // end';
  const nodes = codeNodes(document as unknown as Document, source);
  expect(nodes.map((node) => node.textContent).join("")).toBe(source);
  const comments = nodes.filter((node) => (node as Element).className === "comment").map((node) => node.textContent);
  expect(comments).toEqual(["// yes", "/* yes\n too */", "// end"]);
});
