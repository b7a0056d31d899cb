import { type Span, span } from "../text/span.ts";
import { type Cursor, shorten } from "./cursor.ts";
import {
  type BinaryNode,
  type CallNode,
  type Expression,
  type NameNode,
  type PathNode,
  ROLE,
} from "./tree.ts";
import { isUnitHere, requiredUnit, unitBehind, unknownUnit } from "./unit-reader.ts";
import { HEAD_WORDS, VALUE_WORDS } from "./words.ts";

/** Deeper nesting is no formula anybody wrote; later stages may walk a tree this deep without running out of stack. */
export const DEEPEST_EXPRESSION = 256;
/** Most operators in one expression: bounds the height of the tree that `1 + 1 + 1 …` makes. */
export const MOST_OPERATORS = 1000;

/** Binding strength, loosest first. */
export const LEVEL = {
  or: 1,
  and: 2,
  not: 3,
  comparison: 4,
  as: 5,
  sum: 6,
  product: 7,
  sign: 8,
  power: 9,
} as const;

/**
 * Reads an expression whose operators bind at least as tightly as `level`. One function for all levels
 * (precedence climbing), since they differ in nothing but the number.
 */
export function expression(c: Cursor, level: number = LEVEL.or): Expression {
  const start = c.offset;
  if (!enter(c)) return broken(c, start);
  let left = operand(c);
  for (let next = infix(c); next && next.level >= level; next = infix(c)) {
    const place = c.span;
    if (!countOperator(c)) break;
    c.take(next.operator === "as" ? ROLE.word : ROLE.infix);
    left = next.operator === "as" ? unitStated(c, start, left) : binary(c, start, left, next, place);
  }
  c.depth--;
  return left;
}

/** Starts a new count of operators: one expression of a list, a row or a head. */
export function wholeExpression(c: Cursor, level: number = LEVEL.or): Expression {
  c.operators = 0;
  return expression(c, level);
}

/** `unit`, `genset.z.velocity`. */
export function path(c: Cursor, role: number = ROLE.reference): PathNode {
  const start = c.offset;
  const names: NameNode[] = [];
  do {
    if (c.kind !== "name") {
      c.expected(names.length === 0 ? "a name" : "a name behind the dot");
      break;
    }
    names.push(name(c, role));
  } while (c.accept("."));
  return { kind: "path", span: c.from(start), names };
}

/** Takes the current token as a name. */
export function name(c: Cursor, role: number): NameNode {
  const node: NameNode = { kind: "name", span: c.span, text: c.word };
  c.take(role);
  return node;
}

/** `(a, b, key: c)`; the cursor stands at the parenthesis. */
export function callArguments(c: Cursor, callee: NameNode): CallNode {
  const positional: Expression[] = [];
  const named: { name: NameNode; value: Expression }[] = [];
  c.take();
  while (!c.atEnd && c.word !== ")") {
    if (c.kind === "name" && c.wordAhead(1) === ":") {
      const key = name(c, ROLE.argument);
      c.take();
      named.push({ name: key, value: expression(c) });
    } else {
      positional.push(argument(c));
    }
    if (!c.accept(",")) break;
    if (c.word === ")") c.expected("another argument behind the comma");
  }
  closing(c, "an operator, `,` or `)`");
  return { kind: "call", span: c.from(callee.span.start), callee, positional, named };
}

/** An argument: an expression, or a range `A to B`. */
function argument(c: Cursor): Expression {
  const start = c.offset;
  const from = expression(c);
  if (!c.accept("to", ROLE.word)) return from;
  const to = expression(c);
  return { kind: "range", span: c.from(start), from, to };
}

/** `(x, y, z)` with a unit for all, or one on each; also `(x)`, which is a parenthesis. */
export function parenthesis(c: Cursor): Expression {
  const start = c.offset;
  c.take();
  const items = [expression(c)];
  while (c.accept(",")) items.push(expression(c));
  closing(c, items.length > 1 ? "an operator, `,` or `)`" : "an operator or `)`");
  if (items.length > 1) {
    const unit = unitBehind(c);
    return { kind: "tuple", span: c.from(start), items, unit };
  }
  if (isUnitHere(c)) unitOnParenthesis(c);
  return { kind: "parenthesis", span: c.from(start), inner: items[0] };
}

type Infix = { readonly operator: BinaryNode["operator"] | "as"; readonly level: number };

const INFIX: ReadonlyMap<string, Infix> = new Map(
  (
    [
      ["or", "or", LEVEL.or],
      ["and", "and", LEVEL.and],
      ["<", "<", LEVEL.comparison],
      ["<=", "<=", LEVEL.comparison],
      [">", ">", LEVEL.comparison],
      [">=", ">=", LEVEL.comparison],
      ["==", "==", LEVEL.comparison],
      ["!=", "!=", LEVEL.comparison],
      ["as", "as", LEVEL.as],
      ["+", "+", LEVEL.sum],
      ["-", "-", LEVEL.sum],
      ["*", "*", LEVEL.product],
      ["·", "*", LEVEL.product],
      ["/", "/", LEVEL.product],
      ["^", "^", LEVEL.power],
    ] as const
  ).map(([sign, operator, level]) => [sign, { operator, level }]),
);

function infix(c: Cursor): Infix | undefined {
  return c.kind === "operator" || c.kind === "name" ? INFIX.get(c.word) : undefined;
}

function binary(c: Cursor, start: number, left: Expression, next: Infix, operatorSpan: Span): BinaryNode {
  // `^` groups to the right and takes a sign in front of the power: 2^-1.
  const right = expression(c, next.level === LEVEL.power ? LEVEL.sign : next.level + 1);
  const operator = next.operator as BinaryNode["operator"];
  return { kind: "binary", span: c.from(start), operator, operatorSpan, left, right };
}

function unitStated(c: Cursor, start: number, operand: Expression): Expression {
  const unit = requiredUnit(c);
  return unit ? { kind: "as", span: c.from(start), operand, unit } : broken(c, start);
}

function operand(c: Cursor): Expression {
  const start = c.offset;
  if (c.kind === "number") return number(c);
  if (c.kind === "name" && (!VALUE_WORDS.has(c.word) || c.word === "not")) return named(c);
  if (c.word === "(") return parenthesis(c);
  if (c.word === "-" || c.word === "+") {
    const operator = c.word;
    c.take(ROLE.prefix);
    const inner = expression(c, LEVEL.sign);
    return { kind: "unary", span: c.from(start), operator, operand: inner };
  }
  c.expected("a value");
  return broken(c, start);
}

function named(c: Cursor): Expression {
  const start = c.offset;
  if (c.accept("not", ROLE.prefix)) {
    const inner = expression(c, LEVEL.comparison);
    return { kind: "unary", span: c.from(start), operator: "not", operand: inner };
  }
  if (c.wordAhead(1) === "(") return callArguments(c, name(c, ROLE.callee));
  if (c.word === "if") {
    c.take();
    c.expected("`(` behind `if`, as in `if(a < b, x, y)`");
  }
  return path(c);
}

/** A literal with the unit behind it. */
function number(c: Cursor): Expression {
  const start = c.offset;
  const value = literal(c);
  const unit = unitBehind(c);
  if (!unit && c.is("name") && !VALUE_WORDS.has(c.word) && !HEAD_WORDS.has(c.word)) notAUnit(c, start);
  return { kind: "number", span: c.from(start), value, unit };
}

/** The value of the number token; it must be one that a computer holds. */
export function literal(c: Cursor): number {
  const value = Number(c.word);
  if (Number.isFinite(value)) c.take();
  else c.failAt(c.span, `\`${shorten(c.word)}\` is beyond the largest number, about 1.8e308`);
  return value;
}

function notAUnit(c: Cursor, start: number): void {
  const text = c.state.text.slice(start, c.taken);
  if (c.wordAhead(1) === "(") {
    const fixes = [
      { title: "Multiply", edits: [{ span: span(c.taken, c.offset), text: " * " }], safe: false },
    ];
    c.expected(`an operator behind \`${shorten(text)}\``, { fixes });
  } else unknownUnit(c);
}

function unitOnParenthesis(c: Cursor): void {
  const edits = [{ span: span(c.offset, c.offset), text: "as " }];
  c.failAt(c.span, `the unit \`${c.word}\` stands behind a parenthesis; only a number or a tuple takes one`, {
    hint: "`as` gives a bare number its unit: (a + b) as mm",
    fixes: [{ title: `Write \`as ${c.word}\``, edits, safe: false }],
  });
}

function closing(c: Cursor, what: string): void {
  if (!c.accept(")")) c.expected(what);
}

function enter(c: Cursor): boolean {
  if (++c.depth <= DEEPEST_EXPRESSION) return true;
  c.failAt(c.span, `this expression is nested deeper than ${DEEPEST_EXPRESSION} levels`);
  c.depth--;
  return false;
}

function countOperator(c: Cursor): boolean {
  if (++c.operators <= MOST_OPERATORS) return true;
  c.failAt(
    c.span,
    `this expression has more than ${MOST_OPERATORS} operators; name parts of it with \`let\``,
  );
  return false;
}

const broken = (c: Cursor, start: number): Expression => ({ kind: "broken", span: c.from(start) });
