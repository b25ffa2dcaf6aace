import { type Connection, ErrorCodes, ResponseError } from "vscode-languageserver";

/**
 * Wraps handlers so that none can take the server down: what is thrown is logged, and becomes the
 * answer of that one request. A notification has no answer, so there it is only logged.
 */
export function guardWith(connection: Connection) {
  function log(name: string, error: unknown): void {
    const reason = error instanceof Error ? (error.stack ?? error.message) : String(error);
    connection.console.error(`${name}: ${reason}`);
  }

  return {
    answering<A extends unknown[], R>(name: string, handler: (...args: A) => R | Promise<R>) {
      return async (...args: A): Promise<R> => {
        try {
          return await handler(...args);
        } catch (error) {
          if (error instanceof ResponseError) throw error;
          log(name, error);
          throw new ResponseError(
            ErrorCodes.InternalError,
            `Plumbline could not answer ${name}; its log says why.`,
          );
        }
      };
    },

    hearing<A extends unknown[]>(name: string, handler: (...args: A) => void | Promise<void>) {
      return async (...args: A): Promise<void> => {
        try {
          await handler(...args);
        } catch (error) {
          log(name, error);
        }
      };
    },

    /** For what is asked of the client: one that refuses does without, and nothing else depends on it. */
    async asking(name: string, question: () => unknown): Promise<void> {
      try {
        await question();
      } catch (error) {
        log(name, error);
      }
    },
  };
}
