/** Something the caller can mend: told in a clear line on standard error, exit code 2. */
export class UsageError extends Error {}
