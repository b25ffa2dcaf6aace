import type { HintLevel } from "../features/inlayHints.ts";
import { severitiesOf } from "../plan/configuration.ts";
import type { Severities } from "../plan/severities.ts";

/** The user's settings, of the section `plumbline`. */
export interface Settings {
  readonly hints: HintLevel;
  readonly severity: Severities;
  readonly diagnostics: {
    /** A new finding is shown so many milliseconds after the last edit. */
    readonly delay: number;
    /** Whether a new finding comes while one types, or when the note is saved. */
    readonly run: "onType" | "onSave";
  };
}

export const standardSettings: Settings = {
  hints: "full",
  severity: {},
  diagnostics: { delay: 0, run: "onType" },
};

/** A finding that comes later than this would be taken for none. */
const LONGEST_DELAY = 10_000;

interface Raw {
  readonly hints?: { readonly level?: unknown };
  readonly severity?: unknown;
  readonly diagnostics?: { readonly delay?: unknown; readonly run?: unknown };
}

/** Reads settings as they come from a client; what is none of the known values stays at its standard. */
export function readSettings(raw: unknown): Settings {
  const { hints, severity, diagnostics } = (raw ?? {}) as Raw;
  const level = hints?.level;
  const delay = diagnostics?.delay;
  return {
    hints: level === "brief" || level === "off" || level === "full" ? level : standardSettings.hints,
    severity: severitiesOf(severity),
    diagnostics: {
      delay:
        typeof delay === "number" && 0 <= delay && delay <= LONGEST_DELAY
          ? delay
          : standardSettings.diagnostics.delay,
      run: diagnostics?.run === "onSave" ? "onSave" : standardSettings.diagnostics.run,
    },
  };
}
