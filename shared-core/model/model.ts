import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type { Assembly, QuantityRef } from "../mechanics/assembly.ts";
import type { BinaryNode, Expression, NoteNode, StatementNode, Tree, UnitNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Kind, Quantity } from "../units/dimension.ts";
import type { StatementDescription } from "../vocabulary/description.ts";

/** Reads other files (used models, records). Everything outside comes in through it; null: there is no such file. */
export interface FileReader {
  read(path: string): FileContent;
}

export type FileContent =
  | { readonly ok: true; readonly text: string }
  | { readonly ok: false; readonly why: "missing" | "outside" | "unreadable"; readonly detail: string };

/** A named statement of the file (or of a used one). */
export interface Entity {
  readonly name: string;
  readonly keyword: string;
  readonly description: StatementDescription;
  readonly node: StatementNode;
  /** Path of the used file it comes from; undefined for this file. */
  readonly file?: string;
}

/** One written `+/-`: an independent draw. value = nominal + s * half, s in [-1, 1]. */
export interface Draw {
  readonly id: number;
  /** `mount`, or `mounts.stiffness` for a tolerance written on an element. */
  readonly owner: string;
  readonly span: Span;
  readonly file?: string;
  readonly distribution: "uniform" | "normal" | "lognormal";
  /** More than 1 for a tolerance on an element with a count: each of them is drawn. */
  readonly copies: number;
}

/** A `let`, evaluated for one case. */
export interface ParameterValue extends Quantity {
  readonly name: string;
  /** As it stands in the text, or in the case that replaces it: `26.5 N/mm`. */
  readonly written: string;
  /** The unit to show it in, when it was written with one. */
  readonly unitNode?: UnitNode;
  /** Band of its own tolerance, SI. */
  readonly low?: number;
  readonly high?: number;
  /** `within A to B`, SI. */
  readonly range?: readonly [number, number];
  readonly draw?: number;
}

/** Values put in place of the nominal ones: draw id -> position s in [-1, 1] of its band; let name -> SI value. */
export interface Overrides {
  readonly draws?: ReadonlyMap<number, number>;
  readonly parameters?: ReadonlyMap<string, number>;
}

interface AskBase {
  readonly name: string;
  readonly node: StatementNode;
}
export interface ModesAsk extends AskBase {
  readonly kind: "modes";
  readonly upToHz?: number;
  readonly count?: number;
}
export interface SweepAsk extends AskBase {
  readonly kind: "sweep";
  readonly of: readonly QuantityRef[];
  /** Indices of drives. */
  readonly by: readonly number[];
  readonly fromHz: number;
  readonly toHz: number;
  readonly points: number;
  readonly spacing: "log" | "even";
}
export interface HistoryAsk extends AskBase {
  readonly kind: "history";
  readonly of: readonly QuantityRef[];
  readonly by: readonly number[];
  readonly lasting: number;
  readonly step?: number;
  readonly accuracy: number;
  readonly start: "as_written" | "at_rest";
}
/** An ask of a kind that this version does not compute. */
export interface LaterAsk extends AskBase {
  readonly kind: "later";
  readonly askKind: string;
}
export type Ask = ModesAsk | SweepAsk | HistoryAsk | LaterAsk;

export interface LimitCurve {
  readonly name: string;
  /** One value for all frequencies, or points. Hz and SI. */
  readonly points: readonly { readonly atHz: number; readonly value: number }[] | number;
  readonly betweenPoints: "log_log" | "straight";
  readonly of: "peak" | "rms";
  readonly bands: "none" | "octave" | "third_octave";
  readonly kind: Kind;
}

/** One comparison that must hold; `A <= x <= B` makes two, NAME.low and NAME.high. */
export interface Expectation {
  readonly name: string;
  readonly node: StatementNode;
  readonly left: Expression;
  readonly operator: "<=" | ">=" | "<" | ">";
  readonly right: Expression;
  readonly comparison: BinaryNode;
  /** Share. */
  readonly margin?: number;
  /** Names of cases it is judged in; undefined: all. */
  readonly cases?: readonly string[];
  readonly tolerance: "nominal" | "worst_case" | { readonly share: number };
}

export interface CaseInfo {
  /** "as written" for the first. */
  readonly name: string;
  readonly node?: StatementNode;
}

/** The model with numbers put in: one case, one set of overrides. */
export interface Instance {
  readonly model: Model;
  readonly caseIndex: number;
  readonly parameters: ReadonlyMap<string, ParameterValue>;
  readonly assembly: Assembly;
  readonly asks: readonly Ask[];
  readonly limits: ReadonlyMap<string, LimitCurve>;
  /** Diagnostics that arise with these numbers only (not-positive, inconsistent-bind ...). */
  readonly diagnostics: readonly Diagnostic[];
}

/** What could be understood of a file. Always there; `buildable` says whether it has a mechanics to compute. */
export interface Model {
  readonly file: string;
  readonly tree: Tree;
  readonly title?: string;
  /** Every name of the one namespace. */
  readonly entities: ReadonlyMap<string, Entity>;
  readonly draws: readonly Draw[];
  /** The first is the model as written. */
  readonly cases: readonly CaseInfo[];
  readonly expectations: readonly Expectation[];
  readonly diagnostics: readonly Diagnostic[];
  /** False when an error in what moves, joins or drives leaves no system to compute. */
  readonly buildable: boolean;
  /** Acceptances: statement -> code -> reason. */
  readonly accepted: ReadonlyMap<
    StatementNode,
    readonly { readonly code: string; readonly reason: string; readonly note: NoteNode }[]
  >;
  /** Other files it read, for watching. */
  readonly files: readonly string[];
}
