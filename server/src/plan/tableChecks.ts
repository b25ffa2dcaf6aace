import { liftCoefficientAtStall } from "../flight/buffet.ts";
import { A0 } from "../flight/constants.ts";
import { checkLiftMach } from "../flight/stall.ts";
import { interpolate, type Table } from "../flight/table.ts";
import type { PlacedClause } from "../notation/block.ts";
import { nearestWord } from "../notation/spelling.ts";
import type { Card, Configuration } from "./card.ts";
import { formatMach } from "./format.ts";
import type { Lowering } from "./lowering.ts";
import { findingAt, listed } from "./site.ts";

/** Checks what only the card as a whole shows: tables that contradict the stall speed, and names that are none of its own. */
export function checkTables(lowering: Lowering, card: Card): Card {
  checkConfigurationNames(lowering, card);
  const configurations = card.configurations.map((one) =>
    checkBuffet(lowering, card, checkLift(lowering, one)),
  );
  return { ...checkCgEffect(lowering, card), configurations };
}

function clauseAt(lowering: Lowering, line: number, start: number): PlacedClause {
  const { clauses } = lowering.site.block;
  return (clauses.find((placed) => placed.line === line && placed.clause.span.start === start) ??
    clauses[0]) as PlacedClause;
}

function checkConfigurationNames(lowering: Lowering, card: Card): void {
  const names = card.configurations.map((one) => one.name);
  for (const placed of lowering.site.block.clauses) {
    const body = placed.clause.body;
    if (!body || !("config" in body)) continue;
    if (names.some((name) => name.toLowerCase() === body.config.text.toLowerCase())) continue;
    const nearest = nearestWord(body.config.text, names);
    lowering.findings.push(
      findingAt(
        "unknown-config",
        placed,
        `${card.name} has no configuration ${body.config.text}; it has ${listed(names) || "none"}.`,
        {
          span: body.config.span,
          fixes: nearest
            ? [
                {
                  title: `Write ${nearest}`,
                  preferred: true,
                  edits: [{ line: placed.line, ...body.config.span, newText: nearest }],
                },
              ]
            : [],
        },
      ),
    );
  }
}

/** VSR is a speed at the most adverse cg by definition, so no cg may raise it (14 CFR 25.103(b)). */
function checkCgEffect(lowering: Lowering, card: Card): Card {
  const effect = card.cgEffect;
  if (card.basis?.value?.kind !== "vsr" || !effect?.value) return card;
  if (effect.value.values.every((factor) => factor <= 1 + 1e-9)) return card;
  lowering.findings.push(
    findingAt(
      "bad-table",
      clauseAt(lowering, effect.origin.line, effect.origin.span.start),
      "VSR holds at the most adverse cg by definition (14 CFR 25.103), so no factor may exceed 1.000: check the table or the basis.",
    ),
  );
  return { ...card, cgEffect: { ...effect, value: null } };
}

function checkLift(lowering: Lowering, configuration: Configuration): Configuration {
  const { liftMach, stallSpeed } = configuration;
  if (!liftMach?.value || stallSpeed === null) return configuration;
  const problem = checkLiftMach(liftMach.value, { stallSpeed });
  if (!problem) return configuration;
  const first = liftMach.value.arguments[0] as number;
  lowering.findings.push(
    findingAt(
      "bad-table",
      clauseAt(lowering, liftMach.origin.line, liftMach.origin.span.start),
      problem === "first-factor"
        ? "The first factor of a lift-mach table must be 1.00, since it is over the low-speed value: divide the factors by the first."
        : `At the stall speed of ${configuration.name} the Mach number is ${formatMach(stallSpeed / A0)} at sea level, above the table's first, ${formatMach(first)}, so its factor there is not 1: begin the table lower.`,
    ),
  );
  return { ...configuration, liftMach: { ...liftMach, value: null } };
}

/** Buffet cannot begin beyond the stall: CL_b may not exceed the card's own lift coefficient there. */
function checkBuffet(lowering: Lowering, card: Card, configuration: Configuration): Configuration {
  const { buffet, stallSpeed, liftMach } = configuration;
  const area = card.wing?.value?.area;
  const referenceMass = card.referenceMass?.value;
  if (!buffet?.value || stallSpeed === null || !area || !referenceMass) return configuration;
  const atStall = liftCoefficientAtStall(stallSpeed, referenceMass, area);
  // Without its lift table nothing is known of the stall at these Mach numbers.
  if (liftMach && !liftMach.value) return configuration;
  const table: Table = buffet.value;
  // Both tables are straight between their pairs, so a contradiction shows at a pair of one of them.
  const machs = [...table.arguments, ...(liftMach?.value?.arguments ?? [])].sort((a, b) => a - b);
  const over = machs.find((mach) => {
    const onset = interpolate(table, mach);
    const factor = liftFactor(liftMach?.value ?? null, mach);
    return onset !== null && factor !== null && atStall * factor * (1 + 1e-9) < onset;
  });
  if (over === undefined) return configuration;
  lowering.findings.push(
    findingAt(
      "bad-table",
      clauseAt(lowering, buffet.origin.line, buffet.origin.span.start),
      `At ${formatMach(over)} buffet would begin at a higher lift coefficient than the card's own stall, which cannot be: check the table, the wing area and the stall speed.`,
    ),
  );
  return { ...configuration, buffet: { ...buffet, value: null } };
}

function liftFactor(table: Table | null, mach: number): number | null {
  if (!table || mach <= (table.arguments[0] as number)) return 1;
  return interpolate(table, mach);
}
