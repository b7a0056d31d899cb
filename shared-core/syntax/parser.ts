import type { Diagnostic, Fix } from "../diagnostics/diagnostic.ts";
import { span } from "../text/span.ts";
import type { Conflict } from "./conflicts.ts";
import { type ParseOptions, ParseState } from "./cursor.ts";
import { tokenize } from "./lexer.ts";
import { splitLines } from "./lines.ts";
import { readStatements } from "./statements.ts";
import type { Token, Tree } from "./tree.ts";

export type { ParseOptions } from "./cursor.ts";

export interface Parsed {
  readonly tree: Tree;
  /** In order of place. Every error is of the text alone: names and units are looked at later. */
  readonly diagnostics: readonly Diagnostic[];
}

/** Longest text that is read, in UTF-16 units: about 600,000 lines. */
export const LARGEST_TEXT = 20_000_000;

/** Text -> tree, for any text: never throws, linear in its length. */
export function parse(text: string, options: ParseOptions): Parsed {
  if (text.length > LARGEST_TEXT) return tooLarge(text);
  const { tokens, conflicts } = tokenize(text);
  const state = new ParseState(text, tokens, options);
  for (const conflict of conflicts) sayConflict(state, conflict);
  const lines = splitLines(text, tokens);
  const outline = readStatements(state, lines);
  const diagnostics = state.diagnostics.sort((a, b) => a.span.start - b.span.start);
  return { tree: { text, tokens, ...outline, lines, roles: state.roles }, diagnostics };
}

function tooLarge(text: string): Parsed {
  const tokens: Token[] = [{ kind: "unknown", offset: 0, length: text.length }];
  const line = { first: 0, last: 1, span: span(0, text.length), indent: 0, role: "lost", level: 0 } as const;
  const millions = (text.length / 1e6).toFixed(1);
  return {
    tree: {
      text,
      tokens,
      version: undefined,
      statements: [],
      looseNotes: [],
      lines: [{ ...line, readable: false }],
      roles: new Uint8Array(1),
    },
    diagnostics: [
      {
        code: "too-large",
        severity: "error",
        message: `the file has ${millions} million characters, at most ${LARGEST_TEXT / 1e6} million are read`,
        span: span(0, 0),
      },
    ],
  };
}

function sayConflict(state: ParseState, conflict: Conflict): void {
  state.say({
    code: "merge-conflict",
    severity: "error",
    message: conflict.sides
      ? "a merge left both sides here; the first is read until one is chosen"
      : "a merge left this marker here",
    span: conflict.skipped[0],
    fixes: conflictFixes(state.text, conflict),
  });
}

function conflictFixes(text: string, conflict: Conflict): Fix[] {
  if (!conflict.sides) return [];
  const [first, second] = conflict.sides;
  const keep = (title: string, kept: string): Fix => {
    // The last marker line goes with its line ending, so that no blank line stays.
    const ending = text.startsWith("\r\n", conflict.span.end) ? 2 : conflict.span.end < text.length ? 1 : 0;
    const whole = span(conflict.span.start, conflict.span.end + ending);
    return { title, edits: [{ span: whole, text: kept }], safe: false };
  };
  return [
    keep("Keep the first side", text.slice(first.start, first.end)),
    keep("Keep the second side", text.slice(second.start, second.end)),
  ];
}
