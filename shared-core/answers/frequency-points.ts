/** Values of some quantities at the points of an axis, many points at a time where the model allows it. */
import { takeLane } from "./frequency-block.ts";
import type { Pole } from "./frequency-poles.ts";
import { type PlainWriter, plainMotions, type SteadyQuantity, steadyValue } from "./frequency-quantity.ts";
import { poleAwareReader, type Reader, TOO_NEAR } from "./frequency-response.ts";
import type { SteadySolution } from "./frequency-solution.ts";

/** A column a quantity, a place a point. */
export interface Values {
  /** Hz, ascending. */
  readonly axis: Float64Array;
  readonly re: readonly Float64Array[];
  readonly im: readonly Float64Array[];
}

/** Columns of zeros, side by side in one piece of memory. */
export function columns(count: number, length: number): Float64Array[] {
  const all = new Float64Array(count * length);
  return Array.from({ length: count }, (_, q) => all.subarray(q * length, (q + 1) * length));
}

export class SteadyPoints {
  readonly #solution: SteadySolution;
  readonly #poles: readonly Pole[];
  readonly #quantities: readonly SteadyQuantity[];
  /** Hz, ascending, of poles that nothing damps. */
  readonly #undamped: Float64Array;
  readonly #plain: PlainWriter | undefined;
  readonly #missing = new Map<number, string>();
  readonly #out = new Float64Array(2);
  #careful: Reader[] | undefined;

  constructor(solution: SteadySolution, poles: readonly Pole[], quantities: readonly SteadyQuantity[]) {
    this.#solution = solution;
    this.#poles = poles;
    this.#quantities = quantities;
    this.#undamped = Float64Array.from(
      poles.filter((p) => p.halfWidthHz === 0),
      (p) => p.atHz,
    ).sort();
    this.#plain = solution.groups.length === 1 ? plainMotions(quantities) : undefined;
  }

  at(axis: Float64Array): Values {
    const count = this.#quantities.length;
    const values = { axis, re: columns(count, axis.length), im: columns(count, axis.length) };
    const blocks = this.#solution.blocks();
    if (blocks === undefined) {
      for (let i = 0; i < axis.length; i++) this.#point(values, i);
      return values;
    }
    for (let from = 0; from < axis.length; ) {
      const block = blocks(axis, from);
      const count = Math.min(block.lanes, axis.length - from);
      this.#plain?.block(block, count, from, values.re, values.im);
      for (let lane = 0; lane < count; lane++) {
        if (block.good[lane] === 0 || this.#isAtPole(axis[from + lane])) this.#point(values, from + lane);
        else if (this.#plain === undefined) {
          const states = this.#solution.still(axis[from + lane]);
          if (!states.ok) continue;
          takeLane(block, lane, states.value[0]);
          this.#write(values, from + lane, states.value);
        }
      }
      from += count;
    }
    return values;
  }

  /** Why some values of a quantity, of those asked for until now, are missing; undefined where none is. */
  missing(quantity: number): string | undefined {
    return this.#missing.get(quantity);
  }

  /** One point by itself. */
  #point(values: Values, i: number): void {
    const hz = values.axis[i];
    const states = this.#isAtPole(hz) ? undefined : this.#solution.quick(hz);
    if (!states?.ok) this.#readCarefully(values, i);
    else if (this.#plain !== undefined) this.#plain.point(states.value[0], i, values.re, values.im);
    else this.#write(values, i, states.value);
  }

  #write(values: Values, i: number, states: Parameters<typeof steadyValue>[1]): void {
    this.#quantities.forEach((quantity, q) => {
      steadyValue(quantity, states, this.#out);
      values.re[q][i] = this.#out[0];
      values.im[q][i] = this.#out[1];
    });
  }

  /** At an undamped pole, or where nothing holds the motion: a value where the quantity has one, else NaN. */
  #readCarefully({ axis, re, im }: Values, i: number): void {
    this.#careful ??= this.#quantities.map((q) => poleAwareReader(this.#solution.quick, this.#poles, q));
    this.#careful.forEach((read, q) => {
      const got = read(axis[i]);
      re[q][i] = got.ok ? got.value[0] : Number.NaN;
      im[q][i] = got.ok ? got.value[1] : Number.NaN;
      if (!got.ok && !this.#missing.has(q)) this.#missing.set(q, got.reason);
    });
  }

  #isAtPole(hz: number): boolean {
    const poles = this.#undamped;
    if (poles.length === 0) return false;
    let lo = 0;
    let hi = poles.length;
    while (lo < hi) {
      const middle = (lo + hi) >> 1;
      if (poles[middle] < hz) lo = middle + 1;
      else hi = middle;
    }
    const near = (p: number) => Math.abs(hz - poles[p]) <= TOO_NEAR * poles[p];
    return (lo < poles.length && near(lo)) || (lo > 0 && near(lo - 1));
  }
}
