import type { Expectation } from "../../model/model.ts";
import type { Steps } from "../steps.ts";
import type { Explorer, Positions } from "./explorer.ts";
import { largestAlong } from "./line.ts";

/** Most draws whose corners are all visited: 4096 of them. */
const MOST_CORNERS = 12;
/** Trials after which a search ends with the worst it has seen: no model may keep a build server for hours. */
const MOST_TRIALS = 5000;
/** Rounds over all draws of a search; each moves every draw to the worst place on its line. */
const ROUNDS = 4;

export interface WorstFound {
  readonly positions: Positions;
  readonly excess: number;
  /** Every corner, and no line through the nominal point or the worst corner has its largest excess inside. */
  readonly proven: boolean;
}

export type Worst = WorstFound | { readonly reason: string } | "cancelled";

const LINE = [-1, -0.5, 0, 0.5, 1];
/** Along a line of histories, each of which is integrated anew. */
const DEAR_LINE = [-1, 0, 1];
/** Through a corner the ends are corners themselves; the slopes there tell whether the excess rises inwards. */
const CORNER_LINE = [-1, 1];

/**
 * The worst point of the bands for each expectation. Up to twelve draws: every corner, then every line through
 * the nominal point and through the worst corner; where one has its largest excess inside, a search goes on
 * from there. Above: the corner that the nominal lines point to, flips of it, and the same search.
 */
export function* worstCases(
  explorer: Explorer,
  expectations: readonly Expectation[],
): Steps<readonly Worst[]> {
  const corners = explorer.draws.length <= MOST_CORNERS;
  const starts = corners ? yield* worstCorners(explorer, expectations) : undefined;
  const worst: Worst[] = [];
  for (const [i, expectation] of expectations.entries()) {
    worst.push(yield* worstOf(explorer, expectation, starts?.[i]));
  }
  return worst;
}

function* worstOf(explorer: Explorer, expectation: Expectation, corner: Worst | undefined): Steps<Worst> {
  const start = corner ?? (yield* pointedCorner(explorer, expectation));
  if (start === "cancelled" || "reason" in start) return start;
  const found = yield* insideSearch(explorer, expectation, start);
  if (corner !== undefined || found === "cancelled" || "reason" in found) return found;
  return { ...found, proven: false };
}

/** All corners, each visited once for all expectations. */
function* worstCorners(explorer: Explorer, expectations: readonly Expectation[]): Steps<readonly Worst[]> {
  const worst: Worst[] = expectations.map(() => ({
    positions: [],
    excess: Number.NEGATIVE_INFINITY,
    proven: true,
  }));
  const count = explorer.draws.length;
  for (let corner = 0; corner < 2 ** count; corner++) {
    if (yield) return expectations.map(() => "cancelled");
    const positions = Array.from({ length: count }, (_, i) => ((corner >> i) & 1 ? 1 : -1));
    expectations.forEach((expectation, i) => {
      worst[i] = worse(worst[i], explorer, expectation, positions);
    });
  }
  return worst;
}

function worse(so: Worst, explorer: Explorer, expectation: Expectation, positions: Positions): Worst {
  if (so === "cancelled" || "reason" in so) return so;
  const here = explorer.excess(expectation, positions);
  if ("reason" in here) return here;
  return here.excess > so.excess ? { positions, excess: here.excess, proven: so.proven } : so;
}

/** Where each draw's own line through the nominal point ends worst, then single flips of that corner. */
function* pointedCorner(explorer: Explorer, expectation: Expectation): Steps<Worst> {
  const nominal = explorer.draws.map(() => 0);
  const positions: number[] = [];
  for (let draw = 0; draw < nominal.length; draw++) {
    if (yield) return "cancelled";
    if (explorer.count > MOST_TRIALS) {
      positions.push(1);
      continue;
    }
    const ends = [-1, 1].map((end) =>
      explorer.excess(
        expectation,
        nominal.map((other, i) => (i === draw ? end : other)),
      ),
    );
    const [low, high] = ends;
    if ("reason" in low) return low;
    if ("reason" in high) return high;
    positions.push(high.excess >= low.excess ? 1 : -1);
  }
  return yield* flipped(explorer, expectation, positions);
}

function* flipped(explorer: Explorer, expectation: Expectation, from: Positions): Steps<Worst> {
  let worst: Worst = worse(
    { positions: from, excess: Number.NEGATIVE_INFINITY, proven: false },
    explorer,
    expectation,
    from,
  );
  for (let round = 0; round < ROUNDS; round++) {
    const before: Worst = worst;
    for (let draw = 0; draw < from.length && explorer.count <= MOST_TRIALS; draw++) {
      if (yield) return "cancelled";
      if (worst === "cancelled" || "reason" in worst) return worst;
      const other: Positions = worst.positions.map((position, i) => (i === draw ? -position : position));
      worst = worse(worst, explorer, expectation, other);
    }
    if (worst === before) break;
  }
  return worst;
}

function* insideSearch(explorer: Explorer, expectation: Expectation, corner: WorstFound): Steps<Worst> {
  let worst = corner;
  const nominal = explorer.draws.map(() => 0);
  const line = explorer.isDear(expectation) ? DEAR_LINE : LINE;
  for (const [through, samples] of [
    [nominal, line],
    [corner.positions, CORNER_LINE],
  ] as const) {
    for (let draw = 0; draw < nominal.length; draw++) {
      if (yield) return "cancelled";
      if (explorer.count > MOST_TRIALS) return { ...worst, proven: false };
      const found = largestAlong(explorer, expectation, through, draw, samples);
      if ("reason" in found) return found;
      if (!found.inside) continue;
      worst = { ...worst, proven: false };
      const climbed: Worst = yield* climb(explorer, expectation, found);
      if (climbed === "cancelled" || "reason" in climbed) return climbed;
      if (climbed.excess > worst.excess) worst = climbed;
    }
  }
  return worst;
}

/** From a point on, moves each draw in turn to the worst place on its line, until nothing gets worse. */
function* climb(
  explorer: Explorer,
  expectation: Expectation,
  from: { readonly positions: Positions; readonly excess: number },
): Steps<Worst> {
  let worst: WorstFound = { positions: from.positions, excess: from.excess, proven: false };
  const line = explorer.isDear(expectation) ? DEAR_LINE : LINE;
  for (let round = 0; round < ROUNDS; round++) {
    const before = worst.excess;
    for (let draw = 0; draw < explorer.draws.length && explorer.count <= MOST_TRIALS; draw++) {
      if (yield) return "cancelled";
      const found = largestAlong(explorer, expectation, worst.positions, draw, line);
      if ("reason" in found) return found;
      if (found.excess > worst.excess) {
        worst = { positions: found.positions, excess: found.excess, proven: false };
      }
    }
    if (!(worst.excess > before + 1e-6 * Math.abs(before))) break;
  }
  return worst;
}
