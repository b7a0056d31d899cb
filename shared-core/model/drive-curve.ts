import type { TableRow } from "../syntax/tree.ts";
import { RATE } from "../units/quantity.ts";
import { formatQuantity } from "../units/show.ts";
import { unitsOf } from "../vocabulary/measures.ts";
import type { Given } from "./details.ts";
import { type Draft, sayNotYet } from "./draft.ts";
import { planExpression } from "./number.ts";
import { textOf, type Wanted } from "./typed.ts";

/** A torque over speed: Hz, ascending, and N*m. */
export interface SpeedCurve {
  readonly speedsHz: readonly number[];
  readonly torques: readonly number[];
}

/** The rows of a torque over speed; undefined where one is wrong, which is said. */
export function speedCurve(given: Given, torque: Wanted, draft: Draft): SpeedCurve | undefined {
  if (given.table === undefined) {
    sayNotYet(draft, given.span, "a torque over speed from a file");
    return undefined;
  }
  const speedsHz: number[] = [];
  const torques: number[] = [];
  for (const row of given.table) {
    const cells = cellsOf(row, torque, draft);
    if (cells === undefined || !isAscending(row, cells[0], speedsHz, draft)) return undefined;
    speedsHz.push(cells[0]);
    torques.push(cells[1]);
  }
  return speedsHz.length > 0 ? { speedsHz, torques } : undefined;
}

function cellsOf(row: TableRow, torque: Wanted, draft: Draft): readonly [number, number] | undefined {
  if (row.cells.length !== 2) {
    const count = row.cells.length === 1 ? "1 number" : `${row.cells.length} numbers`;
    draft.findings.say("wrong-kind", row.span, `a row holds a speed and a torque, here stand ${count}`, {
      hint: "as in `1450 rpm  220 N*m`",
    });
    return undefined;
  }
  const speed: Wanted = { kinds: [RATE], says: "a rate", units: unitsOf("rate") };
  const [first, second] = [speed, torque].map((wanted, i) =>
    planExpression(row.cells[i], draft.numbers, wanted),
  );
  if (first === undefined || second === undefined) return undefined;
  const { frame } = draft.lets;
  return [first.compute(frame), second.compute(frame)];
}

function isAscending(row: TableRow, hz: number, above: readonly number[], draft: Draft): boolean {
  const last = above[above.length - 1];
  if (last === undefined || hz > last) return true;
  const text = textOf(draft.main, row.cells[0].span);
  draft.findings.say(
    "wrong-kind",
    row.cells[0].span,
    `rows go up in speed; ${text} does not come after ${formatQuantity({ ...RATE, value: last })}`,
  );
  return false;
}
