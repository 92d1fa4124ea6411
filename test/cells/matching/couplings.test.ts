import { expect, test } from "vitest";
import { modeField, TE11, TM11 } from "../../../cells/guide/mode.ts";
import { couplings, junctionCouplings } from "../../../cells/matching/couplings.ts";
import { modeTable } from "../../../cells/matching/mode-table.ts";
import { taperCouplings, taperGenerator } from "../../../cells/matching/taper-couplings.ts";
import { gaussLegendre } from "../../../cells/math/quadrature.ts";
import { assertClose } from "../../assert-close.ts";

const mode = (index: number) => ({ ...(index % 2 === 0 ? TE11 : TM11), n: 1 + (index >> 1) });

/** ∫ e_i·E_j dS over the smaller guide by quadrature of the fields themselves. */
function byQuadrature(a: number, b: number, i: number, j: number): number {
  const { nodes, weights } = gaussLegendre(60);
  let sum = 0;
  nodes.forEach((node, q) => {
    const rho = (a * (1 + node)) / 2;
    // e_ρ ∝ cos φ and e_φ ∝ sin φ: π times the product of their amplitudes
    const along = modeField(mode(i), a, rho, 0).eRho * modeField(mode(j), b, rho, 0).eRho;
    const across = modeField(mode(i), a, rho, Math.PI / 2).ePhi * modeField(mode(j), b, rho, Math.PI / 2).ePhi;
    sum += weights[q]! * (a / 2) * rho * Math.PI * (along + across);
  });
  return sum;
}

test("junctionCouplings: against quadrature of the mode fields", () => {
  for (const ratio of [0.3, 0.765, 0.95, 0.999, 0.99999]) {
    const b = 0.02;
    const { values, columns } = junctionCouplings(ratio * b, b, { smallCount: 8, largeCount: 12 });
    for (let j = 0; j < 12; j++) {
      for (let i = 0; i < 8; i++) {
        assertClose(values[j * columns + i]!, byQuadrature(ratio * b, b, i, j), {
          abs: 3e-13,
          because: `60 Gauss points integrate these to rounding; ratio ${ratio}, large ${j}, small ${i}`,
        });
      }
    }
  }
});

test("junctionCouplings: the seam between the quotient and its Taylor series", () => {
  const table = modeTable(2);
  for (const index of [0, 1]) {
    const at = (delta: number): number => {
      const ratio = 1 - delta / table.chi[index]!;
      return couplings(ratio, { smallCount: 2, largeCount: 2 }, table).values[index * 2 + index]!;
    };
    const [below, above] = [at(2e-3 * (1 - 1e-9)), at(2e-3 * (1 + 1e-9))];
    assertClose(below, above, { abs: 1e-11, because: "the coupling itself changes by 2e-12 between the two" });
  }
});

test("junctionCouplings: equal radii give the unit matrix", () => {
  const { values, columns } = junctionCouplings(0.01, 0.01, { smallCount: 3, largeCount: 4 });
  for (let j = 0; j < 4; j++) for (let i = 0; i < 3; i++) expect(values[j * columns + i]).toBe(i === j ? 1 : 0);
});

test("junctionCouplings: every mode of the small guide is made of modes of the large one", () => {
  const count = 400;
  const { values, columns } = junctionCouplings(0.015, 0.0196, { smallCount: 4, largeCount: count });
  for (let i = 0; i < 4; i++) {
    let sum = 0;
    for (let j = 0; j < count; j++) sum += values[j * columns + i]! ** 2;
    // TM modes end with a jump of the radial field: their coefficients fall as 1/n only.
    assertClose(sum, 1, { abs: i % 2 === 0 ? 1e-3 : 5e-3, because: "completeness; what 400 modes leave out" });
  }
});

test("junctionCouplings: what makes no sense is refused", () => {
  expect(() => junctionCouplings(0.02, 0.01, { smallCount: 2, largeCount: 2 })).toThrow(/largeRadius must be at least/);
  expect(() => junctionCouplings(-1, 0.01, { smallCount: 2, largeCount: 2 })).toThrow(/smallRadius must be/);
  expect(() => junctionCouplings(0.01, 0.02, { smallCount: 2.5, largeCount: 2 })).toThrow(/smallCount/);
});

test("taperGenerator: the derivative of the step couplings at equal radii", () => {
  const table = modeTable(8);
  const { values } = taperGenerator(8, table);
  const step = 1e-5;
  const at = couplings(Math.exp(-step), { smallCount: 8, largeCount: 8 }, table).values;
  const twice = couplings(Math.exp(-2 * step), { smallCount: 8, largeCount: 8 }, table).values;
  for (let i = 0; i < 64; i++) {
    const unit = i % 9 === 0 ? 1 : 0;
    const derivative = (4 * (at[i]! - unit) - (twice[i]! - unit)) / (2 * step);
    assertClose(derivative, values[i]!, {
      abs: 2e-6,
      because: "one-sided difference of second order, χ²·step² = 1e-7",
    });
  }
});

test("taperCouplings: two steps in a row are one of twice the length", () => {
  const generator = taperGenerator(12, modeTable(12));
  const once = taperCouplings(generator, 0.013).values;
  const twice = taperCouplings(generator, 0.026).values;
  for (let r = 0; r < 12; r++) {
    for (let c = 0; c < 12; c++) {
      let sum = 0;
      for (let m = 0; m < 12; m++) sum += once[r * 12 + m]! * once[m * 12 + c]!;
      assertClose(sum, twice[r * 12 + c]!, { abs: 1e-11, because: "ten terms of the exponential below norm 1/4" });
    }
  }
});
