import { test } from "vitest";
import { edgeCouplings, edgeTail } from "../../../cells/matching/edge-basis.ts";
import { isTE, modeTable } from "../../../cells/matching/mode-table.ts";
import { assertClose } from "../../assert-close.ts";

const count = 9;
const table = modeTable(3000);

function sum(
  ratio: number,
  modes: number,
  weight: (te: boolean, kappa: number) => number,
  tail: boolean,
): Float64Array {
  const { values } = edgeCouplings(ratio, count, modes, table);
  const out = new Float64Array(count * count);
  for (let j = 0; j < modes; j++) {
    const w = weight(isTE(j), table.chi[j]! * ratio);
    for (let p = 0; p < count; p++) {
      for (let q = 0; q < count; q++) out[p * count + q]! += values[j * count + p]! * values[j * count + q]! * w;
    }
  }
  if (tail) {
    const { te, tm } = edgeTail(ratio, count, modes, table);
    for (let p = 0; p < count; p++) {
      for (let q = 0; q < count; q++) {
        out[p * count + q]! += weight(true, 1) * te[p]! * te[q]! + weight(false, 1) * tm[p]! * tm[q]!;
      }
    }
  }
  return out;
}

test("edgeCouplings: TE functions hold the same energy in every guide they are expanded in", () => {
  // Σ M² over the TE modes is what the TE part of E·E integrates to: a property of the aperture alone, to completeness.
  const teOnly = (te: boolean): number => (te ? 1 : 0);
  const same = sum(1, 3000, teOnly, false);
  for (const ratio of [0.3, 0.8]) {
    const other = sum(ratio, 3000, teOnly, false);
    for (const p of [1, 3, 5]) {
      assertClose(other[p * count + p]!, same[p * count + p]!, {
        rel: 3e-6,
        because: "terms fall as κ^(−7/3); 3000 modes reach κ = 1400 at the ratio 0.3",
      });
    }
  }
});

for (const family of ["TE", "TM"] as const) {
  test(`edgeTail: ${family} sums cut at κ = 60 against 3000 modes`, () => {
    const weight = (te: boolean, kappa: number): number => (te === (family === "TE") ? (te ? kappa : 1 / kappa) : 0);
    for (const ratio of [1, 0.95, 0.8, 0.5, 0.3]) {
      const cut = sum(ratio, 2 * Math.ceil(60 / ratio / Math.PI), weight, true);
      const full = sum(ratio, 3000, weight, true);
      for (let p = 0; p < count; p++) {
        for (let q = 0; q <= p; q++) {
          const size = Math.sqrt(full[p * count + p]! * full[q * count + q]!);
          // The leading term of Bessel's asymptotics: its next one is of relative size (order²/2κ)² of the tail.
          assertClose(cut[p * count + q]!, full[p * count + q]!, {
            abs: (p === 0 ? (ratio > 0.9 ? 7e-4 : 2e-5) : 5e-3) * size,
            because: `tail at ratio ${ratio}, functions ${p}, ${q}`,
          });
        }
      }
    }
  });
}
