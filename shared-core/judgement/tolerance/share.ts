import type { Draw, Expectation } from "../../model/model.ts";
import { normal, uniform } from "../../numerics/random.ts";
import type { Steps } from "../steps.ts";
import type { Explorer } from "./explorer.ts";

export interface ShareFound {
  /** Share of the draws in which it holds. */
  readonly share: number;
  readonly samples: number;
  /** Value that the wanted share of the draws does not exceed on the failing side. */
  readonly worst: number;
}

/** Fixed, so that a verdict never changes by itself. */
const SEED = 1;
/** Samples: enough for twenty failures at the wanted share, between these bounds; the fewest of histories. */
const FEWEST = 400;
const MOST = 4000;

/** Draws at random and counts. */
export function* shareOfDraws(
  explorer: Explorer,
  expectation: Expectation,
  wanted: number,
): Steps<ShareFound | { readonly reason: string } | "cancelled"> {
  const enough = Math.ceil(20 / Math.max(1 - wanted, 1e-9));
  const samples = explorer.isDear(expectation) ? FEWEST : Math.min(MOST, Math.max(FEWEST, enough));
  const found: { excess: number; value: number }[] = [];
  for (let sample = 0; sample < samples; sample++) {
    if (yield) return "cancelled";
    const here = explorer.excess(
      expectation,
      explorer.draws.map((draw) => positionOf(draw, sample)),
    );
    if ("reason" in here) return here;
    found.push(here);
  }
  const holding = found.filter(({ excess }) => excess <= 0).length;
  found.sort((a, b) => b.excess - a.excess);
  const beyond = Math.min(samples - 1, Math.floor((1 - wanted) * samples * (1 + 1e-12)));
  return { share: holding / samples, samples, worst: found[beyond].value };
}

/**
 * Position of a draw in one sample. A tolerance written on an element with a count is drawn for each; their sum
 * stands at the mean of the positions. A normal or lognormal band is three standard deviations.
 */
function positionOf({ id, copies, distribution }: Draw, sample: number): number {
  let sum = 0;
  for (let copy = 0; copy < copies; copy++) {
    const repetition = sample * copies + copy;
    sum +=
      distribution === "uniform" ? 2 * uniform(SEED, id, repetition) - 1 : normal(SEED, id, repetition) / 3;
  }
  return sum / copies;
}
