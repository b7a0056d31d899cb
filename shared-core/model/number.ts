import type { Expression, UnitNode, ValueNode } from "../syntax/tree.ts";
import { isNumber, NUMBER } from "../units/quantity.ts";
import { compile, type Frame, numberFault } from "./code.ts";
import { check } from "./expression.ts";
import { replaceFix } from "./findings.ts";
import { literalOf } from "./fit.ts";
import { checkGlued } from "./glued.ts";
import type { Draw, Overrides } from "./model.ts";
import type { PlannedNumber, PlannedTolerance } from "./plan.ts";
import { type ExpressionContext, textOf, type Wanted, wantedKind } from "./typed.ts";

/** Where the numbers of one place are understood. */
export interface NumberContext extends Omit<ExpressionContext, "root"> {
  /** Takes a written tolerance into the model's list of draws. */
  readonly newDraw: (draw: Omit<Draw, "id">) => number;
  readonly file?: string;
}

/** Understands `EXPR [+/- TOL] [within A to B]`; undefined where it has an error, which has been said. */
export function planNumber(
  node: ValueNode,
  c: NumberContext,
  wanted: Wanted | undefined,
  owner: string,
  copies = 1,
): PlannedNumber | undefined {
  const expression = planExpression(node.expression, c, wanted);
  if (node.tolerance === undefined && node.within === undefined) return expression;
  const tolerance = node.tolerance && planTolerance(node, c, expression, owner, copies);
  const within = node.within && planWithin(node, c, expression);
  if (expression === undefined) return undefined;
  if (node.tolerance && tolerance === undefined) return undefined;
  if (node.within && within === undefined) return undefined;
  return { ...expression, ...(tolerance ? { tolerance } : {}), ...(within ? { within } : {}) };
}

/** Understands an expression that stands alone as a number, and holds its value as written to be finite. */
export function planExpression(
  node: Expression,
  c: NumberContext,
  wanted: Wanted | undefined,
): PlannedNumber | undefined {
  const whole: ExpressionContext = { ...c, root: node };
  const typed = checkGlued(node, whole, wanted, check);
  if (typed === undefined) return undefined;
  const compute = compile(typed.code);
  if (!Number.isFinite(compute(c.nominal())) && !reads(typed.code)) {
    const fault = numberFault(typed.code, c.nominal());
    c.findings.say("not-positive", fault?.span ?? node.span, fault?.message ?? "this is no number");
    return undefined;
  }
  const unitNode = unitOfValue(node);
  return {
    span: node.span,
    code: typed.code,
    compute,
    kind: typed.kind,
    ...(unitNode ? { unitNode } : {}),
  };
}

/** SI value with tolerances and overrides; `nominal` in place of the value as computed. */
export function evaluate(
  of: PlannedNumber,
  frame: Frame,
  draws: Overrides["draws"],
  nominal = of.compute(frame),
): number {
  const { tolerance } = of;
  if (tolerance === undefined || draws === undefined) return nominal;
  const position = draws.get(tolerance.draw);
  if (position === undefined || position === 0) return nominal;
  return drawn(nominal, tolerance, tolerance.compute(frame), position);
}

/** Ends of the band of a tolerance round a nominal value, the lower first. */
export function bandOf(
  of: PlannedNumber,
  frame: Frame,
  nominal: number,
): readonly [number, number] | undefined {
  const { tolerance } = of;
  if (tolerance === undefined) return undefined;
  const amount = tolerance.compute(frame);
  const ends = [drawn(nominal, tolerance, amount, -1), drawn(nominal, tolerance, amount, 1)];
  return ends[0] <= ends[1] ? [ends[0], ends[1]] : [ends[1], ends[0]];
}

/**
 * The value at a position from -1 to 1 of its band. The band of a lognormal number is that of its logarithm, so
 * that +/- 10 % reaches from 1/1.1 to 1.1 times the nominal value.
 */
function drawn(nominal: number, tolerance: PlannedTolerance, amount: number, position: number): number {
  const half = tolerance.relative ? Math.abs(nominal) * amount : amount;
  if (tolerance.distribution !== "lognormal") return nominal + position * half;
  return nominal === 0 ? 0 : nominal * (1 + half / Math.abs(nominal)) ** position;
}

function planTolerance(
  node: ValueNode,
  c: NumberContext,
  value: PlannedNumber | undefined,
  owner: string,
  copies: number,
): PlannedTolerance | undefined {
  const tolerance = node.tolerance;
  if (tolerance === undefined) return undefined;
  const relative = isShare(tolerance.amount);
  const wanted =
    relative || value === undefined ? wantedKind(NUMBER) : wantedKind(value.kind, TOLERANCE_HINT);
  const amount = planExpression(
    tolerance.amount,
    c,
    isBareShare(tolerance.amount, c) ? wantedKind(NUMBER) : wanted,
  );
  if (amount === undefined) return undefined;
  const size = amount.compute(c.nominal());
  if (size < 0) {
    c.findings.say(
      "not-positive",
      tolerance.amount.span,
      `a tolerance is not negative, found ${textOf(c, tolerance.amount.span)}`,
    );
    return undefined;
  }
  const isRelative = relative || (isNumber(amount.kind) && value !== undefined && !isNumber(value.kind));
  const distribution = distributionOf(tolerance.distribution?.text);
  const draw = c.newDraw({ owner, span: tolerance.span, file: c.file, distribution, copies });
  return { compute: amount.compute, relative: isRelative, distribution, draw, span: tolerance.span };
}

const TOLERANCE_HINT = "a tolerance is a share of the value, in %, or a number in the unit of the value";

/** A literal in % or ppm is a share of the value, whatever the value is. */
const isShare = (node: Expression): boolean => /^(%|ppm)$/.test(literalOf(node)?.unit?.text ?? "");

/** A share by name: `+/- scatter` with `let scatter = 5 %`. */
function isBareShare(node: Expression, c: NumberContext): boolean {
  if (node.kind !== "path" || node.names.length !== 1) return false;
  const meaning = c.scope.find(node.names[0]);
  return meaning?.is === "number" && meaning.typed !== undefined && isNumber(meaning.typed.kind);
}

function distributionOf(word: string | undefined): PlannedTolerance["distribution"] {
  return word === "normal" || word === "lognormal" ? word : "uniform";
}

function planWithin(
  node: ValueNode,
  c: NumberContext,
  value: PlannedNumber | undefined,
): PlannedNumber["within"] | undefined {
  if (node.within === undefined) return undefined;
  const wanted = value && wantedKind(value.kind, "the range has the unit of the value");
  const from = planExpression(node.within.from, c, wanted);
  const to = planExpression(node.within.to, c, wanted);
  if (from === undefined || to === undefined) return undefined;
  if (from.compute(c.nominal()) < to.compute(c.nominal())) return [from.compute, to.compute];
  sayRangeReversed(node.within, c);
  return undefined;
}

/** A range whose ends stand the wrong way round, or are equal. */
export function sayRangeReversed(
  range: { readonly from: Expression; readonly to: Expression },
  c: Pick<NumberContext, "findings" | "tree">,
): void {
  const [from, to] = [textOf(c, range.from.span), textOf(c, range.to.span)];
  const span = { start: range.from.span.start, end: range.to.span.end };
  const fixes = from === to ? [] : [replaceFix(`Write \`${to} to ${from}\``, span, `${to} to ${from}`)];
  c.findings.say("wrong-kind", span, `the range runs from ${from} to ${to}; its lower end comes first`, {
    fixes,
  });
}

/** The unit a value was written in: of its only literal, or behind `as`. */
function unitOfValue(node: Expression): UnitNode | undefined {
  if (node.kind === "as") return node.unit;
  if (node.kind === "parenthesis") return unitOfValue(node.inner);
  return literalOf(node)?.unit;
}

/** Whether a code reads a variable of a law, so that it has no value of its own. */
function reads(code: PlannedNumber["code"]): boolean {
  if (code.op === "slot") return code.slot < 3;
  if (code.op === "answer") return true;
  if (code.op === "constant") return false;
  if (code.op === "negate" || code.op === "not") return reads(code.a);
  if (code.op === "if") return reads(code.condition) || reads(code.yes) || reads(code.no);
  if (code.op === "call") return code.args.some(reads);
  return reads(code.a) || reads(code.b);
}
