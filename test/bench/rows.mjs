/** A row of the table that compares two figures of one unit; `aims` are `{ text, met }`, all to be met. */
export function compared(measure, ours, baseline, { unit = "ms", against = "echo", aims = [] } = {}) {
  return {
    measure,
    value: figure(ours, unit),
    baseline: `${against} ${figure(baseline, unit)}`,
    ratio: (ours / baseline).toFixed(2),
    ...judged(aims),
  };
}

/** A row with one figure. */
export function single(measure, value, { unit = "ms", aims = [] } = {}) {
  return { measure, value: figure(value, unit), ...judged(aims) };
}

/** An aim that the value be at most, or at least, the bound; it says by how much it is missed. */
export function atMost(value, bound, text) {
  return { text, met: value <= bound, gap: `${(value / bound).toFixed(2)} times the aim` };
}

export function atLeast(value, bound, text) {
  return { text, met: bound <= value, gap: `${(value / bound).toFixed(2)} of the aim` };
}

function judged(aims) {
  if (aims.length === 0) return {};
  const missed = aims.filter(({ met }) => !met);
  const met = missed.length === 0 ? "yes" : `no: ${missed.map(({ gap }) => gap).join(" and ")}`;
  return { aim: aims.map(({ text }) => text).join(", "), met };
}

function figure(value, unit) {
  const decimals = value < 10 ? 2 : value < 100 ? 1 : 0;
  const [whole, fraction] = value.toFixed(decimals).split(".");
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ",");
  return `${fraction ? `${grouped}.${fraction}` : grouped} ${unit}`;
}
