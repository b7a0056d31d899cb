import type { Diagnostic, Fix } from "../diagnostics/diagnostic.ts";
import { nearest } from "../text/nearest.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { LOOKALIKES } from "./characters.ts";
import type { GrammarTable } from "./grammar.ts";
import { ROLE, type Token, type TreeLine } from "./tree.ts";

/** What the parser is given besides the text. */
export interface ParseOptions {
  readonly grammar: GrammarTable;
  /** Whether a name is in the unit table, prefix included: `kN`, `%`. */
  readonly isUnit: (name: string) => boolean;
  /** The unit somebody most likely meant; for the fix of `unknown-unit`. */
  readonly nearestUnit?: (name: string) => string | undefined;
}

/** What a diagnostic may carry besides its words and place. */
export interface Extras {
  readonly hint?: string;
  readonly fixes?: readonly Fix[];
  readonly code?: Diagnostic["code"];
  readonly related?: Diagnostic["related"];
}

/** How many mistyped words of one file get a suggestion; beyond it the file is not one somebody typed. */
const MOST_SUGGESTIONS = 200;

/** One file while it is parsed. */
export class ParseState {
  readonly diagnostics: Diagnostic[] = [];
  readonly roles: Uint8Array;
  readonly #units = new Map<string, boolean>();
  readonly #said = new Set<number>();
  #suggestionsLeft = MOST_SUGGESTIONS;

  constructor(
    readonly text: string,
    readonly tokens: readonly Token[],
    readonly options: ParseOptions,
  ) {
    this.roles = new Uint8Array(tokens.length);
  }

  isUnit(name: string): boolean {
    let known = this.#units.get(name);
    if (known === undefined) {
      known = this.options.isUnit(name);
      this.#units.set(name, known);
    }
    return known;
  }

  textOf(token: Token): string {
    return this.text.slice(token.offset, token.offset + token.length);
  }

  /** Says a diagnostic unless one was said at this place. */
  say(diagnostic: Diagnostic): void {
    if (this.#said.has(diagnostic.span.start)) return;
    this.#said.add(diagnostic.span.start);
    this.diagnostics.push(diagnostic);
  }

  suggest(word: string, candidates: Iterable<string>): string | undefined {
    return this.#suggestionsLeft-- > 0 ? nearest(word, candidates) : undefined;
  }
}

/**
 * Walks over the tokens of one line, blanks and comments left out. The first `fail` of a line says its error
 * and jumps to the end of the line; whatever is tried afterwards finds nothing and says nothing. So every
 * production may go on as if all were well, and a line has at most one error.
 */
export class Cursor {
  readonly state: ParseState;
  readonly line: TreeLine;
  readonly #text: string;
  readonly #tokens: readonly Token[];
  /** The text of the current token; empty at the end of the line. */
  word = "";
  kind: Token["kind"] | "end" = "end";
  failed = false;
  /** Errors of this line are not said, because its one error has been. */
  quiet = false;
  /** Nesting of the expression being read, and the operators seen in it (see expressions.ts). */
  depth = 0;
  operators = 0;
  #at: number;
  #end: number;
  /** End of the token taken last. */
  #taken: number;

  constructor(state: ParseState, line: TreeLine) {
    this.state = state;
    this.line = line;
    this.#text = state.text;
    this.#tokens = state.tokens;
    this.#at = line.first;
    this.#end = line.last;
    this.#taken = line.span.start;
    this.#settle();
  }

  get index(): number {
    return this.#at;
  }

  /** Where the current token starts; at the end of the line, where the token taken last ended. */
  get offset(): number {
    return this.#at < this.#end ? this.state.tokens[this.#at].offset : this.#taken;
  }

  /** Where the token taken last ended. */
  get taken(): number {
    return this.#taken;
  }

  get atEnd(): boolean {
    return this.kind === "end";
  }

  /** True when no blank stands between the token taken last and the current one. */
  get glued(): boolean {
    return !this.atEnd && this.offset === this.#taken;
  }

  /** The span of the current token; at the end of the line, of the last one on it. */
  get span(): Span {
    const token = this.atEnd ? this.#lastToken() : this.state.tokens[this.#at];
    return token ? span(token.offset, token.offset + token.length) : this.line.span;
  }

  is(kind: Token["kind"]): boolean {
    return this.kind === kind;
  }

  from(start: number): Span {
    return span(start, Math.max(start, this.#taken));
  }

  take(role: number = ROLE.none): void {
    if (this.atEnd) return;
    const token = this.state.tokens[this.#at];
    if (role !== ROLE.none) this.state.roles[this.#at] = role;
    this.#taken = token.offset + token.length;
    this.#at++;
    this.#settle();
  }

  /** Takes the current token if it is this word or operator. */
  accept(word: string, role: number = ROLE.none): boolean {
    if (this.word !== word || this.kind === "string") return false;
    this.take(role);
    return true;
  }

  /** The tokens from the current one on, without blanks and comments. */
  ahead(count: number): Token[] {
    const found: Token[] = [];
    for (let i = this.#at; i < this.#end && found.length < count; i++) {
      if (isSignificant(this.state.tokens[i])) found.push(this.state.tokens[i]);
    }
    return found;
  }

  /** The token `steps` significant tokens further on. */
  tokenAhead(steps: number): Token | undefined {
    const { tokens } = this.state;
    let left = steps;
    for (let i = this.#at; i < this.#end; i++) {
      if (isSignificant(tokens[i]) && left-- === 0) return tokens[i];
    }
    return undefined;
  }

  /** The text of the token `steps` significant tokens further on; empty when the line ends before. */
  wordAhead(steps: number): string {
    const token = this.tokenAhead(steps);
    return token ? this.state.textOf(token) : "";
  }

  mark(): { readonly at: number; readonly taken: number } {
    return { at: this.#at, taken: this.#taken };
  }

  reset(mark: { readonly at: number; readonly taken: number }): void {
    this.#at = mark.at;
    this.#taken = mark.taken;
    this.#settle();
  }

  /** "expected X, found Y" at the current token. */
  expected(what: string, extras: Extras = {}): void {
    const lookalike = this.#unknownCharacter();
    if (lookalike) this.failAt(this.span, lookalike.message, { ...extras, ...lookalike });
    else this.failAt(this.span, `expected ${what}, ${this.#found()}`, extras);
  }

  failAt(place: Span, message: string, extras: Extras = {}): void {
    if (!this.failed && !this.quiet) {
      const { code = "syntax", hint, fixes, related } = extras;
      this.state.say({ code, severity: "error", message, hint, fixes, related, span: place });
    }
    this.failed = true;
    this.line.readable = false;
    this.#at = this.#end;
    this.#settle();
  }

  /** Says that something stands behind what was read, if so. */
  expectEnd(what = "the end of the line", extras: Extras = {}): void {
    if (!this.atEnd) this.expected(what, extras);
  }

  #settle(): void {
    const tokens = this.#tokens;
    while (this.#at < this.#end) {
      const token = tokens[this.#at];
      if (isSignificant(token)) {
        this.kind = token.kind;
        this.word = this.#text.slice(token.offset, token.offset + token.length);
        return;
      }
      this.#at++;
    }
    this.kind = "end";
    this.word = "";
  }

  #lastToken(): Token | undefined {
    for (let i = this.#end - 1; i >= this.line.first; i--) {
      if (isSignificant(this.state.tokens[i])) return this.state.tokens[i];
    }
    return undefined;
  }

  #found(): string {
    if (this.atEnd) return "and the line ends here";
    return this.kind === "string" ? "found a text in quotes" : `found \`${shorten(this.word)}\``;
  }

  #unknownCharacter(): { message: string; fixes?: Fix[] } | undefined {
    if (this.kind !== "unknown") return undefined;
    const meant = LOOKALIKES.get(this.word)?.trim();
    if (meant === undefined) return { message: `${nameOf(this.word)} has no meaning here` };
    const title = `Write \`${meant}\``;
    return {
      message: `\`${this.word}\` is written \`${meant}\` here`,
      fixes: [{ title, edits: this.#lookalikeEdits(), safe: true }],
    };
  }

  /** All lookalikes from here to the end of the line, so that one fix cures the line. */
  #lookalikeEdits(): TextEdit[] {
    const edits: TextEdit[] = [];
    for (let i = this.#at; i < this.#end; i++) {
      const token = this.state.tokens[i];
      const meant = token.kind === "unknown" ? LOOKALIKES.get(this.state.textOf(token)) : undefined;
      if (meant !== undefined) {
        edits.push({ span: span(token.offset, token.offset + token.length), text: meant });
      }
    }
    return edits;
  }
}

/** Names are shown in full up to this length. */
const SHOWN_LENGTH = 40;

export function shorten(word: string): string {
  return word.length <= SHOWN_LENGTH ? word : `${word.slice(0, SHOWN_LENGTH)}…`;
}

function isSignificant(token: Token): boolean {
  return token.kind !== "blank" && token.kind !== "comment";
}

/** Characters that would not be seen are told by their number. */
function nameOf(character: string): string {
  if (/^[\p{L}\p{N}\p{P}\p{S}]/u.test(character)) return `\`${character}\``;
  const point = character.codePointAt(0) ?? 0;
  return `the character U+${point.toString(16).toUpperCase().padStart(4, "0")}`;
}
