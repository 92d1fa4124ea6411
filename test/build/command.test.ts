// The parts of the command line that need no notebook.

import { mkdtemp, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { expect, test } from "vitest";
import { Failure } from "../../build/command/failure.ts";
import { didYouMean, nearNames } from "../../build/command/near-names.ts";
import { startProgress } from "../../build/command/progress.ts";
import { readArguments } from "../../build/command/verb.ts";
import { readSets } from "../../build/set-givens.ts";

const verb = {
  options: {
    set: { type: "string", multiple: true },
    only: { type: "string" },
    out: { type: "string", short: "o" },
    csv: { type: "boolean" },
  },
  positionals: [{ name: "notebook" }],
} as const satisfies Parameters<typeof readArguments>[1];
const read = (...argv: string[]) =>
  readArguments("values", { options: verb.options, positionals: [...verb.positionals] }, argv);

test("readArguments: options in any order, values with signs and equals signs", () => {
  const args = read("--set", "a=1 m", "x.ts", "--set=b=-3 dB", "-o", "out.csv", "--csv");
  expect(args.positionals).toEqual(["x.ts"]);
  expect(args.texts("set")).toEqual(["a=1 m", "b=-3 dB"]);
  expect(args.text("out")).toBe("out.csv");
  expect(args.switch("csv")).toBe(true);
  expect(args.switch("still")).toBe(false);
});

test.each([
  [["x.ts", "--onyl", "a"], /no option --onyl\. Did you mean "--only"\?/],
  [["x.ts", "--only"], /--only needs a value/],
  [["x.ts", "--only", "a", "--only", "b"], /--only is given twice/],
  [["x.ts", "--csv=yes"], /--csv is a switch and takes no value; got "yes"/],
  [[], /values needs a notebook\. See "hornbook values --help"/],
  [["x.ts", "y.ts"], /doesn't know what to do with "y.ts"/],
])("readArguments: %j is refused in a sentence", (argv, words) => {
  expect(() => read(...argv)).toThrow(words);
  expect(() => read(...argv)).toThrow(Failure);
});

test("nearNames: slips of a key, swapped letters, parts of a name; not just anything", () => {
  const names = ["dishDiameter", "fOverD", "bandLow", "bandHigh", "trade"];
  expect(nearNames("dishDiamter", names)).toEqual(["dishDiameter"]);
  expect(nearNames("dihsdiameter", names)).toEqual(["dishDiameter"]);
  expect(nearNames("band", names)).toEqual(["bandLow", "bandHigh"]);
  expect(nearNames("tarde", names)).toEqual(["trade"]);
  expect(nearNames("noise", names)).toEqual([]);
  expect(didYouMean("noise", ["a", "b"])).toBe(" There is: a, b.");
});

test("readSets: text from a file, a text that begins with @, spaces kept", async () => {
  const folder = await mkdtemp(join(tmpdir(), "sets-"));
  const file = join(folder, "horn.csv");
  await writeFile(file, "z_mm,r_mm\r\n0,10\r\n");
  expect(await readSets([`profile=@${file}`, "name=@@home", "d= 2.4 m", "e=a=b"], "/")).toEqual({
    profile: "z_mm,r_mm\r\n0,10\r\n",
    name: "@home",
    d: " 2.4 m",
    e: "a=b",
  });
  await writeFile(file, Buffer.from([0xff, 0xfe, 0x41]));
  await expect(readSets([`profile=@${file}`], "/")).rejects.toThrow(/isn't UTF-8 text/);
  await expect(readSets([`profile=@${folder}`], "/")).rejects.toThrow(/it is a folder/);
  await expect(readSets(["profile=@/no/such/file"], "/")).rejects.toThrow(/there is no such file/);
  await expect(readSets(["profile"], "/")).rejects.toThrow(/must be name=value; got "profile"/);
  await expect(readSets(["=3"], "/")).rejects.toThrow(/must be name=value/);
  await expect(readSets(["a=1", "a=2"], "/")).rejects.toThrow(/gives a twice/);
});

test("startProgress: silent at first, then one line, and gone at the end", async () => {
  const lines: string[] = [];
  const terminal = { isTTY: true, columns: 20, write: (text: string) => lines.push(text) };
  const quick = startProgress(terminal, { afterMs: 10_000 });
  quick.say("evaluating");
  quick.end();
  expect(lines).toEqual([]);
  const slow = startProgress(terminal, { afterMs: 0 });
  slow.say("a text that is longer than the terminal is wide");
  expect(lines.at(-1)).toBe("\r\u001b[2Ka text that is long");
  slow.end();
  expect(lines.at(-1)).toBe("\r\u001b[2K");
  const log: string[] = [];
  const piped = startProgress({ write: (text: string) => log.push(text) }, { afterMs: 0, pauseMs: 1000 });
  piped.say("one");
  piped.say("two");
  piped.end();
  expect(log).toEqual(["one\n"]);
});
