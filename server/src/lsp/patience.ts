import type { PlacedFinding } from "../plan/note.ts";
import type { Runtime } from "./runtime.ts";
import type { Settings } from "./settings.ts";
import { uriKey } from "./uriKey.ts";

/** A finding that is shown, as far as one that comes after an edit can be told to be the same. */
interface Shown {
  readonly code: string;
  readonly line: number;
}

export interface Patience {
  edited(uri: string): void;
  saved(uri: string): void;
  closed(uri: string): void;
  /** What is shown of the findings now. What is gone goes at once; what is new may have to wait. */
  shown(uri: string, findings: readonly PlacedFinding[]): readonly PlacedFinding[];
}

/**
 * Lets new findings wait while somebody types: for a while after the last edit, or until the note is
 * saved. A finding that was shown and is still there stays, with what it says now.
 *
 * @param settings whether and how long; null where the client could not be told to look again
 * @param lookAgain asks the client to look at a note once what waited is to be shown
 */
export function patience(
  settings: () => Settings["diagnostics"] | null,
  later: Runtime["later"],
  lookAgain: (uri: string) => void,
): Patience {
  const waiting = new Map<string, () => void>();
  const lastShown = new Map<string, readonly Shown[]>();

  function end(uri: string): void {
    const key = uriKey(uri);
    waiting.get(key)?.();
    if (waiting.delete(key)) lookAgain(uri);
  }

  return {
    edited(uri) {
      const { run, delay } = settings() ?? { run: "onType", delay: 0 };
      const key = uriKey(uri);
      waiting.get(key)?.();
      if (run === "onSave") waiting.set(key, () => {});
      else if (0 < delay)
        waiting.set(
          key,
          later(delay, () => end(uri)),
        );
      else waiting.delete(key);
    },
    saved: end,
    closed(uri) {
      const key = uriKey(uri);
      waiting.get(key)?.();
      waiting.delete(key);
      lastShown.delete(key);
    },
    shown(uri, findings) {
      const key = uriKey(uri);
      const kept = waiting.has(key) ? stillThere(findings, lastShown.get(key) ?? []) : findings;
      lastShown.set(
        key,
        kept.map(({ line, finding }) => ({ code: finding.code, line })),
      );
      return kept;
    },
  };
}

/** The findings that were shown before: as many of a code as there were, those nearest to where they stood. */
function stillThere(findings: readonly PlacedFinding[], before: readonly Shown[]): readonly PlacedFinding[] {
  const left = new Map<string, number[]>();
  for (const { code, line } of before) left.set(code, [...(left.get(code) ?? []), line]);
  const kept = new Set<PlacedFinding>();
  for (const [code, lines] of left) {
    const own = findings.filter(({ finding }) => finding.code === code);
    for (const line of lines) {
      const nearest = own
        .filter((one) => !kept.has(one))
        .sort((a, b) => Math.abs(a.line - line) - Math.abs(b.line - line))[0];
      if (nearest) kept.add(nearest);
    }
  }
  return findings.filter((one) => kept.has(one));
}
