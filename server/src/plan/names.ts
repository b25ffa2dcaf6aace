import type { PlacedClause } from "../notation/block.ts";
import { nearestWord } from "../notation/spelling.ts";
import type { Name } from "../notation/tree.ts";
import type { Card } from "./card.ts";
import type { Applying } from "./carry.ts";
import type { Read } from "./clauses.ts";
import { fileName } from "./fileName.ts";
import type { Finding, Related } from "./finding.ts";
import { catalogue } from "./findings.ts";
import type { Limits } from "./limits.ts";
import { lineOf, type Origin } from "./origin.ts";
import { findingAt, listed } from "./site.ts";
import { exactly } from "./spread.ts";
import type { AppliedLimits, Contamination, FlownAircraft } from "./state.ts";

/** What `fly NAME` names. `code` is the finding that keeps the card from giving figures. */
export function flyCard(
  { site, definitions, findings }: Applying,
  fly: Read<"fly" | "under">,
): { readonly value: FlownAircraft | null; readonly code: string | null } {
  const { name } = fly.body;
  const found = definitions.card(name.text);
  if (found.kind === "found") {
    const card = found.definition;
    const broken = brokenDefinition(site.uri, fly.placed, name, "card", card);
    if (broken) findings.push(broken);
    return { value: { name: card.name, card }, code: card.withheld ? "broken-definition" : null };
  }
  if (found.kind === "twice") {
    findings.push(givenTwice(fly.placed, name, "card", found.places));
    return { value: null, code: "duplicate-name" };
  }
  const known = definitions.cards.map((card) => card.name);
  const nearest = found.nearest;
  const hint = nearest
    ? `did you mean ${nearest.name} (${place(nearest.origin, site.uri)})?`
    : known.length > 0
      ? `there ${known.length === 1 ? "is" : "are"} ${listed(known)}.`
      : "no card is there yet; a card begins with `aircraft`.";
  findings.push(
    findingAt("unknown-aircraft", fly.placed, `No card in this folder is called ${name.text}; ${hint}`, {
      ...(nearest ? { mentions: [nearest.origin] } : {}),
      span: name.span,
      fixes: nearest
        ? [
            {
              title: `Write ${nearest.name}`,
              preferred: true,
              edits: [{ line: fly.placed.line, ...name.span, newText: nearest.name }],
            },
          ]
        : [],
    }),
  );
  return { value: null, code: "unknown-aircraft" };
}

/** What `under NAME` names; limits that cannot be used hold no row, and nothing steps in for them. */
export function underLimits(
  { site, definitions, findings }: Applying,
  under: Read<"fly" | "under">,
): AppliedLimits | null {
  const { name } = under.body;
  const found = definitions.limitsNamed(name.text);
  if (found.kind === "found") {
    const limits = found.definition;
    const broken = brokenDefinition(site.uri, under.placed, name, "limits", limits);
    if (broken) findings.push(broken);
    return { name: limits.name, limits: limits.withheld ? null : limits };
  }
  if (found.kind === "twice") {
    findings.push(givenTwice(under.placed, name, "limits", found.places));
    return { name: name.text, limits: null };
  }
  const nearest = found.nearest;
  const hint = nearest
    ? `did you mean ${nearest.name} (${place(nearest.origin, site.uri)})?`
    : "limits begin with `limits`.";
  findings.push(
    findingAt(
      "unknown-limits",
      under.placed,
      `No limits in this folder are called ${name.text}, so no rule is held; ${hint}`,
      {
        ...(nearest ? { mentions: [nearest.origin] } : {}),
        span: name.span,
        fixes: nearest
          ? [
              {
                title: `Write ${nearest.name}`,
                preferred: true,
                edits: [{ line: under.placed.line, ...name.span, newText: nearest.name }],
              },
            ]
          : [],
      },
    ),
  );
  return { name: name.text, limits: null };
}

function brokenDefinition(
  uri: string,
  placed: PlacedClause,
  name: Name,
  what: "card" | "limits",
  definition: Card | Limits,
): Finding | null {
  const { origin } = definition;
  const withheld = definition.withheld !== null;
  const first = firstError(definition);
  if (!first && !withheld) return null;
  const mended: Origin = first ? { ...origin, line: first.line, span: first.span } : origin;
  const cost =
    what === "limits"
      ? withheld
        ? "none of its rows is held"
        : "the row in error is not held"
      : withheld
        ? "no figure is computed from it"
        : "nothing is computed from what is in error";
  // What is then not computed or not held at all must not pass for checked.
  const grave = withheld || ("lost" in definition && definition.lost.length > 0);
  const related: Related[] = first
    ? [{ origin: mended, message: first.message }]
    : [{ origin, message: `${name.text} is defined here.` }];
  return findingAt(
    "broken-definition",
    placed,
    `The ${what} ${name.text} ${what === "card" ? "has" : "have"} an error ${place(mended, uri)}, and ${cost}: mend it there.`,
    { span: name.span, related, mentions: [mended], ...(grave ? { severity: "error" } : {}) },
  );
}

/** Slips that read one way only leave a definition whole. */
const harmless = new Set(["separator", "unclosed-remark", "unclosed-title"]);

/** The first finding that costs a definition something. */
function firstError({ block, findings }: Card | Limits): Pick<Finding, "line" | "span" | "message"> | null {
  const text = block.findings.filter(
    (one) => catalogue[one.code].severity === "error" && !harmless.has(one.code),
  );
  const errors = [...text, ...findings.filter((one) => one.severity === "error")];
  return errors.sort((a, b) => a.line - b.line || a.span.start - b.span.start)[0] ?? null;
}

function givenTwice(
  placed: PlacedClause,
  name: Name,
  what: "card" | "limits",
  places: readonly Origin[],
): Finding {
  const files = [...new Set(places.map(({ uri }) => fileName(uri)))];
  return findingAt(
    "duplicate-name",
    placed,
    `${name.text} is the name of ${places.length} ${what === "card" ? "cards" : "sets of limits"} in this folder (${listed(files)}), so none of them is used: keep one, or rename the others.`,
    {
      span: name.span,
      related: places.map((origin) => ({ origin, message: `${name.text} is defined here.` })),
    },
  );
}

/** A contaminant of the card in use. */
export function useContaminant(
  { draft, findings }: Applying,
  placed: PlacedClause,
  name: Name,
): Contamination | null {
  const card = draft.aircraft?.value?.card;
  if (!card) {
    if (!draft.aircraft) {
      findings.push(
        findingAt(
          "missing-value",
          placed,
          `${name.text} is looked up in the card, and no line up to here says which aeroplane flies: write \`fly\` before it, or the loss in per cent.`,
          { span: name.span },
        ),
      );
    }
    return null;
  }
  const found = card.contaminants.find((one) => one.name.toLowerCase() === name.text.toLowerCase());
  if (found) {
    return found.loss === null
      ? null
      : { loss: exactly(found.loss), contaminant: found.name, rain: found.rain };
  }
  const names = card.contaminants.map((one) => one.name);
  const nearest = nearestWord(name.text, names);
  findings.push(
    findingAt(
      "unknown-contaminant",
      placed,
      names.length > 0
        ? `${card.name} has no contaminant ${name.text}; it has ${listed(names)}. Write one of them, or the loss in per cent.`
        : `${card.name} names no contaminant, so write the loss of maximum lift in per cent.`,
      {
        span: name.span,
        fixes: nearest
          ? [{ title: `Write ${nearest}`, edits: [{ line: placed.line, ...name.span, newText: nearest }] }]
          : [],
      },
    ),
  );
  return null;
}

export function unknownConfiguration(card: Card, placed: PlacedClause, name: string): Finding {
  const names = card.configurations.map((one) => one.name);
  const nearest = nearestWord(name, names);
  const body = placed.clause.body;
  const span = body?.kind === "config" ? body.name.span : placed.clause.span;
  return findingAt(
    "unknown-config",
    placed,
    `${card.name} has no configuration ${name}; it has ${listed(names)}.`,
    {
      span,
      related: [{ origin: card.origin, message: `The card ${card.name}.` }],
      fixes:
        nearest && body?.kind === "config"
          ? [
              {
                title: `Write ${nearest}`,
                preferred: true,
                edits: [{ line: placed.line, ...span, newText: nearest }],
              },
            ]
          : [],
    },
  );
}

/** Another note by its file alone: lines above move there without this one being told anew. */
function place(origin: Origin, uri: string): string {
  return origin.uri === uri ? `on line ${lineOf(origin) + 1}` : `in ${fileName(origin.uri)}`;
}
