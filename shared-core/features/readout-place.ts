import { placeAt, tokenIndexAt } from "../syntax/search.ts";
import {
  type DetailNode,
  type NoteNode,
  type NumberNode,
  type PathNode,
  ROLE,
  type StatementNode,
  type Token,
  type Tree,
} from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";

/** Everything a readout wants to know of a place: the token, what it turned out to be, and what it lies in. */
export interface TextPlace {
  readonly token: Token;
  readonly text: string;
  readonly span: Span;
  /** One of `ROLE`. */
  readonly role: number;
  readonly statement?: StatementNode;
  /** The statement inside a kit; the same as `statement` elsewhere. */
  readonly innermost?: StatementNode;
  readonly detail?: DetailNode;
  /** Nodes of the innermost statement that hold the token, outermost first. */
  readonly chain: readonly AnyNode[];
}

export interface AnyNode {
  readonly kind?: string;
  readonly span: Span;
}

/** What stands at an offset; at the end of a word that word. undefined on blanks and line ends. */
export function textPlace(tree: Tree, offset: number): TextPlace | undefined {
  const at = tokenIndexAt(tree, offset);
  const found = tree.tokens[at];
  if (found === undefined) return undefined;
  const before = offset === found.offset ? at - 1 : -1;
  const index = speaks(tree, at) ? at : before >= 0 && speaks(tree, before) ? before : -1;
  return index < 0 ? undefined : placeOfToken(tree, index);
}

const speaks = (tree: Tree, index: number): boolean => {
  const { kind } = tree.tokens[index];
  if (kind === "name" || kind === "number" || kind === "note") return true;
  return kind === "operator" && tree.roles[index] === ROLE.unit;
};

function placeOfToken(tree: Tree, index: number): TextPlace {
  const token = tree.tokens[index];
  const span = { start: token.offset, end: token.offset + token.length };
  const common = {
    token,
    text: tree.text.slice(span.start, span.end),
    span,
    role: tree.roles[index],
  };
  const place = placeAt(tree, token.offset);
  // The span of a statement begins behind its notes; its tokens do not.
  const statement =
    place?.statement ?? tree.statements.find(({ first, last }) => first <= index && index < last);
  if (statement === undefined) return { ...common, chain: [] };
  const innermost = place?.innermost ?? statement;
  return { ...common, statement, innermost, detail: place?.detail, chain: nodesAt(innermost, span) };
}

/** Nodes that hold a span, outermost first. */
export function nodesAt(root: object, span: Span): readonly AnyNode[] {
  const chain: AnyNode[] = [];
  descend(root, span, chain);
  return chain;
}

/** Siblings never overlap, so the order of the search is from the outside inwards. */
function descend(value: object, span: Span, chain: AnyNode[]): void {
  if (isNode(value) && !holdsNotes(value)) {
    if (!(value.span.start <= span.start && span.end <= value.span.end)) return;
    chain.push(value);
  }
  for (const child of Object.values(value)) {
    if (typeof child === "object" && child !== null && !isSpan(child)) descend(child, span, chain);
  }
}

/** Statements and details: their notes lie outside of their span. */
const holdsNotes = (node: AnyNode): boolean => node.kind === "statement" || node.kind === "detail";
const isNode = (value: object): value is AnyNode =>
  "span" in value && typeof value.span === "object" && value.span !== null && isSpan(value.span);
const isSpan = (value: object): value is Span => "start" in value && typeof value.start === "number";

const last = <T extends AnyNode>(chain: readonly AnyNode[], kind: string): T | undefined =>
  chain.findLast((node) => node.kind === kind) as T | undefined;

export const numberAt = ({ chain }: TextPlace): NumberNode | undefined => last<NumberNode>(chain, "number");
export const pathAt = ({ chain }: TextPlace): PathNode | undefined => last<PathNode>(chain, "path");
export const noteAt = ({ chain }: TextPlace): NoteNode | undefined => last<NoteNode>(chain, "note");
