// How a verb ends early: one sentence for a person and an exit code for a script.

/** Exit codes of every verb. */
export const EXIT = {
  ok: 0,
  /** a cell failed, or `check` found something */
  found: 1,
  /** `check` found nothing but rationales that have moved or were only inherited */
  rationales: 3,
  /** the arguments, or the file they name, can't be used */
  arguments: 2,
} as const;

/** Carries the sentence that the command prints on stderr, and the exit code. */
export class Failure extends Error {
  override name = "Failure";
  readonly exitCode: number;
  constructor(message: string, exitCode: number = EXIT.arguments, cause?: unknown) {
    super(message, cause === undefined ? undefined : { cause });
    this.exitCode = exitCode;
  }
}

/** What an operating-system error means, in words: "no such file". */
export function systemWords(error: unknown): string {
  const code = (error as { code?: string }).code;
  const words: Record<string, string> = {
    ENOENT: "there is no such file",
    ENOTDIR: "a part of the path isn't a folder",
    EISDIR: "it is a folder",
    EACCES: "permission is denied",
    EPERM: "the system doesn't permit it",
    EROFS: "the file system is read-only",
    ENOSPC: "the disk is full",
    EADDRINUSE: "the port is taken",
  };
  if (code && words[code]) return words[code];
  return error instanceof Error ? error.message : String(error);
}
