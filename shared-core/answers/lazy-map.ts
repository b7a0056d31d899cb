/** What is worked out when it is first looked at. */

/** The result of `compute`, worked out once. */
export function once<T>(compute: () => T): () => T {
  let known: { value: T } | undefined;
  return () => {
    known ??= { value: compute() };
    return known.value;
  };
}

/** A map whose keys are known, in order, and whose values are worked out one by one when looked at. */
export class LazyMap<K, V> implements ReadonlyMap<K, V> {
  readonly #values: Map<K, () => V>;

  constructor(keys: readonly K[], compute: (key: K) => V) {
    this.#values = new Map(keys.map((key) => [key, once(() => compute(key))]));
  }

  get size(): number {
    return this.#values.size;
  }

  has(key: K): boolean {
    return this.#values.has(key);
  }

  get(key: K): V | undefined {
    return this.#values.get(key)?.();
  }

  keys(): MapIterator<K> {
    return this.#values.keys();
  }

  *entries(): MapIterator<[K, V]> {
    for (const [key, value] of this.#values) yield [key, value()];
  }

  *values(): MapIterator<V> {
    for (const value of this.#values.values()) yield value();
  }

  [Symbol.iterator](): MapIterator<[K, V]> {
    return this.entries();
  }

  forEach(visit: (value: V, key: K, map: ReadonlyMap<K, V>) => void): void {
    for (const [key, value] of this) visit(value, key, this);
  }
}
