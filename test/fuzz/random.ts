/** A small seeded source of numbers for tests (mulberry32, public domain): the same seed gives the same run. */
export class Dice {
  #state: number;

  constructor(seed: number) {
    this.#state = seed >>> 0;
  }

  /** A whole number from 0 up to `count`, exclusive. */
  below(count: number): number {
    return Math.floor(this.#next() * count);
  }

  pick<T>(list: readonly T[]): T {
    return list[this.below(list.length)];
  }

  #next(): number {
    this.#state = (this.#state + 0x6d2b79f5) >>> 0;
    let t = this.#state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  }
}
