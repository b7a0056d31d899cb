import { span } from "../text/span.ts";
import { BYTE_ORDER_MARK } from "./characters.ts";
import type { LineRole, Token, TokenKind, TreeLine } from "./tree.ts";

/** Cuts the tokens into lines, at least one. Statements, details and rows are told apart later, by the parser. */
export function splitLines(text: string, tokens: readonly Token[]): TreeLine[] {
  const lines: TreeLine[] = [];
  let first = 0;
  let start = 0;
  for (let i = 0; i < tokens.length; i++) {
    if (tokens[i].kind !== "newline") continue;
    lines.push(lineOf(text, tokens, first, i, start, tokens[i].offset));
    first = i + 1;
    start = tokens[i].offset + tokens[i].length;
  }
  lines.push(lineOf(text, tokens, first, tokens.length, start, text.length));
  return lines;
}

const TAB_STOP = 4;

const ROLE_OF_FIRST: Partial<Record<TokenKind, LineRole>> = {
  comment: "comment",
  note: "note",
  conflict: "conflict",
};

function lineOf(
  text: string,
  tokens: readonly Token[],
  first: number,
  last: number,
  start: number,
  end: number,
): TreeLine {
  let i = first;
  while (i < last && tokens[i].kind === "blank") i++;
  const role = i === last ? "blank" : (ROLE_OF_FIRST[tokens[i].kind] ?? "lost");
  const indent = i < last ? columnOf(text, start, tokens[i].offset) : 0;
  return { first, last, span: span(start, end), indent, role, level: 0, readable: true };
}

function columnOf(text: string, start: number, end: number): number {
  let column = 0;
  for (let i = start; i < end; i++) {
    const code = text.charCodeAt(i);
    if (code === BYTE_ORDER_MARK) continue;
    column = code === 9 ? column - (column % TAB_STOP) + TAB_STOP : column + 1;
  }
  return column;
}
