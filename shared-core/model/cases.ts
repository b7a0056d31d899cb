import type { DetailNode, ValueNode } from "../syntax/tree.ts";
import { slotsRead } from "./code.ts";
import { itemWords, sayUnknownName } from "./details.ts";
import type { Draft } from "./draft.ts";
import { aKeyword, type Described, nameSpan } from "./names.ts";
import { planNumber } from "./number.ts";
import type { PlannedLet } from "./plan.ts";
import { wantedKind } from "./typed.ts";

/** The lets of a case in the order in which they can be computed: those of the model with some replaced. */
export function planCase(statement: Described, draft: Draft): readonly PlannedLet[] | undefined {
  const replaced = new Map<number, PlannedLet>();
  const places = new Map<number, DetailNode>();
  let sound = !statement.node.broken;
  for (const detail of statement.node.details) {
    const planned = detail.broken ? undefined : replacement(statement, detail, draft);
    if (planned === undefined) {
      sound = false;
    } else {
      replaced.set(planned.slot, planned);
      places.set(planned.slot, detail);
    }
  }
  if (!sound) return undefined;
  const lets = draft.lets.planned.map((each) => replaced.get(each.slot) ?? each);
  return ordered(lets, (slot) => {
    const place = places.get(slot);
    if (place === undefined) return;
    draft.findings.say(
      "circular-definition",
      place.key.span,
      `in case \`${statement.name}\` \`${place.key.text}\` is defined by itself`,
      {
        hint: "its value here uses a number that is computed from it",
      },
    );
  });
}

function replacement(statement: Described, detail: DetailNode, draft: Draft): PlannedLet | undefined {
  const { key } = detail;
  const entity = draft.main.names.get(key.text);
  if (entity === undefined || entity.keyword !== "let") {
    if (entity === undefined)
      sayUnknownName(
        key,
        draft.numbers.scope.numberNames(),
        draft.findings,
        "a case replaces numbers that `let` defines",
      );
    else {
      draft.findings.say(
        "wrong-kind",
        key.span,
        `\`${key.text}\` is ${aKeyword(entity.keyword)}; a case replaces numbers that \`let\` defines`,
        {
          hint: "give the number a name with `let`, and replace that",
          related: [{ span: nameSpan(entity.node), message: `\`${key.text}\` is defined here` }],
        },
      );
    }
    return undefined;
  }
  draft.lets.typed(entity, draft.main.contextOf(entity));
  const base = draft.lets.plannedOf(entity);
  const value = caseValue(detail, draft);
  if (base === undefined || value === undefined) return undefined;
  const wanted = wantedKind(base.kind, `\`${key.text}\` is \`${base.written}\` as written`);
  const number = planNumber(value, draft.numbers, wanted, `${statement.name}.${key.text}`);
  if (number === undefined) return undefined;
  const keepsBand = number.tolerance === undefined && base.tolerance?.relative;
  const text = draft.main.tree.text;
  return {
    ...base,
    ...number,
    tolerance: keepsBand ? base.tolerance : number.tolerance,
    within: number.within ?? base.within,
    unitNode: number.unitNode ?? base.unitNode,
    written: text.slice(value.expression.span.start, value.expression.span.end),
    file: undefined,
    reads: slotsRead(number.code),
  };
}

function caseValue(detail: DetailNode, draft: Draft): ValueNode | undefined {
  const [item] = detail.items;
  if (item?.kind === "value" && detail.items.length === 1 && detail.component === undefined) return item;
  draft.findings.say(
    "wrong-kind",
    item?.span ?? detail.key.span,
    `a case gives one number, found ${itemWords(item)}`,
  );
  return undefined;
}

/** Sorted so that each let comes behind those that it reads; `circle` is told a let that reads itself. */
export function ordered(
  lets: readonly PlannedLet[],
  circle: (slot: number) => void,
): readonly PlannedLet[] | undefined {
  const bySlot = new Map(lets.map((each) => [each.slot, each]));
  const state = new Map<number, "open" | "done">();
  const result: PlannedLet[] = [];
  let sound = true;
  const visit = (slot: number, trail: readonly number[]): void => {
    const planned = bySlot.get(slot);
    if (planned === undefined || state.get(slot) === "done") return;
    if (state.get(slot) === "open") {
      sound = false;
      for (const each of trail.slice(trail.indexOf(slot))) circle(each);
      return;
    }
    state.set(slot, "open");
    for (const read of planned.reads) visit(read, [...trail, slot]);
    state.set(slot, "done");
    result.push(planned);
  };
  for (const { slot } of lets) visit(slot, []);
  return sound ? result : undefined;
}
