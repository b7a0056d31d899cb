/** Asks, quantities and drives written by hand for the tests of steady answers and histories. */
import type { HistorySolution } from "../../shared-core/answers/history.ts";
import { historySolution } from "../../shared-core/answers/history.ts";
import { modalBasis } from "../../shared-core/answers/modes-basis.ts";
import type {
  Assembly,
  DriveInfo,
  DriveShape,
  ElementMeasure,
  QuantityRef,
} from "../../shared-core/mechanics/assembly.ts";
import { systemMatrices } from "../../shared-core/mechanics/matrices.ts";
import type { HistoryAsk } from "../../shared-core/model/model.ts";
import { sparseToDense } from "../../shared-core/numerics/sparse.ts";
import { unwrap } from "../numerics/helpers.ts";

type Derivative = 0 | 1 | 2;

export function motionOf(assembly: Assembly, name: string, derivative: Derivative = 0): QuantityRef {
  const coordinate = assembly.coordinates.findIndex((c) => c.name === name);
  if (coordinate >= 0) {
    return {
      text: `${name} ${derivative}`,
      unit: "m",
      terms: [{ of: "coordinate", coordinate, derivative, factor: 1 }],
    };
  }
  const support = assembly.supports.findIndex((s) => s.name === name);
  if (support < 0) throw new Error(`nothing called ${name}`);
  return {
    text: `${name} ${derivative}`,
    unit: "m",
    terms: [{ of: "support", support, derivative, factor: 1 }],
  };
}

export function elementOf(assembly: Assembly, measure: ElementMeasure, ...names: string[]): QuantityRef {
  return {
    text: `${names.join("+")} ${measure}`,
    unit: "N",
    terms: names.map((name) => {
      const element = assembly.elements.findIndex((e) => e.name === name);
      if (element < 0) throw new Error(`no element called ${name}`);
      return { of: "element" as const, element, measure, factor: 1 };
    }),
  };
}

/** a - b. */
export function difference(a: QuantityRef, b: QuantityRef): QuantityRef {
  return {
    text: `${a.text} - ${b.text}`,
    unit: a.unit,
    terms: [...a.terms, ...b.terms.map((t) => ({ ...t, factor: -t.factor }))],
  };
}

export function withDrives(assembly: Assembly, ...drives: DriveInfo[]): Assembly {
  return { ...assembly, drives };
}

export function forceOn(
  assembly: Assembly,
  name: string,
  shape: DriveShape,
  more: Partial<DriveInfo> = {},
): DriveInfo {
  const found = assembly.coordinates.find((c) => c.name === name);
  if (found === undefined) throw new Error(`nothing called ${name}`);
  return {
    name: `f_${name}`,
    keyword: "force",
    on: { kind: "form", form: found.form },
    derivative: 0,
    shape,
    unit: "N",
    ...more,
  };
}

export function motionDrive(
  assembly: Assembly,
  name: string,
  derivative: Derivative,
  shape: DriveShape,
  more: Partial<DriveInfo> = {},
): DriveInfo {
  const support = assembly.supports.findIndex((s) => s.name === name);
  if (support < 0) throw new Error(`no support called ${name}`);
  return {
    name: `m_${name}`,
    keyword: "motion",
    on: { kind: "support", support },
    derivative,
    shape,
    unit: ["m", "m/s", "m/s^2"][derivative],
    ...more,
  };
}

export const sine = (amplitude: number, frequencyHz: number, phase = 0): DriveShape => ({
  kind: "sine",
  amplitude,
  frequencyHz,
  phase,
  order: 1,
});

export function startingAt(assembly: Assembly, places: Record<string, readonly [number, number]>): Assembly {
  return {
    ...assembly,
    coordinates: assembly.coordinates.map((c) => ({
      ...c,
      startsAt: places[c.name]?.[0] ?? 0,
      startsMoving: places[c.name]?.[1] ?? 0,
    })),
  };
}

export function historyAsk(
  lasting: number,
  of: readonly QuantityRef[],
  more: Partial<HistoryAsk> = {},
): HistoryAsk {
  return {
    kind: "history",
    name: "run",
    // The node only gives diagnostics their place.
    node: undefined as unknown as HistoryAsk["node"],
    of,
    by: [],
    lasting,
    accuracy: 1e-6,
    start: "as_written",
    ...more,
  };
}

export function solved(assembly: Assembly, ask: HistoryAsk): HistorySolution {
  return unwrap(historySolution(assembly, unwrap(modalBasis(assembly)), ask));
}

/**
 * Largest share by which M q'' + C q' + K q + support terms misses the forces at an instant, over the sizes of
 * its parts: the equations of motion themselves, without any reduction. `forces` over the free coordinates.
 */
export function equationError(
  assembly: Assembly,
  { response }: HistorySolution,
  time: number,
  forces: Float64Array,
): number {
  const m = systemMatrices(assembly);
  const n = assembly.free;
  const s = assembly.supports.length;
  const free = assembly.coordinates.filter((c) => c.form.coordinates.length === 1 && c.form.factors[0] === 1);
  const of = (names: readonly string[], derivative: Derivative) =>
    names.map((name) => unwrap(response.at(motionOf(assembly, name, derivative), time)));
  const names = Array.from({ length: n }, (_, i) => {
    const found = free.find((c) => c.form.coordinates[0] === i);
    if (found === undefined) throw new Error(`free coordinate ${i} has no name`);
    return found.name;
  });
  const supportNames = assembly.supports.map((x) => x.name);
  let worst = 0;
  const parts: [Float64Array, number[], number][] = [
    [sparseToDense(m.mass), of(names, 2), n],
    [sparseToDense(m.damping), of(names, 1), n],
    [sparseToDense(m.stiffness), of(names, 0), n],
    [sparseToDense(m.massSupport), of(supportNames, 2), s],
    [sparseToDense(m.dampingSupport), of(supportNames, 1), s],
    [sparseToDense(m.stiffnessSupport), of(supportNames, 0), s],
  ];
  for (let i = 0; i < n; i++) {
    let sum = -forces[i];
    let size = Math.abs(forces[i]);
    for (const [matrix, x, columns] of parts) {
      for (let j = 0; j < columns; j++) {
        sum += matrix[i * columns + j] * x[j];
        size += Math.abs(matrix[i * columns + j] * x[j]);
      }
    }
    if (size > 0) worst = Math.max(worst, Math.abs(sum) / size);
  }
  return worst;
}
