import type { Model } from "../../model/model.ts";
import type { NumberNode, StatementNode, UnitNode } from "../../syntax/tree.ts";
import { isFault } from "../../units/fault.ts";
import { siUnit } from "../../units/show.ts";
import { unitOf } from "../../units/unit-of.ts";
import type { ShownUnit } from "./unit-view.ts";

/**
 * The units that a file uses, by SI text: the first one of each kind, limits of expectations before all others,
 * since they say how its author thinks of an answer. Bare numbers are left out: a percent sign belongs to the
 * number it stands behind. So are rates: a frequency is read in Hz, whatever unit a speed was written in.
 */
export function writtenUnits(model: Model): ReadonlyMap<string, ShownUnit> {
  const found = new Map<string, ShownUnit>();
  const seen = new Set<string>();
  const take = (unit: UnitNode): void => {
    if (seen.has(unit.text)) return;
    seen.add(unit.text);
    const shown = meaningOf(unit);
    if (shown && !found.has(shown.si) && shown.si !== "1" && shown.si !== "Hz")
      found.set(shown.si, shown.unit);
  };
  const judged = (statement: StatementNode) => statement.keyword.text === "expect";
  const { statements } = model.tree;
  for (const statement of statements.filter(judged)) eachUnit(statement, take);
  for (const statement of statements) eachUnit(statement, take);
  return found;
}

function meaningOf(node: UnitNode): { readonly si: string; readonly unit: ShownUnit } | undefined {
  const meaning = unitOf(node);
  if (isFault(meaning)) return undefined;
  return { si: siUnit(meaning.kind), unit: { text: node.text, factor: meaning.factor } };
}

/** Shows the units of all numbers below a node, in the order of the text. */
function eachUnit(node: object, take: (unit: UnitNode) => void): void {
  if (isUnit(node)) take(node);
  else if (!isNumber(node)) {
    for (const child of Object.values(node)) {
      if (typeof child === "object" && child !== null) eachUnit(child, take);
    }
  } else if (node.unit) take(node.unit);
}

const isNumber = (node: object): node is NumberNode =>
  "kind" in node && node.kind === "number" && "value" in node;
const isUnit = (node: object): node is UnitNode => "kind" in node && node.kind === "unit";
