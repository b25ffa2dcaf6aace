import type { Card, Configuration, Stated } from "./card.ts";

type Skipped = { readonly rule: string; readonly why: string };

const known = new WeakMap<Configuration, readonly Skipped[]>();

/** The checks that do not exist for a card, because it does not state the value, or states it in error. */
export function absentChecks(card: Card, configuration: Configuration): readonly Skipped[] {
  let skipped = known.get(configuration);
  if (!skipped) {
    skipped = findAbsent(card, configuration);
    known.set(configuration, skipped);
  }
  return skipped;
}

function findAbsent(card: Card, configuration: Configuration): readonly Skipped[] {
  const { name } = configuration;
  const checks: (readonly [string, string, Stated<unknown> | null])[] = [
    ["overweight, underweight", "mass", card.mass],
    // A clean wing has no flap limit, so its absence is nothing to tell.
    ...(name.toLowerCase() === "clean" && !configuration.vfe
      ? []
      : [["over-vfe", `vfe for ${name}`, configuration.vfe] as const]),
    ["over-vmo", "vmo", card.vmo],
    ["over-mmo", "mmo", card.mmo],
    ["over-vne", "vne", card.vne],
    ["over-vno", "vno", card.vno],
    ["over-ceiling", "ceiling", card.ceiling],
    ["below-vmca", "vmca", card.vmca],
    ["over-load-limit", `load for ${name}`, configuration.load],
    ["warning-in-turn, stall-before-warning", "warning", card.warning],
    ["buffet-in-turn", `buffet for ${name}`, configuration.buffet],
    // The lift coefficients of a buffet table give a load only with the wing's area.
    ...(configuration.buffet?.value ? [["buffet-in-turn", "wing", card.wing] as const] : []),
  ];
  return checks.flatMap(([rule, what, stated]): Skipped[] => {
    if (!stated) return [{ rule, why: `The card ${card.name} states no ${what}.` }];
    if (stated.value === null) return [{ rule, why: `The card ${card.name} states ${what} in error.` }];
    return [];
  });
}
