// What the tests use of Node's own assertions, for a host that has none.

function fail(message: unknown, standard: string): never {
  throw message instanceof Error ? message : new Error(message === undefined ? standard : String(message));
}

const shown = (value: unknown) => JSON.stringify(value);

const assert = {
  ok(value: unknown, message?: unknown): void {
    if (!value) fail(message, `${shown(value)} is not true`);
  },
  equal(actual: unknown, wanted: unknown, message?: unknown): void {
    if (!Object.is(actual, wanted)) fail(message, `${shown(actual)} is not ${shown(wanted)}`);
  },
  notEqual(actual: unknown, other: unknown, message?: unknown): void {
    if (Object.is(actual, other)) fail(message, `is ${shown(actual)}`);
  },
  /** Of plain data. */
  deepEqual(actual: unknown, wanted: unknown, message?: unknown): void {
    if (shown(actual) !== shown(wanted)) fail(message, `${shown(actual)} is not ${shown(wanted)}`);
  },
  match(text: string, pattern: RegExp, message?: unknown): void {
    if (!pattern.test(text)) fail(message, `${shown(text)} does not match ${pattern}`);
  },
};

export default assert;
