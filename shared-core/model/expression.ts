/**
 * One function a kind of node. Longer than other files because they call each other all the way round.
 */
import type { AsNode, BinaryNode, Expression, NumberNode, PathNode, UnitNode } from "../syntax/tree.ts";
import { describeQuantity } from "../units/describe.ts";
import { isFault } from "../units/fault.ts";
import {
  isNumber,
  isPlainPerTime,
  NUMBER,
  PER_TIME,
  powerOfDimension,
  RATE,
  sameKind,
} from "../units/quantity.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";
import { checkCall } from "./calls.ts";
import { type BinaryOperator, binary, constant, constantValue, scaled } from "./code.ts";
import { Findings, replaceFix } from "./findings.ts";
import { agrees, found, literalOf, plainRate, suited } from "./fit.ts";
import { inSI } from "./literal.ts";
import { flatten, productOf, sayMixture } from "./product.ts";
import {
  type Checked,
  type ExpressionContext,
  type Scope,
  type Typed,
  textOf,
  type Wanted,
  wantedKind,
} from "./typed.ts";

/**
 * Understands an expression: what it computes, and its kind in every part. What is wanted is handed down as
 * far as it tells which part is to blame.
 */
export function check(node: Expression, c: ExpressionContext, wanted?: Wanted): Checked {
  switch (node.kind) {
    case "number":
      return suited(node, checkNumber(node, c), wanted, c);
    case "path":
      return suited(node, checkName(node, c), wanted, c);
    case "parenthesis":
      return placed(check(node.inner, c, wanted), node);
    case "unary":
      return checkUnary(node, c, wanted);
    case "binary":
      return checkBinary(node, c, wanted);
    case "as":
      return suited(node, checkAs(node, c), wanted, c);
    case "call":
      return suited(node, checkCall(node, c, wanted), wanted, c);
    case "tuple":
      c.findings.say("wrong-kind", node.span, `expected one number, found ${node.items.length} in a tuple`);
      return undefined;
    case "range":
      c.findings.say("wrong-kind", node.span, "expected one number, found a range");
      return undefined;
    case "broken":
      return undefined;
  }
}

/** What a unit means; says where it means nothing. */
export function meaningOf(unit: UnitNode, c: ExpressionContext): UnitMeaning | undefined {
  const known = MEANINGS.get(unit.text);
  if (known !== undefined) return known;
  const meaning = unitOf(unit);
  if (!isFault(meaning)) {
    if (MEANINGS.size < MOST_MEANINGS) MEANINGS.set(unit.text, meaning);
    return meaning;
  }
  const place = unit.factors[meaning.factorIndex]?.span ?? unit.span;
  const fixes = (meaning.replace ?? []).map((text) => replaceFix(`Write \`${text}\``, place, text));
  c.findings.say(meaning.code, place, meaning.message, { hint: meaning.hint, fixes });
  return undefined;
}

/** What the units of models mean, by their text; so many at most that no text can make it large. */
const MEANINGS = new Map<string, UnitMeaning>();
const MOST_MEANINGS = 1000;

function checkNumber(node: NumberNode, c: ExpressionContext): Checked {
  if (node.unit === undefined) {
    const code = constant(node.value, node.span);
    return node.value === 0 ? { code, kind: NUMBER, zero: true } : { code, kind: NUMBER };
  }
  const unit = meaningOf(node.unit, c);
  if (unit === undefined) return undefined;
  const value = inSI(node.value, unit);
  if (!Number.isFinite(value)) {
    c.findings.say("not-positive", node.span, "this is beyond the largest number, about 1.8e308");
    return undefined;
  }
  return { code: constant(value, node.span), kind: unit.kind };
}

function checkName(node: PathNode, c: ExpressionContext): Checked {
  const [name] = node.names;
  const text = textOf(c, node.span);
  if (node.names.length === 0) return undefined;
  if (node.names.length === 1 && name.text === "pi")
    return { code: constant(Math.PI, node.span), kind: NUMBER };
  if (node.names.length === 1 && name.text === "e")
    return { code: constant(Math.E, node.span), kind: NUMBER };
  const meaning = c.scope.find(name);
  if (meaning === undefined) {
    unknownName(node, c);
    return undefined;
  }
  if (meaning.is === "number" && node.names.length === 1) return placed(meaning.typed, node);
  if (meaning.is === "number") {
    c.findings.say(
      "wrong-kind",
      node.span,
      `\`${name.text}\` is a number and has no \`${node.names[1].text}\``,
    );
    return undefined;
  }
  const varies = node.names.length > 1;
  c.findings.say(
    "wrong-kind",
    node.span,
    varies
      ? `\`${text}\` varies with frequency or time; a single number was expected here`
      : `\`${text}\` is ${meaning.says}; a number was expected here`,
    varies ? { hint: `functions such as \`peak(ask, ${text})\` take one number of it, in \`expect\`` } : {},
  );
  return undefined;
}

function unknownName(node: PathNode, c: ExpressionContext): void {
  const name = node.names[0];
  const near = c.findings.suggest(name.text, c.scope.numberNames());
  const fixes = near === undefined ? [] : [replaceFix(`Write \`${near}\``, name.span, near)];
  const isUnit = !isFault(unitOf({ text: name.text, factors: [{ name: name.text, power: 1 }] }));
  const hint = isUnit
    ? `\`${name.text}\` is a unit: it stands right behind a number, as in \`3 ${name.text}\``
    : "a number gets a name with `let`";
  c.findings.say("unknown-name", name.span, `nothing is called \`${name.text}\``, {
    about: name.text,
    hint,
    fixes,
  });
}

function checkUnary(
  node: Extract<Expression, { kind: "unary" }>,
  c: ExpressionContext,
  wanted: Wanted | undefined,
): Checked {
  if (node.operator === "not") {
    const typed = checkLogical(node.operand, c);
    return suited(
      node,
      typed && { ...typed, code: { op: "not", a: typed.code, span: node.span } },
      wanted,
      c,
    );
  }
  const typed = check(node.operand, c, wanted);
  if (typed === undefined || typed.logical || node.operator === "+") return placed(typed, node);
  if (typed.code.op === "constant") return { ...typed, code: constant(-typed.code.value, node.span) };
  return { ...typed, code: { op: "negate", a: typed.code, span: node.span } };
}

function checkBinary(node: BinaryNode, c: ExpressionContext, wanted: Wanted | undefined): Checked {
  switch (node.operator) {
    case "+":
    case "-":
      return checkSum(node, c, wanted);
    case "*":
    case "/":
      return checkProduct(node, c, wanted);
    case "^":
      return suited(node, checkPower(node, c), wanted, c);
    case "and":
    case "or": {
      const [left, right] = [checkLogical(node.left, c), checkLogical(node.right, c)];
      if (left === undefined || right === undefined) return undefined;
      return suited(node, logical(node.operator, left, right, node), wanted, c);
    }
    default:
      return suited(node, checkComparison(node, c), wanted, c);
  }
}

function checkSum(node: BinaryNode, c: ExpressionContext, wanted: Wanted | undefined): Checked {
  const single = wanted?.kinds.length === 1 ? wanted : undefined;
  const left = check(node.left, c, single);
  const right = check(node.right, c, single);
  if (left === undefined || right === undefined || !alike(node.left, left, node.right, right, c))
    return undefined;
  const leading = left.zero ? right : left;
  const code = binary(node.operator === "+" ? "add" : "subtract", left.code, right.code, node.span);
  const zero = left.zero && right.zero;
  return suited(node, { code, kind: leading.kind, ...(zero ? { zero } : {}) }, wanted, c);
}

/**
 * Whether two operands may be added or compared. A bare literal beside a quantity lacks its unit; otherwise the
 * second is held to the first.
 */
export function alike(
  leftNode: Expression,
  left: Typed,
  rightNode: Expression,
  right: Typed,
  c: ExpressionContext,
): boolean {
  if (agrees(left, right)) return true;
  if (left.logical || right.logical) {
    suited(left.logical ? leftNode : rightNode, left.logical ? left : right, undefined, c);
    return false;
  }
  const leftIsToBlame =
    (isNumber(left.kind) && literalOf(leftNode) !== undefined) ||
    (isPlainPerTime(left.kind) && right.kind.rate && left.code.op !== "answer");
  const [wrongNode, wrong, otherNode, other] = leftIsToBlame
    ? [leftNode, left, rightNode, right]
    : [rightNode, right, leftNode, left];
  const hint = `only like quantities add up and compare; beside it stands ${shownOperand(otherNode, other, c)}`;
  suited(wrongNode, wrong, { ...wantedKind(other.kind, hint), beside: true }, c);
  return false;
}

function shownOperand(node: Expression, typed: Typed, c: ExpressionContext): string {
  const words = found(node, typed, c);
  const text = textOf(c, node.span);
  return words.includes(text) ? words : `\`${text}\`, ${words}`;
}

function checkProduct(node: BinaryNode, c: ExpressionContext, wanted: Wanted | undefined): Checked {
  const slots = flatten(node, (inner) => standsAlone(inner, c));
  const checked = slots.map((slot) => check(slot.node, c));
  if (checked.some((typed) => typed === undefined)) return undefined;
  const typed = checked as Typed[];
  const wrong = slots.findIndex(
    (slot, i) => typed[i].logical && suited(slot.node, typed[i], undefined, c) === undefined,
  );
  if (wrong >= 0) return undefined;
  const product = productOf(node, slots, c, typed);
  if (product === undefined || wanted === undefined) return product;
  const dimensioned = slots.filter((_, i) => !isNumber(typed[i].kind));
  const only = dimensioned.length === 1 && dimensioned[0].power > 0 ? dimensioned[0].node : undefined;
  if (only !== undefined && !wanted.kinds.some((kind) => sameKind(kind, product.kind))) {
    const alone = typed[slots.findIndex((slot) => slot.node === only)];
    if (sameKind(alone.kind, product.kind) && !alone.kind.rate) {
      suited(only, alone, wanted, c);
      return undefined;
    }
  }
  return suited(node, product, wanted, c);
}

/**
 * Whether a product in parentheses holds a rate and comes out, by itself, as something that is no rate. Kept by
 * scope, so that deep nesting costs no more than its length squared.
 */
function standsAlone(node: Expression, c: ExpressionContext): boolean {
  if (node.kind === "parenthesis") return standsAlone(node.inner, c);
  if (node.kind !== "binary") return false;
  const known = STANDING.get(c.scope) ?? new WeakMap<Expression, boolean>();
  STANDING.set(c.scope, known);
  const kept = known.get(node);
  if (kept !== undefined) return kept;
  const stands = tryAlone(node, c);
  known.set(node, stands);
  return stands;
}

const STANDING = new WeakMap<Scope, WeakMap<Expression, boolean>>();

function tryAlone(node: BinaryNode, c: ExpressionContext): boolean {
  const quiet = { ...c, findings: new Findings(), turning: false };
  const typed = check(node, quiet);
  if (typed === undefined || typed.kind.rate) return false;
  return flatten(node, () => false).some((slot) => check(slot.node, quiet)?.kind.rate);
}

function checkPower(node: BinaryNode, c: ExpressionContext): Checked {
  const base = check(node.left, c);
  const exponent = check(node.right, c, wantedKind(NUMBER, "an exponent is a number"));
  if (base === undefined || exponent === undefined) return undefined;
  if (base.logical) return suited(node.left, base, undefined, c);
  if (isNumber(base.kind)) {
    return { code: binary("power", base.code, exponent.code, node.span), kind: NUMBER };
  }
  const value = constantValue(exponent.code);
  if (value === undefined || !Number.isFinite(value)) {
    const hint = "the unit of the result depends on it";
    const what = found(node.left, base, c);
    c.findings.say("unit-mismatch", node.right.span, `the exponent of ${what}, is to be a plain number`, {
      hint,
    });
    return undefined;
  }
  if (base.kind.rate && !base.angular) return powerOfRate(node, base, value, c);
  const plain = base.angular ? plainRate(base) : base;
  return {
    code: binary("power", plain.code, exponent.code, node.span),
    kind: { dimension: powerOfDimension(plain.kind.dimension, value), rate: false },
  };
}

/** A rate to the first is itself, to the -1 the time of one cycle; any other power is ambiguous. */
function powerOfRate(node: BinaryNode, base: Typed, exponent: number, c: ExpressionContext): Checked {
  if (exponent === 1) return { ...base, code: { ...base.code, span: node.span } };
  if (exponent === -1) {
    const code = binary("divide", constant(1, node.span), base.code, node.span);
    return { code, kind: { dimension: powerOfDimension(PER_TIME, -1), rate: false } };
  }
  sayMixture(node, node.left, base, c);
  return undefined;
}

function checkAs(node: AsNode, c: ExpressionContext): Checked {
  const typed = check(node.operand, c);
  const unit = meaningOf(node.unit, c);
  if (typed === undefined || unit === undefined) return undefined;
  if (typed.logical) return suited(node.operand, typed, undefined, c);
  if (sameKind(typed.kind, unit.kind) && !typed.zero) {
    const angular = unit.kind.rate && isRadians(unit);
    return { ...typed, code: { ...typed.code, span: node.span }, angular };
  }
  if (isNumber(typed.kind))
    return { code: placedCode(scaled(typed.code, unit.factor), node), kind: unit.kind };
  if (unit.kind.rate && isPlainPerTime(typed.kind)) return rateStated(node, typed, unit, c);
  const value = describeQuantity({ ...unit.kind, value: unit.factor }).replace(/,.*/, "");
  c.findings.say(
    "unit-mismatch",
    node.unit.span,
    `${found(node.operand, typed, c)}, cannot be given in ${node.unit.text}, the unit of ${value}`,
  );
  return undefined;
}

/** A plain 1/s counts radians or, as Hz, cycles; other spellings do not say which. */
function rateStated(node: AsNode, typed: Typed, unit: UnitMeaning, c: ExpressionContext): Checked {
  if (isRadians(unit)) {
    return { code: placedCode(scaled(typed.code, 1 / (2 * Math.PI)), node), kind: RATE };
  }
  if (/^[a-zA-Zµμ]*Hz$/.test(unit.text)) return { code: placedCode(typed.code, node), kind: RATE };
  const text = textOf(c, node.operand.span);
  const fixes = ["rad/s", "Hz"].map((name) =>
    replaceFix(`Write \`${text} as ${name}\``, node.unit.span, name),
  );
  const message = `a plain 1/s given in ${unit.text} leaves open whether it counts radians or cycles`;
  c.findings.say("ambiguous-rate", node.unit.span, message, { fixes });
  return undefined;
}

const isRadians = (unit: UnitMeaning): boolean => /^[a-zA-Zµμ]*rad\/\w+$/.test(unit.text);

/** A condition: a comparison, or what `and`, `or`, `not` make of them. */
export function checkLogical(node: Expression, c: ExpressionContext): Checked {
  if (node.kind === "parenthesis") return checkLogical(node.inner, c);
  const typed = isCondition(node) ? checkCondition(node, c) : check(node, c);
  if (typed === undefined || typed.logical) return typed;
  c.findings.say("wrong-kind", node.span, `expected a comparison, found ${found(node, typed, c)}`, {
    hint: "a condition compares two numbers, as in `t < 2 s`",
  });
  return undefined;
}

const CONDITIONS: ReadonlySet<string> = new Set(["<", "<=", ">", ">=", "==", "!=", "and", "or"]);

const isCondition = (node: Expression): boolean =>
  (node.kind === "binary" && CONDITIONS.has(node.operator)) ||
  (node.kind === "unary" && node.operator === "not");

function checkCondition(node: Expression, c: ExpressionContext): Checked {
  if (node.kind === "unary") {
    const typed = checkLogical(node.operand, c);
    return typed && { ...typed, code: { op: "not", a: typed.code, span: node.span } };
  }
  if (node.kind !== "binary") return undefined;
  if (node.operator !== "and" && node.operator !== "or") return checkComparison(node, c);
  const [left, right] = [checkLogical(node.left, c), checkLogical(node.right, c)];
  return left && right && logical(node.operator, left, right, node);
}

function checkComparison(node: BinaryNode, c: ExpressionContext): Checked {
  const left = check(node.left, c);
  const right = check(node.right, c);
  if (left === undefined || right === undefined || !alike(node.left, left, node.right, right, c))
    return undefined;
  const greater = node.operator === ">" || node.operator === ">=";
  const [a, b] = greater ? [right, left] : [left, right];
  return logical(COMPARISON[node.operator] ?? "equal", a, b, node);
}

const COMPARISON: Readonly<Record<string, BinaryOperator>> = {
  "<": "less",
  ">": "less",
  "<=": "less-equal",
  ">=": "less-equal",
  "==": "equal",
  "!=": "unequal",
};

const logical = (op: BinaryOperator, a: Typed, b: Typed, node: Expression): Typed => ({
  code: binary(op, a.code, b.code, node.span),
  kind: NUMBER,
  logical: true,
});

const placedCode = (code: Typed["code"], node: Expression): Typed["code"] => ({ ...code, span: node.span });

/** The same meaning at the place of another node, so that faults are marked where they stand. */
function placed(typed: Checked, node: Expression): Checked {
  return typed && { ...typed, code: placedCode(typed.code, node) };
}
