// hornbook open: the notebook in the browser, live, and again at every save.

import { startLocalServer } from "../../runtime/server/local-server.ts";
import type { OpenState } from "../../runtime/server/open-state.ts";
import { openBrowser } from "../browser.ts";
import { EXIT, Failure } from "../command/failure.ts";
import type { Verb } from "../command/verb.ts";
import { createDesk } from "../desk.ts";
import { createLiveSite } from "../live-site.ts";
import { findNotebook, notebooksAtHand } from "../notebook-place.ts";

const USUAL_NOTEBOOK = "notebooks/trade-study.ts";

/** Tried first, so that an address with its givens still serves tomorrow; any free port if it is taken. */
const USUAL_PORT = 4676;

export const verb: Verb = {
  help: `hornbook open [notebook] [--port N] [--no-browser]

Shows a notebook in the browser. Its givens can be turned; what depends on them is computed anew. When the file, or one it
imports, is saved, the page takes it up with the givens as they are. A file that can't be used is told on the page, which stays
on the last good version. Without a notebook: ${USUAL_NOTEBOOK}.

The page is served to this machine only (127.0.0.1). Stop with Ctrl-C.

  --port N        this port, or none; otherwise ${USUAL_PORT} if it is free, else any that is
  --no-browser    only print the address

  hornbook open notebooks/first-look.ts
  hornbook open my-dish.ts --port 8080 --no-browser
`,
  options: { port: { type: "string" }, "no-browser": { type: "boolean" } },
  positionals: [{ name: "notebook", optional: true }],
  async run(args, { projectRoot }) {
    const named = args.positionals[0];
    const place = findNotebook(named ?? USUAL_NOTEBOOK, projectRoot);
    const port = readPort(args.text("port"));
    const say = (line: string) => process.stderr.write(`${line}\n`);
    let tell: (state: OpenState) => void = () => {};
    const site = await createLiveSite(place, projectRoot, (state) => tell(state), say);
    const server = await startLocalServer({
      port,
      preferredPort: USUAL_PORT,
      page: site.page,
      asset: site.asset,
      hello: site.state,
      actions: createDesk(place, { filesBeside: site.filesBeside }),
    }).catch(async (error: NodeJS.ErrnoException) => {
      await site.close();
      if (error.code === "EADDRINUSE") {
        throw new Failure(`port ${port} is taken by another program; choose another, or leave --port out.`);
      }
      if (error.code === "EACCES") throw new Failure(`port ${port} isn't permitted to you; choose one above 1023.`);
      throw error;
    });
    tell = (state) => server.events.send("notebook", state);
    process.stdout.write(`${place.label} is open at ${server.url}\n`);
    if (named === undefined) {
      const others = notebooksAtHand(projectRoot).filter((label) => label !== place.label);
      if (others.length > 0) say(`Other notebooks at hand: ${others.join(", ")}.`);
    }
    say("Ctrl-C stops it.");
    if (!args.switch("no-browser")) openBrowser(server.url);
    await interruption();
    await Promise.all([server.close(), site.close()]);
    return EXIT.ok;
  },
};

function readPort(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  const port = Number(text);
  if (!/^\d+$/.test(text) || port < 1 || port > 65535) {
    throw new Failure(`--port must be a whole number from 1 to 65535; got "${text}".`);
  }
  return port;
}

/** Resolves when the reader, or the system, ends the program. */
function interruption(): Promise<void> {
  return new Promise((resolve) => {
    for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const) process.once(signal, () => resolve());
  });
}
