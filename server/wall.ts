import { type CancellationToken, ErrorCodes, LSPErrorCodes, ResponseError } from "vscode-languageserver";
import { errorText } from "./numbers.ts";

/** A request that cannot be met for a reason that the user should read. */
export const refusal = (reason: string): ResponseError<never> =>
  new ResponseError(LSPErrorCodes.RequestFailed, reason);

/** The text has changed while the request was under way: what it found would stand at the wrong places. */
export const outdated = (): ResponseError<never> =>
  new ResponseError(LSPErrorCodes.ContentModified, "the text has changed since");

/**
 * A wall around each handler: a defect costs that one answer. It is logged with the name of the request; the client
 * gets an empty answer and the server lives on. Refusals and cancellations pass through.
 */
export function wall(log: (text: string) => void, hasEnded: () => boolean) {
  return <P, R>(name: string, empty: R, handler: (params: P, token: CancellationToken) => R | Promise<R>) =>
    async (params: P, token: CancellationToken): Promise<R | ResponseError<never>> => {
      try {
        if (hasEnded()) return ended();
        if (token.isCancellationRequested) return cancelled();
        const answer = await handler(params, token);
        return token.isCancellationRequested ? cancelled() : answer;
      } catch (error) {
        if (error instanceof ResponseError) return error as ResponseError<never>;
        log(`${name} failed\n${errorText(error)}`);
        return empty;
      }
    };
}

const ended = (): ResponseError<never> =>
  new ResponseError(ErrorCodes.InvalidRequest, "the server has been shut down");

const cancelled = (): ResponseError<never> =>
  new ResponseError(LSPErrorCodes.RequestCancelled, "the request was cancelled");
