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
  const judged = (statement: StatementNode) => statement.keyword.text === "expect";
  const { statements } = model.tree;
  for (const unit of [...statements.filter(judged), ...statements].flatMap(unitsIn)) {
    const shown = meaningOf(unit);
    if (shown && !found.has(shown.si) && shown.si !== "1" && shown.si !== "Hz")
      found.set(shown.si, shown.unit);
  }
  return found;
}

function meaningOf(node: UnitNode): { readonly si: string; readonly unit: ShownUnit } | undefined {
  const meaning = unitOf(node);
  if (isFault(meaning)) return undefined;
  return { si: siUnit(meaning.kind), unit: { text: node.text, factor: meaning.factor } };
}

/** Units of all numbers below a node, in the order of the text. */
function unitsIn(node: object): UnitNode[] {
  if (isNumber(node)) return node.unit ? [node.unit] : [];
  if (isUnit(node)) return [node];
  return Object.values(node).flatMap((child) =>
    typeof child === "object" && child !== null ? unitsIn(child) : [],
  );
}

const isNumber = (node: object): node is NumberNode =>
  "kind" in node && node.kind === "number" && "value" in node;
const isUnit = (node: object): node is UnitNode => "kind" in node && node.kind === "unit";
