// Profiles that nobody would draw, seeded: every one gives a sheet of finite numbers, a drawing and a file.

import { expect, test } from "vitest";
import { buildDxf } from "../../../../cells/figures/build-dxf.ts";
import { buildDrawing, buildTables } from "../../../../cells/figures/index.ts";
import type { HornProfile } from "../../../../cells/horn/horn-profile.ts";
import { stations } from "../../../../cells/horn/workshop/bore.ts";
import { buildSheet } from "../../../../cells/horn/workshop/build-sheet.ts";
import { wallFeatures } from "../../../../cells/horn/workshop/metal.ts";
import { assertClose, seededRandom } from "../../../assert-close.ts";
import { drawnAt } from "../../figures/drawn.ts";

/** Cones, cylinders, steps both ways, slots and grooves in any order; sometimes a step at an end. */
function randomProfile(random: () => number): HornProfile {
  const z = [0];
  const radius = [0.004 + 0.03 * random()];
  const parts = 1 + Math.floor(8 * random());
  for (let part = 0; part < parts; part++) {
    const r = radius.at(-1)!;
    const at = z.at(-1)!;
    const run = 0.0005 + 0.02 * random();
    const kind = random();
    if (kind < 0.3) {
      z.push(at + run);
      radius.push(r * (0.6 + 1.2 * random()));
    } else if (kind < 0.5) {
      z.push(at + run);
      radius.push(r);
    } else if (kind < 0.7) {
      z.push(at, at + run);
      const next = r * (0.6 + 0.9 * random());
      radius.push(next, next);
    } else {
      const [bottom, ridge] = [r * (1.05 + random()), r * (0.9 + 0.2 * random())];
      const tooth = 0.0004 + 0.003 * random();
      z.push(at, at + run / 5, at + run / 5, at + run / 5 + tooth);
      radius.push(bottom, bottom, ridge, ridge);
    }
  }
  if (z.length < 2 || z.at(-1) === 0) {
    z.push(z.at(-1)! + 0.01);
    radius.push(radius.at(-1)!);
  }
  const length = z.at(-1)!;
  return { z: z.map((one) => one - length), radius };
}

test("buildSheet: 150 random profiles", () => {
  const random = seededRandom(7);
  for (let i = 0; i < 150; i++) {
    const profile = randomProfile(random);
    const wall = 0.001 + 0.003 * random();
    const because = `profile ${i}: ${JSON.stringify(profile)}`;
    const sheet = buildSheet(
      { kind: "custom", profile, outerDiameter: 2 * (Math.max(...profile.radius) + wall) },
      { highestFrequency: 5e9 + 90e9 * random() },
    );
    const finite = (value: unknown): void => {
      if (typeof value === "number") expect(Number.isFinite(value), because).toBe(true);
      else if (typeof value === "object" && value !== null) for (const one of Object.values(value)) finite(one);
    };
    finite(sheet);
    assertClose(sheet.wall, wall, { rel: 1e-9, because });
    const { slots } = wallFeatures(profile);
    const verdict = sheet.machining.find(({ field }) => field === "wall")!;
    // Over slots of uneven depth the outside runs straight and may come too near: then the sheet says so.
    if (slots.length === 0) expect(verdict.value, because).toBeGreaterThan(0);
    if (verdict.value! > 0) expect(sheet.volume, because).toBeGreaterThan(0);
    else expect(verdict.verdict, because).toBe("misses");
    expect(sheet.slots.length).toBe(slots.length);
    expect(stations(profile)[0]!.name, because).toBe("throat");
    expect(stations(profile).at(-1)!.name, because).toBe("mouth");
    for (const [k, [z]] of sheet.outer.entries())
      if (k > 0) expect(z, because).toBeGreaterThanOrEqual(sheet.outer[k - 1]![0]);
    const svg = drawnAt(buildDrawing(sheet), random() < 0.5 ? 760 : 354).outerHTML;
    expect(svg, because).not.toMatch(/NaN|Infinity|undefined/);
    finite(buildTables(sheet));
    expect(buildDxf(sheet).endsWith("EOF") || buildDxf(sheet).trimEnd().endsWith("EOF"), because).toBe(true);
  }
});
