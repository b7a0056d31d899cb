/**
 * Places along a line, nearest to where each wants to be (least squares), keeping the order and at least `apart[i]`
 * between i and i + 1. Exact, by pooling neighbours that press on each other (isotonic regression).
 */
export function spread(wanted: readonly number[], apart: readonly number[]): number[] {
  const offsets = [0];
  for (let i = 1; i < wanted.length; i++) offsets.push(offsets[i - 1] + apart[i - 1]);
  const pools: { sum: number; count: number }[] = [];
  for (let i = 0; i < wanted.length; i++) {
    pools.push({ sum: wanted[i] - offsets[i], count: 1 });
    while (pools.length > 1 && mean(pools[pools.length - 2]) >= mean(pools[pools.length - 1])) {
      const last = pools.pop() as { sum: number; count: number };
      pools[pools.length - 1].sum += last.sum;
      pools[pools.length - 1].count += last.count;
    }
  }
  return pools.flatMap((pool) => Array<number>(pool.count).fill(mean(pool))).map((at, i) => at + offsets[i]);
}

/** The same inside an interval; where it is too narrow, the distances shrink evenly. */
export function spreadInside(
  wanted: readonly number[],
  apart: readonly number[],
  [from, to]: readonly [number, number],
): number[] {
  const total = apart.slice(0, Math.max(0, wanted.length - 1)).reduce((sum, each) => sum + each, 0);
  const room = to - from;
  if (total > room) {
    let at = from;
    return wanted.map((_, i) => {
      const here = at;
      at += total === 0 ? 0 : (apart[i] * room) / total;
      return here;
    });
  }
  const places = spread(wanted, apart);
  let least = from;
  const pushed = places.map((place, i) => {
    const here = Math.max(place, least);
    least = here + (apart[i] ?? 0);
    return here;
  });
  let most = to;
  for (let i = pushed.length - 1; i >= 0; i--) {
    pushed[i] = Math.min(pushed[i], most);
    most = pushed[i] - (i > 0 ? apart[i - 1] : 0);
  }
  return pushed;
}

const mean = ({ sum, count }: { sum: number; count: number }): number => sum / count;
