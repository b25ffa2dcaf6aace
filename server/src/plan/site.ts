import type { Block, PlacedClause } from "../notation/block.ts";
import type { Fix } from "../notation/finding.ts";
import type { Span } from "../notation/span.ts";
import type { Finding, Related, Severity } from "./finding.ts";
import { catalogue, type FindingCode } from "./findings.ts";
import { type Anchor, lineOf, type Origin } from "./origin.ts";

/** The block that is being evaluated, and where it stands. */
export interface Site {
  readonly uri: string;
  readonly block: Block;
  /** Outlives this version of the block, so that what is carried on from it stays the same while it is. */
  readonly anchor: Anchor;
}

/** A block of a plan, which is read on a day. */
export interface PlanSite extends Site {
  /** `2026-03-01`. */
  readonly today: string;
}

export function originOf(site: Site, placed: PlacedClause): Origin {
  return { uri: site.uri, block: site.anchor, line: placed.line, span: placed.clause.span };
}

export interface Details {
  readonly severity?: Severity;
  readonly span?: Span;
  readonly related?: readonly Related[];
  readonly fixes?: readonly Fix[];
  readonly figure?: number;
  readonly rule?: string;
  /** Every place whose line the message names. */
  readonly mentions?: readonly Origin[];
}

/** A finding at a clause, with the catalogue's severity unless the situation says otherwise. */
export function findingAt(
  code: FindingCode,
  placed: PlacedClause,
  message: string,
  details: Details = {},
): Finding {
  return {
    code,
    severity: details.severity ?? catalogue[code].severity,
    line: placed.line,
    span: details.span ?? placed.clause.span,
    message,
    related: details.related ?? [],
    fixes: details.fixes ?? [],
    ...(details.figure === undefined ? {} : { figure: details.figure }),
    ...(details.rule === undefined ? {} : { rule: details.rule }),
    ...(details.mentions
      ? { mentions: details.mentions.map((origin) => ({ origin, line: lineOf(origin) })) }
      : {}),
  };
}

/** A fix that writes a keyword at the block's end and leaves the place of its argument empty. */
export function stateFix(block: Block, keyword: string, title: string): Fix {
  const line = block.lines.length - 1;
  const text = block.lines[line]?.text ?? "";
  const end = text.trimEnd().length;
  const gap = /[|;]$/.test(text.slice(0, end)) ? " " : "; ";
  return { title, edits: [{ line, start: end, end, newText: `${gap}${keyword} ` }] };
}

/** "a, b and c". */
export function listed(items: readonly string[]): string {
  if (items.length < 2) return items[0] ?? "";
  return `${items.slice(0, -1).join(", ")} and ${items[items.length - 1]}`;
}

/** One step lower: an error becomes a warning, a warning information. */
export function oneStepLower(severity: Severity): Severity {
  return severity === "error" ? "warning" : severity === "warning" ? "information" : severity;
}
