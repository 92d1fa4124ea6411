// The desk as a page reaches it: each request is one POST to the local server, with the page's token.

import type { Desk, DeskAnswer } from "../desk.ts";

/** @param token handed to the page by the server that serves it */
export function createDeskClient(token: string, ask: typeof fetch = fetch): Desk {
  const send = async (name: keyof Desk, request: object): Promise<DeskAnswer> => {
    try {
      const response = await ask(`/do/${name}`, {
        method: "POST",
        headers: { "content-type": "application/json", "x-hornbook-token": token },
        body: JSON.stringify(request),
      });
      if (response.ok) return (await response.json()) as DeskAnswer;
      return { ok: false, sentence: (await response.text()).trim() };
    } catch {
      return {
        ok: false,
        sentence: "The program behind this page doesn't answer; nothing was written. Start it again with: npm start",
      };
    }
  };
  return {
    keepGivens: (request) => send("keepGivens", request),
    addNote: (request) => send("addNote", request),
    addRationale: (request) => send("addRationale", request),
    editRationale: (request) => send("editRationale", request),
    agreeAgain: (request) => send("agreeAgain", request),
    replaceCell: (request) => send("replaceCell", request),
    undo: (request) => send("undo", request),
    fork: (request) => send("fork", request),
  };
}
