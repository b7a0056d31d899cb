import type { LinearForm } from "../mechanics/assembly.ts";
import { coordinateForm } from "../mechanics/forms.ts";
import type { Frame } from "./code.ts";
import type { Findings } from "./findings.ts";
import type { Plan, PlannedBind } from "./plan.ts";

export interface BoundForms {
  /** Number of free coordinates. */
  readonly free: number;
  /** One a coordinate, over the free coordinates and the supports. */
  readonly forms: readonly LinearForm[];
}

/** Sums over coordinates and supports, by index. */
interface Row {
  readonly coordinates: Map<number, number>;
  readonly supports: Map<number, number>;
}

/** Solved coordinates, and which of them read a free one. */
interface Solved {
  readonly rows: Map<number, Row>;
  readonly readers: Map<number, Set<number>>;
}

/** Other binds named beside an inconsistent one. */
const MOST_RELATED = 8;

/** Relative size below which a coefficient is rounding: binds hold a few factors, each good to 1e-16. */
const ZERO = 1e-12;

/**
 * Solves the binds for as many coordinates as there are binds, each for the one on its left side where that can
 * be. A bind that says nothing new, or that leaves no motion, is an inconsistent-bind.
 */
export function bindForms(plan: Plan, frame: Frame, findings: Findings): BoundForms {
  const solved: Solved = { rows: new Map(), readers: new Map() };
  const by = new Map<number, PlannedBind>();
  for (const bind of plan.binds) takeBind(bind, frame, solved, by, findings, plan);
  const freeIndex = new Map<number, number>();
  plan.coordinates.forEach((_, i) => {
    if (!solved.rows.has(i)) freeIndex.set(i, freeIndex.size);
  });
  const forms = plan.coordinates.map((_, i) => {
    const row = solved.rows.get(i);
    return row === undefined ? coordinateForm(freeIndex.get(i) ?? 0) : formOf(row, freeIndex);
  });
  return { free: freeIndex.size, forms };
}

function takeBind(
  bind: PlannedBind,
  frame: Frame,
  solved: Solved,
  by: Map<number, PlannedBind>,
  findings: Findings,
  plan: Plan,
): void {
  const row: Row = { coordinates: new Map(), supports: new Map() };
  let scale = 1;
  add(row, substituted(bind.coordinate, solved), 1);
  for (const { place, compute } of bind.terms) {
    const factor = compute(frame);
    scale = Math.max(scale, Math.abs(factor));
    if (place.is === "coordinate") add(row, substituted(place.index, solved), -factor);
    else if (place.is === "support")
      row.supports.set(place.index, (row.supports.get(place.index) ?? 0) - factor);
  }
  for (const part of [row.coordinates, row.supports]) {
    for (const [index, value] of part) if (!(Math.abs(value) > ZERO * scale)) part.delete(index);
  }
  const target = row.coordinates.has(bind.coordinate) ? bind.coordinate : largest(row.coordinates);
  const others = row.coordinates.size - 1 + row.supports.size;
  if (target === undefined || (others === 0 && !holdsStill(bind, frame))) {
    sayInconsistent(bind, target, by, plan, findings);
    return;
  }
  solve(target, row, solved);
  by.set(target, bind);
}

/** `bind tip = ground`, and multiples that are zero: meant to stand still. */
const holdsStill = (bind: PlannedBind, frame: Frame): boolean =>
  bind.terms.every(({ place, compute }) => place.is === "ground" || compute(frame) === 0);

const unitRow = (index: number): Row => ({ coordinates: new Map([[index, 1]]), supports: new Map() });

const substituted = (index: number, { rows }: Solved): Row => rows.get(index) ?? unitRow(index);

function add(into: Row, row: Row, factor: number): void {
  for (const [index, value] of row.coordinates) {
    into.coordinates.set(index, (into.coordinates.get(index) ?? 0) + factor * value);
  }
  for (const [index, value] of row.supports) {
    into.supports.set(index, (into.supports.get(index) ?? 0) + factor * value);
  }
}

function largest(entries: ReadonlyMap<number, number>): number | undefined {
  let best: number | undefined;
  for (const [index, value] of entries) {
    if (best === undefined || Math.abs(value) > Math.abs(entries.get(best) ?? 0)) best = index;
  }
  return best;
}

/** `row = 0` solved for one coordinate, and put into what was solved before. */
function solve(target: number, row: Row, solved: Solved): void {
  const pivot = row.coordinates.get(target) ?? 1;
  const expressed: Row = { coordinates: new Map(), supports: new Map() };
  for (const [index, value] of row.coordinates) {
    if (index !== target) expressed.coordinates.set(index, -value / pivot);
  }
  for (const [index, value] of row.supports) expressed.supports.set(index, -value / pivot);
  for (const reader of solved.readers.get(target) ?? []) {
    const known = solved.rows.get(reader);
    const factor = known?.coordinates.get(target);
    if (known === undefined || factor === undefined) continue;
    known.coordinates.delete(target);
    add(known, expressed, factor);
    note(reader, expressed, solved);
  }
  solved.readers.delete(target);
  solved.rows.set(target, expressed);
  note(target, expressed, solved);
}

function note(reader: number, row: Row, { readers }: Solved): void {
  for (const index of row.coordinates.keys()) {
    const known = readers.get(index) ?? new Set<number>();
    known.add(reader);
    readers.set(index, known);
  }
}

function formOf(row: Row, freeIndex: ReadonlyMap<number, number>): LinearForm {
  const free = [...row.coordinates]
    .map(([index, value]) => [freeIndex.get(index) ?? 0, value] as const)
    .sort((a, b) => a[0] - b[0]);
  const given = [...row.supports].sort((a, b) => a[0] - b[0]);
  return {
    coordinates: free.map(([index]) => index),
    factors: free.map(([, value]) => value),
    supports: given.map(([index]) => index),
    supportFactors: given.map(([, value]) => value),
  };
}

function sayInconsistent(
  bind: PlannedBind,
  held: number | undefined,
  by: ReadonlyMap<number, PlannedBind>,
  plan: Plan,
  findings: Findings,
): void {
  const name = plan.coordinates[bind.coordinate].name;
  const others = [...by.values()].slice(0, MOST_RELATED);
  const message =
    held === undefined
      ? `this bind of \`${name}\` says what the others say already, or contradicts them: it fixes no further coordinate`
      : `this bind of \`${name}\` and the others together hold \`${plan.coordinates[held].name}\` at zero`;
  findings.say("inconsistent-bind", bind.span, message, {
    hint:
      others.length > 0
        ? "each bind takes one coordinate away from those that move; take one bind out"
        : undefined,
    related: others.map((each) => ({ span: each.span, message: "with this bind" })),
  });
}
