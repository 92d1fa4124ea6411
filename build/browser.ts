// Opens the reader's browser, where there is a screen to open it on.

import { spawn } from "node:child_process";

/** The command that opens an address with what the reader has chosen for it, or undefined without a screen. */
export function openingCommand(
  url: string,
  platform: NodeJS.Platform = process.platform,
  environment: NodeJS.ProcessEnv = process.env,
): [command: string, args: string[]] | undefined {
  if (platform === "darwin") return ["open", [url]];
  // `start` takes its first quoted argument for a title.
  if (platform === "win32") return ["cmd", ["/c", "start", '""', url.replaceAll("&", "^&")]];
  if (environment.DISPLAY || environment.WAYLAND_DISPLAY) return ["xdg-open", [url]];
  return undefined;
}

/** Tries to open the address; that it can't is no error: the address is printed anyway. */
export function openBrowser(url: string): void {
  const command = openingCommand(url);
  if (!command) return;
  const child = spawn(command[0], command[1], { stdio: "ignore", detached: true, windowsVerbatimArguments: true });
  child.on("error", () => {});
  child.unref();
}
