// The live page in a real browser: what turns, what stays, what is heard, where things stand.

import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { type SamplePages, samplePages } from "./open-page.ts";

let pages: SamplePages;
beforeAll(async () => {
  pages = await samplePages();
});
afterAll(async () => {
  await pages?.close();
});

const axe = readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");

async function findings(page: Page): Promise<string[]> {
  await page.evaluate(axe);
  return page.evaluate(async () => {
    const { axe } = window as unknown as { axe: typeof import("axe-core") };
    const result = await axe.run(document, { resultTypes: ["violations"] });
    return result.violations
      .filter(({ impact }) => impact === "serious" || impact === "critical")
      .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 120)).join(" | ")}`);
  });
}

const frames = (page: Page) =>
  page.evaluate(() => new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve))));
const calls = (page: Page) => page.evaluate(() => window.sample.calls);

describe("givens", () => {
  test("a slider turns its given once a frame, in round steps, and keeps the focus", async () => {
    const page = await pages.open();
    const slider = page.locator("#row-dishDiameter input[type=range]");
    await slider.focus();
    await page.keyboard.press("ArrowRight");
    await frames(page);
    expect(await calls(page)).toEqual(["set dishDiameter 2.45 m"]);
    expect(await slider.getAttribute("aria-valuetext")).toBe("2.45\u00a0m");
    // Many positions between two frames are one entry.
    await slider.evaluate((input: HTMLInputElement) => {
      for (const position of ["50", "100", "150"]) {
        input.value = position;
        input.dispatchEvent(new Event("input", { bubbles: true }));
      }
    });
    await frames(page);
    expect(await calls(page)).toEqual(["set dishDiameter 2.45 m", "set dishDiameter 8.00 m"]);
    expect(await page.inputValue("#given-dishDiameter")).toBe("8.00\u00a0m");
    expect(await page.textContent("#row-dishDiameter .was")).toBe("was 2.4\u00a0m");
    expect(await slider.evaluate((input) => document.activeElement === input)).toBe(true);
    expect(await page.textContent(".actions .said")).toBe("One value differs from the file.");
  });

  test("only what changed is made again", async () => {
    const page = await pages.open();
    await page.evaluate(() => {
      for (const content of document.querySelectorAll(".content > *")) content.setAttribute("data-old", "");
    });
    await page.fill("#given-edgeTaper", "12 dB");
    await page.keyboard.press("Enter");
    await frames(page);
    const old = (name: string) => page.locator(`[data-cell="${name}"] .content > *`).getAttribute("data-old");
    expect(await old("patterns")).toBeNull();
    expect(await old("trade")).toBeNull();
    expect(await old("band")).toBe("");
    expect(await page.textContent('[data-cell="line 50"]')).toContain("With 12\u00a0dB asked");
    expect(await page.evaluate(() => document.activeElement?.id)).toBe("given-edgeTaper");
  });

  test("a refused entry keeps what was entered, says why and what stands; Escape brings the last good value back", async () => {
    const page = await pages.open();
    await page.fill("#given-dishDiameter", "90 m");
    await page.keyboard.press("Enter");
    await frames(page);
    expect(await page.textContent("#given-dishDiameter-refusal")).toBe(
      "Dish diameter must lie between 0.5 and 12 m; got 90 m. 2.4\u00a0m stands.",
    );
    const field = page.locator("#given-dishDiameter");
    expect(await field.getAttribute("aria-invalid")).toBe("true");
    expect(await field.getAttribute("aria-describedby")).toBe("given-dishDiameter-refusal");
    expect((await field.inputValue()).replace("\u00a0", " ")).toBe("90 m");
    await field.press("Escape");
    await frames(page);
    expect(await field.inputValue()).toBe("2.4\u00a0m");
    expect(await page.textContent("#given-dishDiameter-refusal")).toBe("");
    expect(await field.getAttribute("aria-invalid")).toBeNull();
  });

  test("leaving a field enters it; a true minus and a no-break space are read; back and keep do what they say", async () => {
    const page = await pages.open();
    await page.fill("#given-bandLow", "8.025\u00a0GHz");
    await page.locator("#given-edgeTaper").focus();
    await frames(page);
    expect(await calls(page)).toEqual(["set bandLow 8.025 GHz"]);
    expect(await page.textContent('[data-cell="line 40"]')).toContain("Changed");
    await page.getByRole("button", { name: "Keep these values" }).click();
    expect(await page.evaluate(() => window.kept)).toEqual([{ bandLow: "8.025 GHz" }]);
    expect(await page.textContent(".actions .said")).toBe("Kept.");
    await page.getByRole("button", { name: "Back to the values in the file" }).click();
    expect((await calls(page)).at(-1)).toBe("reset");
    expect(await page.locator('[data-cell="line 40"]').count()).toBe(0);
    expect(await page.inputValue("#given-bandLow")).toBe("8.1\u00a0GHz");
  });

  test("choice, switch, long text and a file are entered too", async () => {
    const page = await pages.open();
    await page.selectOption("#given-material", "brass");
    await page.uncheck("#given-polarizer");
    await page.fill("#given-profile", "z_mm,r_mm\n0,50");
    await page.locator("#given-site").focus();
    await frames(page);
    await page.setInputFiles("#row-profile input[type=file]", {
      name: "<img>.csv",
      mimeType: "text/csv",
      buffer: Buffer.from("z_mm,r_mm\n0,51\n-9,51"),
    });
    await expect.poll(async () => (await calls(page)).at(-1)).toBe("set profile z_mm,r_mm\n0,51\n-9,51");
    expect((await calls(page)).slice(0, 3)).toEqual([
      "set material brass",
      "set polarizer off",
      "set profile z_mm,r_mm\n0,50",
    ]);
    expect(await page.textContent("#row-profile .said")).toBe("<img>.csv");
  });
});

describe("address", () => {
  test("holds what differs, soon after it moved, and a link reproduces the view", async () => {
    const page = await pages.open();
    await page.fill("#given-dishDiameter", "1.8 m");
    await page.keyboard.press("Enter");
    await expect.poll(() => page.evaluate(() => location.hash)).toBe("#dishDiameter=1.8%20m");
    await page.getByRole("button", { name: "Back to the values in the file" }).click();
    await expect.poll(() => page.evaluate(() => location.hash)).toBe("");
    const other = await pages.open({ hash: "#dishDiameter=1.8 m&nothing=1" });
    expect(await other.inputValue("#given-dishDiameter")).toBe("1.8\u00a0m");
    expect(await other.textContent(".address")).toContain("“nothing” is no given of this study.");
    await other.evaluate(() => {
      location.hash = "#edgeTaper=12%20dB";
    });
    await expect.poll(() => other.inputValue("#given-edgeTaper")).toBe("12\u00a0dB");
    expect(await other.inputValue("#given-dishDiameter")).toBe("2.4\u00a0m");
    await other.goBack();
    await expect.poll(() => other.inputValue("#given-dishDiameter")).toBe("1.8\u00a0m");
  });

  test("going to a place on the page leaves the givens in the address", async () => {
    const page = await pages.open({ hash: "#dishDiameter=1.8%20m" });
    await page.getByRole("navigation").getByRole("link", { name: "Trade" }).click();
    expect(await page.evaluate(() => location.hash)).toBe("#dishDiameter=1.8%20m");
    expect(await page.evaluate(() => document.activeElement?.id)).toBe("trade");
    expect(
      await page.locator("#trade").evaluate((section) => Math.abs(section.getBoundingClientRect().top)),
    ).toBeLessThan(400);
  });
});

describe("states", () => {
  test("stop and compute speak to the cell where the work is", async () => {
    const page = await pages.open();
    await page.locator('[data-cell="band"]').getByRole("button", { name: "stop" }).click();
    expect(await calls(page)).toEqual(["stop sweep"]);
    await page.evaluate(() => window.sample.put("band", { state: "behind" }));
    await page.locator('[data-cell="band"]').getByRole("button", { name: "compute" }).click();
    expect(await calls(page)).toEqual(["stop sweep", "again sweep"]);
  });

  test("the state is spoken once, when the study has come to rest", async () => {
    const page = await pages.open();
    const heard = page.locator("#study > [role=status]");
    for (const progress of [0.7, 0.8, 0.9])
      await page.evaluate((share) => window.sample.put("sweep", { progress: share }), progress);
    await page.evaluate(() => {
      window.sample.put("sweep", { state: "current", progress: undefined });
      window.sample.put("band", { state: "current" });
    });
    expect(await heard.textContent()).toBe("");
    await expect.poll(() => heard.textContent(), { timeout: 4000 }).toBe("One result is behind and three have failed.");
  });

  test("a figure that fails and comes back leaves what is below where it was", async () => {
    const page = await pages.open();
    const below = () => page.locator("#trade").evaluate((section) => section.getBoundingClientRect().top + scrollY);
    const before = await below();
    const value = await page.evaluate(() => {
      const { value } = window.sample.cell("patterns");
      const failure = { reason: "no such horn", cell: "patterns", file: "f.ts", line: 1, path: ["patterns"] };
      window.sample.put("patterns", { state: "failed", value: undefined, failure });
      (window as unknown as { held: unknown }).held = value;
      return document.querySelector('[data-cell="patterns"] .content')?.textContent;
    });
    expect(value).toContain("no such horn");
    expect(Math.abs((await below()) - before)).toBeLessThan(120);
    await page.evaluate(() =>
      window.sample.put("patterns", {
        state: "current",
        value: (window as unknown as { held: unknown }).held,
        failure: undefined,
      }),
    );
    expect(await below()).toBe(before);
  });
});

describe("a painted page", () => {
  test("is readable without scripts, and says that its values can't be turned", async () => {
    const page = await pages.open({ painted: true, scripts: false });
    expect(await page.locator("h1").textContent()).toBe("A feed for the northern mast");
    expect(await page.locator(".drawing svg").count()).toBe(3);
    expect(await page.locator(".asleep").isVisible()).toBe(true);
    await page.locator('[data-cell="patterns"] details.code summary').click();
    expect(await page.locator('[data-cell="patterns"] pre').isVisible()).toBe(true);
  });

  test("stands where it stood, to the pixel, when its script has taken over; focus and opened code stay", async () => {
    const things = "h1, h2, h3, .drawing, .results tr, .givens tr, .beside, .caption, .foot, .actions, footer";
    const places = (page: Page) =>
      page.locator(things).evaluateAll((all) => all.map((each) => Math.round(each.getBoundingClientRect().top)));
    const page = await pages.open({ painted: true, wake: false });
    await page.locator('[data-cell="patterns"] details.code summary').click();
    await page.locator("#given-dishDiameter").focus();
    const before = await places(page);
    await page.addScriptTag({ path: pages.script });
    await page.waitForFunction(() => !document.querySelector("noscript"));
    expect(await page.locator('[data-cell="patterns"] pre').isVisible()).toBe(true);
    expect(await page.evaluate(() => document.activeElement?.id)).toBe("given-dishDiameter");
    expect(await places(page)).toEqual(before);
    await page.keyboard.press("Tab");
    await page.keyboard.press("ArrowRight");
    await frames(page);
    expect(await calls(page)).toEqual(["set dishDiameter 2.45 m"]);
  });
});

describe("drawings", () => {
  test("are drawn for the room there is, and again only when that changes", async () => {
    const page = await pages.open();
    const width = () => page.locator('[data-cell="patterns"] .drawing svg').getAttribute("width");
    expect(await width()).toBe("760");
    await page.setViewportSize({ width: 390, height: 900 });
    await expect.poll(width).toBe("354");
    await page.setViewportSize({ width: 1300, height: 900 });
    await expect.poll(width).toBe("760");
  });

  test("a drawing and its numbers can be saved as files", async () => {
    const page = await pages.open();
    const figure = page.locator('[data-cell="patterns"]');
    const text = async (name: string) => {
      const [download] = await Promise.all([
        page.waitForEvent("download"),
        figure.getByRole("button", { name }).click(),
      ]);
      return { file: download.suggestedFilename(), text: readFileSync(await download.path(), "utf8") };
    };
    expect(await text("numbers")).toEqual({
      file: "patterns.csv",
      text: '"theta, deg","level, dB"\r\n0,0\r\n30,-11\r\n60,-33\r\n',
    });
    const drawing = await text("drawing");
    expect(drawing.file).toBe("patterns.svg");
    expect(drawing.text).toMatch(/^<svg [^>]*xmlns="http:\/\/www.w3.org\/2000\/svg"[\s\S]*<polyline[\s\S]*<\/svg>$/);
  });

  test("a figure that is still being computed shows what the file holds, and says so", async () => {
    const page = await pages.open({ painted: true, wake: false });
    await page.evaluate(() => {
      (window as unknown as { hold: string }).hold = "band";
    });
    await page.addScriptTag({ path: pages.script });
    await page.waitForFunction(() => !document.querySelector("noscript"));
    const figure = page.locator('[data-cell="band"]');
    expect(await figure.locator(".drawing polyline").count()).toBe(3);
    expect(await figure.locator(".foot .line").textContent()).toContain("shown as the file holds it");
  });
});

describe("texts from outside", () => {
  test("none becomes markup or runs, in any place of the live page", async () => {
    const page = await pages.open({ hash: `#site=${encodeURIComponent("<img src=x onerror=window.ran=1>")}&<b>=1` });
    await page.evaluate(() => {
      const evil = '</textarea><script>window.ran=1</script><img src=x onerror="window.ran=1">';
      const { sample } = window;
      sample.set("profile", evil);
      for (const given of sample.givens)
        Object.assign(given, { label: evil, why: evil, refusal: { entered: evil, message: evil } });
      sample.put("line 1", { value: { shows: "head", document: evil, title: evil, facts: [[evil, evil]] } });
      sample.put("line 50", {
        value: { shows: "note", markdown: `## ${evil}\n\n[x](javascript:window.ran=1) ${evil}` },
      });
      sample.put("trade", {
        source: evil,
        value: {
          shows: "table",
          title: evil,
          basis: evil,
          columns: [{ label: evil }],
          rows: [
            { label: evil, under: evil, cells: [{ text: evil, word: evil }] },
            { label: evil, cells: evil },
          ],
        },
      });
      sample.put("line 85", { value: { shows: "margin", mark: "warning", markdown: evil } });
      sample.put("lonely", { failure: { reason: evil, cell: evil, file: evil, line: 1, path: [evil, evil] } });
    });
    for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
    await frames(page);
    expect(await page.locator("#study script, #study img, #study b, #study a[href^=javascript]").count()).toBe(0);
    expect(await page.evaluate(() => (window as unknown as { ran?: number }).ran)).toBeUndefined();
    expect(await page.textContent("h1")).toContain("<script>window.ran=1</script>");
    expect(await page.inputValue("#given-site")).toContain("<img");
  });
});

describe("where things stand", () => {
  test("at 1440 px a note begins at its row or figure, and no two overlap", async () => {
    const page = await pages.open({ hash: "#bandLow=8.025%20GHz" });
    const notes = await page.locator("main .beside").evaluateAll((all) =>
      all.map((note) => {
        const thing = note.closest("tr") ?? note.parentElement?.querySelector("figure") ?? note.parentElement!;
        const { top, bottom, left, width } = note.getBoundingClientRect();
        return {
          name: note.getAttribute("data-cell"),
          top,
          bottom,
          left,
          width,
          target: thing.getBoundingClientRect().top,
          pushed: note.previousElementSibling?.matches(".beside"),
        };
      }),
    );
    const column = await page.locator("main").evaluate((main) => main.getBoundingClientRect().right);
    for (const note of notes) {
      expect(note.left, note.name ?? "").toBe(column + 52);
      expect(note.width).toBe(276);
    }
    for (const name of ["line 41", "line 60", "line 85", "line 87"]) {
      const note = notes.find((each) => each.name === name)!;
      if (name === "line 41") continue; // pushed down by the note above it
      expect(Math.abs(note.top - note.target), name).toBeLessThanOrEqual(2);
    }
    notes.sort((a, b) => a.top - b.top);
    for (const [index, note] of notes.entries())
      if (index > 0) expect(note.top).toBeGreaterThanOrEqual(notes[index - 1]!.bottom);
  });

  test("at 390 and 1000 px nothing is wider than the window, but drawings and code in their own box", async () => {
    for (const width of [390, 1000]) {
      const page = await pages.open({ width, hash: "#bandLow=8.025%20GHz&dishDiameter=99%20m" });
      for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
      const wide = await page.evaluate(() => {
        const out = [...document.querySelectorAll("#study *")].filter((element) => {
          if (element.closest("pre, .unseen, .skip, textarea, thead") || element.closest("svg")) return false;
          return element.getBoundingClientRect().right > document.documentElement.clientWidth + 0.5;
        });
        return {
          page: document.documentElement.scrollWidth,
          out: out.map((element) => element.outerHTML.slice(0, 100)),
        };
      });
      expect(wide.out).toEqual([]);
      expect(wide.page).toBe(width);
    }
  });
});

describe("for everyone", () => {
  test("no serious finding of axe-core, wide, narrow, and with everything opened", async () => {
    for (const width of [1440, 390]) {
      const page = await pages.open({ width, hash: "#bandLow=8.025%20GHz&nothing=1" });
      await page.fill("#given-dishDiameter", "90 m");
      await page.keyboard.press("Enter");
      await frames(page);
      for (const summary of await page.locator("summary").all()) if (await summary.isVisible()) await summary.click();
      expect(await findings(page)).toEqual([]);
    }
  });

  test("the whole page can be walked and worked by keyboard, and the focus is always seen", async () => {
    const page = await pages.open();
    const walked: string[] = [];
    for (let step = 0; step < 80; step++) {
      await page.keyboard.press("Tab");
      const at = await page.evaluate(() => {
        const active = document.activeElement;
        if (!active || active === document.body) return undefined;
        const { outlineStyle, outlineWidth } = getComputedStyle(active);
        return {
          name: active.id || active.getAttribute("aria-label") || active.textContent!.trim(),
          seen: outlineStyle !== "none" && Number.parseFloat(outlineWidth) >= 1,
        };
      });
      if (!at) break;
      expect(at.seen, at.name).toBe(true);
      walked.push(at.name);
    }
    expect(walked.slice(0, 6)).toEqual([
      "Skip to the report",
      "Go to the first that has failed",
      "Given",
      "What the dish asks of the feed",
      "Over the band",
      "Trade",
    ]);
    for (const name of [
      "given-dishDiameter",
      "Dish diameter, slider",
      "given-material",
      "given-polarizer",
      "given-profile",
      "Keep these values",
      "stop",
      "code",
    ])
      expect(walked).toContain(name);
    await page.locator('[data-cell="trade"] details.code summary').focus();
    await page.keyboard.press("Enter");
    expect(await page.locator('[data-cell="trade"] pre').textContent()).toContain("const trade = table(");
  });

  test("nothing in the page's console went wrong, under a policy without style attributes", () => {
    expect(pages.errors).toEqual([]);
  });

  test("the page's own code stays light", () => {
    // The budget of a whole exported study is 700 kB; reading Markdown (marked) is 52 kB of this.
    expect(pages.weight.script).toBeLessThan(90_000);
    expect(pages.weight.style).toBeLessThan(24_000);
  });
});
