// Notebooks as they should never be: a sound one with its text spoiled, and one whose every call is given what it can't take.

import { seededRandom } from "../assert-close.ts";

const PIECES = [
  ...[
    "(",
    "}",
    "`",
    '"',
    "${",
    "/*",
    "=>",
    "await ",
    "const ",
    "\u0000",
    "export ",
    "import ",
    "rationale(",
    ";",
    "\\",
  ],
  ...["\r\n", "\u2028", "</script>", "<!--", "💥", "0 / 0", "export default ", "restsOn(", "side", "null"],
];

/** What no call of the vocabulary expects. */
const JUNK = [
  ...["undefined", "null", "NaN", "Infinity", "-1", "1e400", "0", "true", "{}", "[]", "[null]", "[[]]", '""', '" "'],
  ...['"1 GHz"', '"x".repeat(100_000)', '"</script><script>"', "Symbol('s')", "() => 1", "12n", "new Date(Number.NaN)"],
  ...[
    "Object.create(null)",
    "new Map([[1, 2]])",
    "Promise.resolve(1)",
    "/x/",
    "new Proxy({}, {})",
    "{ shows: 'table' }",
  ],
  ...["{ shows: 'figure' }", "{ shows: 'rationale' }", "{ shows: 'head', facts: 1 }", "{ shows: 'nothing' }"],
  ...["{ shows: 'note' }", "{ markdown: 5 }", "{ get label() { throw new Error('trap'); } }", "restsOn", "other"],
];

/** Sound calls; `@` before a value says that it may be replaced by junk. */
const CALLS = [
  'given(@"1 m", @{ label: @"A", why: @"w", min: @"0.1 m", max: @"5 m" })',
  'given.choice(@["a", "b"], @{ label: @"B", why: @"w", default: @"a" })',
  'given.switch(@true, @{ label: @"C", why: @"w" })',
  'given.text(@"t", @{ label: @"D", why: @"w" })',
  'head(@{ document: @"d", title: @"t", facts: @[@["a", @"b"]] })',
  "note`words ${@other} and ${show(@other, @'m', @2)}`",
  "lead`words ${@other}`",
  "margin(@other, @{ mark: @'warning', row: @'r' })`words ${@other}`",
  "caution(@'Mind')`words ${@other}`",
  "figure(@{ alt: @'a', draw: @(({ document }: { document: Document }) => document.createElementNS('http://www.w3.org/2000/svg', 'svg')), data: @[['x (m)'], [@1]] }, @{ caption: @'c', title: @'t', basis: @'b' })",
  "table(@{ columns: @['x', @'y'], rows: @[@{ label: @'l', under: @'u', key: @'k', cells: @[@'1', @{ text: @'2', verdict: @'passes' }] }], caption: @'c', data: @[['x'], [@1]] })",
  "rationale(@other, @{ decision: @'d', chosen: @'c', author: @'a', date: @'2026-12-01', reasons: @note`r`, inherited: @'f', numbers: @[restsOn(@'l', @1, @{ agreed: @'1 m', mayMove: @'1 mm' })], history: @[@{ author: @'a', date: @'2026-11-30', agreed: @{ l: @'1 m' } }] })",
];

/** The end of the value that begins at `at`: as many brackets closed as opened. */
function valueEnd(text: string, at: number): number {
  let open = 0;
  let quote = "";
  for (let i = at; i < text.length; i++) {
    const char = text[i]!;
    if (quote !== "") {
      if (char === quote) quote = "";
    } else if (/["'`]/.test(char)) quote = char;
    else if (/[([{]/.test(char)) open++;
    else if (/[)\]}]/.test(char) && --open < 0) return i;
    else if (char === "," && open === 0) return i;
  }
  return text.length;
}

/**
 * @param sound    source of a sound notebook
 * @param vocabulary import path of the vocabulary, as a literal
 */
export function* malformedNotebooks(sound: string, vocabulary: string, count: number, seed: number): Iterable<string> {
  const random = seededRandom(seed);
  const upTo = (n: number) => Math.floor(random() * n);
  const spoiled = (): string => {
    let text = sound;
    for (let edits = 1 + upTo(3); edits > 0; edits--) {
      const at = upTo(text.length);
      const kind = random();
      if (kind < 0.4) text = text.slice(0, at) + PIECES[upTo(PIECES.length)] + text.slice(at);
      else if (kind < 0.75) text = text.slice(0, at) + text.slice(at + 1 + upTo(12));
      else if (kind < 0.9) text = text.slice(0, at) + text.slice(at, at + 200) + text.slice(at);
      else text = text.slice(0, at);
    }
    return text;
  };
  /** each mark is dropped, one or two of them with their value */
  const misused = (call: string): string => {
    let text = call;
    for (let times = 1 + upTo(2); times > 0; times--) {
      const marks = [...text.matchAll(/@/g)].map(({ index }) => index);
      const at = marks[upTo(marks.length)];
      if (at === undefined) break;
      text = text.slice(0, at) + JUNK[upTo(JUNK.length)] + text.slice(valueEnd(text, at + 1));
    }
    return text.replaceAll("@", "");
  };
  const allMisused = (): string => {
    const cells = Array.from({ length: 12 }, (_, i) => {
      const call = misused(CALLS[upTo(CALLS.length)]!);
      return `${random() < 0.8 ? `export const cell${i} = ` : ""}${call};`;
    });
    const names = "caution, figure, given, head, lead, margin, note, rationale, restsOn, show, table";
    return `import { ${names} } from ${vocabulary};\n\nexport const other = 2;\n\n${cells.join("\n\n")}\n`;
  };
  for (let i = 0; i < count; i++) yield i % 2 === 0 ? spoiled() : allMisused();
}
