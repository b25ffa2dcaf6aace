import { type Connection, ErrorCodes, ResponseError } from "vscode-languageserver";

/**
 * Wraps handlers so that none can take the server down: what is thrown is logged and becomes the
 * answer of that one request.
 */
export function guardWith(connection: Connection) {
  return function guard<A extends unknown[], R>(name: string, handler: (...args: A) => R | Promise<R>) {
    return async (...args: A): Promise<R> => {
      try {
        return await handler(...args);
      } catch (error) {
        if (error instanceof ResponseError) throw error;
        const reason = error instanceof Error ? (error.stack ?? error.message) : String(error);
        connection.console.error(`${name}: ${reason}`);
        throw new ResponseError(
          ErrorCodes.InternalError,
          `Plumbline could not answer ${name}; its log says why.`,
        );
      }
    };
  };
}
