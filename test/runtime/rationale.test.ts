import { parseHTML } from "linkedom";
import { describe, expect, test } from "vitest";
import { createStudy } from "../../runtime/engine.ts";
import { rationale, restsOn } from "../../runtime/index.ts";
import { renderStudy } from "../../runtime/page/render.ts";
import { rationaleSentence } from "../../runtime/page/words.ts";
import { studyValues } from "../../runtime/plain-values.ts";
import { restedText } from "../../runtime/rationale-findings.ts";
import { loadNotebook } from "./load-notebook.ts";

const details = {
  ...{ decision: "Take it.", chosen: "smooth", author: "A. N.", date: "2026-11-30", reasons: "Because." },
  numbers: [restsOn("Gain", 44.5, { agreed: "44.50 dBi", mayMove: "0.1 dBi" })],
};

describe("restsOn", () => {
  test("stands within its tolerance, both ends included; moved beyond it, or when the number is gone", () => {
    const at = (now: number | null) => restsOn("Gain", now, { agreed: "44.50 dBi", mayMove: "0.1 dBi" }).moved;
    expect([44.5, 44.6, 44.4, 44.61, 44.39, null].map(at)).toEqual([false, false, false, true, true, true]);
  });

  test("SI inside, the unit and digits of the text outside", () => {
    const length = restsOn("Length", 0.0966, { agreed: "96.6 mm", mayMove: "5 mm" });
    expect(length).toMatchObject({ agreed: 0.0966, tolerance: 0.005, unit: "mm", digits: 1, moved: false });
    expect(restedText(length.now, length)).toBe("96.6\u00a0mm");
    const power = restsOn("Power", -20, { agreed: "10.0 dBm", mayMove: "1 dBm" });
    // 10 dBm is −20 dBW: a level keeps its decibels and is held in dBW
    expect([power.agreed, power.tolerance, restedText(power.agreed, power)]).toEqual([-20, 1, "10.0\u00a0dBm"]);
  });

  test("what can't be is one sentence", () => {
    const rest = (now: number, agreed: string, mayMove: string) => () => restsOn("Gain", now, { agreed, mayMove });
    expect(rest(Number.NaN, "1 dB", "1 dB")).toThrow("restsOn: Gain must be finite; got NaN");
    expect(rest(1, "1 parsley", "1 dB")).toThrow(/agreed value of Gain must be/);
    expect(rest(1, "1 dB", "1 m")).toThrow(/what Gain may move by must be a ratio in decibels; got 1 m/);
    expect(rest(1, "1 dB", "0 dB")).toThrow("must be above 0");
    expect(() => restsOn(" ", 1, { agreed: "1", mayMove: "1" })).toThrow("label");
  });
});

describe("rationale", () => {
  test("what can't be is one sentence", () => {
    expect(() => rationale(null, { ...details, decision: "" })).toThrow("decision must be said in words");
    expect(() => rationale(null, { ...details, numbers: [] })).toThrow("at least one number");
    expect(() => rationale(null, { ...details, date: "2026-02-30" })).toThrow(
      "must be a day like 2026-11-30; got 2026-02-30",
    );
    expect(() => rationale(null, { ...details, numbers: [...details.numbers, ...details.numbers] })).toThrow(
      '"Gain" twice',
    );
    expect(() =>
      rationale(null, { ...details, history: [{ author: "B", date: "2026-01-01", agreed: { Gain: "much" } }] }),
    ).toThrow(/former Gain must be/);
  });

  const notebook = (inherited = "") => `
const gain = given("44.5 dBi", { label: "Gain", why: "", min: 0, max: 90 });
export const shown = table({ columns: ["Gain"], rows: [{ label: "Horn", cells: [gain] }] });
export const chosen = rationale(shown, {
  decision: "Take it.", chosen: "smooth", author: "A. N.", date: "2026-11-30",
  reasons: note\`It gives \${show(gain, "dBi", 1)}.\`,
  numbers: [restsOn("Gain", gain, { agreed: "44.50 dBi", mayMove: "0.1 dBi" })],
  history: [{ author: "B. C.", date: "2026-01-02", agreed: { Gain: "44.1 dBi" } }],${inherited}
});
export const wrong = [rationale(shown, { decision: "x", chosen: "x", author: "x", date: "2026-11-30", reasons: "", numbers: [] })];
`;

  test("stands beside its cell, moves with its numbers, and says so", async () => {
    const module = await loadNotebook(notebook());
    const study = createStudy(module);
    await study.settled();
    expect(study.cell("chosen").beside).toBe("shown");
    expect(study.cell("wrong").failure?.reason).toMatch(/must be alone as the value of a top-level const/);
    expect(rationaleSentence(study.cells)).toBe("");
    expect(study.set("gain", "45 dBi")).toEqual({ ok: true });
    await study.settled();
    expect(rationaleSentence(study.cells)).toBe("One rationale has moved.");
    const [warning] = studyValues(study).warnings;
    expect(warning).toMatchObject({ cell: "chosen", code: "moved", shown: true });
    expect(warning!.text.replaceAll("\u00a0", " ")).toBe(
      '"Take it." rests on Gain, agreed as 44.50 dBi, now 45.00 dBi.',
    );
    const { document } = parseHTML("<!doctype html><html><body></body></html>");
    const html = renderStudy(study, { document: document as unknown as Document, still: true });
    const text = parseHTML(`<body>${html}</body>`).document.querySelector('[data-cell="chosen"]')!.textContent!;
    for (const words of [
      "Take it.",
      "A. N., 30 November 2026",
      "It gives 45.0",
      "moved by 0.50",
      "one former agreement",
      "2 January 2026, B. C.: Gain 44.1",
    ])
      expect(text.replaceAll("\u00a0", " ")).toContain(words);
    // paper and files have nothing to press
    expect(html).not.toContain("agree again");
    study.dispose();
  });

  test("an inherited one is told until someone agrees", async () => {
    const study = createStudy(await loadNotebook(notebook('\n  inherited: "old.ts",')));
    await study.settled();
    expect(rationaleSentence(study.cells)).toBe("One rationale is inherited, not yet confirmed.");
    expect(studyValues(study).warnings.map(({ code }) => code)).toEqual(["inherited"]);
    study.dispose();
  });
});
