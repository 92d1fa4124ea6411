// What the tests load in a browser: the sample study, mounted, with its fake at hand.

import { mountStudy } from "../../../runtime/page/mount.ts";
import type { PageOptions } from "../../../runtime/page/options.ts";
import type { FakeStudy } from "./fake-study.ts";
import { sampleStudy } from "./sample-study.ts";

declare global {
  interface Window {
    sample: FakeStudy;
    kept: Record<string, string>[];
    /** a cell that has no value yet when the page mounts */
    hold?: string;
  }
}

window.kept = [];
window.sample = sampleStudy();
if (window.hold) Object.assign(window.sample.cell(window.hold), { value: undefined, state: "working" });
const options: PageOptions = {
  keep: (texts) => {
    window.kept.push(texts);
    return "Kept.";
  },
  imprint: "Computed on this machine.",
};
mountStudy(document.getElementById("study")!, window.sample, options);
