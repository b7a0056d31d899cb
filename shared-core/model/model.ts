import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type { Assembly, QuantityRef } from "../mechanics/assembly.ts";
import type { Outcome } from "../numerics/outcome.ts";
import type {
  BinaryNode,
  CallNode,
  Expression,
  NoteNode,
  StatementNode,
  Tree,
  UnitNode,
} from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Kind, Quantity } from "../units/dimension.ts";
import type { StatementDescription } from "../vocabulary/description.ts";
import type { Plan } from "./plan.ts";

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

/** An argument of an answer function, resolved for one instance. */
export type AnswerArgument =
  /** A number of any kind: a mode number, a rate, a time, a share. */
  | { readonly is: "number"; readonly quantity: Quantity }
  /** `600 rpm to 1500 rpm`, or the name of a drive whose speed is a range. SI, rates in Hz. */
  | { readonly is: "range"; readonly from: Quantity; readonly to: Quantity }
  /** `orders: (1, 2)`. */
  | { readonly is: "list"; readonly values: readonly number[] }
  | { readonly is: "ask"; readonly ask: Ask }
  | { readonly is: "series"; readonly quantity: QuantityRef }
  /** A joining element or a group: what it pulls with, and the indices of its elements. */
  | {
      readonly is: "element";
      readonly name: string;
      readonly elements: readonly number[];
      readonly force: QuantityRef;
    }
  | { readonly is: "let"; readonly name: string }
  | { readonly is: "limit"; readonly limit: LimitCurve }
  /** A word of a closed list, as the direction of an effective mass. */
  | { readonly is: "word"; readonly word: string }
  /** An expression that is to be evaluated again with other numbers (the quantity of a sensitivity). */
  | { readonly is: "expression"; readonly expression: Expression };

/** Arguments by the parameter names of vocabulary/functions.ts; optional ones may be missing. */
export type AnswerArguments = Readonly<Record<string, AnswerArgument | undefined>>;

/** Computes a call such as `natural_frequency(1)` from the answers. SI, rates in Hz. */
export type AnswerFunction = (call: CallNode, args: AnswerArguments) => Outcome<Quantity>;

/**
 * How the numbers of an instance move with one `let`: derivatives by its SI value (a rate: by its Hz), in the
 * order of `assembly.inertias` and `assembly.elements`.
 */
export interface Derivatives {
  readonly name: string;
  readonly inertia: Float64Array;
  readonly stiffness: Float64Array;
  readonly damping: Float64Array;
  readonly inertance: Float64Array;
  readonly lossFactor: Float64Array;
  readonly preload: Float64Array;
  readonly gravity: number;
  readonly modalDamping: number;
  readonly massDamping: number;
  readonly stiffnessDamping: number;
  /** True when a bind moves with it: the forms change too, which the rows above do not hold. */
  readonly movesForms: boolean;
  /** True when a drive moves with it. */
  readonly movesDrives: boolean;
}

/** The model with numbers put in: one case, one set of overrides. */
export interface Instance {
  readonly model: Model;
  readonly caseIndex: number;
  readonly parameters: ReadonlyMap<string, ParameterValue>;
  readonly assembly: Assembly;
  readonly asks: readonly Ask[];
  readonly limits: ReadonlyMap<string, LimitCurve>;
  /** Diagnostics that arise with these numbers only (not-positive, inconsistent-bind ...), not those of the model. */
  readonly diagnostics: readonly Diagnostic[];
  /** False where these numbers leave no system to compute; nothing must be asked of it then. */
  readonly sound: boolean;
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
  /** Compiled for putting numbers in; only `model/` reads it. */
  readonly plan: Plan;
}
