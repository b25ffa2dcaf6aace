import { fromSI, type UnitName } from "../flight/units.ts";
import { applyAccepts } from "./accepts.ts";
import { blocks } from "./blocking.ts";
import type { Clauses } from "./clauses.ts";
import { evaluateStated, type Setting, type StatedPoint } from "./evaluateStated.ts";
import type { Finding } from "./finding.ts";
import { formatSpoken } from "./format.ts";
import { closed, type OpenClause, type Written } from "./openClause.ts";
import type { Solved, SolvedEnd } from "./point.ts";
import { findingAt, listed, originOf } from "./site.ts";
import { speedWindow } from "./solveBounds.ts";
import { type Grid, gridOf } from "./solveGrid.ts";
import { withUnknown } from "./unknownState.ts";

/** A point whose `?` was sought, evaluated at the value that was found. */
export interface SolvedPoint {
  readonly stated: StatedPoint;
  readonly solved: Solved | null;
}

/** How much may still be worked out, in corners of trials. A sweep that would go beyond it is refused. */
export interface Work {
  left: number;
}

/** Bisection ends where the bracket is this narrow, relative to the value. */
const PRECISION = 1e-6;

/**
 * Seeks the steepest bank, lowest speed, heaviest weight or highest altitude that keeps every rule and
 * check of the point. The values that may be written are tried one after the other from the end that
 * is asked for, for the set that keeps them all need not be one piece; between the best and the next
 * the exact bound is then bisected. Every trial is the point as it would read with the value written
 * in, so that the fix changes nothing.
 */
export function solve(
  setting: Setting,
  clauses: Clauses,
  open: OpenClause,
  work: Work | null = null,
): SolvedPoint {
  const seeker = new Seeker(setting, clauses, open, work);
  const best = seeker.best();
  if (best === null) return unsolved(seeker);
  if (seeker.isUnbounded(best)) return unbounded(seeker, best);
  return { stated: seeker.stated(seeker.grid.written(best)), solved: new Found(seeker, best) };
}

/** What a trial came to. */
interface Trial {
  readonly keeps: boolean;
  /** What the value breaks, the gravest first; the code that withholds the figures where there are none. */
  readonly broken: readonly string[];
  readonly figures: boolean;
}

class Seeker {
  readonly grid: Grid;
  readonly setting: Setting;
  readonly open: OpenClause;
  readonly #clauses: Clauses;
  readonly #work: Work | null;
  least: { readonly at: number; readonly trial: Trial } | null = null;

  constructor(setting: Setting, clauses: Clauses, open: OpenClause, work: Work | null) {
    this.#work = work;
    this.setting = setting;
    this.open = open;
    this.#clauses = clauses;
    this.grid = gridOf(setting, clauses, open);
  }

  stated(written: Written): StatedPoint {
    return evaluateStated(this.setting, closed(this.#clauses, this.open, written));
  }

  try(value: number): Trial {
    const { unit, decimals } = this.grid;
    const { point, findings, evaluated, withheld } = this.stated({ value, unit, decimals });
    if (this.#work) this.#work.left -= evaluated?.corners.all.length ?? 1;
    const broken = applyAccepts(point, findings, evaluated !== null).findings.filter(blocks);
    if (!evaluated) return { keeps: false, broken: [withheld?.code ?? "missing-value"], figures: false };
    return { keeps: broken.length === 0, broken: byGravity(broken).map(label), figures: true };
  }

  /** The index of the best value that keeps everything; null where none does, and `least` says which breaks least. */
  best(): number | null {
    const { step } = this.grid;
    const { from, to } = this.#searched();
    for (let i = from; step < 0 ? to <= i : i <= to; i += step) {
      if (this.#work && this.#work.left < 0) return null;
      if (this.#keepsAt(i)) return i;
    }
    return null;
  }

  #keepsAt(i: number): boolean {
    const trial = this.try(this.grid.value(i));
    // Of two that break as much the later one, which asks less, is named.
    const { least } = this;
    if (!trial.keeps && trial.figures && (!least || trial.broken.length <= least.trial.broken.length))
      this.least = { at: i, trial };
    return trial.keeps;
  }

  /** Where a value can keep everything: the whole grid, or for a speed the part that is not ruled out beforehand. */
  #searched(): Pick<Grid, "from" | "to"> {
    const { grid } = this;
    if (grid.what !== "speed") return grid;
    const window = speedWindow(grid, this.stated(grid.written(this.#probe())));
    if (!window) return grid;
    if (window.low <= window.high) return { from: window.low, to: window.high };
    // Nothing is left between what is asked for at least and at most: the fastest allowed says what is in the way.
    return { from: window.high - 2, to: window.high - 1 };
  }

  /** A speed at which most aeroplanes have figures. */
  #probe(): number {
    const { shownUnit } = this.grid;
    return shownUnit === "M" ? 500 : Math.round(fromSI(100, shownUnit as UnitName));
  }

  /** True where nothing stands in the way beyond the first value that was tried. */
  isUnbounded(best: number): boolean {
    const { from, step, value } = this.grid;
    return best === from && this.try(value(from - step)).keeps;
  }

  /** The end of the values that keep everything, from `inside` on in the direction of `step`. */
  end(inside: number, step: number): SolvedEnd {
    const { value } = this.grid;
    let keeps = value(inside);
    let fails = value(inside + step);
    const beyond = this.try(fails);
    let broken = beyond.broken;
    // Near 0 a relative bracket would never be narrow enough.
    const scale = () => Math.max(Math.abs(keeps), Math.abs(fails), Math.abs(value(1) - value(0)));
    while (PRECISION * scale() < Math.abs(fails - keeps)) {
      const middle = (keeps + fails) / 2;
      const trial = this.try(middle);
      if (trial.keeps) keeps = middle;
      else {
        fails = middle;
        broken = trial.broken;
      }
    }
    // Named is what the next value that may be written breaks too.
    const boundBy = broken.find((one) => beyond.broken.includes(one)) ?? beyond.broken[0] ?? "";
    return { value: value(inside), exact: keeps, boundBy };
  }
}

class Found implements Solved {
  readonly what: Solved["what"];
  readonly unit: Solved["unit"];
  readonly best: SolvedEnd;
  readonly blockedBy = null;
  readonly written: Written;
  readonly open: OpenClause;
  readonly #seeker: Seeker;
  readonly #at: number;
  #other: SolvedEnd | null | undefined;

  constructor(seeker: Seeker, at: number) {
    this.what = seeker.grid.what;
    this.unit = seeker.grid.shownUnit;
    this.best = seeker.end(at, -seeker.grid.step);
    this.written = seeker.grid.written(at);
    this.open = seeker.open;
    this.#seeker = seeker;
    this.#at = at;
  }

  other(): SolvedEnd | null {
    if (this.#other === undefined) this.#other = this.#findOther();
    return this.#other;
  }

  #findOther(): SolvedEnd | null {
    const { grid } = this.#seeker;
    for (let i = this.#at; grid.step < 0 ? grid.to <= i : i <= grid.to; i += grid.step) {
      const next = i + grid.step;
      if (!this.#seeker.try(grid.value(next)).keeps) return this.#seeker.end(i, grid.step);
    }
    return null;
  }
}

/** No value keeps everything: what stands in the way at the value that breaks least. */
function unsolved(seeker: Seeker): SolvedPoint {
  const { grid, least } = seeker;
  // Without figures anywhere something else is in the way, which is told as it is for any point.
  if (!least) return { stated: seeker.stated(grid.written(grid.to)), solved: null };
  const at = `${grid.what} ${formatSpoken(grid.written(least.at), grid.keyword)}`;
  return withoutSolution(
    seeker,
    seeker.stated(grid.written(least.at)),
    least.trial.broken.join("; "),
    `No ${grid.what} keeps every rule and check here: at ${at}, which breaks least, ${names(least.trial.broken)} ${least.trial.broken.length === 1 ? "stands" : "stand"} in the way. Change something else of the point, or the limits.`,
  );
}

/** A value that nothing bounds is no answer. */
function unbounded(seeker: Seeker, best: number): SolvedPoint {
  const { grid } = seeker;
  return withoutSolution(
    seeker,
    seeker.stated(grid.written(best)),
    "nothing bounds it",
    `Nothing bounds the ${grid.what} here: state it, or give the card what bounds it.`,
  );
}

function withoutSolution(
  { grid, open, setting }: Seeker,
  stated: StatedPoint,
  blockedBy: string,
  message: string,
): SolvedPoint {
  const withheld = { origin: originOf(setting.site, open.placed), code: "no-solution" };
  const finding = findingAt("no-solution", open.placed, message, { span: open.value.span });
  // What could not be evaluated says why itself, whatever the value is.
  const others = stated.findings.filter((one) => !blocks(one) || one.code === "not-evaluated");
  const unknown = { value: null, origin: withheld.origin, unknown: "no-solution", phase: null };
  return {
    stated: {
      ...stated,
      evaluated: null,
      rules: { rows: [], off: [], notEvaluated: [] },
      withheld,
      findings: [...others, finding],
      after: stated.point.clauses.aside ? setting.before : withUnknown(stated.after, open.slot, unknown),
    },
    solved: {
      what: grid.what,
      unit: grid.shownUnit,
      best: null,
      other: () => null,
      blockedBy,
      written: null,
      open,
    },
  };
}

function names(broken: readonly string[]): string {
  return listed(broken.map((one) => `\`${one}\``));
}

const order = ["error", "warning", "information", "hint"];

function byGravity(findings: readonly Finding[]): readonly Finding[] {
  return [...findings].sort((a, b) => order.indexOf(a.severity) - order.indexOf(b.severity));
}

/** A rule by its row as it is written, a check by its code. */
function label(finding: Finding): string {
  return finding.rule ?? finding.code;
}
