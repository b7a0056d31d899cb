import type { Span } from "../text/span.ts";

/**
 * The tree keeps every character: joining the tokens gives back the file, and every node is a run of tokens
 * (`first` to `last`, exclusive) with the span it covers (without leading and trailing blanks).
 */
export type TokenKind =
  | "blank"
  | "newline"
  | "comment"
  | "note"
  | "number"
  | "name"
  | "string"
  | "operator"
  | "conflict"
  | "unknown";

export interface Token {
  readonly kind: TokenKind;
  readonly offset: number;
  readonly length: number;
}

export interface Node {
  readonly span: Span;
}

export interface NameNode extends Node {
  readonly kind: "name";
  readonly text: string;
}

/** A unit as written behind a number, with its factors: `kg*m^2` is (kg, 1), (m, 2). */
export interface UnitNode extends Node {
  readonly kind: "unit";
  readonly text: string;
  readonly factors: readonly { readonly name: string; readonly power: number; readonly span: Span }[];
}

export interface NumberNode extends Node {
  readonly kind: "number";
  readonly value: number;
  readonly unit?: UnitNode;
}

export interface TupleNode extends Node {
  readonly kind: "tuple";
  readonly items: readonly Expression[];
  /** A unit behind the parenthesis, for all items. */
  readonly unit?: UnitNode;
}

/** `unit`, `genset.z.velocity`: one or more names joined by dots. */
export interface PathNode extends Node {
  readonly kind: "path";
  readonly names: readonly NameNode[];
}

export interface CallNode extends Node {
  readonly kind: "call";
  readonly callee: NameNode;
  readonly positional: readonly Expression[];
  readonly named: readonly { readonly name: NameNode; readonly value: Expression }[];
}

export interface UnaryNode extends Node {
  readonly kind: "unary";
  readonly operator: "-" | "+" | "not";
  readonly operand: Expression;
}

export interface BinaryNode extends Node {
  readonly kind: "binary";
  readonly operator: "+" | "-" | "*" | "/" | "^" | "<" | "<=" | ">" | ">=" | "==" | "!=" | "and" | "or";
  readonly operatorSpan: Span;
  readonly left: Expression;
  readonly right: Expression;
}

/** `EXPR as UNIT`. */
export interface AsNode extends Node {
  readonly kind: "as";
  readonly operand: Expression;
  readonly unit: UnitNode;
}

export interface GroupNode extends Node {
  readonly kind: "parenthesis";
  readonly inner: Expression;
}

/** Stands where an expression was wanted and none could be read; its error has been said. */
export interface BrokenNode extends Node {
  readonly kind: "broken";
}

export type Expression =
  | NumberNode
  | TupleNode
  | PathNode
  | CallNode
  | UnaryNode
  | BinaryNode
  | AsNode
  | GroupNode
  | RangeNode
  | BrokenNode;

export interface ToleranceNode extends Node {
  readonly kind: "tolerance";
  readonly amount: Expression;
  readonly distribution?: NameNode;
}

/** `EXPR [+/- TOL [distribution]] [within A to B]`. */
export interface ValueNode extends Node {
  readonly kind: "value";
  readonly expression: Expression;
  readonly tolerance?: ToleranceNode;
  readonly within?: { readonly from: Expression; readonly to: Expression; readonly span: Span };
}

/**
 * `[NAME] [from] A to B`: a range, a chirp (`from`), or a change (`NAME from A to B`). Among expressions it stands
 * as an argument of a call only.
 */
export interface RangeNode extends Node {
  readonly kind: "range";
  readonly name?: PathNode;
  readonly from: Expression;
  readonly to: Expression;
}

/** `5 % at 12 Hz`. */
export interface AtNode extends Node {
  readonly kind: "at";
  readonly value: ValueNode;
  readonly at: Expression;
}

export interface TextNode extends Node {
  readonly kind: "text";
  /** Without the quotes. */
  readonly text: string;
}

export type Item = ValueNode | RangeNode | AtNode | TextNode;

/** A row of a table: signed literals with optional units. */
export interface TableRow extends Node {
  readonly cells: readonly NumberNode[];
}

/** `> key: text` is a tag; any other note line has no key. */
export interface NoteNode extends Node {
  readonly kind: "note";
  readonly text: string;
  readonly tag?: { readonly key: string; readonly keySpan: Span; readonly text: string };
  /** `> accept CODE: reason`. */
  readonly accept?: { readonly code: string; readonly codeSpan: Span; readonly reason: string };
}

export interface DetailNode extends Node {
  readonly kind: "detail";
  readonly notes: readonly NoteNode[];
  /** `stiffness`, or `stiffness.x` for one component. */
  readonly key: NameNode;
  readonly component?: NameNode;
  /** What stands on the line behind `=`, separated by commas; list rows are appended. */
  readonly items: readonly Item[];
  /** Rows of a table detail. */
  readonly table?: readonly TableRow[];
  /** True where an error was said inside; later stages stay quiet about it. */
  readonly broken: boolean;
}

/**
 * One statement. `slots` holds what the head pattern of its keyword names (see grammar.ts): `name`, `a`, `b`,
 * `on`, `of`, `kind` ... A slot that could not be read is missing and `broken` is true.
 */
export interface StatementNode extends Node {
  readonly kind: "statement";
  readonly keyword: NameNode;
  readonly notes: readonly NoteNode[];
  readonly slots: Readonly<Record<string, SlotValue>>;
  /** What stands behind `=` in the head. */
  readonly value?: readonly Item[];
  readonly headSpan: Span;
  readonly details: readonly DetailNode[];
  /** Statements inside a kit. */
  readonly inner: readonly StatementNode[];
  readonly broken: boolean;
  /** Token run, notes included. */
  readonly first: number;
  readonly last: number;
}

export type SlotValue =
  | NameNode
  | PathNode
  | TextNode
  | TupleNode
  | { readonly kind: "names"; readonly span: Span; readonly items: readonly PathNode[] }
  | { readonly kind: "parameters"; readonly span: Span; readonly items: readonly NameNode[] }
  | CallNode
  | NumberNode
  | ValueNode;

export interface Tree {
  readonly text: string;
  readonly tokens: readonly Token[];
  readonly version?: { readonly number: number; readonly span: Span };
  readonly statements: readonly StatementNode[];
  /** Notes that stand before nothing. */
  readonly looseNotes: readonly NoteNode[];
  /** Every line of the text, in order; at least one. */
  readonly lines: readonly TreeLine[];
  /** What each token turned out to be, one `ROLE` a token. */
  readonly roles: Uint8Array;
}

/** What a line is. `lost` is text that belongs to nothing that could be read. */
export type LineRole =
  | "blank"
  | "comment"
  | "note"
  | "version"
  | "statement"
  | "detail"
  | "row"
  | "conflict"
  | "lost";

export interface TreeLine {
  /** Its tokens, `first` to `last` (exclusive), without the newline. */
  readonly first: number;
  readonly last: number;
  /** Offset of its first character and of its end, without the newline. */
  readonly span: Span;
  /** Column of its first character that is not blank; a tab goes on to the next multiple of 4. */
  readonly indent: number;
  role: LineRole;
  /** How many steps it is indented in the canonical layout. */
  level: number;
  /** False where a syntax error was said; such a line is shown as it is and never reformatted. */
  readable: boolean;
}

/** What a token is in its place. Tokens that speak for themselves (comments, strings ...) have none. */
export const ROLE = {
  none: 0,
  /** The word that starts a statement. */
  keyword: 1,
  /** A fixed word: `between`, `to`, `as`, `within`, `normal`, `and` ... */
  word: 2,
  /** A name where it is defined. */
  definition: 3,
  /** The key of a detail. */
  key: 4,
  /** Any part of a unit. */
  unit: 5,
  /** An operator between two operands. */
  infix: 6,
  /** A sign or `not` in front of an operand. */
  prefix: 7,
  /** What is called: `sqrt`, `peak`, a kit. */
  callee: 8,
  /** The name of a named argument. */
  argument: 9,
  /** A name that refers to something. */
  reference: 10,
  /** A word of a closed list: the kind of an ask, the key of an assumption. */
  choice: 11,
} as const;
