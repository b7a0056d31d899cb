/** Points in the dips of a sweep: where a magnitude has a local minimum at which the response turns sharply. */
import { columns, type SteadyPoints, type Values } from "./frequency-points.ts";

/** Rounds in which dips between points are closed in, and points added in all. */
const DIP_ROUNDS = 6;
const MOST_DIP_POINTS = 2000;

/** The table with points put into its dips, at most `room` of them. */
export function closeDips(points: SteadyPoints, first: Values, room: number): Values {
  const table = new GrowingTable(first);
  let left = Math.min(MOST_DIP_POINTS, room);
  // Only where a neighbour is new can a dip have become another.
  let looked: Int32Array | undefined;
  for (let round = 0; round < DIP_ROUNDS && left > 0; round++) {
    const wanted = new Set<number>();
    for (let q = 0; q < first.re.length; q++) table.dips(q, looked, wanted);
    const more = Float64Array.from(wanted).sort().slice(0, left);
    if (more.length === 0) break;
    left -= more.length;
    looked = table.add(points.at(more));
  }
  return table.values();
}

/** Parts of a table, and where along the common axis their points stand. */
class GrowingTable {
  readonly #parts: Values[];
  #axis: Float64Array;
  /** Part and place in it of each point of the axis. */
  #part: Uint8Array;
  #place: Int32Array;

  constructor(first: Values) {
    this.#parts = [first];
    this.#axis = first.axis;
    this.#part = new Uint8Array(first.axis.length);
    this.#place = new Int32Array(first.axis.length);
    for (let i = 0; i < this.#place.length; i++) this.#place[i] = i;
  }

  /** Adds the frequencies that the dips of quantity q ask for, of those at the places `looked` or at all. */
  dips(q: number, looked: Int32Array | undefined, wanted: Set<number>): void {
    if (looked === undefined) {
      allDips(this.#axis, this.#parts[0].re[q], this.#parts[0].im[q], wanted);
      return;
    }
    const parts = this.#parts.map(({ re, im }) => ({ re: re[q], im: im[q] }));
    const square = (p: number): number => {
      const { re, im } = parts[this.#part[p]];
      const place = this.#place[p];
      return re[place] * re[place] + im[place] * im[place];
    };
    for (const i of looked) {
      const here = square(i);
      if (!(here < square(i - 1) && here < square(i + 1))) continue;
      for (let k = 0; k < 3; k++) {
        const { re, im } = parts[this.#part[i - 1 + k]];
        const place = this.#place[i - 1 + k];
        three.f[k] = this.#axis[i - 1 + k];
        three.re[k] = re[place];
        three.im[k] = im[place];
      }
      addDip(three, wanted);
    }
  }

  /** Puts new points among the old; the inner places beside or at the new ones, ascending. */
  add(more: Values): Int32Array {
    const total = this.#axis.length + more.axis.length;
    const axis = new Float64Array(total);
    const part = new Uint8Array(total);
    const place = new Int32Array(total);
    const touched = new Set<number>();
    const own = this.#parts.length;
    let [i, j, count] = [0, 0, 0];
    while (i < this.#axis.length || j < more.axis.length) {
      const old = j >= more.axis.length || (i < this.#axis.length && this.#axis[i] <= more.axis[j]);
      const f = old ? this.#axis[i] : more.axis[j];
      if (count === 0 || axis[count - 1] !== f) {
        axis[count] = f;
        part[count] = old ? this.#part[i] : own;
        place[count] = old ? this.#place[i] : j;
        if (!old) for (let p = count - 1; p <= count + 1; p++) touched.add(p);
        count++;
      }
      if (old) i++;
      else j++;
    }
    this.#parts.push(more);
    this.#axis = axis.slice(0, count);
    this.#part = part.slice(0, count);
    this.#place = place.slice(0, count);
    return Int32Array.from([...touched].filter((p) => 0 < p && p + 1 < count)).sort();
  }

  values(): Values {
    if (this.#parts.length === 1) return this.#parts[0];
    // From an array of its own: that of all parts in one is what the loop can run through quickly.
    const starts = this.#parts.map((_, p) =>
      this.#parts.slice(0, p).reduce((n, { axis }) => n + axis.length, 0),
    );
    const all = new Float64Array(this.#parts.reduce((n, { axis }) => n + axis.length, 0));
    const from = this.#place.map((place, i) => starts[this.#part[i]] + place);
    const gather = (given: readonly (readonly Float64Array[])[]) => {
      const out = columns(given[0].length, from.length);
      out.forEach((column, q) => {
        given.forEach((part, p) => {
          all.set(part[q], starts[p]);
        });
        for (let i = 0; i < column.length; i++) column[i] = all[from[i]];
      });
      return out;
    };
    return {
      axis: this.#axis,
      re: gather(this.#parts.map(({ re }) => re)),
      im: gather(this.#parts.map(({ im }) => im)),
    };
  }
}

/** Three neighbouring points. */
interface Three {
  readonly f: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

const three: Three = { f: new Float64Array(3), re: new Float64Array(3), im: new Float64Array(3) };

function allDips(axis: Float64Array, re: Float64Array, im: Float64Array, wanted: Set<number>): void {
  let before = Number.POSITIVE_INFINITY;
  let here = re[0] * re[0] + im[0] * im[0];
  for (let i = 0; i + 1 < axis.length; i++) {
    const next = re[i + 1] * re[i + 1] + im[i + 1] * im[i + 1];
    if (i > 0 && here < before && here < next) {
      for (let k = 0; k < 3; k++) {
        three.f[k] = axis[i - 1 + k];
        three.re[k] = re[i - 1 + k];
        three.im[k] = im[i - 1 + k];
      }
      addDip(three, wanted);
    }
    before = here;
    here = next;
  }
}

/** Where the straight lines of the complex response beside a local minimum, the middle one, pass nearest to zero. */
function addDip({ f, re, im }: Three, wanted: Set<number>): void {
  const here = re[1] * re[1] + im[1] * im[1];
  for (let other = 0; other <= 2; other += 2) {
    const dr = re[other] - re[1];
    const di = im[other] - im[1];
    const length = dr * dr + di * di;
    const share = length > 0 ? -(re[1] * dr + im[1] * di) / length : 0;
    // A dip that the points at hand already show to a tenth needs no more of them.
    if (!(share > 0.02 && share < 0.98)) continue;
    const across = re[1] * di - im[1] * dr;
    if (across * across < 0.8 * here * length) wanted.add(f[1] + share * (f[other] - f[1]));
  }
}
