// Progress on stderr for what takes more than a second: one line, rewritten on a terminal, repeated now and then in a log.

export interface Progress {
  /** what is being done now, and how far it is */
  say(text: string): void;
  /** removes the line; the work is over */
  end(): void;
}

/**
 * Shows nothing in the first second, then the text said last.
 * @param out a stream; a terminal gets one line that is rewritten, anything else a line at most every `pauseMs`
 */
export function startProgress(
  out: { write(text: string): unknown; isTTY?: boolean; columns?: number } = process.stderr,
  { afterMs = 1000, pauseMs = 5000 } = {},
): Progress {
  const begun = Date.now();
  let text = "";
  let shown = "";
  let lastLine = Number.NEGATIVE_INFINITY;
  const show = () => {
    const now = Date.now();
    if (!text || now - begun < afterMs) return;
    if (out.isTTY) {
      const line = text.slice(0, (out.columns ?? 80) - 1);
      if (line !== shown) out.write(`\r\u001b[2K${line}`);
      shown = line;
    } else if (text !== shown && now - lastLine >= pauseMs) {
      out.write(`${text}\n`);
      shown = text;
      lastLine = now;
    }
  };
  const timer = setInterval(show, 200);
  timer.unref();
  return {
    say(next) {
      text = next;
      show();
    },
    end() {
      clearInterval(timer);
      if (out.isTTY && shown) out.write("\r\u001b[2K");
    },
  };
}
