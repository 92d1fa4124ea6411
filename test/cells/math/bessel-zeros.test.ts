import { describe, expect, test } from "vitest";
import { besselPrimeZero, besselZero } from "../../../cells/math/bessel-zeros.ts";
import { assertClose } from "../../assert-close.ts";
import { readReference } from "../../references/read.ts";

const zeroOf = (kind: string, n: number, i: number): number =>
  kind === "J" ? besselZero(n, i) : besselPrimeZero(n, i);

// mpmath, 40 digits; Abramowitz & Stegun 1964, Table 9.5 is the printed source (5 digits). Status: computed, read.
const table = readReference("bessel-zeros.csv")
  .trim()
  .split("\n")
  .filter((line) => !line.startsWith("#") && !line.startsWith("kind"))
  .map((line) => line.split(","))
  .map(([kind, n, i, zero]) => ({ kind: kind!, n: Number(n), i: Number(i), zero: Number(zero) }));

// Higher orders and indices: test/references/bessel-mpmath.json.
const further = (
  JSON.parse(readReference("bessel-mpmath.json")) as { zeros: { kind: string; n: number; i: number; zero: string }[] }
).zeros.map((row) => ({ ...row, zero: Number(row.zero) }));

describe("Bessel zeros against 40-digit values", () => {
  test.each([...table, ...further])("$kind, order $n, zero $i", ({ kind, n, i, zero }) => {
    assertClose(zeroOf(kind, n, i), zero, { rel: 1e-14, because: "Newton's method to the rounding of J" });
  });

  // Status: read to 4 digits at MathWorld "Bessel Function Zeros" and computed (mpmath).
  test("the eight that size a feed, to 1e-12", () => {
    const because = "printed to 16 digits";
    assertClose(besselPrimeZero(1, 1), 1.841183781340659, { rel: 1e-12, because });
    assertClose(besselPrimeZero(2, 1), 3.05423692822714, { rel: 1e-12, because });
    assertClose(besselPrimeZero(3, 1), 4.201188941210528, { rel: 1e-12, because });
    assertClose(besselPrimeZero(1, 2), 5.331442773525033, { rel: 1e-12, because });
    assertClose(besselZero(0, 1), 2.404825557695773, { rel: 1e-12, because });
    assertClose(besselZero(1, 1), 3.831705970207512, { rel: 1e-12, because });
    assertClose(besselZero(2, 1), 5.135622301840683, { rel: 1e-12, because });
    assertClose(besselZero(1, 2), 7.015586669815619, { rel: 1e-12, because });
  });
});

describe("laws", () => {
  // Abramowitz & Stegun 1964, 9.5.2: n ≤ j'_{n,1} < j_{n,1} < j'_{n,2} < …
  test.each([0, 1, 2, 5, 12, 33, 100])("order %i: zeros of J and J' alternate, none skipped", (n) => {
    let previous = n;
    for (let i = 1; i <= 40; i++) {
      const [first, second] =
        n === 0 ? [besselZero(0, i), besselPrimeZero(0, i)] : [besselPrimeZero(n, i), besselZero(n, i)];
      expect(first).toBeGreaterThan(previous);
      expect(second).toBeGreaterThan(first);
      previous = second;
    }
    // Both could skip a pair together: the large zeros lie π apart, so the count up to the last one is fixed.
    const next = besselZero(n, 41);
    assertClose(next - besselZero(n, 40), Math.PI, {
      rel: n * n * 1e-3 + 1e-2,
      because: "spacing tends to π from above",
    });
  });
});

describe("refusals name the value", () => {
  test.each([
    [-1, 1],
    [1, 0],
    [1, 1.5],
    [0.5, 1],
    [101, 1],
    [1, Number.NaN],
  ])("order %d, index %d", (n, i) => {
    expect(() => besselZero(n, i)).toThrow(RangeError);
    expect(() => besselPrimeZero(n, i)).toThrow(/besselPrimeZero: (order|index)/);
  });
});
