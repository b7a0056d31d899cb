/**
 * What the parser must know of a statement kind. The parser takes a table of these as an argument; it is
 * filled from vocabulary/, so that a new statement is one new file there.
 */
export type HeadPart =
  /** A fixed word: `between`, `and`, `on`, `at`, `in`, `from`, `to`, `of`; also the `=` of `part NAME = KIT(…) between …`. */
  | { readonly kind: "word"; readonly word: string }
  /** A defining name (may be optional, as in `ask KIND [NAME]`). */
  | { readonly kind: "name"; readonly slot: string; readonly optional?: boolean }
  /** A reference: `unit`, `genset.z`, `ground`. */
  | { readonly kind: "place"; readonly slot: string }
  /** A word of a closed list, as KIND of an ask or KEY of an assume. */
  | { readonly kind: "choice"; readonly slot: string; readonly choices: readonly string[] }
  /** A string in quotes. */
  | { readonly kind: "text"; readonly slot: string }
  /** `(p, q)` behind a kit's name. */
  | { readonly kind: "parameters"; readonly slot: string; readonly optional?: boolean }
  /** `KIT(values)` of a part: a call. */
  | { readonly kind: "call"; readonly slot: string }
  /** `(x, y, z)` of a point or mount. */
  | { readonly kind: "tuple"; readonly slot: string }
  /** Alternatives, tried in order by their first word: `in LOOP` or `between LOOP and LOOP`. */
  | { readonly kind: "either"; readonly ways: readonly (readonly HeadPart[])[] };

/** How `= …` in the head is read. */
export type HeadValue = "none" | "optional" | "required";

export interface DetailGrammar {
  readonly key: string;
  /** What rows below it hold: a table of literals, or a list of items. Absent: it takes no rows. */
  readonly rows?: "table" | "list";
}

export interface StatementGrammar {
  readonly keyword: string;
  readonly head: readonly HeadPart[];
  readonly value: HeadValue;
  /** The detail that `= VALUE` sets; given both ways it is an error. */
  readonly principal?: string;
  readonly details: readonly DetailGrammar[];
  /** Details not in the list are taken too (a case names lets, a kit holds statements). */
  readonly openDetails?: boolean;
  /** Indented lines are statements (a kit). */
  readonly holdsStatements?: boolean;
}

export type GrammarTable = ReadonlyMap<string, StatementGrammar>;
