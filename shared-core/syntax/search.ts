import { contains, type Span } from "../text/span.ts";
import type { DetailNode, StatementNode, Token, Tree, TreeLine } from "./tree.ts";

/** What stands at a place: the statement, the one inside it when it is a kit, and the detail. */
export interface Place {
  readonly statement: StatementNode;
  /** The innermost statement; the same as `statement` outside kits. */
  readonly innermost: StatementNode;
  readonly detail?: DetailNode;
}

/** Index of the token that holds an offset; of the last one at the end of the text; -1 in an empty text. */
export function tokenIndexAt(tree: Tree, offset: number): number {
  return lastStarting(tree.tokens, (token) => token.offset, offset);
}

export function tokenAt(tree: Tree, offset: number): Token | undefined {
  return tree.tokens[tokenIndexAt(tree, offset)];
}

export function lineIndexAt(tree: Tree, offset: number): number {
  return Math.max(
    0,
    lastStarting(tree.lines, (line) => line.span.start, offset),
  );
}

export function lineAt(tree: Tree, offset: number): TreeLine {
  return tree.lines[lineIndexAt(tree, offset)];
}

/** What an offset lies in, both ends of a span included; undefined between statements. */
export function placeAt(tree: Tree, offset: number): Place | undefined {
  const statement = holding(tree.statements, offset);
  if (!statement) return undefined;
  const innermost = holding(statement.inner, offset) ?? statement;
  return { statement, innermost, detail: holding(innermost.details, offset) };
}

/** Of nodes in order of place, the one whose span holds the offset. */
function holding<T extends { readonly span: Span }>(nodes: readonly T[], offset: number): T | undefined {
  const node = nodes[lastStarting(nodes, ({ span }) => span.start, offset)];
  return node && contains(node.span, offset) ? node : undefined;
}

/** Index of the last one that starts at or before the offset, by bisection; -1 when none does. */
function lastStarting<T>(list: readonly T[], startOf: (each: T) => number, offset: number): number {
  let lo = -1;
  let hi = list.length - 1;
  while (lo < hi) {
    const middle = (lo + hi + 1) >> 1;
    if (startOf(list[middle]) <= offset) lo = middle;
    else hi = middle - 1;
  }
  return lo;
}
