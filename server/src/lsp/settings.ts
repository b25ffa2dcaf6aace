import type { HintLevel } from "../features/inlayHints.ts";

/** The user's settings, of the section `plumbline`. */
export interface Settings {
  readonly hints: HintLevel;
}

export const standardSettings: Settings = { hints: "full" };

/** Reads settings as they come from a client; what is none of the known values stays at its standard. */
export function readSettings(raw: unknown): Settings {
  const level = (raw as { hints?: { level?: unknown } } | null | undefined)?.hints?.level;
  return { hints: level === "brief" || level === "off" || level === "full" ? level : standardSettings.hints };
}
