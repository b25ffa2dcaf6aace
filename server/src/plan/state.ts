/** Placeholder of the carried state; written with the evaluator. */
export type State = Readonly<Record<string, unknown>>;
