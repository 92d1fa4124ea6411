// What one horn does in one dish. Open this first; notebooks/trade-study.ts sets every kind of horn side by side.
import { dishSection, patternCuts } from "../cells/figures/index.ts";
import { closedFormPattern, dish, feedRequirement, overBand, smoothHorn } from "../cells/index.ts";
import { figure, given, head, lead, note, show } from "../runtime/index.ts";

head({ document: "First look", title: "One cone in one dish", facts: [["Model", "closed form"]] });

export const dishDiameter = given("1.2 m", { label: "Dish diameter", why: "As bought.", min: "0.3 m", max: "20 m" });
export const fOverD = given("0.6", { label: "Focal length over diameter", why: "As bought.", min: 0.26, max: 2 });
export const bandLow = given("10.7 GHz", { label: "Band from", why: "First channel.", min: "1 GHz", max: "60 GHz" });
export const bandHigh = given("11.7 GHz", { label: "Band to", why: "Last channel.", min: "1 GHz", max: "60 GHz" });

export const reflector = dish({ diameter: dishDiameter, fOverD });
export const requirement = feedRequirement({ dish: reflector, bandLow, bandHigh, edgeTaperDb: 11 });
export const cone = smoothHorn(requirement);
export const band = overBand(cone, reflector, { bandLow, bandHigh });

export const answer = lead`${
  band.feasible
    ? `A smooth cone ${show(band.horn.length, "mm", 0)} long with a mouth of ${show(2 * band.horn.apertureRadius, "mm", 0)}
lights this dish with ${show(band.center.apertureEfficiency, "%", 1)} aperture efficiency, which gives
${show(band.center.gainDbi, "dBi", 1)} at ${show(requirement.bandCenter, "GHz", 2)}.`
    : `No smooth cone serves this dish. ${band.reason}`
}`;

note`## The dish and its cone

The rim is seen at ${show(reflector.halfAngle, "deg", 1)} from the axis. The longer path to it takes
${show(requirement.spaceLossDb, "dB", 1)}; for an edge at −11 dB the horn's own pattern has to fall by
${show(requirement.feedTaperDb, "dB", 1)}.`;

export const section = figure(dishSection(reflector, { feed: cone.feasible ? cone : undefined }), {
  caption: "The dish in section, with the horn to scale at its focus.",
});

note`## Its pattern

The E-plane is narrower than the H-plane; half their difference is what the cone radiates cross-polar at 45°.`;

const shown = { label: "Smooth cone", kind: "smooth" } as const;
const entry = cone.feasible
  ? { ...shown, pattern: closedFormPattern(cone, requirement.bandCenter) }
  : { ...shown, reason: cone.reason };
export const pattern = figure(patternCuts([entry], { halfAngle: reflector.halfAngle }), {
  caption: "Level against boresight at band centre. Right of the rim, power misses the dish.",
  basis: "closed form",
});
