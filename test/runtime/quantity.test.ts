import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { formatQuantity, parseQuantity, unitNamed } from "../../runtime/quantity.ts";
import { assertClose } from "../assert-close.ts";

describe("parseQuantity: values", () => {
  // Factors: The International System of Units (SI Brochure), 9th edition, 2019, tables 7 and 8 (prefixes, degree, minute of arc);
  // the inch and the foot are exact since the international yard and pound agreement of 1959 (NIST SP 811, 2008, B.6).
  test.each([
    ["2.4 m", 2.4],
    ["94 in", 94 * 0.0254],
    ["8 ft", 8 * 0.3048],
    ["10 mil", 0.000254],
    ["8.4 GHz", 8.4e9],
    ["8.4GHz", 8.4e9],
    ["  8.4   GHz ", 8.4e9],
    ["35 deg", (35 * Math.PI) / 180],
    ["35°", (35 * Math.PI) / 180],
    ["10 arcmin", (10 * Math.PI) / 180 / 60],
    ["0.3 mm", 0.0003],
    ["5 µm", 5e-6],
    ["5 μm", 5e-6],
    ["1 um", 1e-6],
    ["5.8e7 S/m", 5.8e7],
    ["3 MV/m", 3e6],
    ["1013.25 hPa", 101325],
    ["10 W/m²", 10],
    ["10 W/m^2", 10],
    ["20 kW", 20000],
    ["290 K", 290],
    ["15 °C", 288.15],
    ["0.8", 0.8],
    ["62 %", 0.62],
    ["-3 dB", -3],
    ["−3 dB", -3],
    ["11 dB", 11],
    ["38.5 dBi", 38.5],
    ["20.1 dB/K", 20.1],
    ["-3 dBW", -3],
    ["+.5 m", 0.5],
    ["5. m", 5],
    ["1e-3 m", 0.001],
    ["2.4 m", 2.4],
    ["90 min", 5400],
  ])("%s", (text, value) => {
    assertClose(parseQuantity(text).value, value, {
      rel: 2 * Number.EPSILON,
      because: "one rounding of the factor and one of the product",
    });
  });

  test("powers of ten are read as decimals: the nearest double, not a product", () => {
    expect(parseQuantity("0.3 mm").value).toBe(0.0003);
    expect(parseQuantity("8.025 GHz").value).toBe(8025000000);
    expect(parseQuantity("0.07 cm").value).toBe(0.0007);
  });

  test("a number alone takes the unit that is asked", () => {
    expect(parseQuantity("300", unitNamed("mm"))).toMatchObject({ value: 0.3, text: "300 mm" });
    expect(parseQuantity("35", unitNamed("deg")).text).toBe("35 deg");
    expect(parseQuantity("10", unitNamed("dBm")).value).toBe(-20);
    expect(parseQuantity("0 dBW", unitNamed("dBm"))).toMatchObject({ value: 0, text: "0 dBW" });
  });
});

describe("parseQuantity: refusals are one sentence that says what was entered and what is meant", () => {
  test.each([
    ["8.4 GHz", "m", "must be a length; got 8.4 GHz, which is a frequency"],
    ["2.4 m", "GHz", "must be a frequency; got 2.4 m, which is a length"],
    ["2 m", "", "must be a plain number; got 2 m, which is a length"],
    ["2 dB", "", "must be a plain number; got 2 dB, which is a ratio in decibels"],
    ["30 dBW", "dB", "must be a ratio in decibels; got 30 dBW, which is a power level"],
    ["2 W", "dBW", "must be a power level; got 2 W, which is a power"],
    ["35 %", "deg", "must be an angle; got 35 %, which is a plain number"],
    ["2,4 m", "m", "must be written with a decimal point and no other separator; got 2,4 m"],
    ["1,000 m", "m", "must be written with a decimal point and no other separator; got 1,000 m"],
    ["8 ghz", "GHz", 'must be a frequency; got 8 ghz, but "ghz" is not a unit; write GHz'],
    ["8 MHZ", "GHz", 'must be a frequency; got 8 MHZ, but "MHZ" is not a unit; write MHz'],
    ["3 furlings", "m", 'must be a length; got 3 furlings, but "furlings" is not a unit known here'],
    ["", "m", "must be a length; got nothing"],
    ["   ", "m", "must be a length; got nothing"],
    ["wide", "m", "must be a length; got wide, which is not a number"],
    ["NaN m", "m", "must be a length; got NaN m, which is not a number"],
    ["Infinity", "m", "must be a length; got Infinity, which is not a number"],
    ["0x10 m", "m", 'must be a length; got 0x10 m, but "x10 m" is not a unit known here'],
    ["1.2.3 m", "m", "must be a length; got 1.2.3 m, which is not a number"],
    ["1e999 m", "m", "must be a length; got 1e999 m, which is beyond any number kept here"],
    ["1 m 2", "m", 'must be a length; got 1 m 2, but "m 2" is not a unit known here'],
    ["3 constructor", "m", 'must be a length; got 3 constructor, but "constructor" is not a unit known here'],
    ["3 __proto__", "m", 'must be a length; got 3 __proto__, but "__proto__" is not a unit known here'],
    ["2 <script>", "m", 'must be a length; got 2 <script>, but "<script>" is not a unit known here'],
  ])("%s for %s", (text, unit, message) => {
    expect(() => parseQuantity(text, unitNamed(unit))).toThrow(message);
  });

  test("a very long text is cut, never repeated whole", () => {
    const message = (() => {
      try {
        parseQuantity(`3 ${"x".repeat(10_000)}`, unitNamed("m"));
      } catch (error) {
        return (error as Error).message;
      }
      return "";
    })();
    expect(message.length).toBeLessThan(250);
    expect(message).toContain("…");
  });
});

const UNITS = [
  "m",
  "mm",
  "µm",
  "in",
  "ft",
  "mil",
  "Hz",
  "MHz",
  "GHz",
  "deg",
  "rad",
  "arcsec",
  "W",
  "kW",
  "K",
  "Pa",
  "hPa",
  "S/m",
  "MV/m",
  "",
  "%",
  "dB",
  "dBi",
  "dBW",
  "s",
  "ns",
];
const unit = fc.constantFrom(...UNITS);

describe("round trips", () => {
  test("text to value to text to value: the same to the last bit", () => {
    const decimal = fc
      .tuple(fc.integer({ min: -999_999, max: 999_999 }), fc.integer({ min: -9, max: 9 }))
      .map(([n, e]) => `${n}e${e}`);
    fc.assert(
      fc.property(decimal, unit, (digits, name) => {
        const { value } = parseQuantity(`${digits} ${name}`);
        const written = formatQuantity(value, name);
        expect(parseQuantity(written, unitNamed(name)).value).toBe(value);
      }),
      { seed: 41, numRuns: 3000 },
    );
  });

  test("any value in a unit of a power of ten: the same to the last bit", () => {
    const decimalUnit = fc.constantFrom(...UNITS.filter((name) => unitNamed(name).exponent !== undefined));
    const anyNumber = fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e200, max: 1e200 });
    fc.assert(
      fc.property(anyNumber, decimalUnit, (value, name) => {
        expect(parseQuantity(formatQuantity(value, name)).value + 0).toBe(value + 0);
      }),
      { seed: 42, numRuns: 3000 },
    );
  });

  test("any value in any unit: within two units in the last place", () => {
    const size = fc.double({ noNaN: true, min: 1e-6, max: 1e12 });
    fc.assert(
      fc.property(size, unit, (value, name) => {
        const back = parseQuantity(formatQuantity(value, name)).value;
        assertClose(back, value, { rel: 2 * Number.EPSILON, because: "a division and a product by the unit's factor" });
      }),
      { seed: 43, numRuns: 3000 },
    );
  });

  test("short where a short text says it", () => {
    expect(formatQuantity(0.0003, "mm")).toBe("0.3 mm");
    expect(formatQuantity(2.3876, "in")).toBe("94 in");
    expect(formatQuantity((35 * Math.PI) / 180, "deg")).toBe("35 deg");
    expect(formatQuantity(8.4e9, "GHz")).toBe("8.4 GHz");
    expect(formatQuantity(0.8, "")).toBe("0.8");
    expect(formatQuantity(0.62, "%")).toBe("62 %");
    expect(() => formatQuantity(Number.NaN, "m")).toThrow("no quantity in m stands for NaN");
  });

  test("whatever is typed: a quantity or one sentence, never another error", () => {
    fc.assert(
      fc.property(
        fc.oneof(
          fc.string(),
          fc.string({ unit: "binary" }),
          fc.stringMatching(/^-?\d{1,3}(\.\d+)? [a-zA-Zµ°/^%0-9]{0,6}$/),
        ),
        unit,
        (text, name) => {
          try {
            expect(Number.isFinite(parseQuantity(text, unitNamed(name)).value)).toBe(true);
          } catch (error) {
            expect((error as Error).name).toBe("QuantityError");
            expect((error as Error).message).toMatch(/^must be /);
          }
        },
      ),
      { seed: 44, numRuns: 3000 },
    );
  });
});
