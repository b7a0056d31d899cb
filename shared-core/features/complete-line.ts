import { placeAt, tokenIndexAt } from "../syntax/search.ts";
import { ROLE, type StatementNode, type Token, type Tree, type TreeLine } from "../syntax/tree.ts";
import { type Span, span } from "../text/span.ts";

/** A token in front of what is being typed, blanks left out. */
export interface Word {
  readonly text: string;
  readonly kind: Token["kind"];
  readonly start: number;
  readonly end: number;
  readonly role: number;
}

/** The line that is being typed, as far as the cursor. */
export interface TypedLine {
  readonly tree: Tree;
  readonly offset: number;
  /** Index of the line. */
  readonly index: number;
  readonly line: TreeLine;
  /** Column of its first word, or of the cursor where there is none yet. */
  readonly indent: number;
  readonly words: readonly Word[];
  /** The word that the cursor ends or stands in; empty at the cursor where there is none. */
  readonly typed: Span;
  /** The word up to the cursor. */
  readonly prefix: string;
  /** What stands behind the typed word on the line, without blanks and comment. */
  readonly behind: string;
  /** A comment, note, text or conflict that the cursor stands in. */
  readonly inside?: Token;
}

export function typedLine(tree: Tree, offset: number): TypedLine {
  const index = lineAtCursor(tree, offset);
  const line = tree.lines[index];
  const here = tokenIndexAt(tree, Math.max(0, offset - 1));
  const token = offset > 0 ? tree.tokens[here] : undefined;
  // Blanks behind a comment or note belong to it.
  const before = token?.kind === "blank" && here > line.first ? tree.tokens[here - 1] : undefined;
  const solid = before && (before.kind === "comment" || before.kind === "note") ? before : token;
  const inside = solid && SOLID.has(solid.kind) && isInside(tree, solid, offset) ? solid : undefined;
  const isWord = token?.kind === "name" && token.offset < offset && offset <= token.offset + token.length;
  const typed = isWord ? span(token.offset, token.offset + token.length) : span(offset, offset);
  const words = wordsBefore(tree, line, typed.start);
  const rest = tree.text.slice(typed.end, line.span.end).replace(/#.*$/, "").trim();
  const prefix = tree.text.slice(typed.start, offset);
  const indent =
    words.length > 0 || prefix !== "" ? line.indent : columnOf(tree.text.slice(line.span.start, offset));
  return { tree, offset, index, line, indent, words, typed, prefix, behind: rest, inside };
}

/** The statement and detail that a line hangs under: those above it that are indented less. */
export function ownersOf({ tree, index, indent }: TypedLine): {
  readonly statement?: StatementNode;
  /** The kit that holds the statement, or that the line itself stands in. */
  readonly kit?: StatementNode;
  /** Line of a detail above, for rows. */
  readonly detailLine?: TreeLine;
} {
  let detailLine: TreeLine | undefined;
  let inner: StatementNode | undefined;
  let below = indent;
  for (let i = index - 1; i >= 0 && below > 0; i--) {
    const line = tree.lines[i];
    if (line.role === "detail" && line.indent < below && !inner) detailLine ??= line;
    if (line.role !== "statement" && line.role !== "lost" && line.role !== "detail") continue;
    if (line.indent >= below) continue;
    if (line.role === "detail") continue;
    const place = placeAt(tree, line.span.start + firstColumn(tree, line));
    const statement = place?.innermost;
    if (statement === undefined) return {};
    if (line.level > 0) {
      inner ??= statement;
      below = line.indent;
      continue;
    }
    const isKit = statement.keyword.text === "kit";
    if (inner) return { statement: inner, kit: isKit ? statement : undefined, detailLine };
    return isKit ? { kit: statement } : { statement, detailLine };
  }
  return {};
}

/** Words of a line up to a place, tokens of units among them. */
export function wordsBefore(tree: Tree, line: TreeLine, end: number): Word[] {
  const words: Word[] = [];
  for (let i = line.first; i < line.last; i++) {
    const { kind, offset, length } = tree.tokens[i];
    if (offset + length > end) break;
    if (kind === "blank" || kind === "comment") continue;
    const text = tree.text.slice(offset, offset + length);
    words.push({ text, kind, start: offset, end: offset + length, role: tree.roles[i] });
  }
  return words;
}

export const isUnitWord = ({ role }: Word): boolean => role === ROLE.unit;

const SOLID: ReadonlySet<Token["kind"]> = new Set(["comment", "note", "string", "conflict"]);

/** Behind a closed text one is no longer inside it. */
function isInside(tree: Tree, { kind, offset, length }: Token, cursor: number): boolean {
  if (kind !== "string" || cursor < offset + length) return true;
  return length === 1 || tree.text[offset + length - 1] !== '"';
}

/** A cursor between `\r` and `\n` is on the line that ends there. */
function lineAtCursor(tree: Tree, offset: number): number {
  let [lo, hi] = [0, tree.lines.length - 1];
  while (lo < hi) {
    const middle = (lo + hi + 1) >> 1;
    if (tree.lines[middle].span.start <= offset) lo = middle;
    else hi = middle - 1;
  }
  return lo;
}

function firstColumn(tree: Tree, line: TreeLine): number {
  for (let i = line.first; i < line.last; i++) {
    const { kind, offset } = tree.tokens[i];
    if (kind !== "blank") return offset - line.span.start;
  }
  return 0;
}

const TAB_STOP = 4;

function columnOf(blanks: string): number {
  let column = 0;
  for (const sign of blanks) column = sign === "\t" ? column - (column % TAB_STOP) + TAB_STOP : column + 1;
  return column;
}
