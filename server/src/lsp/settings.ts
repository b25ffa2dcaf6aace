import { allHintKinds, type HintKind } from "../features/hintKinds.ts";
import type { HintLevel } from "../features/inlayHints.ts";
import { severitiesOf } from "../plan/configuration.ts";
import type { Severities } from "../plan/severities.ts";

/** The user's settings, of the section `plumbline`. */
export interface Settings {
  readonly hints: HintLevel;
  readonly kinds: readonly HintKind[];
  readonly severity: Severities;
  /** What is wrong in them, as sentences. */
  readonly problems: readonly string[];
  readonly diagnostics: {
    /** A new finding is shown so many milliseconds after the last edit. */
    readonly delay: number;
    /** Whether a new finding comes while one types, or when the note is saved. */
    readonly run: "onType" | "onSave";
  };
}

export const standardSettings: Settings = {
  hints: "full",
  kinds: allHintKinds,
  severity: {},
  problems: [],
  diagnostics: { delay: 0, run: "onType" },
};

/** A finding that comes later than this would be taken for none. */
const LONGEST_DELAY = 10_000;

interface Raw {
  readonly hints?: { readonly level?: unknown; readonly kinds?: unknown };
  readonly severity?: unknown;
  readonly diagnostics?: { readonly delay?: unknown; readonly run?: unknown };
}

/** Reads settings as they come from a client; what is none of the known values stays at its standard. */
export function readSettings(raw: unknown): Settings {
  const { hints, severity, diagnostics } = (raw ?? {}) as Raw;
  const level = hints?.level;
  const kinds = hints?.kinds;
  const delay = diagnostics?.delay;
  const { severities, problems } = severitiesOf(severity);
  return {
    hints: level === "brief" || level === "off" || level === "full" ? level : standardSettings.hints,
    // A name that is none is left out, so that one slip does not bring back what was turned off.
    kinds: Array.isArray(kinds)
      ? allHintKinds.filter((kind) => kinds.includes(kind))
      : standardSettings.kinds,
    severity: severities,
    problems: problems.map((message) => `plumbline.severity: ${message}`),
    diagnostics: {
      delay:
        typeof delay === "number" && 0 <= delay && delay <= LONGEST_DELAY
          ? delay
          : standardSettings.diagnostics.delay,
      run: diagnostics?.run === "onSave" ? "onSave" : standardSettings.diagnostics.run,
    },
  };
}
