/**
 * Exact elimination of a coordinate without a force of its own from a sum of squares.
 *
 * With z at rest under sum v (a z + g)^2, z = -sum v a g / S, S = sum v a^2, and what is left is the sum over
 * pairs of (v_i v_j / S) (a_j g_i - a_i g_j)^2: springs in series, the star-mesh rule of networks. No difference
 * of large numbers is taken, so a soft spring behind one a billion times stiffer keeps all its digits.
 */
import type { LinearForm } from "./assembly.ts";
import { combineForms } from "./forms.ts";

/** `value * form form^T`. */
export interface SquareTerm {
  readonly form: LinearForm;
  readonly value: number;
}

export interface Elimination {
  /** What replaces the terms that held the coordinate; the others follow unchanged. */
  readonly terms: SquareTerm[];
  /** The coordinate at rest, as a form over the others (and supports). */
  readonly form: LinearForm;
  /** S: the coordinate moves by force / S when all others are held. */
  readonly sum: number;
}

/** Share of the sum of magnitudes below which terms of both signs are taken to cancel. */
const CANCELLED = 1e-13;

/** Eliminates coordinate `z`; undefined where its terms cancel, so that nothing says where it is. */
export function eliminate(terms: readonly SquareTerm[], z: number): Elimination | undefined {
  const touching: { term: SquareTerm; factor: number }[] = [];
  const kept: SquareTerm[] = [];
  for (const term of terms) {
    const factor = factorOf(term.form, z);
    if (factor === 0) kept.push(term);
    else touching.push({ term, factor });
  }
  let sum = 0;
  let size = 0;
  for (const { term, factor } of touching) {
    sum += term.value * factor * factor;
    size += Math.abs(term.value) * factor * factor;
  }
  if (Math.abs(sum) <= CANCELLED * size) return undefined;
  const form = withoutCoordinate(
    combineForms(
      touching.map(({ term }) => term.form),
      touching.map(({ term, factor }) => (-term.value * factor) / sum),
    ),
    z,
  );
  return { terms: [...mesh(touching, sum), ...kept], form, sum };
}

/** Factor with which a coordinate stands in a form. */
export function factorOf(form: LinearForm, coordinate: number): number {
  const at = form.coordinates.indexOf(coordinate);
  return at < 0 ? 0 : form.factors[at];
}

/** The form with one coordinate left out. */
export function withoutCoordinate(form: LinearForm, coordinate: number): LinearForm {
  const at = form.coordinates.indexOf(coordinate);
  if (at < 0) return form;
  return {
    ...form,
    coordinates: form.coordinates.filter((_, i) => i !== at),
    factors: form.factors.filter((_, i) => i !== at),
  };
}

/** One term a pair, those along the same form added up. */
function mesh(touching: readonly { term: SquareTerm; factor: number }[], sum: number): SquareTerm[] {
  const merged = new Map<string, { form: LinearForm; value: number }>();
  for (let i = 0; i < touching.length; i++) {
    for (let j = i + 1; j < touching.length; j++) {
      const a = touching[i];
      const b = touching[j];
      const pair = combineForms([a.term.form, b.term.form], [b.factor, -a.factor]);
      const lead = pair.factors[0];
      if (lead === undefined) continue;
      const form = lead === 1 ? pair : combineForms([pair], [1 / lead]);
      const value = ((a.term.value * b.term.value) / sum) * lead * lead;
      const key = keyOf(form);
      const known = merged.get(key);
      if (known === undefined) merged.set(key, { form, value });
      else known.value += value;
    }
  }
  return [...merged.values()];
}

const keyOf = (form: LinearForm): string =>
  `${form.coordinates.join()}|${form.factors.join()}|${form.supports.join()}|${form.supportFactors.join()}`;
