import type { ResultName } from "../notation/vocabulary.ts";
import { resultEntry } from "../plan/results.ts";
import { figureIn } from "./figureIn.ts";

/** A result in the unit it is shown in, unrounded, for scripts. */
export function resultFigure(name: ResultName, si: number): number {
  const { unit } = resultEntry(name);
  return unit === null ? si : figureIn(si, unit);
}
