import type { SemanticTokens, SemanticTokensDelta, SemanticTokensEdit } from "vscode-languageserver";
import { encodeTokens, type Span, semanticTokens } from "../../shared-core/index.ts";
import { toSpan } from "../convert.ts";
import { type Serving, sessionOf } from "../serving.ts";
import type { Session } from "../session.ts";

export function registerSemanticTokens(serving: Serving): void {
  const { guard, schedule } = serving;
  const { semanticTokens: tokens } = serving.connection.languages;
  const sent = new WeakMap<Session, { readonly resultId: string; readonly data: number[] }>();
  let count = 0;
  const dataOf = (session: Session, span?: Span): number[] => {
    const view = schedule.view(session);
    return encodeTokens(view, semanticTokens(view, span));
  };
  const whole = (session: Session): { resultId: string; data: number[] } => {
    const answer = { resultId: String(++count), data: dataOf(session) };
    sent.set(session, answer);
    return answer;
  };
  const none: SemanticTokens = { data: [] };
  tokens.on(
    guard("textDocument/semanticTokens/full", none, ({ textDocument }) => {
      const session = sessionOf(serving, textDocument);
      return session ? whole(session) : none;
    }),
  );
  tokens.onRange(
    guard("textDocument/semanticTokens/range", none, ({ textDocument, range }) => {
      const session = sessionOf(serving, textDocument);
      return session ? { data: dataOf(session, toSpan(schedule.current(session).lines, range)) } : none;
    }),
  );
  tokens.onDelta(
    guard(
      "textDocument/semanticTokens/full/delta",
      none as SemanticTokens | SemanticTokensDelta,
      ({ textDocument, previousResultId }) => {
        const session = sessionOf(serving, textDocument);
        if (session === undefined) return none;
        const before = sent.get(session);
        const { resultId, data } = whole(session);
        if (before?.resultId !== previousResultId) return { resultId, data };
        return { resultId, edits: difference(before.data, data) };
      },
    ),
  );
}

/** One edit from the first number that differs to the last, which is what typing leads to. */
export function difference(before: readonly number[], after: readonly number[]): SemanticTokensEdit[] {
  let start = 0;
  while (start < before.length && start < after.length && before[start] === after[start]) start++;
  let [a, b] = [before.length, after.length];
  while (a > start && b > start && before[a - 1] === after[b - 1]) {
    a--;
    b--;
  }
  return a === start && b === start ? [] : [{ start, deleteCount: a - start, data: after.slice(start, b) }];
}
