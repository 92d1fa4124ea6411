// What is bundled: small modules that import the notebook and what runs with it. Paths are from the project.

import { NOTEBOOK_IMPORT } from "./notebook-plugin.ts";

const SERVE_IN_WORKER = `
import { browserPort, inBackgroundWorker } from "./runtime/background/browser.ts";
import { serveBackground } from "./runtime/background/serve.ts";
`;

/** The notebook for the live page; in a worker it answers background calls. */
export const NOTEBOOK_ENTRY = `
import { notebook } from "${NOTEBOOK_IMPORT}";
${SERVE_IN_WORKER}
if (inBackgroundWorker()) serveBackground(notebook.backgroundFunctions, browserPort());
export { notebook };
`;

/** The notebook for the command line; \`serve\` is called in a worker. */
export const NODE_ENTRY = `
import { notebook } from "${NOTEBOOK_IMPORT}";
import { nodePort } from "./runtime/background/node.ts";
import { serveBackground } from "./runtime/background/serve.ts";
export const serve = () => serveBackground(notebook.backgroundFunctions, nodePort());
export { notebook };
`;

/** The script of the page that \`open\` serves. */
export const PAGE_ENTRY = `import "./runtime/server/open-page.ts";`;

/** The one script of an exported file; in a worker it answers background calls. */
export const EXPORT_ENTRY = `
import { notebook } from "${NOTEBOOK_IMPORT}";
${SERVE_IN_WORKER}
import { wake } from "./build/export-page.ts";
if (inBackgroundWorker()) serveBackground(notebook.backgroundFunctions, browserPort());
else wake(notebook);
`;
