// A trade in sentences: which feed passes, which misses and by how much, which can't be realized.

import type { FeedKind } from "../horn/horn-profile.ts";
import type { Trade, TradeRow } from "../trade/trade-table.ts";
import { decimal, listed } from "./kit/words.ts";

/** Names of the kinds as headings write them. */
export const kindNames: Record<FeedKind, string> = {
  smooth: "Smooth cone",
  dualMode: "Dual-mode",
  corrugated: "Corrugated",
  chokeRing: "Choke ring",
  measured: "Measured",
  custom: "Own profile",
};

/** The same within a sentence. */
export const kindNouns: Record<FeedKind, string> = {
  smooth: "smooth cone",
  dualMode: "dual-mode horn",
  corrugated: "corrugated horn",
  chokeRing: "choke-ring feed",
  measured: "measured horn",
  custom: "horn of the own profile",
};

type SweptRow = Extract<TradeRow, { feasible: true }>;

/** The feed that passes every limit with the most gain at its worst frequency; none if no feed does. */
export function bestRow(trade: Trade): SweptRow | undefined {
  return trade.rows
    .filter((row): row is SweptRow => row.feasible && row.verdict !== "misses")
    .reduce<SweptRow | undefined>(
      (best, row) => (best && best.worst.gainDbi >= row.worst.gainDbi ? best : row),
      undefined,
    );
}

/** "cross-polar" of "cross-polar, worst": the sentence says where. */
const bare = (label: string): string => label.replace(/, worst$/, "");

function missSentence({ kind, verdicts }: SweptRow): string {
  const missed = verdicts
    .filter(({ verdict }) => verdict === "misses")
    .map(({ label, words }) => `the limit on ${bare(label)} by ${words.replace(/^misses by /, "")}`);
  return `The ${kindNouns[kind]} misses ${listed(missed)}.`;
}

/**
 * What a trade found, in a few sentences: the feed that passes with the most gain, those that pass too, those that miss, those
 * that can't be realized.
 */
export function tradeSentences(trade: Trade): string {
  const best = bestRow(trade);
  const swept = trade.rows.filter((row): row is SweptRow => row.feasible);
  const others = swept.filter((row) => row !== best && row.verdict !== "misses");
  const refused = trade.rows.filter(({ feasible }) => !feasible);
  return [
    best
      ? `The ${kindNouns[best.kind]} passes every limit${others.length > 0 ? " with the most gain" : ""}: ${decimal(best.worst.gainDbi, 2)} dBi and ${decimal(100 * best.worst.totalEfficiency, 1)} % at the worst of the band.`
      : "No candidate passes every limit.",
    ...others.map(
      ({ kind, worst }) =>
        `The ${kindNouns[kind]} passes too, with ${decimal(worst.gainDbi - best!.worst.gainDbi, 2)} dB of gain against it.`,
    ),
    ...swept.filter(({ verdict }) => verdict === "misses").map(missSentence),
    ...refused.map(({ kind }) => `A ${kindNouns[kind]} can't be realised for this dish.`),
  ].join(" ");
}
