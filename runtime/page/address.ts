// Givens in the address: "#dishDiameter=2.4%20m&fOverD=0.8", only those that differ from the file, so that a link reproduces
// the view. A plain "#trade" is a place on the page, as everywhere.

import type { Study } from "../study.ts";
import { differs } from "./scale.ts";

/** The fragment, without "#", for the study as it is; empty when nothing differs from the file. */
export function fragmentOf(study: Study): string {
  return study.givens
    .filter(differs)
    .map((given) => `${encodeURIComponent(given.name)}=${encodeURIComponent(given.text)}`)
    .join("&");
}

export interface Asked {
  texts: Map<string, string>;
  /** a sentence for each part that couldn't be read */
  complaints: string[];
}

/** What a fragment asks for. A fragment without "=" asks for no given. */
export function readFragment(fragment: string): Asked {
  const asked: Asked = { texts: new Map(), complaints: [] };
  const bare = fragment.replace(/^#/, "");
  if (!bare.includes("=")) return asked;
  for (const part of bare.split("&").filter(Boolean)) {
    const at = part.indexOf("=");
    try {
      if (at < 1) throw new URIError("no name");
      asked.texts.set(decodeURIComponent(part.slice(0, at)), decodeURIComponent(part.slice(at + 1)));
    } catch {
      asked.complaints.push(`Not taken from the address: “${part.slice(0, 60)}” is no name and value.`);
    }
  }
  return asked;
}

/** Enters what an address asks for, the rest as in the file. What can't be entered is left out, with a sentence each. */
export function applyFragment(study: Study, fragment: string): string[] {
  const { texts, complaints } = readFragment(fragment);
  const names = new Set(study.givens.map((given) => given.name));
  const wanted: Record<string, string> = {};
  for (const given of study.givens) {
    const text = texts.get(given.name) ?? given.defaultText;
    if (text !== given.text) wanted[given.name] = text;
  }
  for (const name of texts.keys())
    if (!names.has(name))
      complaints.push(`Not taken from the address: “${name.slice(0, 60)}” is no given of this study.`);
  // All that can be entered go in together, for one evaluation; each round takes out one that can't.
  while (Object.keys(wanted).length > 0) {
    const result = study.setAll(wanted);
    if (result.ok) break;
    const given = study.givens.find(({ name }) => name === result.name);
    if (!given || !Object.hasOwn(wanted, result.name)) break;
    const message = result.message.replace(/[.\s]+$/, "");
    complaints.push(`Not taken from the address: ${message}. It stays at ${given.text.slice(0, 60)}.`);
    delete wanted[result.name];
  }
  return complaints;
}

export interface AddressLink {
  /** writes the study's givens into the address, soon */
  write(): void;
  dispose(): void;
}

/** Keeps address and study together. `said` hears the sentences about what the address asked in vain. */
export function linkAddress(window: Window, study: Study, said: (sentences: string[]) => void): AddressLink {
  // Browsers refuse more than about a hundred changes of the address in half a minute.
  const pause = 350;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let written: string | undefined;
  let asleep = false;

  const put = () => {
    timer = undefined;
    const fragment = fragmentOf(study);
    if (fragment === written) return;
    const here = window.location.hash.replace(/^#/, "");
    if (fragment === "" && !here.includes("=")) return;
    written = fragment;
    try {
      const bare = window.location.href.replace(/#.*$/s, "");
      window.history.replaceState(window.history.state, "", fragment ? `#${fragment}` : bare);
    } catch {
      asleep = true; // a document without an address of its own
    }
  };
  const read = () => {
    const here = window.location.hash.replace(/^#/, "");
    if (here === written || (here !== "" && !here.includes("="))) return;
    written = here;
    said(applyFragment(study, here));
  };
  // An address that says nothing leaves the study as it was handed over.
  if (window.location.hash.includes("=")) read();
  window.addEventListener("hashchange", read);
  window.addEventListener("popstate", read);
  return {
    write: () => {
      if (!asleep) timer ??= setTimeout(put, pause);
    },
    dispose() {
      clearTimeout(timer);
      window.removeEventListener("hashchange", read);
      window.removeEventListener("popstate", read);
    },
  };
}
