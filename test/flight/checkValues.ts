import { readFileSync } from "node:fs";

/** A published or computed value that the figures are held against. */
export interface CheckValue {
  readonly id: string;
  readonly kind: string;
  readonly statement: string;
  readonly inputs: Readonly<Record<string, number | string | readonly number[]>>;
  readonly expected: Readonly<Record<string, number | string | boolean | readonly number[]>>;
  readonly tolerance: Readonly<Record<string, { readonly abs?: number; readonly rel?: number } | string>>;
  readonly source: { readonly title: string; readonly section: string; readonly edition: string };
  readonly verified: string;
  readonly note?: string;
}

const read = (name: string) => JSON.parse(readFileSync(new URL(name, import.meta.url), "utf8"));

/** The values this physics covers. */
export const checkValues: readonly CheckValue[] = read("checkValues.json");

/** The values it does not, each with the reason. */
export const uncovered: Readonly<Record<string, string>> = read("uncovered.json");
