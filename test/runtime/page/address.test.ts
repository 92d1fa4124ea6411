import { describe, expect, test } from "vitest";
import { applyFragment, fragmentOf, readFragment } from "../../../runtime/page/address.ts";
import { sampleStudy } from "./sample-study.ts";

describe("givens in the address", () => {
  test("only what differs from the file is written, and reads back to the same givens", () => {
    const study = sampleStudy();
    expect(fragmentOf(study)).toBe("");
    study.setAll({ dishDiameter: "1.8 m", site: "mast & tower = 2 #%" });
    const other = sampleStudy();
    expect(applyFragment(other, fragmentOf(study))).toEqual([]);
    expect(other.givens.map((given) => given.text)).toEqual(study.givens.map((given) => given.text));
  });

  test("givens that the address leaves out go back to the file", () => {
    const study = sampleStudy();
    study.setAll({ dishDiameter: "1.8 m", edgeTaper: "12 dB" });
    applyFragment(study, "#edgeTaper=13%20dB");
    expect(study.given("dishDiameter").text).toBe("2.4 m");
    expect(study.given("edgeTaper").text).toBe("13 dB");
  });

  test("unknown, refused and unreadable parts get a sentence each; the rest applies", () => {
    const study = sampleStudy();
    const said = applyFragment(
      study,
      "#dishDiameter=99 m&nothing=1&edgeTaper=12 dB&material=gold&x=%E0%A4%A&__proto__=1",
    );
    expect(said).toHaveLength(5);
    expect(said.join(" ")).toContain("“nothing” is no given");
    expect(said.join(" ")).toContain("got 99 m. It stays at 2.4 m.");
    expect(said.join(" ")).toContain("got gold. It stays at aluminium.");
    expect(study.given("edgeTaper").text).toBe("12 dB");
    expect(study.given("dishDiameter").text).toBe("2.4 m");
  });

  test("a place on the page asks for no given", () => {
    expect(readFragment("#trade")).toEqual({ texts: new Map(), complaints: [] });
  });
});
