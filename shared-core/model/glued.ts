import { visit } from "../syntax/expression-nodes.ts";
import type { Expression, NumberNode, UnitNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { editsFix, Findings } from "./findings.ts";
import { type Checked, type ExpressionContext, textOf, type Wanted } from "./typed.ts";

type Check = (node: Expression, c: ExpressionContext, wanted?: Wanted) => Checked;

/**
 * `12 Hz*t` is hertz-tonnes. A unit whose later factors are also names of numbers here is read both ways: as the
 * unit, and with the names as factors of a product. Where the names would fit, or the unit does not, the writer
 * has to say which is meant.
 */
export function checkGlued(
  node: Expression,
  c: ExpressionContext,
  wanted: Wanted | undefined,
  check: Check,
): Checked {
  const literals = gluedLiterals(node, c);
  if (literals.length === 0) return check(node, c, wanted);
  const asUnits = trial(node, c, wanted, check);
  const unitFits = asUnits.typed !== undefined && !asUnits.findings.hasErrors;
  const decides =
    wanted !== undefined ||
    literals.some((literal) => gluedFactors(literal, c).some(({ name }) => c.variables?.has(name)));
  if (unitFits && (!decides || !namesFit(node, literals, c, wanted, check))) {
    c.findings.take(asUnits.findings);
    return asUnits.typed;
  }
  if (asUnits.typed === undefined && !asUnits.findings.hasErrors) return undefined;
  for (const literal of literals) sayGlued(literal, c);
  return undefined;
}

function trial(node: Expression, c: ExpressionContext, wanted: Wanted | undefined, check: Check) {
  const findings = new Findings();
  return { typed: check(node, { ...c, findings }, wanted), findings };
}

function namesFit(
  node: Expression,
  literals: readonly NumberNode[],
  c: ExpressionContext,
  wanted: Wanted | undefined,
  check: Check,
): boolean {
  const apart = literals.reduce<Expression>(
    (whole, literal) => replace(whole, literal, takenApart(literal, c)),
    node,
  );
  const { typed, findings } = trial(apart, { ...c, root: apart }, wanted, check);
  return typed !== undefined && !findings.hasErrors;
}

type UnitFactor = UnitNode["factors"][number];

/** Factors after the first of a unit that are also names of numbers in this place. */
function gluedFactors(literal: NumberNode, c: ExpressionContext): readonly UnitFactor[] {
  const [, ...later] = literal.unit?.factors ?? [];
  return later.filter(({ name }) => c.scope.holdsNumber(name));
}

const isGlued = ({ unit }: NumberNode, c: ExpressionContext): boolean =>
  unit?.factors.some(({ name }, i) => i > 0 && c.scope.holdsNumber(name)) === true;

function gluedLiterals(node: Expression, c: ExpressionContext): readonly NumberNode[] {
  if (node.kind === "path") return [];
  if (node.kind === "number") return isGlued(node, c) ? [node] : [];
  const literals: NumberNode[] = [];
  visit(node, (each) => {
    if (each.kind === "number" && isGlued(each, c)) literals.push(each);
  });
  return literals;
}

function sayGlued(literal: NumberNode, c: ExpressionContext): void {
  const unit = literal.unit as UnitNode;
  const factors = gluedFactors(literal, c);
  // Whichever is meant, the names are spoken of here, so they do not count as unused.
  for (const { name: text, span } of factors) c.scope.find({ kind: "name", text, span });
  const edits = factors.flatMap((factor) => {
    const operator = operatorBefore(unit, factor, c.tree.text);
    return operator === undefined
      ? []
      : [{ span: operator, text: ` ${c.tree.text.slice(operator.start, operator.end)} ` }];
  });
  const written = textOf(c, literal.span);
  const names = factors.map(({ name }) => `\`${name}\` is also ${nameWords(name, c)}`).join(" and ");
  const meant = applied(written, edits, literal.span.start);
  c.findings.say(
    "glued-name",
    literal.span,
    `\`${written}\` is read as a number in ${unit.text}, and ${names}`,
    {
      hint: `blanks round the operator make it a product: \`${meant}\``,
      fixes: edits.length === 0 ? [] : [editsFix(`Write \`${meant}\``, edits)],
    },
  );
}

const VARIABLES: Readonly<Record<string, string>> = { t: "the time", travel: "the travel", rate: "the rate" };

function nameWords(name: string, c: ExpressionContext): string {
  return c.variables?.has(name) ? (VARIABLES[name] ?? name) : "the name of a number";
}

function operatorBefore(unit: UnitNode, factor: UnitFactor, text: string): Span | undefined {
  for (let at = factor.span.start - 1; at >= unit.span.start; at--) {
    if ("*·/".includes(text[at])) return { start: at, end: at + 1 };
    if (text[at] !== "(") return undefined;
  }
  return undefined;
}

function applied(text: string, edits: readonly { span: Span; text: string }[], offset: number): string {
  let result = text;
  for (const edit of [...edits].reverse()) {
    const [start, end] = [edit.span.start - offset, edit.span.end - offset];
    result = result.slice(0, start) + edit.text + result.slice(end);
  }
  return result;
}

/** `12 Hz*t` as the product of `12 Hz` and the name `t`; spans stay those of the text. */
function takenApart(literal: NumberNode, c: ExpressionContext): Expression {
  const unit = literal.unit as UnitNode;
  const glued = new Set(gluedFactors(literal, c));
  const kept = unit.factors.filter((factor) => !glued.has(factor));
  const text = c.tree.text.slice(unit.span.start, kept.at(-1)?.span.end ?? unit.span.end);
  let whole: Expression = { ...literal, unit: { ...unit, text, factors: kept } };
  for (const { name, power, span } of glued) {
    let factor: Expression = { kind: "path", span, names: [{ kind: "name", span, text: name }] };
    if (Math.abs(power) !== 1) {
      const right: Expression = { kind: "number", span, value: Math.abs(power) };
      factor = { kind: "binary", span, operator: "^", operatorSpan: span, left: factor, right };
    }
    whole = {
      kind: "binary",
      span: literal.span,
      operator: power < 0 ? "/" : "*",
      operatorSpan: span,
      left: whole,
      right: factor,
    };
  }
  return whole;
}

function replace(node: Expression, what: Expression, by: Expression): Expression {
  if (node === what) return by;
  const inside = (child: Expression) => replace(child, what, by);
  switch (node.kind) {
    case "parenthesis":
      return { ...node, inner: inside(node.inner) };
    case "unary":
    case "as":
      return { ...node, operand: inside(node.operand) };
    case "binary":
      return { ...node, left: inside(node.left), right: inside(node.right) };
    case "call":
      return {
        ...node,
        positional: node.positional.map(inside),
        named: node.named.map((each) => ({ ...each, value: inside(each.value) })),
      };
    case "tuple":
      return { ...node, items: node.items.map(inside) };
    case "range":
      return { ...node, from: inside(node.from), to: inside(node.to) };
    default:
      return node;
  }
}
