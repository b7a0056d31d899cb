export interface BenchModel {
  readonly mass: readonly number[];
  readonly springs: readonly (readonly [number, number, number])[];
  readonly dampers: readonly (readonly [number, number, number])[];
  readonly drive: number;
  readonly watch: number;
}

export function generator(seed: number): () => number;
export function benchModel(kind: "chain" | "general", n: number, seed?: number): BenchModel;
export function modelText(model: BenchModel, options?: { damped?: boolean; ask?: string }): string;
