import type { Card } from "./card.ts";
import type { Limits } from "./limits.ts";
import type { Origin } from "./origin.ts";

export type Lookup<T> =
  | { readonly kind: "found"; readonly definition: T }
  /** `nearest` is a definition whose name is close, for the message and its fix. */
  | { readonly kind: "missing"; readonly nearest: T | null }
  | { readonly kind: "twice"; readonly places: readonly Origin[] };

/** The cards and limits that the notes of one folder see, by name without regard to case. */
export interface Definitions {
  readonly cards: readonly Card[];
  readonly limits: readonly Limits[];
  card(name: string): Lookup<Card>;
  limitsNamed(name: string): Lookup<Limits>;
}
