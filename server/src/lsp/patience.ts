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
  /**
   * Told before an edit is taken in.
   *
   * @param findings what the note is told until then
   */
  editing(uri: string, findings: () => readonly PlacedFinding[]): void;
  saved(uri: string): void;
  closed(uri: string): void;
  /** Something else than an edit changed what notes are told: that is shown at once, but for those being written. */
  othersChanged(): void;
  /** Other settings hold: nothing waits any more. */
  settingsChanged(): void;
  /** What is shown of the findings now. What is gone goes at once; what is new may have to wait. */
  shown(uri: string, findings: readonly PlacedFinding[]): readonly PlacedFinding[];
}

/**
 * Lets new findings wait while somebody types: for a while after the last edit, or until the note is
 * saved. A finding that was shown and is still there stays, with what it says now. While one note waits
 * the others wait too, for a card that is being written changes what every note is told.
 *
 * @param settings whether and how long; null where the client could not be told to look again
 * @param lookAgain asks the client to look again once what waited is to be shown
 */
export function patience(
  settings: () => Settings["diagnostics"] | null,
  later: Runtime["later"],
  lookAgain: () => void,
): Patience {
  /** The notes being written, with what takes their timer back. */
  const waiting = new Map<string, () => void>();
  const lastShown = new Map<string, readonly Shown[]>();

  function end(uri: string): void {
    const key = uriKey(uri);
    waiting.get(key)?.();
    if (!waiting.delete(key)) return;
    forgetOthers();
    lookAgain();
  }

  function forgetOthers(): void {
    for (const key of [...lastShown.keys()]) if (!waiting.has(key)) lastShown.delete(key);
  }

  return {
    editing(uri, findings) {
      const { run, delay } = settings() ?? { run: "onType", delay: 0 };
      const key = uriKey(uri);
      waiting.get(key)?.();
      if (run === "onType" && delay === 0) {
        waiting.delete(key);
        return;
      }
      if (!lastShown.has(key)) lastShown.set(key, placesOf(findings()));
      waiting.set(key, run === "onSave" ? () => {} : later(delay, () => end(uri)));
    },
    saved: end,
    closed(uri) {
      end(uri);
      lastShown.delete(uriKey(uri));
    },
    othersChanged: forgetOthers,
    settingsChanged() {
      for (const takeBack of waiting.values()) takeBack();
      waiting.clear();
      lastShown.clear();
    },
    shown(uri, findings) {
      const key = uriKey(uri);
      const before = lastShown.get(key);
      const kept = 0 < waiting.size && before ? stillThere(findings, before) : findings;
      lastShown.set(key, placesOf(kept));
      return kept;
    },
  };
}

function placesOf(findings: readonly PlacedFinding[]): readonly Shown[] {
  return findings.map(({ line, finding }) => ({ code: kindOf(finding), line }));
}

/** A bank over its limit is not told to be over the advice too: what only got worse is no new finding. */
function kindOf({ code }: PlacedFinding["finding"]): string {
  return code === "bank-over-advice" ? "bank-over-limit" : code;
}

/** The findings that were shown before: as many of a code as there were, those nearest to where they stood. */
function stillThere(findings: readonly PlacedFinding[], before: readonly Shown[]): readonly PlacedFinding[] {
  const left = new Map<string, number[]>();
  for (const { code, line } of before) left.set(code, [...(left.get(code) ?? []), line]);
  const kept = new Set<PlacedFinding>();
  for (const [code, lines] of left) {
    const own = findings.filter(({ finding }) => kindOf(finding) === code);
    for (const line of lines) {
      const nearest = own
        .filter((one) => !kept.has(one))
        .sort((a, b) => Math.abs(a.line - line) - Math.abs(b.line - line))[0];
      if (nearest) kept.add(nearest);
    }
  }
  return findings.filter((one) => kept.has(one));
}
