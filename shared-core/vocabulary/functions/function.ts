import type { Motion } from "../../mechanics/builder.ts";
import type { Kind } from "../../units/dimension.ts";
import { isNumber, kindOf, NUMBER, powerOfDimension, sameKind } from "../../units/quantity.ts";
import type { Measure } from "../description.ts";
import { dimensionOf } from "../measures.ts";

/** math: of numbers, everywhere; helper: from handbook data to a number of the model; answer: read from the answers. */
export type FunctionGroup = "math" | "helper" | "answer";

/** What an argument may be; the model resolves it to an `AnswerArgument` of the same sort. */
export type ArgumentContent =
  /** A number of a measure, of any of the motions (default: sliding). */
  | { readonly is: "number"; readonly measure: Measure; readonly motions?: readonly Motion[] }
  /** A rate, `600 rpm to 1500 rpm`, or the name of a drive whose speed is a range. */
  | { readonly is: "range" }
  /** `(1, 2)`. */
  | { readonly is: "list"; readonly measure: Measure }
  /** The name of an ask, of these kinds. */
  | { readonly is: "ask"; readonly kinds: readonly string[] }
  /** A quantity: `unit.velocity`, or a joining element or group, which stands for its force. */
  | { readonly is: "series" }
  /** A joining element or a group. */
  | { readonly is: "element" }
  | { readonly is: "pendulum" }
  | { readonly is: "let" }
  | { readonly is: "limit" }
  | { readonly is: "word"; readonly words: readonly string[] }
  /** An expression that is evaluated again with other numbers. */
  | { readonly is: "expression" };

export interface ParameterDescription {
  readonly name: string;
  readonly content: ArgumentContent;
  readonly says: string;
  /** Written with its name: `at: 20 Hz`. */
  readonly named?: boolean;
  /** May be left out; a number has a `standard` then. */
  readonly optional?: boolean;
  /** SI value taken when it is left out. */
  readonly standard?: number;
  /** The last one, given once or several times. */
  readonly repeated?: boolean;
}

/** What a call is worth. */
export type ResultContent =
  /** A measure in a motion (default: sliding), or in the motion that the argument of that index turned out to have. */
  | {
      readonly is: "measure";
      readonly measure: Measure;
      readonly motion?: Motion;
      readonly motionOf?: number;
    }
  /** The kind of the arguments, which are alike. */
  | { readonly is: "same" }
  /** The square root of the kind of the argument. */
  | { readonly is: "root" }
  /** The kind of the quantity in the answer. */
  | { readonly is: "series" }
  /** Where in the answer: a rate in a sweep or spectrum, a time in a history. */
  | { readonly is: "place" };

export interface FunctionDescription {
  readonly name: string;
  readonly group: FunctionGroup;
  readonly parameters: readonly ParameterDescription[];
  readonly result: ResultContent;
  /** One line for hover, completion and signature help. */
  readonly says: string;
  /** As it would be typed. */
  readonly example: string;
  /** What it computes, in the symbols of the trade. */
  readonly formula?: string;
  /** Where it holds. */
  readonly validity?: string;
  readonly source?: string;
  /**
   * SI value (rates in Hz) from the arguments in the order of the parameters, those left out at their standard.
   * Not finite where the arguments have no meaning. Absent for what is read from the answers.
   */
  readonly evaluate?: (numbers: readonly number[]) => number;
  /** Why the arguments lie outside the validity; undefined: they do not. */
  readonly outside?: (numbers: readonly number[]) => string | undefined;
  /** Parsed and checked, but not computed by this version. */
  readonly notYet?: boolean;
}

/** Kinds that an argument of a measure may have. */
export function argumentKinds({ measure, motions = ["sliding"] }: NumberContent): readonly Kind[] {
  return motions.flatMap((motion) => dimensionOf(measure, motion) ?? []);
}

type NumberContent = Extract<ArgumentContent, { is: "number" }>;

/**
 * The kind of a call of a math function or helper whose arguments have these kinds; undefined where they do not
 * fit, or where the result is read from an answer.
 */
export function resultKind(fn: FunctionDescription, kinds: readonly Kind[]): Kind | undefined {
  const { result } = fn;
  switch (result.is) {
    case "measure":
      return dimensionOf(result.measure, result.motion ?? motionOf(fn, kinds, result.motionOf));
    case "same":
      return kinds.every((kind) => sameKind(kind, kinds[0])) ? kinds[0] : undefined;
    case "root":
      return rootOf(kinds[0]);
    default:
      return undefined;
  }
}

function motionOf(fn: FunctionDescription, kinds: readonly Kind[], index: number | undefined): Motion {
  if (index === undefined) return "sliding";
  const parameter = fn.parameters[Math.min(index, fn.parameters.length - 1)].content;
  if (parameter.is !== "number") return "sliding";
  const { measure, motions = ["sliding"] } = parameter;
  const found = motions.find((motion) => {
    const kind = dimensionOf(measure, motion);
    return kind !== undefined && kinds[index] !== undefined && sameKind(kind, kinds[index]);
  });
  return found ?? motions[0];
}

function rootOf(kind: Kind): Kind | undefined {
  if (kind.rate) return undefined;
  return isNumber(kind) ? NUMBER : kindOf(powerOfDimension(kind.dimension, 0.5));
}

/** A parameter that is a number of a measure. */
export function given(
  name: string,
  measure: Measure,
  says: string,
  extra: Partial<ParameterDescription> & { readonly motions?: readonly Motion[] } = {},
): ParameterDescription {
  const { motions, ...rest } = extra;
  return { name, content: { is: "number", measure, motions }, says, ...rest };
}

/** A stiffness, damping or inertance of what slides or turns. */
export const EITHER: readonly Motion[] = ["sliding", "turning"];

export const measureResult = (measure: Measure, index?: number): ResultContent => ({
  is: "measure",
  measure,
  motionOf: index,
});
