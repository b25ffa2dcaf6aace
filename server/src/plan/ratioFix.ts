import { KNOT } from "../flight/units.ts";
import type { Fix } from "../notation/finding.ts";
import type { Checking } from "./checks.ts";
import type { Corners } from "./corners.ts";
import type { HeldRow } from "./point.ts";

/**
 * Where the tolerance alone breaks a ratio row, the knots that are lacking are added to the speed as
 * it is written: to its number, or to its offset. Only a speed in knots CAS can be mended so.
 */
export function ratioFix({ point, evaluated }: Checking, held: HeldRow, corners: Corners): Fix | null {
  const { ready } = evaluated;
  const read = point.clauses.speed;
  if (!read || corners.all.length === 1) return null;
  const basis = ready.card.basis?.value;
  const factor = basis?.kind === "vs" && held.row.vs !== null ? basis.factor : 1;
  const lacks = (one: (typeof corners.all)[number]) => held.bound * one.vs1g * factor - one.cas;
  if (0 < lacks(corners.nominal)) return null;
  const lacking = Math.max(...corners.all.map(lacks)) / KNOT;
  if (!(0 < lacking)) return null;
  const knots = Math.ceil(lacking - 1e-9);
  const { speed } = read.body;
  const edit = (span: { start: number; end: number }, newText: string): Fix => ({
    title: `Fly ${knots} kt faster, so that the row holds with the tolerances`,
    edits: [{ line: read.placed.line, ...span, newText }],
  });
  if (speed.kind === "airspeed" && speed.type === "cas" && speed.value.kind === "scalar") {
    const { quantity } = speed.value;
    if (quantity.unit !== "kt") return null;
    return edit(quantity.numberSpan, plain(quantity.value + knots));
  }
  if (speed.kind !== "named") return null;
  if (!speed.offset) return edit({ start: speed.nameSpan.end, end: speed.nameSpan.end }, ` + ${knots} kt`);
  if (speed.offset.unit !== "kt" || speed.offset.value + knots <= 0) return null;
  const sum = speed.offset.value + knots;
  if (speed.offset.value < 0) return null;
  return edit(speed.offset.span, `${plain(sum)} kt`);
}

/** A number as an author writes it, without binary dust. */
function plain(value: number): string {
  return String(Math.round(value * 1000) / 1000);
}
