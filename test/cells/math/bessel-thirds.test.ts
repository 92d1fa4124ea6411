import { test } from "vitest";
import { writeBesselThirds } from "../../../cells/math/bessel-thirds.ts";
import { assertClose } from "../../assert-close.ts";
import { readReference } from "../../references/read.ts";

const { rows } = JSON.parse(readReference("bessel-thirds.json")) as { rows: { x: number; values: number[] }[] };

for (const count of [2, 13, 40]) {
  test(`writeBesselThirds: ${count} orders against 40-digit arithmetic, x from 0.01 to 1000`, () => {
    for (const { x, values } of rows) {
      const out = new Float64Array(count + 1);
      writeBesselThirds(x, count, out, 1);
      const envelope = Math.min(1, Math.sqrt(2 / (Math.PI * x)));
      for (let m = 0; m < count; m++) {
        assertClose(out[m + 1]!, values[m]!, { abs: 4e-14 * envelope, because: `recurrence at x = ${x}, m = ${m}` });
      }
    }
  });
}
