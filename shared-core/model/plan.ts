import type { DriveShape, Motion, QuantityRef } from "../mechanics/assembly.ts";
import type { Expression, StatementNode, UnitNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import type { Kind } from "../units/dimension.ts";
import type { StatementDescription } from "../vocabulary/description.ts";
import type { Asked } from "./answer-calls.ts";
import type { Code, Compute, Frame } from "./code.ts";
import type { AnswerArgument, Ask, LimitCurve } from "./model.ts";
import type { NumberContext } from "./number.ts";

/**
 * A model compiled for putting numbers in: everything that does not depend on numbers is settled, and what does
 * is a `Compute` over the frame of lets. Made by `understand`, run by `instantiate`.
 */
export interface Plan {
  /** Slots of the frame. */
  readonly slots: number;
  /** One list a case, each in the order in which its lets can be computed. */
  readonly lets: readonly (readonly PlannedLet[])[];
  readonly coordinates: readonly PlannedCoordinate[];
  readonly supports: readonly { readonly name: string; readonly motion: Motion }[];
  readonly binds: readonly PlannedBind[];
  readonly statements: readonly PlannedStatement[];
  readonly drives: readonly PlannedDrive[];
  readonly assumptions: ReadonlyMap<string, PlannedNumber>;
  readonly asks: readonly PlannedAsk[];
  readonly limits: readonly PlannedLimit[];
  /** Sides of expectations and whatever else was understood with answers in it; null: it has an error. */
  readonly expressions: Map<Expression, PlannedExpression | null>;
  /** Joining elements in the order in which they come in an assembly. */
  readonly elements: ReadonlyMap<string, number>;
  /** Where each used file is named, for diagnostics that arise in it with numbers. */
  readonly uses: ReadonlyMap<string, Span>;
  /** For understanding further expressions later on. */
  readonly numbers: NumberContext;
  readonly asked: Asked;
}

export interface PlannedTolerance {
  readonly compute: Compute;
  /** A share of the value; else in its own unit. */
  readonly relative: boolean;
  readonly distribution: "uniform" | "normal" | "lognormal";
  readonly draw: number;
  readonly span: Span;
}

/** A number of the text with its tolerance and range. */
export interface PlannedNumber {
  readonly span: Span;
  readonly code: Code;
  readonly compute: Compute;
  readonly kind: Kind;
  readonly unitNode?: UnitNode;
  readonly tolerance?: PlannedTolerance;
  readonly within?: readonly [Compute, Compute];
}

export interface PlannedLet extends PlannedNumber {
  readonly name: string;
  readonly slot: number;
  readonly written: string;
  /** Path of the used file in which its number stands, for diagnostics. */
  readonly file?: string;
  /** The model's file sees it by its name: its own, and those of the files that it uses itself. */
  readonly visible: boolean;
  /** Slots that its number reads. */
  readonly reads: ReadonlySet<number>;
}

export interface PlannedCoordinate {
  readonly name: string;
  readonly motion: Motion;
  readonly owner: string;
  readonly massless: boolean;
  readonly weight: number;
  /** On which gravity acts; a turning coordinate and a junction have none. */
  readonly mass?: PlannedNumber;
  readonly startsAt?: PlannedNumber;
  readonly startsMoving?: PlannedNumber;
}

/** Where an end, a drive or a bind points. */
export type Place =
  | { readonly is: "coordinate"; readonly index: number; readonly motion: Motion }
  | { readonly is: "support"; readonly index: number; readonly motion: Motion }
  | { readonly is: "ground" };

export interface PlannedBind {
  readonly node: StatementNode;
  /** Index of the coordinate that it binds. */
  readonly coordinate: number;
  readonly terms: readonly { readonly place: Place; readonly compute: Compute; readonly code: Code }[];
  readonly span: Span;
}

/** A statement that puts itself into the equations by its description. */
export interface PlannedStatement {
  readonly name: string;
  readonly node: StatementNode;
  readonly description: StatementDescription;
  readonly motion: Motion;
  readonly ends: Readonly<Record<string, Place>>;
  readonly numbers: ReadonlyMap<string, PlannedNumber>;
  readonly ats: ReadonlyMap<string, { readonly value: PlannedNumber; readonly at: PlannedNumber }>;
  readonly words: ReadonlyMap<string, string>;
  /** Keys whose value must be above zero. */
  readonly positive: ReadonlySet<string>;
}

export interface PlannedDrive {
  readonly name: string;
  readonly node: StatementNode;
  readonly keyword: "force" | "torque" | "motion";
  readonly place: Place;
  readonly derivative: 0 | 1 | 2;
  readonly unit: string;
  readonly shapeKind: DriveShape["kind"];
  /** A sine or unbalance with an amplitude and one frequency. */
  readonly isSteady: boolean;
  /** Numbers that are to be above zero, for not-positive. */
  readonly positive: readonly { readonly key: string; readonly number: PlannedNumber }[];
  readonly shape: (put: Putting) => DriveShape;
  readonly writtenHz: (put: Putting) => number | undefined;
  readonly bandHz: (put: Putting) => readonly [number, number] | undefined;
}

/** Numbers put in: reads planned numbers for one case and one set of overrides. */
export interface Putting {
  readonly frame: Frame;
  number(of: PlannedNumber): number;
  /** Says that a number cannot be used. */
  wrong(span: Span, message: string): void;
}

export interface PlannedTerm {
  readonly term:
    | { readonly of: "coordinate"; readonly index: number; readonly derivative: 0 | 1 | 2 }
    | { readonly of: "support"; readonly index: number; readonly derivative: 0 | 1 | 2 }
    | {
        readonly of: "element";
        readonly name: string;
        readonly measure: "travel" | "rate" | "force" | "power" | "energy";
      };
  readonly factor: (frame: Frame) => number;
}

export interface PlannedQuantity {
  readonly text: string;
  readonly terms: readonly PlannedTerm[];
  readonly unit: string;
  readonly kind: Kind;
  readonly span: Span;
}

export interface PlannedAsk {
  readonly name: string;
  readonly node: StatementNode;
  readonly kind: string;
  /** undefined: it has an error, or is not computed by this version. */
  readonly resolve?: (put: Putting, quantity: (of: PlannedQuantity) => QuantityRef) => Ask;
}

export interface PlannedLimit {
  readonly name: string;
  readonly resolve: (put: Putting) => LimitCurve;
}

/** An argument of an answer function before numbers are put in. */
export type PlannedArgument =
  | { readonly is: "number"; readonly code: Code; readonly kind: Kind }
  | {
      readonly is: "range";
      readonly from: { readonly code: Code; readonly kind: Kind };
      readonly to: { readonly code: Code; readonly kind: Kind };
    }
  | { readonly is: "band"; readonly drive: string }
  | { readonly is: "list"; readonly codes: readonly Code[] }
  | { readonly is: "ask"; readonly name: string }
  | { readonly is: "series"; readonly quantity: PlannedQuantity }
  | {
      readonly is: "element";
      readonly name: string;
      readonly elements: readonly string[];
      readonly force: PlannedQuantity;
    }
  | { readonly is: "limit"; readonly name: string }
  | Extract<AnswerArgument, { is: "let" | "word" | "expression" }>;

export interface PlannedCall {
  readonly call: Extract<Expression, { kind: "call" }>;
  readonly args: Readonly<Record<string, PlannedArgument>>;
  readonly kind: Kind;
}

/** An expression with answers in it: its calls in the order in which they can be evaluated. */
export interface PlannedExpression {
  readonly code: Code;
  readonly kind: Kind;
  readonly calls: readonly PlannedCall[];
  /** The literal 0, which fits any dimension. */
  readonly zero?: boolean;
}
