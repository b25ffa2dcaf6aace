import type { Subject } from "../notation/vocabulary.ts";
import { figureIn } from "./figureIn.ts";

/** A row's figure or bound in the unit that limits are written in. */
export function rowFigureInUnit(
  subject: Subject,
  si: number,
): { readonly value: number | null; readonly unit: "deg" | "nm" | null } {
  const known = (value: number) => (Number.isFinite(value) ? value : null);
  switch (subject) {
    case "bank":
    case "overshoot":
      return { value: known(figureIn(si, "deg")), unit: "deg" };
    case "radius":
      return { value: known(figureIn(si, "nm")), unit: "nm" };
    default:
      return { value: known(si), unit: null };
  }
}
