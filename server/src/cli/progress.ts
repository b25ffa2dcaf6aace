/** Work shorter than this shows nothing. */
const PATIENCE_MS = 500;
const EVERY_MS = 100;

export interface Progress {
  /** Tells how far the work is. */
  step(done: number, total: number, what: string): void;
  /** Takes the line away again. */
  end(): void;
}

/**
 * A line on standard error while long work goes on, where that is a terminal; else nothing.
 *
 * @param participle what is done with the notes
 */
export function progress({ quiet }: { readonly quiet?: boolean }, participle: "read" | "checked"): Progress {
  const { stderr } = process;
  if (quiet || stderr.isTTY !== true) return { step: () => {}, end: () => {} };
  const start = Date.now();
  let last = start;
  let shown = false;
  return {
    step(done, total, what) {
      const now = Date.now();
      if (now - start < PATIENCE_MS || now - last < EVERY_MS) return;
      last = now;
      shown = true;
      const text = `${done} of ${total} notes ${participle}: ${what}`;
      stderr.write(`\r\u001b[K${text.slice(0, Math.max(20, (stderr.columns || 80) - 1))}`);
    },
    end() {
      if (shown) stderr.write("\r\u001b[K");
    },
  };
}
