import type { Expression, UnitNode } from "../syntax/tree.ts";
import { isFault } from "../units/fault.ts";
import { unitOf } from "../units/unit-of.ts";
import type { Given } from "./details.ts";
import type { Draft } from "./draft.ts";
import { replaceFix } from "./findings.ts";

type Factor = UnitNode["factors"][number];

/** The unit that a detail holds (`unit = m/s^2`), which the parser reads as an expression of names. */
export function writtenUnitOf(given: Given, draft: Draft): UnitNode | undefined {
  const [item] = given.items;
  const span = item?.span ?? given.span;
  const factors =
    item?.kind === "value" && given.items.length === 1 ? factorsOf(item.expression, 1) : undefined;
  if (factors === undefined) {
    draft.findings.say("wrong-kind", span, `\`${given.key}\` takes a unit`, {
      hint: `as in \`${given.key} = ${given.description.example}\``,
    });
    return undefined;
  }
  const text = draft.main.tree.text.slice(span.start, span.end);
  const unit: UnitNode = { kind: "unit", span, text, factors };
  const meaning = unitOf(unit);
  if (!isFault(meaning)) return unit;
  const place = factors[meaning.factorIndex]?.span ?? span;
  const fixes = (meaning.replace ?? []).map((each) => replaceFix(`Write \`${each}\``, place, each));
  draft.findings.say(meaning.code, place, meaning.message, { hint: meaning.hint, fixes });
  return undefined;
}

function factorsOf(node: Expression, power: number): Factor[] | undefined {
  switch (node.kind) {
    case "path":
      return node.names.length === 1 ? [{ name: node.names[0].text, power, span: node.span }] : undefined;
    case "parenthesis":
      return factorsOf(node.inner, power);
    case "number":
      return oneOrUnit(node, power);
    case "binary":
      return binaryFactors(node, power);
    default:
      return undefined;
  }
}

/** `1` in front of a stroke, with the unit that the parser took behind it: `1/s`. */
function oneOrUnit(node: Extract<Expression, { kind: "number" }>, power: number): Factor[] | undefined {
  if (node.value !== 1) return undefined;
  return (node.unit?.factors ?? []).map((factor) => ({ ...factor, power: factor.power * power }));
}

function binaryFactors(node: Extract<Expression, { kind: "binary" }>, power: number): Factor[] | undefined {
  if (node.operator === "^") {
    const exponent = wholeNumber(node.right);
    return exponent === undefined ? undefined : factorsOf(node.left, power * exponent);
  }
  if (node.operator !== "*" && node.operator !== "/") return undefined;
  const left = factorsOf(node.left, power);
  const right = factorsOf(node.right, node.operator === "*" ? power : -power);
  return left && right && [...left, ...right];
}

function wholeNumber(node: Expression): number | undefined {
  if (node.kind === "unary" && node.operator === "-") {
    const inner = wholeNumber(node.operand);
    return inner === undefined ? undefined : -inner;
  }
  return node.kind === "number" && !node.unit && Number.isInteger(node.value) ? node.value : undefined;
}
