import type { Token, Tree } from "../syntax/tree.ts";

/**
 * Whether two texts mean the same because they differ only in comments, notes, blanks and blank lines. Notes that
 * accept something count as meaning. False does not say that they differ in meaning.
 */
export function sameMeaning(a: Tree, b: Tree): boolean {
  if (a === b) return true;
  const [words, others] = [meaningOf(a), meaningOf(b)];
  for (;;) {
    const [word, other] = [words.next(), others.next()];
    if (word.done || other.done) return word.done === other.done;
    if (word.value !== other.value) return false;
  }
}

/** What a text says, line by line: how deep a line stands, and its words. */
function* meaningOf({ text, tokens, lines }: Tree): Generator<string> {
  for (const { first, last, role, level, readable } of lines) {
    if (role === "blank" || role === "comment") continue;
    if (role === "note" && !accepts(text, tokens.slice(first, last))) continue;
    yield `${role} ${level} ${readable}`;
    for (let i = first; i < last; i++) {
      const { kind, offset, length }: Token = tokens[i];
      if (kind !== "blank" && kind !== "comment") yield text.slice(offset, offset + length);
    }
  }
}

const accepts = (text: string, tokens: readonly Token[]): boolean =>
  tokens.some(
    ({ kind, offset, length }) => kind === "note" && ACCEPTS.test(text.slice(offset, offset + length)),
  );

const ACCEPTS = /^>[ \t]*accept\b/;
