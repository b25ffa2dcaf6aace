import { allHintKinds, type HintKind } from "../features/hintKinds.ts";
import type { HintLevel } from "../features/inlayHints.ts";

/** The user's settings, of the section `plumbline`. */
export interface Settings {
  readonly hints: HintLevel;
  readonly kinds: readonly HintKind[];
}

export const standardSettings: Settings = { hints: "full", kinds: allHintKinds };

/** Reads settings as they come from a client; what is none of the known values stays at its standard. */
export function readSettings(raw: unknown): Settings {
  const hints = (raw as { hints?: { level?: unknown; kinds?: unknown } } | null | undefined)?.hints;
  const level = hints?.level;
  const kinds = hints?.kinds;
  return {
    hints: level === "brief" || level === "off" || level === "full" ? level : standardSettings.hints,
    // A name that is none is left out, so that one slip does not bring back what was turned off.
    kinds: Array.isArray(kinds)
      ? allHintKinds.filter((kind) => kinds.includes(kind))
      : standardSettings.kinds,
  };
}
