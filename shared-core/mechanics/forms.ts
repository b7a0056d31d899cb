import type { LinearForm } from "./assembly.ts";

const NONE: readonly number[] = [];
const ONE: readonly number[] = [1];

/** The form that is always zero: an end on ground. */
export const groundForm: LinearForm = {
  coordinates: NONE,
  factors: NONE,
  supports: NONE,
  supportFactors: NONE,
};

/** The free coordinate itself. */
export const coordinateForm = (index: number): LinearForm => ({
  coordinates: [index],
  factors: ONE,
  supports: NONE,
  supportFactors: NONE,
});

/** The support itself. */
export const supportForm = (index: number): LinearForm => ({
  coordinates: NONE,
  factors: NONE,
  supports: [index],
  supportFactors: ONE,
});

/** `sum of factors[i] * forms[i]`, indices ascending and without zeros, so that equal forms have equal entries. */
export function combineForms(forms: readonly LinearForm[], factors: readonly number[]): LinearForm {
  const free = new Map<number, number>();
  const given = new Map<number, number>();
  forms.forEach((form, k) => {
    addEntries(free, form.coordinates, form.factors, factors[k]);
    addEntries(given, form.supports, form.supportFactors, factors[k]);
  });
  const [coordinates, coordinateFactors] = sortedEntries(free);
  const [supports, supportFactors] = sortedEntries(given);
  return { coordinates, factors: coordinateFactors, supports, supportFactors };
}

/** `a - b`: the travel between two ends. Most ends are one free coordinate or ground, which need no sorting. */
export function subtractForms(a: LinearForm, b: LinearForm): LinearForm {
  if (!isSimple(a) || !isSimple(b)) return combineForms([a, b], [1, -1]);
  const [i, j] = [a.coordinates[0], b.coordinates[0]];
  if (j === undefined) return a;
  if (i === undefined) return pairForm([j], [-b.factors[0]]);
  if (i === j) {
    const factor = a.factors[0] - b.factors[0];
    return factor === 0 ? groundForm : pairForm([i], [factor]);
  }
  return i < j
    ? pairForm([i, j], [a.factors[0], -b.factors[0]])
    : pairForm([j, i], [-b.factors[0], a.factors[0]]);
}

const isSimple = ({ coordinates, factors, supports }: LinearForm): boolean =>
  supports.length === 0 && (coordinates.length === 0 || (coordinates.length === 1 && factors[0] !== 0));

const pairForm = (coordinates: readonly number[], factors: readonly number[]): LinearForm => ({
  coordinates,
  factors,
  supports: NONE,
  supportFactors: NONE,
});

/** Value of the form's free part at `q` (one entry a free coordinate); supports count as still. */
export function formValue(form: LinearForm, q: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < form.coordinates.length; i++) sum += form.factors[i] * q[form.coordinates[i]];
  return sum;
}

/** Value of the form's support part at `motion` (one entry a support). */
export function supportValue(form: LinearForm, motion: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < form.supports.length; i++) sum += form.supportFactors[i] * motion[form.supports[i]];
  return sum;
}

/** True when the two forms hold the same entries. */
export function sameForm(a: LinearForm, b: LinearForm): boolean {
  return (
    sameList(a.coordinates, b.coordinates) &&
    sameList(a.factors, b.factors) &&
    sameList(a.supports, b.supports) &&
    sameList(a.supportFactors, b.supportFactors)
  );
}

function addEntries(
  into: Map<number, number>,
  at: readonly number[],
  values: readonly number[],
  factor: number,
): void {
  for (let i = 0; i < at.length; i++) into.set(at[i], (into.get(at[i]) ?? 0) + factor * values[i]);
}

function sortedEntries(entries: Map<number, number>): [number[], number[]] {
  const kept = [...entries].filter(([, value]) => value !== 0).sort((a, b) => a[0] - b[0]);
  return [kept.map(([at]) => at), kept.map(([, value]) => value)];
}

const sameList = (a: readonly number[], b: readonly number[]): boolean =>
  a.length === b.length && a.every((value, i) => value === b[i]);
