// Counts and lists in words, for the sentences of the page.

import { isShown, type Rationale } from "../shown.ts";
import type { CellState, CellView } from "../study.ts";

const small = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

/** "one" to "twelve", then digits. */
export function countWord(count: number): string {
  return small[count] ?? String(count);
}

/** "a", "a and b", "a, b and c". */
export function listWords(items: readonly string[]): string {
  if (items.length < 2) return items.join("");
  return `${items.slice(0, -1).join(", ")} and ${items.at(-1)}`;
}

export function capital(sentence: string): string {
  return sentence.charAt(0).toUpperCase() + sentence.slice(1);
}

export type StateCount = Record<CellState, number>;

/** How many results are in which state; the givens and the unnamed parts of a destructuring are no results. */
export function countStates(cells: readonly CellView[]): StateCount {
  const count: StateCount = { current: 0, working: 0, behind: 0, failed: 0 };
  for (const cell of cells) if (cell.role === "value" && !cell.hidden) count[cell.state] += 1;
  return count;
}

/** The state of a study in one sentence: "Two results are behind, one is working and one has failed." */
export function stateSentence(count: StateCount): string {
  const total = count.current + count.working + count.behind + count.failed;
  if (total === 0) return "There are no results yet.";
  if (count.current === total) return total === 1 ? "The result is current." : `All ${total} results are current.`;
  const verbs: [keyof StateCount, string, string][] = [
    ["behind", "is behind", "are behind"],
    ["working", "is working", "are working"],
    ["failed", "has failed", "have failed"],
  ];
  const parts = verbs
    .filter(([state]) => count[state] > 0)
    .map(([state, one, many], index) => {
      const number = count[state];
      const noun = index > 0 ? "" : number === 1 ? " result" : " results";
      return `${countWord(number)}${noun} ${number === 1 ? one : many}`;
    });
  return `${capital(listWords(parts))}.`;
}

/** What stands below that sentence. */
export function stateDetail(count: StateCount): string {
  const total = count.current + count.working + count.behind + count.failed;
  if (count.current === total) return "Every number belongs to the values given below.";
  const current = `Of ${total} results ${count.current} ${count.current === 1 ? "is" : "are"} current.`;
  return `${current} Everything printed in black belongs to the values given below.`;
}

/** What is to be said of the study's rationales, "" when all stand as agreed: "One rationale has moved and two are inherited." */
export function rationaleSentence(cells: readonly CellView[]): string {
  const rationales = cells
    .filter(({ state }) => state !== "failed")
    .map(({ value }) => value)
    .filter((value): value is Rationale => isShown(value) && value.shows === "rationale");
  const moved = rationales.filter(({ numbers }) => numbers.some((number) => number.moved)).length;
  const inherited = rationales.filter((rationale) => rationale.inherited !== undefined).length;
  const parts = [
    ...(moved > 0 ? [`${countWord(moved)} ${moved === 1 ? "rationale has" : "rationales have"} moved`] : []),
    ...(inherited > 0
      ? [
          `${countWord(inherited)}${moved > 0 ? "" : inherited === 1 ? " rationale" : " rationales"} ${inherited === 1 ? "is" : "are"} inherited, not yet confirmed`,
        ]
      : []),
  ];
  return parts.length === 0 ? "" : `${capital(listWords(parts))}.`;
}
