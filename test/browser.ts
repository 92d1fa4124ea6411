// A real browser for tests: the Chromium that `npm ci` brought.

export { launchBrowser } from "../build/chromium.ts";
