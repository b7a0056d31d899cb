import type { Fix } from "../diagnostics/diagnostic.ts";
import { visit } from "../syntax/expression-nodes.ts";
import type { Expression, NumberNode } from "../syntax/tree.ts";
import { convertNumber } from "../units/convert.ts";
import { describeQuantity } from "../units/describe.ts";
import type { Kind } from "../units/dimension.ts";
import {
  dimension,
  divideDimensions,
  isNumber,
  isPlainPerTime,
  NUMBER,
  sameDimension,
  sameKind,
} from "../units/quantity.ts";
import { formatNumber, formatQuantity } from "../units/show.ts";
import { slipIn } from "../units/slips.ts";
import { compile, scaled } from "./code.ts";
import { insertFix, replaceFix } from "./findings.ts";
import {
  type Checked,
  type ExpressionContext,
  type Typed,
  textOf,
  type Wanted,
  wantedKind,
} from "./typed.ts";

/**
 * Holds an expression to what is wanted at its place. What fits comes back, an angular rate as a plain 1/s
 * where that is wanted; what does not is said at the smallest place that is to blame, with its cure.
 */
export function suited(
  node: Expression,
  typed: Checked,
  wanted: Wanted | undefined,
  c: ExpressionContext,
): Checked {
  if (typed === undefined) return undefined;
  if (typed.logical) return logicalWhereNumber(node, c);
  if (wanted === undefined) return typed;
  if (typed.zero) return { ...typed, kind: wanted.kinds[0] };
  if (wanted.kinds.some((kind) => sameKind(kind, typed.kind))) return typed;
  if (typed.angular && wanted.kinds.some(isPlainPerTime)) return plainRate(typed);
  mismatch(node, typed, wanted, c);
  return undefined;
}

/** The angular rate of a rate, a plain 1/s. */
export function plainRate(typed: Typed): Typed {
  return {
    code: scaled(typed.code, 2 * Math.PI),
    kind: { dimension: typed.kind.dimension, rate: false },
  };
}

/** "a mass, 3 kg": what an expression was found to be; literals as they are written. */
export function found(node: Expression, typed: Typed, c: ExpressionContext): string {
  const value = compile(typed.code)(c.nominal());
  if (!Number.isFinite(value)) return wordsOfKind(typed.kind);
  const quantity = { ...typed.kind, value };
  if (isNumber(typed.kind)) return describeQuantity(quantity);
  const text = textOf(c, node.span);
  if (literalOf(node) !== undefined) return `${wordsOfKind(typed.kind)}, ${text}`;
  if (node.kind === "path") return `${wordsOfKind(typed.kind)}, \`${text}\` = ${formatQuantity(quantity)}`;
  return describeQuantity(quantity);
}

const wordsOfKind = (kind: Kind): string => wantedKind(kind).says;

/** The number inside signs and parentheses. */
export function literalOf(node: Expression): NumberNode | undefined {
  if (node.kind === "number") return node;
  if (node.kind === "parenthesis") return literalOf(node.inner);
  if (node.kind === "unary" && node.operator !== "not") return literalOf(node.operand);
  return undefined;
}

/** Text of `EXPR as UNIT`, in parentheses where it is only part of a value. */
export function withAs(node: Expression, unit: string, c: ExpressionContext): string {
  const text = textOf(c, node.span);
  return node === c.root ? `${text} as ${unit}` : `(${text} as ${unit})`;
}

function mismatch(node: Expression, typed: Typed, wanted: Wanted, c: ExpressionContext): void {
  if (wanted.kinds.some((kind) => kind.rate) && isPlainPerTime(typed.kind)) {
    perTimeForRate(node, typed, c);
  } else if (wanted.kinds.some(isPlainPerTime) && typed.kind.rate) {
    rateForPerTime(node, typed, wanted, c);
  } else if (!slip(node, typed, wanted, c)) {
    if (isNumber(typed.kind)) bareNumber(node, typed, wanted, c);
    else plainMismatch(node, typed, wanted, c);
  }
}

function plainMismatch(node: Expression, typed: Typed, wanted: Wanted, c: ExpressionContext): void {
  const message = `expected ${expected(wanted)}, found ${found(node, typed, c)}`;
  c.findings.say("unit-mismatch", node.span, message, { hint: wanted.hint, about: blamed(node, wanted, c) });
}

/** A number with a name that is used in several places for the same thing is one mistake: "fan_speed for a rate". */
function blamed(node: Expression, wanted: Wanted, c: ExpressionContext): string | undefined {
  const names = new Set<string>();
  visit(node, (each) => {
    if (each.kind === "path" && c.scope.holdsNumber(textOf(c, each.span))) names.add(textOf(c, each.span));
  });
  return names.size === 1 ? `${[...names][0]} for ${wanted.says}` : undefined;
}

/** "a stiffness such as N/mm", "a number", "a displacement, a velocity or an acceleration such as mm, mm/s, gn". */
function expected(wanted: Wanted): string {
  if (wanted.units.length === 0) return wanted.says;
  return `${wanted.says} such as ${wanted.units.slice(0, wanted.kinds.length).join(", ")}`;
}

function bareNumber(node: Expression, typed: Typed, wanted: Wanted, c: ExpressionContext): void {
  const literal = literalOf(node);
  const units = wanted.units.slice(0, FIXES_OFFERED);
  if (literal !== undefined) {
    const text = textOf(c, literal.span);
    const fixes = units.map((unit) => insertFix(`Write \`${text} ${unit}\``, literal.span.end, ` ${unit}`));
    const message = `expected ${expected(wanted)}, found \`${textOf(c, node.span)}\` without a unit`;
    c.findings.say("missing-unit", literal.span, message, { hint: wanted.hint, fixes });
    return;
  }
  const fixes = units.map((unit) => {
    const text = withAs(node, unit, c);
    return replaceFix(`Write \`${text}\``, node.span, text);
  });
  const message = `expected ${expected(wanted)}, found ${found(node, typed, c)}`;
  c.findings.say("unit-mismatch", node.span, message, {
    hint: wanted.hint,
    fixes,
    about: blamed(node, wanted, c),
  });
}

/** More would be a list to read, not a cure. */
const FIXES_OFFERED = 4;

function perTimeForRate(node: Expression, typed: Typed, c: ExpressionContext): void {
  const value = compile(typed.code)(c.nominal());
  const fixes = ["rad/s", "Hz"].map((unit) => {
    const text = withAs(node, unit, c);
    return replaceFix(`Read it as ${unit}: \`${text}\``, node.span, text);
  });
  const shown = Number.isFinite(value) ? `, ${formatNumber(value)} 1/s` : "";
  const meanings = Number.isFinite(value)
    ? `: ${formatNumber(value)} rad/s are ${formatNumber(value / (2 * Math.PI))} Hz`
    : "";
  c.findings.say(
    "ambiguous-rate",
    node.span,
    `expected a rate such as Hz, found a plain 1/s${shown}, which leaves open whether it counts radians or cycles`,
    { hint: `\`as rad/s\` or \`as Hz\` says which${meanings}`, fixes },
  );
}

function rateForPerTime(node: Expression, typed: Typed, wanted: Wanted, c: ExpressionContext): void {
  const literal = literalOf(node);
  const angular = withAs(node, "rad/s", { ...c, root: node });
  const fixes: Fix[] =
    literal?.unit === undefined ? [] : [replaceFix("Write `1/s`", literal.unit.span, "1/s")];
  c.findings.say(
    "ambiguous-rate",
    node.span,
    `expected ${expected(wanted)}, found ${found(node, typed, c)}, which counts cycles`,
    { hint: `the angular rate is \`1 * (${angular})\`, the plain number is written in 1/s`, fixes },
  );
}

/** `450 lbf` for a mass, `20 g` for an acceleration: a unit taken for another one. */
function slip(node: Expression, typed: Typed, wanted: Wanted, c: ExpressionContext): boolean {
  const literal = literalOf(node);
  if (literal?.unit === undefined) return weightAsMass(node, typed, wanted, c);
  const unit = literal.unit;
  const known = wanted.kinds.map((kind) => slipIn(unit, kind)).find((each) => each !== undefined);
  if (known?.code === "weight-as-mass" && wanted.beside) return false;
  if (known === undefined) return weightAsMass(node, typed, wanted, c);
  const factor = unit.factors[known.factorIndex];
  const number = c.tree.text.slice(literal.span.start, unit.span.start);
  const better = scaledNumber(number, known.ratio);
  const before = c.tree.text.slice(unit.span.start, factor.span.start);
  const behind = c.tree.text.slice(factor.span.end, unit.span.end);
  const meant = `${better}${before}${known.to}${behind}`;
  c.findings.say(
    known.code,
    factor.span,
    known.code === "weight-as-mass"
      ? `${textOf(c, literal.span)} is a weight, and ${wanted.says} belongs here; ${meant}?`
      : `expected ${expected(wanted)}, found ${found(node, typed, c)}: ${known.message}`,
    { hint: wanted.hint, fixes: [replaceFix(`Write \`${meant}\``, literal.span, meant)] },
  );
  return true;
}

/** The number with the blanks behind it, times a ratio. */
function scaledNumber(text: string, ratio: number): string {
  if (ratio === 1) return text;
  const written = text.trimEnd();
  const unit = (factor: number) => ({ text: "", factor, kind: NUMBER });
  return convertNumber(written, unit(ratio), unit(1)) + text.slice(written.length);
}

const ACCELERATION = dimension(1, 0, -2);

/** `mass pump = pump_weight`: what was written is what it weighs. */
function weightAsMass(node: Expression, typed: Typed, wanted: Wanted, c: ExpressionContext): boolean {
  const [kind] = wanted.kinds;
  const isMass = sameDimension(MASS, kind.dimension) && !kind.rate;
  const weighed = divideDimensions(typed.kind.dimension, ACCELERATION);
  if (wanted.beside || !isMass || typed.kind.rate || !sameDimension(weighed, kind.dimension)) return false;
  const text = textOf(c, node.span);
  const operand = node.kind === "binary" || node.kind === "as" ? `(${text})` : text;
  const mass = `${operand} / (1 gn)`;
  c.findings.say(
    "weight-as-mass",
    node.span,
    `expected ${expected(wanted)}, found a weight, ${found(node, typed, c)}`,
    {
      hint: "a weight is a force: the mass is the weight over the acceleration of gravity, 1 gn",
      fixes: [replaceFix(`Write \`${mass}\``, node.span, mass)],
    },
  );
  return true;
}

const MASS = dimension(0, 1);

function logicalWhereNumber(node: Expression, c: ExpressionContext): undefined {
  c.findings.say("wrong-kind", node.span, "a comparison stands where a number was expected", {
    hint: "comparisons, `and`, `or` and `not` stand inside `if(condition, then, else)`",
  });
  return undefined;
}

/** Whether two kinds agree, zero fitting all. */
export const agrees = (a: Typed, b: { readonly kind: Kind; readonly zero?: boolean }): boolean =>
  a.zero === true || b.zero === true || sameKind(a.kind, b.kind);
