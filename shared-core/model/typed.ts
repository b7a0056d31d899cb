import type { Motion } from "../mechanics/builder.ts";
import type { CallNode, Expression, NameNode, Tree } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { describeKind, likelyUnits } from "../units/describe.ts";
import type { Kind } from "../units/dimension.ts";
import { isNumber } from "../units/quantity.ts";
import type { Measure } from "../vocabulary/description.ts";
import type { FunctionDescription } from "../vocabulary/functions.ts";
import { dimensionOf, unitsOf, wordsOf } from "../vocabulary/measures.ts";
import type { Code, Frame } from "./code.ts";
import type { Findings } from "./findings.ts";

/** An expression that was understood: what it computes and what kind of number that is. */
export interface Typed {
  readonly code: Code;
  readonly kind: Kind;
  /** The literal 0, which fits any dimension. */
  readonly zero?: boolean;
  /** `RATE as rad/s`: multiplies into other quantities as a plain 1/s. */
  readonly angular?: boolean;
  /** A comparison, or what `and`, `or`, `not` make of them. */
  readonly logical?: boolean;
}

/** undefined: it has no meaning, and that has been said. Whatever depends on it stays quiet. */
export type Checked = Typed | undefined;

/** What is wanted at a place, for the check and for the message. */
export interface Wanted {
  /** Any of these fits. */
  readonly kinds: readonly Kind[];
  /** "a stiffness". */
  readonly says: string;
  /** Likely units, the likeliest first; the message names one, the fixes offer several. */
  readonly units: readonly string[];
  readonly hint?: string;
  /** Wanted because of another operand: a weight is then no slip for a mass. */
  readonly beside?: boolean;
}

/** What a name stands for where a number is wanted. */
export type NameMeaning =
  | { readonly is: "number"; readonly typed: Checked }
  | { readonly is: "other"; readonly says: string };

export interface Scope {
  find(name: NameNode): NameMeaning | undefined;
  /** Whether the name stands for a number, without understanding it. */
  holdsNumber(name: string): boolean;
  /** Names that stand for numbers, for suggestions. */
  numberNames(): Iterable<string>;
}

/** Understands calls of answer functions where they may stand (in expectations). */
export interface AnswerCalls {
  check(call: CallNode, fn: FunctionDescription, c: ExpressionContext): Checked;
}

export interface ExpressionContext {
  readonly scope: Scope;
  readonly findings: Findings;
  readonly tree: Tree;
  /** Values of the lets as written, for messages and for exponents. */
  readonly nominal: () => Frame;
  /** The whole value; fixes behind it need no parenthesis. */
  readonly root: Expression;
  readonly answers?: AnswerCalls;
  /** Inside sin or cos: a rate times a time counts turns. */
  readonly turning?: boolean;
  /** Units of glued literals read as products, see glued.ts. */
  readonly variables?: ReadonlySet<string>;
}

export const textOf = (c: { readonly tree: Tree }, span: Span): string =>
  c.tree.text.slice(span.start, span.end);

/** What a measure wants; undefined where any dimension will do. */
export function wantedOf(measure: Measure, motion: Motion = "sliding", hint?: string): Wanted | undefined {
  if (hint !== undefined) return newWanted(measure, motion, hint);
  const key = `${measure} ${motion}`;
  if (!WANTED.has(key)) WANTED.set(key, newWanted(measure, motion));
  return WANTED.get(key);
}

/** What measures want, once for all statements that ask: as many as there are measures and motions. */
const WANTED = new Map<string, Wanted | undefined>();

function newWanted(measure: Measure, motion: Motion, hint?: string): Wanted | undefined {
  const kind = dimensionOf(measure, motion);
  if (kind === undefined) return undefined;
  return { kinds: [kind], says: wordsOf(measure, motion), units: unitsOf(measure, motion), hint };
}

/** What another operand of that kind wants beside it. */
export function wantedKind(kind: Kind, hint?: string): Wanted {
  const units = isNumber(kind) ? [] : likelyUnits(kind);
  return { kinds: [kind], says: describeKind(kind).replace(/ such as .*/, ""), units, hint };
}
