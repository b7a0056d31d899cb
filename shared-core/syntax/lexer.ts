/**
 * Text -> tokens. Lossless: joining the tokens gives back the text, whatever the text. Linear: no character
 * is looked at more than a fixed number of times.
 */
import { BYTE_ORDER_MARK, isBlank, isDigit, isNewline, letterLength, nameLength } from "./characters.ts";
import { type Conflict, findConflicts } from "./conflicts.ts";
import type { Token, TokenKind } from "./tree.ts";

export interface Lexed {
  readonly tokens: Token[];
  readonly conflicts: readonly Conflict[];
}

export function tokenize(text: string): Lexed {
  const conflicts = findConflicts(text);
  return { tokens: new Lexer(text, conflicts).run(), conflicts };
}

/** Longest first, so that `<=` is not `<` and `=`. */
const LONG_OPERATORS: Readonly<Record<string, readonly string[]>> = {
  "+": ["+/-"],
  "<": ["<="],
  ">": [">="],
  "=": ["=="],
  "!": ["!="],
};
const SHORT_OPERATORS = new Set([..."+-*/^()=<>,.:%±·"]);
const NUMBER = /(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?/y;
const QUOTE = 34;
const HASH = 35;
const DOT = 46;
const GREATER = 62;

class Lexer {
  readonly #text: string;
  readonly #tokens: Token[] = [];
  readonly #skipped: readonly { readonly start: number; readonly end: number }[];
  #at = 0;
  #skip = 0;
  /** True until something other than blanks has been seen on the line. */
  #lineStart = true;

  constructor(text: string, conflicts: readonly Conflict[]) {
    this.#text = text;
    this.#skipped = conflicts.flatMap((conflict) => conflict.skipped);
  }

  run(): Token[] {
    const length = this.#text.length;
    if (this.#text.charCodeAt(0) === BYTE_ORDER_MARK) this.#push("blank", 1);
    while (this.#at < length) this.#next();
    return this.#tokens;
  }

  #next(): void {
    const code = this.#text.charCodeAt(this.#at);
    if (isNewline(code)) this.#newline(code);
    else if (this.#inConflict()) this.#push("conflict", this.#lineLength());
    else if (isBlank(code)) this.#push("blank", this.#run(isBlank));
    else this.#solid(code);
  }

  /** A token that is neither blank nor newline. */
  #solid(code: number): void {
    const first = this.#lineStart;
    this.#lineStart = false;
    const letter = letterLength(this.#text, this.#at);
    if (letter > 0) this.#name(letter);
    else if (isDigit(code) || (code === DOT && this.#startsFraction())) this.#number();
    else if (first && code === GREATER) this.#toLineEnd("note");
    else if (code === HASH) this.#toLineEnd("comment");
    else if (code === QUOTE) this.#string();
    else this.#operator();
  }

  #push(kind: TokenKind, length: number): void {
    this.#tokens.push({ kind, offset: this.#at, length });
    this.#at += length;
  }

  #newline(code: number): void {
    const pair = code === 13 && this.#text.charCodeAt(this.#at + 1) === 10;
    this.#push("newline", pair ? 2 : 1);
    this.#lineStart = true;
  }

  #inConflict(): boolean {
    const skipped = this.#skipped;
    while (this.#skip < skipped.length && skipped[this.#skip].end <= this.#at) this.#skip++;
    return this.#skip < skipped.length && skipped[this.#skip].start <= this.#at;
  }

  #run(accepts: (code: number) => boolean): number {
    let end = this.#at + 1;
    while (end < this.#text.length && accepts(this.#text.charCodeAt(end))) end++;
    return end - this.#at;
  }

  #lineLength(): number {
    let end = this.#at;
    while (end < this.#text.length && !isNewline(this.#text.charCodeAt(end))) end++;
    return end - this.#at;
  }

  /** Blanks at the end of the line are a token of their own, so that the formatter may drop them. */
  #toLineEnd(kind: "note" | "comment"): void {
    let end = this.#at + this.#lineLength();
    while (isBlank(this.#text.charCodeAt(end - 1))) end--;
    this.#push(kind, end - this.#at);
  }

  /** To the closing quote (two in a row stand for one inside), or to the end of the line where it is missing. */
  #string(): void {
    const text = this.#text;
    let end = this.#at + 1;
    while (end < text.length && !isNewline(text.charCodeAt(end))) {
      if (text.charCodeAt(end++) !== QUOTE) continue;
      if (text.charCodeAt(end) !== QUOTE) break;
      end++;
    }
    this.#push("string", end - this.#at);
  }

  /** `.5` is a number, but not behind a name: `mount.5` is a slip in a path. */
  #startsFraction(): boolean {
    const before = this.#tokens.at(-1)?.kind;
    return isDigit(this.#text.charCodeAt(this.#at + 1)) && before !== "name" && before !== "number";
  }

  #number(): void {
    NUMBER.lastIndex = this.#at;
    NUMBER.exec(this.#text);
    this.#push("number", NUMBER.lastIndex - this.#at);
  }

  #name(first: number): void {
    let end = this.#at + first;
    for (let step = nameLength(this.#text, end); step > 0; step = nameLength(this.#text, end)) end += step;
    this.#push("name", end - this.#at);
  }

  #operator(): void {
    const text = this.#text;
    const sign = text[this.#at];
    const long = LONG_OPERATORS[sign]?.find((operator) => text.startsWith(operator, this.#at));
    if (long) this.#push("operator", long.length);
    else if (SHORT_OPERATORS.has(sign)) this.#push("operator", 1);
    else this.#push("unknown", (text.codePointAt(this.#at) ?? 0) > 0xffff ? 2 : 1);
  }
}
