import type { FindingJson } from "../findingsJson.ts";
import { withoutLines } from "./withoutLines.ts";

/** A finding as it was and as it is; null on the side where there is none. */
export interface FindingChange {
  readonly old: FindingJson | null;
  readonly new: FindingJson | null;
}

/**
 * Findings of one point, or of one definition, that are new, gone, or say something else now. A line
 * that a message names may move without anything being another finding.
 */
export function findingChanges(
  olds: readonly FindingJson[],
  news: readonly FindingJson[],
): readonly FindingChange[] {
  const left = [...news];
  const take = (same: (one: FindingJson) => boolean): FindingJson | null => {
    const at = left.findIndex(same);
    return at < 0 ? null : (left.splice(at, 1)[0] ?? null);
  };
  const changed = olds.filter((old) => take((one) => saying(one) === saying(old)) === null);
  return [
    ...changed.map((old): FindingChange => ({ old, new: take((one) => one.code === old.code) })),
    ...left.map((one): FindingChange => ({ old: null, new: one })),
  ];
}

function saying(finding: FindingJson): string {
  const { line, column, endLine, endColumn, message, ...rest } = finding;
  return JSON.stringify([withoutLines(message), rest]);
}
