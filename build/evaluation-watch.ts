// While a notebook runs in this process it may end it, wait for ever or throw where nobody catches. Each is one sentence and an
// exit code that isn't 0: a pipeline must never take an evaluation for finished that wasn't.

import type { Study } from "../runtime/study.ts";
import { EXIT } from "./command/failure.ts";

/**
 * Watches until the returned function is called.
 * @param study the running one, as soon as there is one
 */
export function watchEvaluation(label: string, study: () => Study | undefined): () => void {
  const say = (sentence: string) => process.stderr.write(`hornbook: ${label}: ${sentence}\n`);
  // Node says so only when nothing is left that could go on, never when it is told to exit.
  let nothingLeft = false;
  const onIdle = () => {
    nothingLeft = true;
  };
  const onExit = () => {
    process.exitCode = EXIT.found;
    if (!nothingLeft) return say("a cell ended the program, so nothing was found out.");
    const waiting = study()?.cells.filter(({ state }) => state === "working") ?? [];
    const names = waiting.map(({ name }) => name).join(", ");
    say(names === "" ? "it waits for something that never comes." : `${names} waits for something that never comes.`);
  };
  const onUncaught = (error: unknown) => {
    stop();
    const reason = error instanceof Error ? error.message.split("\n")[0] : String(error);
    say(`something that a cell left running failed: ${reason}`);
    process.exit(EXIT.found);
  };
  const stop = () => {
    process.off("beforeExit", onIdle);
    process.off("exit", onExit);
    process.off("uncaughtException", onUncaught);
    process.off("unhandledRejection", onUncaught);
  };
  process.on("beforeExit", onIdle);
  process.on("exit", onExit);
  process.on("uncaughtException", onUncaught);
  process.on("unhandledRejection", onUncaught);
  return stop;
}
