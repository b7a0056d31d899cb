import type { NumberNode, TupleNode, UnitNode } from "../syntax/tree.ts";
import { type Span, span, type TextEdit } from "../text/span.ts";
import { convertNumber } from "../units/convert.ts";
import { likelyUnits } from "../units/describe.ts";
import { isFault } from "../units/fault.ts";
import { knownKind, unitFromText } from "../units/known-kinds.ts";
import { isNumber } from "../units/quantity.ts";
import { siUnit } from "../units/show.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";
import { expressionAt, expressionsOf } from "./navigate-nodes.ts";
import type { CodeAction } from "./refactor-edits.ts";
import type { View } from "./view.ts";

/** The number under the cursor in the other units of its kind, with as many digits as it takes to come back. */
export function convertActions({ model }: View, range: Span): readonly CodeAction[] {
  const chain = expressionAt(model.tree, range.start)?.chain ?? [];
  const literal = chain.findLast((node) => (node.kind === "number" || node.kind === "tuple") && node.unit);
  if (literal?.kind !== "number" && literal?.kind !== "tuple") return [];
  const from = meaningOf(literal.unit);
  if (from === undefined) return [];
  return alternatives(from).map((to) => {
    const edits = converted(model.tree.text, literal, from, to);
    const [number] = edits;
    const title =
      literal.kind === "number" ? `Convert to ${number.text} ${to.text}` : `Convert to ${to.text}`;
    return { title, kind: "refactor.rewrite", edits, safe: false };
  });
}

/** Every number of the file in SI units, or in inches and pounds; units that both use stay. */
export function convertFileActions(view: View): readonly CodeAction[] {
  return (["si", "inch"] as const).flatMap((system) => {
    const edits = fileEdits(view, system);
    if (edits.length === 0) return [];
    const title = system === "si" ? "Convert the file to SI units" : "Convert the file to inch units";
    return [{ title, kind: "source.convert", edits, safe: false }];
  });
}

type Literal = (NumberNode | TupleNode) & { readonly unit: UnitNode };

function fileEdits({ model: { tree } }: View, system: "si" | "inch"): readonly TextEdit[] {
  const byUnit = new Map<string, Literal[]>();
  for (const statement of tree.statements) {
    for (const node of expressionsOf(statement)) {
      if ((node.kind !== "number" && node.kind !== "tuple") || !node.unit) continue;
      byUnit.set(node.unit.text, [...(byUnit.get(node.unit.text) ?? []), node as Literal]);
    }
  }
  return [...byUnit.values()].flatMap((literals) => {
    const from = meaningOf(literals[0].unit);
    const to = from && targetOf(literals, from, system);
    return from && to ? literals.flatMap((each) => converted(tree.text, each, from, to)) : [];
  });
}

/** One target for all literals of a unit, so that a column of numbers stays a column. */
function targetOf(
  literals: readonly Literal[],
  from: UnitMeaning,
  system: "si" | "inch",
): UnitMeaning | undefined {
  const factors = literals[0].unit.factors.map(({ name }) => name);
  const isInch = factors.some((name) => INCH_NAMES.has(name));
  if (isInch === (system === "inch") || isNumber(from.kind)) return undefined;
  const known = knownKind(from.kind);
  const perAngle =
    factors.some((name) => name === "deg" || name === "rad" || name === "rev") && !from.kind.rate;
  const named = (text: string) => meaningIn(perAngle && !/rad|deg/.test(text) ? `${text}/rad` : text);
  if (system === "inch") {
    const inch = known?.inch?.text ?? "";
    return INCH_UNIT.test(inch) ? named(inch) : undefined;
  }
  const sizes = literals
    .flatMap(sizesOf)
    .filter((size) => size > 0)
    .sort((a, b) => a - b);
  const middle = (sizes[sizes.length >> 1] ?? 1) * from.factor;
  const scale = known?.scales.findLast(({ factor }) => middle >= factor) ?? known?.scales[0];
  return named(scale?.text ?? siUnit(from.kind));
}

const INCH_NAMES: ReadonlySet<string> = new Set([
  "in",
  "mil",
  "ft",
  "lbf",
  "kip",
  "lbm",
  "oz",
  "slug",
  "psi",
]);
const INCH_UNIT = /\b(in|lbf|lbm|psi)\b/;

const sizesOf = (literal: Literal): number[] =>
  literal.kind === "number"
    ? [Math.abs(literal.value)]
    : literal.items.flatMap((item) => (item.kind === "number" ? [Math.abs(item.value)] : []));

/** The numbers of a literal first, then its unit; what stands between them stays. */
function converted(
  text: string,
  literal: NumberNode | TupleNode,
  from: UnitMeaning,
  to: UnitMeaning,
): readonly TextEdit[] {
  const unit = literal.unit as UnitNode;
  const numbers = literal.kind === "number" ? [literal] : literal.items.flatMap((item) => numbersIn(item));
  const edits = numbers.map((each): TextEdit => {
    const end = each.unit && each.unit !== unit ? each.span.end : Math.min(each.span.end, unit.span.start);
    const written = text.slice(each.span.start, end).trimEnd();
    const at = span(each.span.start, each.span.start + written.length);
    return { span: at, text: convertNumber(written.replace(/\s+/, ""), from, to) };
  });
  return [...edits, { span: unit.span, text: to.text }];
}

/** Bare numbers of an item: those without a unit of their own. */
function numbersIn(item: TupleNode["items"][number]): NumberNode[] {
  if (item.kind === "number") return item.unit ? [] : [item];
  return item.kind === "unary" ? numbersIn(item.operand) : [];
}

/** Other units worth offering: of an angle for an angle, of a share for a share. */
function alternatives(from: UnitMeaning): readonly UnitMeaning[] {
  const all = isNumber(from.kind) ? (SHARES.includes(from.text) ? SHARES : ANGLES) : likelyUnits(from.kind);
  const perAngle = /\b(rad|deg)\b/.test(from.text) && !from.kind.rate && !isNumber(from.kind);
  const isAngular = (unit: string) => /\b(rad|deg)\b/.test(unit);
  const alike = all.filter(
    (unit) => from.kind.rate || isNumber(from.kind) || isAngular(unit) === perAngle || !all.some(isAngular),
  );
  return alike.flatMap((unit) => {
    const meaning = meaningIn(unit);
    return meaning && unit !== from.text ? [meaning] : [];
  });
}

const SHARES: readonly string[] = ["%", "ppm"];
const ANGLES: readonly string[] = ["deg", "rad", "mrad"];

function meaningOf(unit: UnitNode | undefined): UnitMeaning | undefined {
  const meaning = unit && unitOf(unit);
  return meaning && !isFault(meaning) ? meaning : undefined;
}

/** Units of the tables are spelt with at most one pair of parentheses, `(m/s^2)^2/Hz`. */
function meaningIn(text: string): UnitMeaning | undefined {
  const grouped = /^\(([^()]+)\)\^2(.*)$/.exec(text);
  try {
    const plain = unitFromText(grouped ? `${squared(grouped[1])}${grouped[2]}` : text);
    return { ...plain, text };
  } catch {
    return undefined;
  }
}

const squared = (unit: string): string =>
  unit.replaceAll(
    /([^*/^]+)(?:\^(-?\d+))?/g,
    (_, name: string, power?: string) => `${name}^${2 * Number(power ?? 1)}`,
  );
