import { type Connection, ErrorCodes, ResponseError } from "vscode-languageserver";
import { refuseMalformed } from "./params.ts";

/**
 * Wraps handlers so that none can take the server down: what is thrown is logged, and becomes the
 * answer of that one request. A notification has no answer, so there it is only logged. What comes
 * before the start or after the end, or is not as the protocol has it, reaches no handler.
 */
export function guardWith(connection: Connection) {
  let stage: "new" | "running" | "ended" = "new";

  function log(name: string, error: unknown): void {
    const reason = error instanceof Error ? (error.stack ?? error.message) : String(error);
    connection.console.error(`${name}: ${reason}`);
  }

  function refuseOutOfOrder(name: string): void {
    if (name === "initialize" ? stage === "new" : stage === "running") return;
    throw stage === "new"
      ? new ResponseError(ErrorCodes.ServerNotInitialized, `${name} was asked before initialize.`)
      : new ResponseError(
          ErrorCodes.InvalidRequest,
          `${name} was asked ${stage === "ended" ? "after shutdown" : "twice"}.`,
        );
  }

  return {
    /** From now on requests and notifications are taken in. */
    start(): void {
      stage = "running";
    },

    /** From now on none is. */
    end(): void {
      stage = "ended";
    },

    answering<A extends unknown[], R>(name: string, handler: (...args: A) => R | Promise<R>) {
      return async (...args: A): Promise<R> => {
        try {
          refuseOutOfOrder(name);
          refuseMalformed(name, args[0]);
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
        // A notification has no answer: where none is due it is passed over.
        if (stage !== "running") return;
        try {
          refuseMalformed(name, args[0]);
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
