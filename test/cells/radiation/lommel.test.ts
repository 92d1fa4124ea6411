import { describe, test } from "vitest";
import { besselJ1, besselJPrime1 } from "../../../cells/math/bessel.ts";
import { besselPrimeZero, besselZero } from "../../../cells/math/bessel-zeros.ts";
import { besselTriple, lommelIntegrals } from "../../../cells/radiation/lommel.ts";
import { assertClose } from "../../assert-close.ts";

// python3 -c "
// from mpmath import *; mp.dps=30
// for p,q in ((1.84118,0),(1.84118,5),(3.8317,3.8318),(2.4048,2.4048),(30,29.9995),(16.5,40)):
//   print(p,q,*[nstr(quad(lambda r:besselj(n,p*r)*besselj(n,q*r)*r,linspace(0,1,9)),17) for n in (0,2)])"
// mpmath 1.3.0
const values: [number, number, number, number][] = [
  [1.84118, 0, 0.31602842974541523, 0.0],
  [1.84118, 5, -0.015148568474741018, 0.02626115971341421],
  [3.8317, 3.8318, 0.0811075652781639, 0.08110756529056833],
  [2.4048, 2.4048, 0.1347599263241636, 0.041549857331977795],
  [30, 29.9995, 0.010780738783529534, 0.010749411772620327],
  [16.5, 40, -0.0007451395427124356, -0.0007429379917910777],
];

describe("Lommel's integrals against mpmath's quadrature", () => {
  test.each(values)("p = %d, q = %d", (p, q, order0, order2) => {
    const result = lommelIntegrals(besselTriple(p), besselTriple(q));
    const because = "closed form, three digits lost at its nearest";
    assertClose(result.order0, order0, { abs: 1e-13, because });
    assertClose(result.order2, order2, { abs: 1e-13, because });
  });

  test("the seam between closed form and quadrature is smooth", () => {
    const at = (q: number) => lommelIntegrals(besselTriple(5.3), besselTriple(q));
    for (const side of [-1, 1]) {
      const inside = at(5.3 + side * 0.000999999);
      const outside = at(5.3 + side * 0.001000001);
      const because = "2e-9 apart, slope below 0.02";
      assertClose(inside.order0, outside.order0, { abs: 1e-10, because });
      assertClose(inside.order2, outside.order2, { abs: 1e-10, because });
    }
  });
});

describe("with a guide's own numbers they reduce to the published far fields (Silver 1949, section 10.9)", () => {
  test("TE1n: E-plane 2 J1(χ) J1(u)/(χu), H-plane 2χ J1(χ) J1'(u)/(χ² − u²)", () => {
    for (const n of [1, 2, 5]) {
      const chi = besselPrimeZero(1, n);
      for (const u of [0.1, 1.7, 4, 9.3, 22]) {
        const { order0, order2 } = lommelIntegrals(besselTriple(chi), besselTriple(u));
        const because = "the same function, two forms";
        assertClose(order0 - order2, (2 * besselJ1(chi) * besselJ1(u)) / (chi * u), { abs: 2e-15, because });
        const h = (2 * chi * besselJ1(chi) * besselJPrime1(u)) / (chi * chi - u * u);
        assertClose(order0 + order2, h, { abs: 1e-14, because });
      }
    }
  });

  test("TM1n: E-plane −2u J0(χ) J1(u)/(χ² − u²), nothing in the H-plane", () => {
    for (const n of [1, 3]) {
      const chi = besselZero(1, n);
      for (const u of [0.1, 1.7, 4, 9.3, 22]) {
        const { order0, order2 } = lommelIntegrals(besselTriple(chi), besselTriple(u));
        const e = (-2 * u * besselTriple(chi).j0 * besselJ1(u)) / (chi * chi - u * u);
        assertClose(order0 + order2, e, { abs: 1e-14, because: "the same function, two forms" });
        assertClose(order0 - order2, 0, { abs: 1e-14, because: "TM has no H-plane field" });
      }
    }
  });
});
