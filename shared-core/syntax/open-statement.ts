import { cover, span } from "../text/span.ts";
import type { ParseState } from "./cursor.ts";
import type { DetailGrammar, StatementGrammar } from "./grammar.ts";
import type { DetailNode, Item, NoteNode, StatementNode, TableRow, TreeLine } from "./tree.ts";

/** Nodes are filled while their lines are read, and read-only for everybody else. */
export type Growing<T> = { -readonly [K in keyof T]: T[K] };

/** The detail that rows may still be added to. */
export interface OpenDetail {
  readonly node: Growing<Omit<DetailNode, "items" | "notes" | "table">> & {
    readonly items: Item[];
    readonly notes: NoteNode[];
    table?: TableRow[];
  };
  readonly line: TreeLine;
  /** What its rows hold; `any` where the detail is unknown and its rows are not judged. */
  readonly rows: DetailGrammar["rows"] | "any";
}

/** The statement that indented lines are added to. */
export interface OpenStatement {
  readonly node: Growing<Omit<StatementNode, "details" | "inner">> & {
    readonly details: DetailNode[];
    readonly inner: StatementNode[];
  };
  readonly grammar: StatementGrammar | undefined;
  /** Steps of indentation of its head: 0, or 1 inside a kit. */
  readonly level: number;
  /** Details by key, `stiffness.x` for one component; made with the first detail. */
  byKey: Map<string, DetailNode> | undefined;
  detail: OpenDetail | undefined;
  /** True where the head made so little sense that what stands under it is passed over without a word. */
  readonly lost: boolean;
}

/** Makes a statement reach to the end of this line. */
export function extend(state: ParseState, owner: OpenStatement, line: TreeLine): void {
  owner.node.span = cover(owner.node.span, span(owner.node.span.start, endOf(state, line)));
  owner.node.last = line.last;
}

/** Where the last token of a line ends that is neither a blank nor a comment. */
export function endOf(state: ParseState, line: TreeLine): number {
  for (let i = line.last - 1; i >= line.first; i--) {
    const { kind, offset, length } = state.tokens[i];
    if (kind !== "blank" && kind !== "comment") return offset + length;
  }
  return line.span.start;
}

/** Where the first token of a line starts that is not a blank. */
export function startOf(state: ParseState, line: TreeLine): number {
  let i = line.first;
  while (i < line.last && state.tokens[i].kind === "blank") i++;
  return i < line.last ? state.tokens[i].offset : line.span.end;
}

/** The details a statement takes, by key. */
export function detailsOf(grammar: StatementGrammar): ReadonlyMap<string, DetailGrammar> {
  let known = DETAILS.get(grammar);
  if (!known) {
    known = new Map(grammar.details.map((detail) => [detail.key, detail]));
    DETAILS.set(grammar, known);
  }
  return known;
}

export const startWithNotes = (notes: readonly NoteNode[], start: number): number =>
  notes.length > 0 ? notes[0].span.start : start;

/** Derived from the grammar alone, so it may outlive a parse. */
const DETAILS = new WeakMap<StatementGrammar, ReadonlyMap<string, DetailGrammar>>();
