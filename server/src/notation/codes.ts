/** Every code that `expect` and `accept` may name. */
export const findingCodes = [
  "unknown-keyword", "unexpected-text", "missing-argument", "bad-quantity", "separator", "ambiguous-number",
  "missing-unit", "wrong-unit", "duplicate-clause", "misplaced-clause", "unclosed-remark", "unclosed-title",
  "remark-not-read", "unknown-phase", "unknown-config", "unknown-aircraft", "unknown-limits",
  "unknown-contaminant", "unknown-result", "unknown-code", "duplicate-name", "bad-table", "two-unknowns",
  "two-sweeps", "out-of-range", "point-needs-phase", "missing-bar", "no-bar-lines", "unclosed-fence",
  "broken-definition",
  "missing-value", "outside-table", "overweight", "underweight", "over-vfe", "over-vmo", "over-mmo", "over-vne",
  "over-vno", "over-ceiling", "over-load-limit", "below-vmca", "reference-config", "bank-over-limit",
  "bank-over-advice", "ratio-short", "margin-short", "overshoot-short", "load-over-rule", "radius-over-rule",
  "buffet-short", "warning-in-turn", "buffet-in-turn", "stalled", "stall-before-warning", "no-level-flight",
  "gust-over-stall", "decel-too-fast", "carried-over", "contaminated-takeoff", "not-evaluated", "claim-stale",
  "claim-unchecked", "not-as-expected", "accept-unused", "accept-expired", "accept-refused",
  "published-below-least", "built-in-limits", "turn-into-dead-engine", "over-holding-speed", "no-solution",
  "load-below-bank", "unused-definition",
] as const;
