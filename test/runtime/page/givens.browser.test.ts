// Entering givens in a real browser, and the address that holds them.

import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { calls, frames, type SamplePages, samplePages } from "./open-page.ts";

let pages: SamplePages;
beforeAll(async () => {
  pages = await samplePages();
});
afterAll(async () => {
  await pages?.close();
});

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

test("nothing in the page's console went wrong, under a policy without style attributes", () => {
  expect(pages.errors).toEqual([]);
});
