import type { Block, PlacedClause } from "../notation/block.ts";
import { nearestWord } from "../notation/spelling.ts";
import { BUILT_IN_NAME } from "./builtIn.ts";
import type { Card } from "./card.ts";
import { commonPractice } from "./commonPractice.ts";
import type { Definitions, Lookup } from "./definitions.ts";
import { fileName } from "./fileName.ts";
import type { Finding } from "./finding.ts";
import type { Limits } from "./limits.ts";
import { findingAt, listed } from "./site.ts";

/** The definitions of a folder, and what is told where a name is given twice. */
export function collectDefinitions(
  cards: readonly Card[],
  limits: readonly Limits[],
): { readonly definitions: Definitions; readonly findings: ReadonlyMap<Block, Finding[]> } {
  const findings = new Map<Block, Finding[]>();
  const cardsByName = byName(cards);
  const limitsByName = byName([commonPractice(), ...limits]);
  tellTwice(cardsByName, "card", findings);
  tellTwice(limitsByName, "set of limits", findings);
  const definitions: Definitions = {
    cards,
    limits,
    card: (name) => lookUp(cardsByName, name),
    limitsNamed: (name) => lookUp(limitsByName, name),
  };
  return { definitions, findings };
}

type Named = Card | Limits;

function byName<T extends Named>(definitions: readonly T[]): ReadonlyMap<string, readonly T[]> {
  const found = new Map<string, T[]>();
  for (const one of definitions) {
    if (one.name === "") continue;
    const name = one.name.toLowerCase();
    const same = found.get(name);
    if (same) same.push(one);
    else found.set(name, [one]);
  }
  return found;
}

function lookUp<T extends Named>(definitions: ReadonlyMap<string, readonly T[]>, name: string): Lookup<T> {
  const found = definitions.get(name.toLowerCase()) ?? [];
  const [first] = found;
  if (first) {
    return found.length === 1
      ? { kind: "found", definition: first }
      : { kind: "twice", places: found.map((one) => one.origin) };
  }
  const nearest = nearestWord(name, [...definitions.keys()]);
  return { kind: "missing", nearest: nearest ? (definitions.get(nearest)?.[0] ?? null) : null };
}

function tellTwice<T extends Named>(
  definitions: ReadonlyMap<string, readonly T[]>,
  what: string,
  findings: Map<Block, Finding[]>,
): void {
  for (const [name, same] of definitions) {
    // Limits of the reserved name are told where they are read, whether they are alone or not.
    if (same.length < 2 || (what === "set of limits" && name === BUILT_IN_NAME)) continue;
    for (const one of same) {
      const others = same.filter((other) => other !== one);
      const head = one.block.clauses[0] as PlacedClause;
      const finding = findingAt(
        "duplicate-name",
        head,
        `${one.name} is the name of another ${what} too, ${whereAre(one, others)}, so none of them is used: keep one, or rename one. What several notes use is best kept in a note of its own.`,
        {
          span: one.origin.span,
          related: others.map((other) => ({
            origin: other.origin,
            message: `${other.name} is also defined here.`,
          })),
        },
      );
      findings.set(one.block, [...(findings.get(one.block) ?? []), finding]);
    }
  }
}

/** "in cards.plumb", "in this note": by file alone, for the lines of others move without this being told anew. */
function whereAre(one: Named, others: readonly Named[]): string {
  const files = others.map(({ origin }) => origin.uri);
  const named = [...new Set(files)].map((uri) =>
    uri === one.origin.uri ? "in this note" : `in ${fileName(uri)}`,
  );
  return listed(named);
}
