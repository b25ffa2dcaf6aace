import type { Block, BlockKind, PlacedClause } from "./block.ts";
import type { Fix, TextFinding } from "./finding.ts";
import type { BarLine, Clause, ClauseBody } from "./tree.ts";
import { type Keyword, keywordEntry } from "./vocabulary.ts";

const noFindings: readonly TextFinding[] = [];

/** Makes a block of consecutive bar lines, and tells what only the lines together show. */
export function makeBlock(lines: readonly BarLine[], start: number): Block {
  const kind = kindOf(lines);
  const findings: TextFinding[] = [];
  const placed: { line: number; clause: Clause; counts: boolean }[] = [];
  lines.forEach((line, index) => {
    for (const finding of line.findings)
      findings.push(index === 0 ? finding : { ...finding, line: index, fixes: onLine(finding.fixes, index) });
    for (const clause of line.clauses)
      placed.push({ line: index, clause, counts: !clause.faulty && clause.body !== null });
  });
  for (const one of placed) if (one.counts) one.counts = checkPlace(kind, one, placed, findings);
  checkTwice(kind, placed, findings);
  if (kind === "point") checkOpen(placed, findings);
  if (kind === "setting") checkNeedsPhase(placed, lines, findings);
  return {
    kind,
    lines,
    clauses: placed,
    findings: findings.length > 0 ? sorted(findings) : noFindings,
    start,
  };
}

function sorted(findings: TextFinding[]): readonly TextFinding[] {
  return findings.sort((a, b) => a.line - b.line || a.span.start - b.span.start);
}

function onLine(fixes: readonly Fix[], line: number): readonly Fix[] {
  return fixes.map((fix) => ({ ...fix, edits: fix.edits.map((edit) => ({ ...edit, line })) }));
}

/** The first clause says what the block is; a first keyword close to `aircraft` or `limits` still makes it that kind. */
function kindOf(lines: readonly BarLine[]): BlockKind {
  const first = lines.find((line) => line.clauses.length > 0)?.clauses[0];
  if (first) {
    const word = first.keyword ?? first.meant;
    if (word === "aircraft" && !isUseOfCard(lines)) return "card";
    if (word === "limits") return "limits";
  }
  for (const line of lines) {
    for (const clause of line.clauses) if ((clause.keyword ?? clause.meant) === "phase") return "point";
  }
  return "setting";
}

/** `aircraft X` at the head of a point means `fly X`. */
function isUseOfCard(lines: readonly BarLine[]): boolean {
  return lines.some((line) => line.clauses.some((clause) => clause.keyword === "phase"));
}

/** Bodies that stand in other blocks than their keyword's entry says. */
function blocksOf(clause: Clause): readonly BlockKind[] {
  const body = clause.body as ClauseBody;
  switch (body.kind) {
    case "contaminant":
      return ["card"];
    case "contamination":
      return ["point", "setting"];
    case "config":
      return body.attributes.length > 0 ? ["card"] : ["point", "setting", "card"];
    case "mass":
      return ["card"];
    default:
      return keywordEntry(clause.keyword as Keyword).blocks;
  }
}

const blockNames: Readonly<Record<BlockKind, string>> = {
  card: "a card",
  limits: "limits",
  point: "a point",
  setting: "a setting",
};

/** Clauses whose absence of a phase has its own finding. */
const pointOnly = new Set<Keyword>([
  "bank",
  "load",
  "path",
  "gust",
  "shear",
  "decel",
  "aside",
  "claim",
  "expect",
  "accept",
  "emergency",
]);

/** False, after a finding, where the clause stands in a block of another kind. */
function checkPlace(
  kind: BlockKind,
  { line, clause }: PlacedClause,
  placed: readonly PlacedClause[],
  findings: TextFinding[],
): boolean {
  const keyword = clause.keyword as Keyword;
  const first = placed[0]?.clause === clause;
  if (blocksOf(clause).includes(kind)) {
    // What names a card or limits begins the block, and does so once.
    if ((keyword !== "aircraft" && keyword !== "limits") || first) return true;
    findings.push(
      misplaced(
        line,
        clause,
        `\`${keyword}\` begins ${keyword === "aircraft" ? "a card" : "limits"} and stands first: leave a blank line before it.`,
        [blankLineBefore(line)],
      ),
    );
    return false;
  }
  if (kind === "setting" && pointOnly.has(keyword)) return true;
  findings.push(
    misplaced(line, clause, misplacedMessage(kind, keyword, clause), misplacedFixes(kind, line, clause)),
  );
  return false;
}

function misplaced(line: number, clause: Clause, message: string, fixes: readonly Fix[]): TextFinding {
  return { code: "misplaced-clause", line, span: clause.span, message, fixes };
}

function misplacedMessage(kind: BlockKind, keyword: Keyword, clause: Clause): string {
  const name =
    clause.body && "name" in clause.body && typeof clause.body.name === "object"
      ? clause.body.name.text
      : "NAME";
  if (kind === "point" || kind === "setting") {
    if (keyword === "aircraft") return `\`aircraft\` begins a card; to use one here write \`fly ${name}\`.`;
    if (keyword === "limits") return `\`limits\` begins limits; to use them here write \`under ${name}\`.`;
    if (keyword === "config")
      return "A stall speed, a load range or a flap speed belongs to the card's `config`; here only the name stands.";
  }
  if (kind === "card" && keyword === "weight" && isMass(clause)) {
    return "In a card `mass` states a range: write `to` and the greatest mass, as in `mass 33 t to 59 t`.";
  }
  if (kind === "card" && keyword === "phase")
    return "A card has no phase: leave a blank line before it, and it begins a point.";
  const home = blocksOf(clause).map((one) => blockNames[one]);
  const places =
    home.length < 2 ? (home[0] ?? "") : `${home.slice(0, -1).join(", ")} or ${home[home.length - 1]}`;
  return `\`${keyword}\` belongs to ${places}, and this block is ${blockNames[kind]}: move it there, or leave a blank line before it.`;
}

/** A weight that was written `mass`. */
function isMass({ keywordSpan }: Clause): boolean {
  return keywordSpan.end - keywordSpan.start === "mass".length;
}

function misplacedFixes(kind: BlockKind, line: number, clause: Clause): Fix[] {
  const meant = clause.keyword === "aircraft" ? "fly" : clause.keyword === "limits" ? "under" : null;
  if ((kind === "point" || kind === "setting") && meant) {
    return [
      { title: `Write ${meant}`, preferred: true, edits: [{ line, ...clause.keywordSpan, newText: meant }] },
    ];
  }
  return line > 0 ? [blankLineBefore(line)] : [];
}

function blankLineBefore(line: number): Fix {
  return { title: "Leave a blank line before it", edits: [{ line, start: 0, end: 0, newText: "\n" }] };
}

/** Clauses of which a block may hold several; without a body nobody knows which of them one is. */
const lists: Readonly<Record<BlockKind, ReadonlySet<Keyword>>> = {
  card: new Set<Keyword>(["config", "contamination", "lift-mach", "buffet", "ias", "published"]),
  limits: new Set<Keyword>(),
  point: new Set<Keyword>(["claim", "expect", "accept"]),
  setting: new Set<Keyword>(["claim", "expect", "accept"]),
};

/** What a clause is one of; two of the same are one thing twice. Null for clauses that list. */
function identity(kind: BlockKind, clause: Clause): string | null {
  const body = clause.body;
  const keyword = clause.keyword;
  if (keyword === null) return null;
  switch (keyword) {
    case "burn":
      return "weight";
    case "oat":
      return "isa";
    case "must":
    case "should":
      return null;
    default:
  }
  if (!body) return lists[kind].has(keyword) ? null : keyword;
  switch (body.kind) {
    case "config":
      return kind === "card" ? `config ${body.name.text.toLowerCase()}` : "config";
    case "contaminant":
      return `contamination ${body.name.text.toLowerCase()}`;
    case "lift-mach":
    case "buffet":
    case "ias":
      return `${body.kind} ${body.config.text.toLowerCase()}`;
    case "published":
      return `published ${body.speed} ${body.config.text.toLowerCase()}`;
    case "claim":
      return `claim ${body.result}`;
    case "expect":
    case "accept":
      return `${body.kind} ${body.code}`;
    default:
      return keyword;
  }
}

/** A clause given twice is an error, and neither counts. */
function checkTwice(
  kind: BlockKind,
  placed: { line: number; clause: Clause; counts: boolean }[],
  findings: TextFinding[],
): void {
  if (!anyTwice(placed)) return;
  const seen = new Map<string, (typeof placed)[number]>();
  const known = blockKeywords[kind];
  for (const one of placed) {
    const what = identity(kind, one.clause);
    if (what === null || !known.has(one.clause.keyword as Keyword)) continue;
    const before = seen.get(what);
    if (!before) {
      seen.set(what, one);
      continue;
    }
    before.counts = false;
    one.counts = false;
    findings.push({
      code: "duplicate-clause",
      line: one.line,
      span: one.clause.span,
      message: twiceMessage(one.clause, before, one.line),
      fixes: one.clause.keyword === "phase" && startsLine(placed, one) ? [blankLineBefore(one.line)] : [],
    });
  }
}

/** Almost no block says anything twice, which a look at the keywords alone can tell. */
function anyTwice(placed: readonly PlacedClause[]): boolean {
  for (let i = 1; i < placed.length; i++) {
    const keyword = alike((placed[i] as PlacedClause).clause.keyword);
    if (keyword === null) continue;
    for (let j = 0; j < i; j++)
      if (alike((placed[j] as PlacedClause).clause.keyword) === keyword) return true;
  }
  return false;
}

function alike(keyword: Keyword | null): Keyword | null {
  return keyword === "burn" ? "weight" : keyword === "oat" ? "isa" : keyword;
}

const blockKeywords: Readonly<Record<BlockKind, { has(keyword: Keyword): boolean }>> = {
  card: { has: (keyword) => keywordEntry(keyword).blocks.includes("card") },
  limits: { has: (keyword) => keywordEntry(keyword).blocks.includes("limits") },
  point: { has: (keyword) => keywordEntry(keyword).blocks.includes("point") },
  setting: { has: (keyword) => keywordEntry(keyword).blocks.includes("point") },
};

function startsLine(placed: readonly PlacedClause[], one: PlacedClause): boolean {
  return one.line > 0 && placed.find((other) => other.line === one.line) === one;
}

function twiceMessage(clause: Clause, before: PlacedClause, line: number): string {
  const keyword = clause.keyword as Keyword;
  if (keyword === "phase")
    return "A block is one moment of the plan and this is its second phase; a blank line before it begins a new point.";
  const where =
    before.line === line
      ? "on this line"
      : `${line - before.line} line${line - before.line === 1 ? "" : "s"} above`;
  const first = before.clause.keyword;
  if (first !== keyword)
    return `\`${keyword}\` and \`${first}\` (${where}) state one thing twice, so neither counts: keep one.`;
  return `\`${keyword}\` is stated a second time (first ${where}), so neither counts: keep one.`;
}

function isUnknown(body: ClauseBody | null): boolean {
  if (!body) return false;
  if (body.kind === "speed")
    return (
      body.speed.kind === "unknown" || (body.speed.kind === "mach" && body.speed.value.kind === "unknown")
    );
  return (
    "value" in body &&
    typeof body.value === "object" &&
    body.value !== null &&
    "kind" in body.value &&
    body.value.kind === "unknown"
  );
}

function isSweep(body: ClauseBody | null): boolean {
  if (!body) return false;
  if (body.kind === "speed") {
    const { speed } = body;
    if (speed.kind === "multiple") return speed.factor.kind === "sweep";
    return (speed.kind === "mach" || speed.kind === "airspeed") && speed.value.kind === "sweep";
  }
  return (
    "value" in body &&
    typeof body.value === "object" &&
    body.value !== null &&
    "kind" in body.value &&
    body.value.kind === "sweep"
  );
}

/** One unknown and one sweep to a point. */
function checkOpen(
  placed: { line: number; clause: Clause; counts: boolean }[],
  findings: TextFinding[],
): void {
  let open = 0;
  for (const { clause } of placed) if (isUnknown(clause.body) || isSweep(clause.body)) open++;
  if (open < 2) return;
  const tell = (code: "two-unknowns" | "two-sweeps", found: typeof placed, what: string) => {
    if (found.length < 2) return;
    for (const one of found) one.counts = false;
    for (const one of found.slice(1)) {
      findings.push({
        code,
        line: one.line,
        span: one.clause.span,
        message: `A point has one ${what}, and this is its second: state a value here, or make it another point.`,
        fixes: [],
      });
    }
  };
  tell(
    "two-unknowns",
    placed.filter((one) => one.counts && isUnknown(one.clause.body)),
    "`?`",
  );
  tell(
    "two-sweeps",
    placed.filter((one) => one.counts && isSweep(one.clause.body)),
    "sweep",
  );
}

function openMark(body: ClauseBody | null): string {
  if (isUnknown(body)) return " ?";
  return isSweep(body) ? " … by …" : "";
}

function checkNeedsPhase(
  placed: { line: number; clause: Clause; counts: boolean }[],
  lines: readonly BarLine[],
  findings: TextFinding[],
): void {
  const needing = placed.filter(
    ({ clause }) =>
      (clause.keyword !== null && pointOnly.has(clause.keyword)) ||
      // A value that is sought or varied is evaluated, which only a point is.
      isUnknown(clause.body) ||
      isSweep(clause.body),
  );
  const first = needing[0];
  if (!first) return;
  for (const one of needing) one.counts = false;
  // The phase may be what stands in the block misspelt, which is told.
  if (placed.some(({ clause }) => clause.keyword === null)) return;
  const last = lines.length - 1;
  const end = (lines[last]?.text ?? "").trimEnd().length;
  findings.push({
    code: "point-needs-phase",
    line: first.line,
    span: first.clause.span,
    message: `\`${first.clause.keyword}${openMark(first.clause.body)}\` belongs to a point, and this block has no phase: write \`phase\` and the phase, or, where its point stands above, leave out the blank line between.`,
    fixes: [
      {
        title: "Write phase",
        preferred: true,
        edits: [{ line: last, start: end, end, newText: "; phase " }],
      },
    ],
  });
}
