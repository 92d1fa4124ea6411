// A rationale's draft as its source holds it, for the form in which it is edited. The page has no parser: it reads the forms in
// which the desk writes, and leaves a field empty where a person wrote it in another way.

import type { RationaleDraft } from "../../desk.ts";
import { restedText } from "../../rationale-findings.ts";
import type { Rationale } from "../../shown.ts";

const literal = String.raw`"(?:[^"\\]|\\.)*"`;

function unquoted(text: string | undefined): string {
  try {
    return text === undefined ? "" : (JSON.parse(text) as string);
  } catch {
    return "";
  }
}

/** The inside of a template as a person would type it into the form. */
const typed = (inside: string): string => inside.replace(/\\([\\`$])/g, "$1").replaceAll("\\r", "\r");

export function rationaleInSource(source: string, value: Rationale | undefined): RationaleDraft {
  const text = (name: string) => unquoted(new RegExp(`\\b${name}:\\s*(${literal})`).exec(source)?.[1]);
  const template = /\breasons:\s*note`((?:[^`\\]|\\[\s\S])*)`/.exec(source)?.[1];
  const call = new RegExp(`restsOn\\(\\s*(${literal}),\\s*([\\s\\S]*?),\\s*\\{([^{}]*)\\}\\s*,?\\s*\\)`, "g");
  const numbers = [...source.matchAll(call)].map(([, label, expression = "", details = ""]) => {
    const known = value?.numbers.find((one) => one.label === unquoted(label));
    const mayMove = unquoted(new RegExp(`mayMove:\\s*(${literal})`).exec(details)?.[1]);
    return {
      label: unquoted(label),
      expression: expression.trim(),
      unit: known?.unit ?? "",
      tolerance: mayMove || (known ? restedText(known.tolerance, { ...known, offset: 0 }).replace("−", "-") : ""),
    };
  });
  return {
    decision: text("decision") || (value?.decision ?? ""),
    chosen: text("chosen") || (value?.chosen ?? ""),
    author: text("author") || (value?.author ?? ""),
    reasons: template === undefined ? text("reasons") : typed(template).trim(),
    numbers,
  };
}
