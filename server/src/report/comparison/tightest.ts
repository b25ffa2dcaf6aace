import { formatResultValue } from "../../plan/format.ts";
import type { JsonValue, PointJson } from "../pointsJson.ts";

/** A figure at its worst corner, and the point it belongs to. */
export interface Tightest {
  readonly point: PointJson;
  readonly value: number;
  readonly shown: string;
}

/** The point with the least margin or ratio, sweeps at each of their values; null where none is known. */
export function tightest(points: readonly PointJson[], name: "margin" | "ratio"): Tightest | null {
  let least: { readonly point: PointJson; readonly value: number } | null = null;
  for (const point of points) {
    for (const row of [point, ...rowsOf(point.sweep ?? null)]) {
      const value = row[`${name}_low`];
      if (typeof value === "number" && (least === null || value < least.value)) least = { point, value };
    }
  }
  return least && { ...least, shown: formatResultValue(name, least.value) };
}

function rowsOf(sweep: JsonValue): readonly PointJson[] {
  return Array.isArray(sweep) ? (sweep as readonly PointJson[]) : [];
}
