import { describe, expect, test } from "vitest";
import { speedOfLight } from "../../../cells/constants.ts";
import { balancedLikeMode, hybridMode } from "../../../cells/guide/hybrid.ts";
import { hybridDispersion } from "../../../cells/guide/hybrid-dispersion.ts";
import { cutoffFrequency, TE11 } from "../../../cells/guide/mode.ts";
import { assertClose } from "../../assert-close.ts";

const wall = { innerRadius: 38e-3, depth: 7.9e-3, slotFill: 0.75 };
const at = hybridDispersion(wall, { low: 2e9, high: 14e9, count: 601 });
const curve = (label: string) => at.curves.find((one) => one.label === label)!;

describe("hybridDispersion", () => {
  test("balanced: HE11 is that of a balanced wall, whatever the fill", () => {
    const mode = hybridMode("HE11", wall, at.balanced)!;
    const ideal = balancedLikeMode({ frequency: at.balanced, radius: wall.innerRadius, hybridFactor: 1 });
    assertClose(mode.hybridFactor, 1, { rel: 1e-9, because: "H_φ = 0 at the slot's mouth: Clarricoats & Olver 1984" });
    assertClose(mode.phaseConstant, ideal.phaseConstant, { rel: 1e-9, because: "E_φ(a) = 0 and Λ = 1 fix β" });
    // Granet & James 2005 (from memory): d = (λ/4) exp[1/(2.114 (ka)^1.134)], agreed with the exact slot to 0.2 %
    const wavelength = speedOfLight / at.balanced;
    const depth = (wavelength / 4) * Math.exp(1 / (2.114 * ((2 * Math.PI * wall.innerRadius) / wavelength) ** 1.134));
    assertClose(wall.depth, depth, { rel: 3e-3, because: "fit of the published formula" });
  });

  test("EH11 is slow below balance and gone above; EH12 begins where it is said to; HE11 begins as TE11 does", () => {
    const slow = curve("EH11").phaseConstantRatio;
    const { frequency, phaseConstantRatio: eh12 } = curve("EH12");
    const step = frequency[1]! - frequency[0]!;
    frequency.forEach((f, i) => {
      if (f > at.balanced && f < 1.5 * at.balanced) expect(slow[i], `${f} Hz`).toBeNull();
      if (f < at.balanced && f > 0.95 * at.balanced) expect(slow[i], `${f} Hz`).toBeGreaterThan(1);
    });
    const first = frequency[eh12.findIndex((ratio) => ratio !== null)]!;
    expect(first - at.eh12Start).toBeGreaterThanOrEqual(0);
    expect(first - at.eh12Start).toBeLessThan(step);
    // shallow slots at this frequency: the wall is inductive, and the first mode begins near TE11 of the bore
    const start = frequency[slow.findIndex((ratio) => ratio !== null)]!;
    assertClose(start, cutoffFrequency(TE11, wall.innerRadius), {
      rel: 0.02,
      because: "slots far below λ/4 act as bore",
    });
  });

  test("no mode is faster than light in the guide below its cutoff, none is NaN", () => {
    for (const { phaseConstantRatio } of at.curves)
      for (const ratio of phaseConstantRatio) if (ratio !== null) expect(ratio).toBeGreaterThanOrEqual(0);
  });

  test("refuses a range out of order", () => {
    expect(() => hybridDispersion(wall, { low: 9e9, high: 8e9 })).toThrow(/lowest frequency must be below the highest/);
  });
});
