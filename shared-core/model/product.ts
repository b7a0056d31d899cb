import type { BinaryNode, Expression } from "../syntax/tree.ts";
import type { Kind } from "../units/dimension.ts";
import {
  dimension,
  divideDimensions,
  isNumber,
  multiplyDimensions,
  NO_DIMENSION,
  NUMBER,
  PER_TIME,
  RATE,
  sameDimension,
} from "../units/quantity.ts";
import { binary, type Code, constant } from "./code.ts";
import { replaceFix } from "./findings.ts";
import { found, plainRate } from "./fit.ts";
import { type Checked, type ExpressionContext, type Typed, textOf } from "./typed.ts";

/**
 * Products with rates in them, by the table of language.md section 2. A product is taken apart over `*`, `/`,
 * signs and parentheses into factors above and below the line.
 */
export interface Factor {
  readonly node: Expression;
  readonly power: 1 | -1;
  readonly typed: Typed;
}

export type Slot = { readonly node: Expression; readonly power: 1 | -1; readonly negative: boolean };

/**
 * The factors of a product, in the order in which they are written. A parenthesis is opened unless `stands` says
 * that it means something by itself: `(1 / rate)` is a time.
 */
export function flatten(
  node: Expression,
  stands: (node: Expression) => boolean,
  power: 1 | -1 = 1,
  negative = false,
): Slot[] {
  if (node.kind === "binary" && (node.operator === "*" || node.operator === "/")) {
    const below = (node.operator === "*" ? power : -power) as 1 | -1;
    return [...flatten(node.left, stands, power, negative), ...flatten(node.right, stands, below)];
  }
  if (node.kind === "unary" && node.operator !== "not") {
    return flatten(node.operand, stands, power, negative !== (node.operator === "-"));
  }
  if (node.kind === "parenthesis" && isProductLike(node.inner) && !stands(node.inner)) {
    return flatten(node.inner, stands, power, negative);
  }
  return [{ node, power, negative }];
}

function isProductLike(node: Expression): boolean {
  if (node.kind === "parenthesis") return isProductLike(node.inner);
  if (node.kind === "unary" && node.operator !== "not") return isProductLike(node.operand);
  if (node.kind === "binary") return node.operator === "*" || node.operator === "/";
  return node.kind === "number" || node.kind === "path";
}

/** What a product of checked factors is; says what is wrong with its rates. */
export function productOf(
  node: BinaryNode,
  slots: readonly Slot[],
  c: ExpressionContext,
  checked: readonly Typed[],
): Checked {
  const factors = slots.map(({ node: at, power }, i) => ({ node: at, power, typed: checked[i] }));
  const kind = kindOfProduct(node, factors, c);
  if (kind === undefined) return undefined;
  const parts = factors.map((factor) => {
    const plain = kind.plainAngular && factor.typed.angular;
    return plain ? plainRate(factor.typed).code : factor.typed.code;
  });
  const signs = slots.filter((slot) => slot.negative).length;
  let code = chain(parts, factors, node);
  if (kind.turns) code = binary("multiply", code, constant(2 * Math.PI, node.span), node.span);
  if (signs % 2 === 1) code = { op: "negate", a: code, span: node.span };
  return { code, kind: kind.kind, ...(kind.angular ? { angular: true } : {}) };
}

/** Multiplied and divided from left to right, as it is written. */
function chain(parts: readonly Code[], factors: readonly Factor[], node: BinaryNode): Code {
  let code = parts[0];
  if (factors[0].power < 0) code = binary("divide", constant(1, node.span), code, node.span);
  for (let i = 1; i < parts.length; i++) {
    const span = { start: factors[0].node.span.start, end: factors[i].node.span.end };
    const place = i === parts.length - 1 ? node.span : span;
    code = binary(factors[i].power > 0 ? "multiply" : "divide", code, parts[i], place);
  }
  return code;
}

interface ProductKind {
  readonly kind: Kind;
  readonly angular?: boolean;
  /** Angular rates are taken as plain 1/s. */
  readonly plainAngular?: boolean;
  /** A count of turns inside sin or cos: times 2 pi. */
  readonly turns?: boolean;
}

function kindOfProduct(
  node: BinaryNode,
  factors: readonly Factor[],
  c: ExpressionContext,
): ProductKind | undefined {
  const rates = factors.filter(({ typed }) => typed.kind.rate && !typed.zero);
  const others = factors.filter((factor) => !rates.includes(factor));
  const rest = dimensionOfFactors(others);
  if (rates.length === 0) return { kind: { dimension: rest, rate: false } };
  const plainRates = rates.filter(({ typed }) => !typed.angular);
  const net = rates.reduce((sum, { power }) => sum + power, 0);
  if (plainRates.length === 0) return angularProduct(rates, others, rest, net);
  const mixed = plainRates.length < rates.length;
  if (plainRates.length === 1 && isAngular(plainRates[0], factors)) {
    const whole = multiplyDimensions(rest, dimensionOfFactors(rates));
    return { kind: { dimension: whole, rate: false }, plainAngular: true };
  }
  if (net === 0 && !mixed) return { kind: { dimension: rest, rate: false } };
  const bare = others.every(({ typed }) => isNumber(typed.kind));
  const piFactor = others.find((other) => isPi(other.node) && other.power === plainRates[0].power);
  if (piFactor !== undefined && !mixed) return piWithoutTwo(node, piFactor, plainRates[0], c);
  if (!mixed && net === 1 && bare) return { kind: RATE };
  if (!mixed && net === -1 && bare) return { kind: { dimension: TIME, rate: false } };
  if (c.turning && !mixed && net === 1 && sameDimension(rest, TIME) && !others.some(isAngleLiteral)) {
    return { kind: NUMBER, turns: true };
  }
  return otherMixture(node, plainRates[0], c);
}

const TIME = dimension(0, 0, 1);

/** Every rate is written `as rad/s`. Alone with numbers it may still serve as a rate. */
function angularProduct(
  rates: readonly Factor[],
  others: readonly Factor[],
  rest: Kind["dimension"],
  net: number,
): ProductKind {
  const bare = others.every(({ typed }) => isNumber(typed.kind));
  if (bare && net === 1 && rates.length === 1) return { kind: RATE, angular: true };
  const whole = multiplyDimensions(rest, dimensionOfFactors(rates));
  return { kind: { dimension: whole, rate: false }, plainAngular: true };
}

function dimensionOfFactors(factors: readonly Factor[]): Kind["dimension"] {
  let total = NO_DIMENSION;
  for (const { typed, power } of factors) {
    const of = typed.kind.rate ? PER_TIME : typed.kind.dimension;
    total = power > 0 ? multiplyDimensions(total, of) : divideDimensions(total, of);
  }
  return total;
}

/** A literal 2 and pi stand on the same side of the line as the rate. */
function isAngular(rate: Factor, factors: readonly Factor[]): boolean {
  const beside = factors.filter((factor) => factor.power === rate.power);
  return beside.some(({ node }) => isTwo(node)) && beside.some(({ node }) => isPi(node));
}

const isTwo = (node: Expression): boolean =>
  node.kind === "parenthesis" ? isTwo(node.inner) : node.kind === "number" && !node.unit && node.value === 2;

const isPi = (node: Expression): boolean =>
  node.kind === "parenthesis"
    ? isPi(node.inner)
    : node.kind === "path" && node.names.length === 1 && node.names[0].text === "pi";

const isAngleLiteral = ({ node }: Factor): boolean =>
  node.kind === "number" && node.unit !== undefined && /^(deg|rad|rev)$/.test(node.unit.text);

function piWithoutTwo(node: BinaryNode, pi: Factor, rate: Factor, c: ExpressionContext): undefined {
  const two = replaceFix("Write `2 * pi`", pi.node.span, `2 * ${textOf(c, pi.node.span)}`);
  c.findings.say(
    "ambiguous-rate",
    node.span,
    `pi times ${found(rate.node, rate.typed, c)}: the angular rate of a rate is 2 * pi times it`,
    { hint: "a rate counts cycles in every spelling, also in rad/s", fixes: [two] },
  );
  return undefined;
}

function otherMixture(node: BinaryNode, rate: Factor, c: ExpressionContext): undefined {
  sayMixture(node, rate.node, rate.typed, c);
  return undefined;
}

/** A rate among other quantities: cycles or radians? Marks the rate itself. */
export function sayMixture(whole: Expression, rate: Expression, typed: Typed, c: ExpressionContext): void {
  const text = textOf(c, rate.span);
  const inner = rate.kind === "parenthesis" ? text.slice(1, -1) : text;
  const shown = textOf(c, whole.span);
  const where = shown.length > 60 ? "this product" : `\`${shown}\``;
  c.findings.say(
    "ambiguous-rate",
    rate.span,
    `${found(rate, typed, c)}, multiplies into other quantities in ${where}, which leaves open whether it counts cycles or radians`,
    {
      hint: `\`(${inner} as rad/s)\` is the angular rate, 2 * pi times the cycles a second`,
      fixes: [replaceFix(`Write \`(${inner} as rad/s)\``, rate.span, `(${inner} as rad/s)`)],
    },
  );
}
