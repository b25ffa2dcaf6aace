import type { PointResult } from "../../plan/point.ts";
import { type Figure, pointFigures } from "./pointFigures.ts";
import { withoutLines } from "./withoutLines.ts";

/** A figure as it was and as it is; null on the side where the point has none of that name. */
export interface FigureChange {
  readonly name: string;
  readonly old: Figure | null;
  readonly new: Figure | null;
}

/** The figures of a point that are shown otherwise now. */
export function figureChanges(old: PointResult | null, now: PointResult | null): readonly FigureChange[] {
  const olds = byName(old);
  const news = byName(now);
  // Where one side has no figures at all, that says it all.
  const names =
    old && now && !(old.conditions && now.conditions)
      ? ["figures"]
      : [...new Set([...news.keys(), ...olds.keys()])];
  return names
    .map((name): FigureChange => ({ name, old: olds.get(name) ?? null, new: news.get(name) ?? null }))
    .filter((change) => shown(change.old) !== shown(change.new));
}

function byName(point: PointResult | null): ReadonlyMap<string, Figure> {
  return new Map((point ? pointFigures(point) : []).map((figure) => [figure.name, figure]));
}

function shown(figure: Figure | null): string {
  return figure ? withoutLines(figure.shown) : "-";
}
