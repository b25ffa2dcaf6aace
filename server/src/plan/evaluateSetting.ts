import { airframeOf, cgFactorAt } from "./airframe.ts";
import { applyClauses } from "./carry.ts";
import type { Clauses } from "./clauses.ts";
import { calibrated } from "./corner.ts";
import type { Definitions } from "./definitions.ts";
import type { Finding } from "./finding.ts";
import { configurationNamed } from "./inputs.ts";
import { unknownConfiguration } from "./names.ts";
import { findingAt, listed, originOf, type Site } from "./site.ts";
import { airOf } from "./situation.ts";
import { type ResolvedSpeed, resolveSpeed, type SpeedSetting, settingCas } from "./speed.ts";
import { exactly } from "./spread.ts";
import type { Carried, CarriedState, FlownSpeed, State } from "./state.ts";

/** A setting changes the state that later points start from; it is not itself evaluated. */
export function evaluateSetting(
  site: Site,
  clauses: Clauses,
  definitions: Definitions,
  before: State,
): { readonly after: State; readonly findings: readonly Finding[] } {
  const applied = applyClauses(site, clauses, definitions, before);
  const findings: Finding[] = [...applied.findings];
  const card = applied.carried.aircraft?.value?.card;
  const config = applied.carried.config?.value;
  if (clauses.config && card && config && !configurationNamed(card, config)) {
    findings.push(unknownConfiguration(card, clauses.config.placed, config));
  }
  const carried = clauses.speed ? withSpeed(site, clauses, applied.carried, findings) : applied.carried;
  return {
    after: {
      carried,
      landed: applied.landed,
      sinceLanding: applied.sinceLanding,
      told: applied.afresh ? {} : before.told,
    },
    findings,
  };
}

/** A speed in a setting is reckoned in the setting's own state, straight and level; what it lacks is told there. */
function withSpeed(site: Site, clauses: Clauses, carried: CarriedState, findings: Finding[]): CarriedState {
  const read = clauses.speed;
  if (!read) return carried;
  const setting = settingOf(carried);
  const before = findings.length;
  const resolved = resolveSpeed(read, setting, findings);
  const flown = resolved && flownIn(resolved, carried, setting);
  if (!flown && findings.length === before && read.body.speed.kind !== "unknown") {
    const lacks = lacking(carried);
    if (lacks.length > 0) {
      findings.push(
        findingAt(
          "missing-value",
          read.placed,
          `This speed is reckoned here and needs ${listed(lacks)}, and no line up to here states ${lacks.length === 1 ? "it" : "them"}.`,
        ),
      );
    }
  }
  const own = findings[before];
  const speed: Carried<FlownSpeed> = {
    value: flown,
    origin: originOf(site, read.placed),
    unknown: flown ? null : (own?.code ?? "missing-value"),
    phase: null,
  };
  return { ...carried, speed };
}

function settingOf(carried: CarriedState): SpeedSetting | null {
  const card = carried.aircraft?.value?.card;
  const configuration = card && carried.config?.value ? configurationNamed(card, carried.config.value) : null;
  const air = airOf(carried);
  const mass = carried.mass?.value;
  if (!card || !configuration || !air || !mass) return null;
  const frame = airframeOf(card, configuration);
  const cgFactor = carried.cg?.value === null ? null : cgFactorAt(card, carried.cg?.value ?? null);
  const liftLoss = carried.contamination ? carried.contamination.value?.loss : exactly(0);
  if (!frame || !cgFactor || !liftLoss || carried.aircraft?.unknown) return null;
  return {
    card,
    configuration,
    frame,
    mass: mass.nominal,
    air,
    liftLoss: liftLoss.nominal,
    cgFactor: cgFactor.nominal,
    load: 1,
  };
}

function flownIn(
  speed: ResolvedSpeed,
  carried: CarriedState,
  setting: SpeedSetting | null,
): FlownSpeed | null {
  if (speed.kind === "cas" || speed.kind === "mach") return { kind: speed.kind, speed: speed.value };
  if (speed.kind === "ias") {
    const cas = settingCas(speed, setting);
    return cas && { kind: "cas", speed: cas };
  }
  const air = airOf(carried)?.nominal;
  if (!air) return null;
  const at = (value: number) => calibrated({ kind: speed.kind, value }, air);
  const nominal = at(speed.value.nominal);
  const low = at(speed.value.low);
  const high = at(speed.value.high);
  if (nominal === null || low === null || high === null) return null;
  return { kind: "cas", speed: { nominal, low, high } };
}

/** What a speed expression, a true or an equivalent airspeed may need and no line states. What is stated in error was told. */
function lacking(carried: CarriedState): string[] {
  const lacks: string[] = [];
  if (!carried.aircraft) lacks.push("an aeroplane (`fly`)");
  if (!carried.mass) lacks.push("a weight");
  if (!carried.config) lacks.push("a configuration");
  if (!carried.altitude) lacks.push("an altitude");
  return lacks;
}
