/**
 * One guard for each request: a fault in answering one is logged and answered with nothing, so that it
 * can neither stop the server nor leave the client waiting.
 */
import { LSPErrorCodes, ResponseError, type CancellationToken, type Connection } from 'vscode-languageserver';

export interface Guarded<P, R> {
  readonly connection: Connection;
  /** For the log: `hover`. */
  readonly name: string;
  readonly answer: (params: P, token: CancellationToken) => Promise<R>;
  /** What is answered when `answer` throws. */
  readonly otherwise: (fault: unknown) => R;
  /** What is refused with when an edit came first; "content modified" where nothing else is stated. */
  readonly overtaken?: ResponseError<unknown>;
}

export function guarded<P, R>({ connection, name, answer, otherwise, overtaken }: Guarded<P, R>): (params: P, token: CancellationToken) => Promise<R> {
  return async (params, token) => {
    try {
      return await answer(params, token);
    } catch (error) {
      if (error instanceof Superseded) throw overtaken ?? new ResponseError(LSPErrorCodes.ContentModified, 'the text has changed since');
      if (error instanceof Refusal) throw new ResponseError(LSPErrorCodes.RequestFailed, error.message);
      connection.console.error(`${name}: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`);
      return otherwise(error);
    }
  };
}

/** Thrown where a request was overtaken by an edit: what it asks about is no longer there. */
export class Superseded extends Error {}

/** Thrown where what was asked for is not done, for a reason that the person who asked is told. */
export class Refusal extends Error {}
