// `fork`, by the real command: from a notebook and from an exported file, never over anything.

import { readdir, readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { expect, test } from "vitest";
import { copySmall, fixtures, isOneSentence, ownFolder, run, runtimeImport } from "./run-command.ts";

async function decided(folder: string): Promise<string> {
  const path = join(folder, "decided.ts");
  const text = await readFile(join(fixtures, "decided.ts"), "utf8");
  await writeFile(path, text.replace('"../../../runtime/index.ts"', runtimeImport));
  return path;
}

test("fork: a notebook with new givens, which evaluates to their numbers", async () => {
  const folder = await ownFolder();
  const path = await decided(folder);
  const { code, out, err } = await run(["fork", path, "--name", "Half a plate", "--set", "side=60 cm"], {
    cwd: folder,
  });
  expect([code, out]).toEqual([0, "half-a-plate.ts\n"]);
  expect(err).toBe("Open it with: npm run -s hornbook -- open half-a-plate.ts\n");
  const text = await readFile(join(folder, "half-a-plate.ts"), "utf8");
  expect(text).toMatch(/^\/\/ Forked from decided\.ts on \d{4}-\d\d-\d\d: Half a plate\.\n/);
  expect(text).toContain('given("60 cm", {');
  const values = JSON.parse((await run(["values", "half-a-plate.ts"], { cwd: folder })).out);
  expect(values.cells.area).toBeCloseTo(0.36, 12);
  expect(values.warnings.map(({ code }: { code: string }) => code)).toEqual(["inherited", "moved", "moved"]);
});

test("check: rationales that moved or are inherited are listed, with an exit code of their own", async () => {
  const folder = await ownFolder();
  const path = await decided(folder);
  const fine = await run(["check", path]);
  expect(fine.code).toBe(0);
  expect(fine.out).toContain("rationales ✓ 1, as agreed");
  const moved = await run(["check", path, "--set", "side=1.3 m"]);
  expect(moved.code).toBe(3);
  expect(moved.out.replaceAll("\u00a0", " ")).toContain(
    'squareChosen moved: "Cut it square." rests on Side, agreed as 1.20 m, now 1.30 m.',
  );
  await run(["fork", path, "--name", "Again"], { cwd: folder });
  const inherited = await run(["check", "again.ts"], { cwd: folder });
  expect(inherited.code).toBe(3);
  expect(inherited.out).toContain('"Cut it square." is inherited from decided.ts, not yet confirmed.');
});

test.each([[], ["--still"]])(
  "fork: an exported file %j gives its notebook back, with the files beside it",
  async (...still) => {
    const folder = await ownFolder();
    const elsewhere = await ownFolder();
    const path = await copySmall(folder);
    const source = await readFile(path, "utf8");
    await run(["export", path, "--set", "outer=2 m", "-o", "sent.html", ...still], { cwd: folder });
    const { code, err } = await run(
      ["fork", join(folder, "sent.html"), "--name", "Taken up", "--set", "inner=0.5 m", "--to", elsewhere],
      { cwd: elsewhere },
    );
    expect([code, err]).toEqual([0, "Open it with: npm run -s hornbook -- open taken-up.ts\n"]);
    const forked = await readFile(join(elsewhere, "taken-up.ts"), "utf8");
    const [, ...rest] = forked.split("\n");
    expect(rest.join("\n")).toBe(
      source
        .replace('given("1.2 m"', 'given("2 m"')
        .replace('given("300 mm"', 'given("0.5 m"')
        .replace('title: "A ring of sheet metal"', 'title: "Taken up"'),
    );
    expect(await readFile(join(elsewhere, "ring.ts"), "utf8")).toBe(await readFile(join(folder, "ring.ts"), "utf8"));
    expect(JSON.parse((await run(["values", "taken-up.ts"], { cwd: elsewhere })).out).givens).toMatchObject({
      outer: 2,
      inner: 0.5,
    });
  },
);

test("fork: what can't be is one sentence, exit 2, and nothing is written", async () => {
  const folder = await ownFolder();
  const path = await decided(folder);
  await writeFile(join(folder, "page.html"), "<p>not an export</p>");
  await run(["fork", path, "--name", "there"], { cwd: folder });
  const before = (await readdir(folder)).sort();
  for (const [args, words] of [
    [["fork", path], /needs a name/],
    [["fork", path, "--name", "there"], /there\.ts is there already; a fork never overwrites/],
    [["fork", path, "--name", "?!"], /needs letters or digits/],
    [["fork", path, "--name", "x", "--set", "nope=1"], /has no cell nope/],
    [["fork", path, "--name", "x", "--set", "area=1"], /area is no given/],
    [["fork", path, "--name", "x", "--set", "finish=gilded"], /Finish must be one of bare, painted; got gilded/],
    [["fork", path, "--name", "x", "--set", "side=9 GHz"], /Side must be a length between 0\.1 m and 5 m; got 9 GHz/],
    [["fork", path, "--name", "x", "--set", "side=90 m"], /Side must be a length between 0\.1 m and 5 m; got 90 m/],
    [["fork", path, "--name", "x", "--to", "nowhere"], /no such folder/],
    [["fork", "page.html", "--name", "x"], /carries no study/],
    [["fork", "none.html", "--name", "x"], /there is no such file/],
  ] as const) {
    const { code, out, err } = await run([...args], { cwd: folder });
    expect([code, out, isOneSentence(err)], `${args.join(" ")}: ${err}`).toEqual([2, "", true]);
    expect(err).toMatch(words);
  }
  expect((await readdir(folder)).sort()).toEqual(before);
});
