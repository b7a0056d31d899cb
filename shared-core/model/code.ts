import type { Span } from "../text/span.ts";

/**
 * What an expression computes, ready to run: SI numbers over a frame of slots. Slots 0 to 2 hold the variables
 * of laws, the others the lets. Every node keeps its place, so that a number that cannot be computed is
 * marked where it arises.
 */
export type Code = { readonly span: Span } & (
  | { readonly op: "constant"; readonly value: number }
  | { readonly op: "slot"; readonly slot: number }
  | { readonly op: "negate"; readonly a: Code }
  | { readonly op: BinaryOperator; readonly a: Code; readonly b: Code }
  | { readonly op: "not"; readonly a: Code }
  | { readonly op: "if"; readonly condition: Code; readonly yes: Code; readonly no: Code }
  | { readonly op: "call"; readonly name: string; readonly run: Run; readonly args: readonly Code[] }
  /** A call that only the answers can compute; `index` counts them within one expectation. */
  | { readonly op: "answer"; readonly index: number }
);

export type BinaryOperator =
  | "add"
  | "subtract"
  | "multiply"
  | "divide"
  | "power"
  | "less"
  | "less-equal"
  | "equal"
  | "unequal"
  | "and"
  | "or";

/** A function of numbers; not finite where it has no value. */
export type Run = (numbers: readonly number[]) => number;

export type Frame = Float64Array;

export type Compute = (frame: Frame) => number;

/** Slots of the variables of laws. */
export const VARIABLE_SLOTS = { t: 0, travel: 1, rate: 2 } as const;
export const FIRST_FREE_SLOT = 3;

export const constant = (value: number, span: Span): Code => ({ op: "constant", value, span });

export const binary = (op: BinaryOperator, a: Code, b: Code, span: Span): Code => ({ op, a, b, span });

/** `code` times a constant, folded where it can be. */
export function scaled(code: Code, factor: number): Code {
  if (factor === 1) return code;
  if (code.op === "constant") return constant(code.value * factor, code.span);
  return binary("multiply", code, constant(factor, code.span), code.span);
}

/** Closures over the frame, built once and run thousands of times. */
export function compile(code: Code): Compute {
  switch (code.op) {
    case "constant": {
      const { value } = code;
      return () => value;
    }
    case "slot": {
      const { slot } = code;
      return (frame) => frame[slot];
    }
    case "negate": {
      const a = compile(code.a);
      return (frame) => -a(frame);
    }
    case "not": {
      const a = compile(code.a);
      return (frame) => (a(frame) === 0 ? 1 : 0);
    }
    case "if": {
      const [condition, then, otherwise] = [code.condition, code.yes, code.no].map(compile);
      return (frame) => (condition(frame) !== 0 ? then(frame) : otherwise(frame));
    }
    case "call":
      return compileCall(code.run, code.args.map(compile));
    case "answer":
      return () => Number.NaN;
    default:
      return compileBinary(code.op, compile(code.a), compile(code.b));
  }
}

function compileCall(run: Run, args: readonly Compute[]): Compute {
  if (args.length === 1) {
    const [a] = args;
    return (frame) => run([a(frame)]);
  }
  return (frame) => run(args.map((arg) => arg(frame)));
}

function compileBinary(op: BinaryOperator, a: Compute, b: Compute): Compute {
  switch (op) {
    case "add":
      return (frame) => a(frame) + b(frame);
    case "subtract":
      return (frame) => a(frame) - b(frame);
    case "multiply":
      return (frame) => a(frame) * b(frame);
    case "divide":
      return (frame) => a(frame) / b(frame);
    case "power":
      return (frame) => a(frame) ** b(frame);
    case "less":
      return (frame) => (a(frame) < b(frame) ? 1 : 0);
    case "less-equal":
      return (frame) => (a(frame) <= b(frame) ? 1 : 0);
    case "equal":
      return (frame) => (a(frame) === b(frame) ? 1 : 0);
    case "unequal":
      return (frame) => (a(frame) !== b(frame) ? 1 : 0);
    case "and":
      return (frame) => (a(frame) !== 0 && b(frame) !== 0 ? 1 : 0);
    case "or":
      return (frame) => (a(frame) !== 0 || b(frame) !== 0 ? 1 : 0);
  }
}

/** The nodes directly below. */
export function children(code: Code): readonly Code[] {
  switch (code.op) {
    case "constant":
    case "slot":
    case "answer":
      return [];
    case "negate":
    case "not":
      return [code.a];
    case "if":
      return [code.condition, code.yes, code.no];
    case "call":
      return code.args;
    default:
      return [code.a, code.b];
  }
}

/** True when the code reads one of the slots that the test names. */
export function reads(code: Code, test: (slot: number) => boolean): boolean {
  if (code.op === "slot") return test(code.slot);
  return children(code).some((child) => reads(child, test));
}

/** The slots that a code reads. */
export function slotsRead(code: Code, into = new Set<number>()): Set<number> {
  if (code.op === "slot") into.add(code.slot);
  for (const child of children(code)) slotsRead(child, into);
  return into;
}

/** Value of a code without slots and answers; undefined for any other. */
export function constantValue(code: Code): number | undefined {
  if (code.op === "constant") return code.value;
  const fixed = (node: Code): boolean =>
    node.op !== "slot" && node.op !== "answer" && children(node).every(fixed);
  return fixed(code) ? compile(code)(EMPTY_FRAME) : undefined;
}

const EMPTY_FRAME: Frame = new Float64Array(FIRST_FREE_SLOT);

/** A sub-expression whose operands are numbers and which itself is none, with what it did. */
export interface NumberFault {
  readonly span: Span;
  readonly message: string;
}

/** Where a code stops being a finite number; undefined when it is one. */
export function numberFault(code: Code, frame: Frame): NumberFault | undefined {
  if (Number.isFinite(compile(code)(frame))) return undefined;
  for (const child of evaluatedChildren(code, frame)) {
    const inner = numberFault(child, frame);
    if (inner !== undefined) return inner;
  }
  if (code.op === "divide" && compile(code.b)(frame) === 0) {
    return { span: code.b.span, message: "this is zero, and zero divides nothing" };
  }
  return { span: code.span, message: faultOf(code, frame) };
}

function evaluatedChildren(code: Code, frame: Frame): readonly Code[] {
  if (code.op !== "if") return children(code);
  return [code.condition, compile(code.condition)(frame) !== 0 ? code.yes : code.no];
}

function faultOf(code: Code, frame: Frame): string {
  const values = children(code).map((child) => compile(child)(frame));
  if (code.op === "power" && values[0] < 0) {
    return `a negative number, ${short(values[0])}, has no power ${short(values[1])}`;
  }
  if (code.op === "power" && values[0] === 0) return "zero has no negative power";
  if (code.op === "call") return callFault(code.name, values);
  return "this is beyond the largest number, about 1.8e308";
}

function callFault(name: string, values: readonly number[]): string {
  const [x] = values;
  if (name === "sqrt") return `a negative number, ${short(x)}, has no square root`;
  if (name === "ln" || name === "log10") return `${short(x)} has no logarithm`;
  if (name === "asin" || name === "acos") return `${name} is defined from -1 to 1, here it gets ${short(x)}`;
  return `\`${name}\` has no value for ${values.map(short).join(", ")} (SI)`;
}

const short = (value: number): string => String(Number(value.toPrecision(6)));
