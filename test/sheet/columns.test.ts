/** Long curves gathered into columns of pixels: nothing that stands out is lost. */
import { describe, expect, it } from "vitest";
import { columnsOf, isCalm, wayThrough } from "../../client/sheet/plot-columns.ts";
import { firstFrom, Pyramid } from "../../client/sheet/pyramid.ts";
import { Dice } from "../fuzz/random.ts";

/** Rows with spikes of one sample and gaps of many, over an axis that is even or logarithmic. */
function row(seed: number, isLog: boolean) {
  const dice = new Dice(seed);
  const length = 4000 + dice.below(4000);
  const x = Float64Array.from({ length }, (_, i) => (isLog ? 10 ** ((3 * i) / length) : i / 100));
  const y = Float64Array.from({ length }, () => dice.below(1000) / 1000);
  for (let i = 0; i < 5; i++) y[dice.below(length)] = 50 - dice.below(100);
  const gap = dice.below(length - 300);
  y.fill(Number.NaN, gap, gap + 200 + dice.below(100));
  return { x, y, length };
}

const same = (value: number): number => value;

describe.each([false, true])("columns of a curve, logarithmic: %s", (isLog) => {
  it("hold the highest and the lowest of all samples, each in its place", () => {
    for (let seed = 1; seed <= 50; seed++) {
      const { x, y, length } = row(seed, isLog);
      const [from, to, columns] = [x[0], x[length - 1], 300];
      const drawn = { curve: { name: "", style: 0, x, y }, heights: new Pyramid(y) };
      const found = columnsOf(drawn, { first: 0, last: length, columns, from, to, isLog }, same);
      const edgeOf = (share: number) =>
        isLog ? from * Math.exp(Math.log(to / from) * share) : from + share * (to - from);
      for (const { at, highest, lowest, enters, leaves } of found) {
        const start = at === 0 ? 0 : firstFrom(x, edgeOf(at / columns));
        const end = at === columns - 1 ? length : firstFrom(x, edgeOf((at + 1) / columns));
        const inside = [...y.subarray(start, end)].filter((value) => !Number.isNaN(value));
        // `highest` is that of the value: pixels that grow downwards are the caller's.
        expect(highest, `seed ${seed}, column ${at}`).toBe(Math.max(...inside));
        expect(lowest).toBe(Math.min(...inside));
        const way = wayThrough({ at, highest, lowest, enters, leaves });
        expect(way).toContain(highest);
        expect(way).toContain(lowest);
      }
      const all = [...y].filter((value) => !Number.isNaN(value));
      expect(Math.max(...found.map(({ highest }) => highest))).toBe(Math.max(...all));
      expect(Math.min(...found.map(({ lowest }) => lowest))).toBe(Math.min(...all));
      // The gap is as long as several columns: they are left out.
      expect(found.length).toBeLessThan(columns);
    }
  });
});

describe("a curve", () => {
  const column = (highest: number, lowest: number) => ({
    at: 0,
    enters: lowest,
    leaves: highest,
    highest,
    lowest,
  });
  it("is calm while its columns are short, in pixels that grow downwards", () => {
    expect(isCalm([column(10, 12), column(12, 15)])).toBe(true);
    expect(isCalm([column(10, 90), column(12, 95)])).toBe(false);
  });

  it("is met at its ends in the order in which it runs", () => {
    expect(wayThrough({ at: 0, enters: 9, leaves: 2, highest: 1, lowest: 10 })).toEqual([9, 10, 1, 2]);
    expect(wayThrough({ at: 0, enters: 2, leaves: 9, highest: 1, lowest: 10 })).toEqual([2, 1, 10, 9]);
    expect(wayThrough({ at: 0, enters: Number.NaN, leaves: 9, highest: 1, lowest: 10 })).toEqual([1, 10, 9]);
  });
});
