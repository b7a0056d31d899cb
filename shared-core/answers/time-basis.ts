/**
 * States in which a motion falls apart as far as it can: factors of the undamped modes, their rates, and the
 * distances of relaxing places from where springs alone would hold them.
 *
 *   w = (eta, eta', d):  eta'' = -lambda eta - (C_ee - C_ed C_dd^-1 C_de) eta' + C_ed C_dd^-1 K_dd d
 *                        d'    = -C_dd^-1 (C_de eta' + K_dd d)
 *
 * Stiffness stands on the diagonal only, as the roots lambda themselves, so slow modes keep all their digits
 * beside fast ones, free motions are free to the last bit, and proportional damping leaves single oscillators.
 */
import type { FlatForms } from "../mechanics/flat-forms.ts";
import { flatForms, formValues } from "../mechanics/flat-forms.ts";
import type { Reduction } from "../mechanics/massless.ts";
import type { StateInput, StateSpace } from "../mechanics/state-space.ts";
import { factorLu, solveLu } from "../numerics/lu.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { multiply } from "../numerics/products.ts";
import { sparseTimesVector } from "../numerics/sparse.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { supportPlaces } from "./time-damping.ts";
import type { RawStateForm } from "./time-state.ts";

export interface StateBasis {
  /** The equations for w. */
  readonly raw: RawStateForm;
  /** y = T w for the states y of state-space.ts, N x N. */
  readonly columns: Float64Array;
  /** w = T^-1 y, N x N. */
  readonly inverse: Float64Array;
  /** Sets of states that do not feel each other; together all of them. */
  readonly components: readonly (readonly number[])[];
}

/** Coupling below this share of both own dampings is rounding of their sums, and is left out. */
const UNCOUPLED = 1e-13;
/** What rounding leaves of a sum that cancels, against the size of its terms. */
const ROUNDING = 8 * Number.EPSILON;
/**
 * Vectors are orthogonal to rounding of the *largest* root; coupling that small is left out as well, as long as it
 * is below this share of both own dampings, where it changes no answer by more.
 */
const NEGLIGIBLE = 1e-9;

/** `rates` is 2 zeta omega that modal damping and loss factors add to each mode, 1/s. */
export function modalStates(
  basis: ModalBasis,
  space: StateSpace,
  inputs: readonly StateInput[],
  rates: Float64Array,
): Outcome<StateBasis> {
  const { reduction, size } = space;
  const { inertial: m, relaxing: d } = reduction;
  if (basis.undamped.count !== m) return fail("the modes do not cover all inertias");
  const held = heldPlaces(space);
  if (!held.ok) return fail(held.reason);
  const columns = transformation(basis, held.value, m, d);
  const inverse = inverseTransformation(basis, held.value, m, d);
  const damping = modalDamping(basis, space, held.value, rates);
  const relaxed = relaxedParts(space, damping);
  if (!relaxed.ok) return fail(relaxed.reason);
  const a = stateMatrix(basis, damping, relaxed.value, m, d);
  const count = space.inputs;
  const [b0, b1, b2] = [space.b0, space.b1, space.b2].map((b) => multiply(inverse, b, size, size, count));
  addSupportRates(basis, inputs, rates, b1);
  return succeed({
    raw: { size, a, inputs: count, b0, b1, b2 },
    columns,
    inverse,
    components: componentsOf(damping, m, d),
  });
}

/**
 * Where the relaxing places stand for a unit of each inertial coordinate, G, d x m: under springs alone, and where
 * there are none where the dampers would draw them. A free motion then strains neither.
 */
function heldPlaces({ reduction }: StateSpace): Outcome<Float64Array> {
  const { inertial: m, relaxing: d, stiffness, damping } = reduction;
  const held = new Float64Array(d * m);
  const sprung = new Set<number>();
  for (const { form } of stiffness) for (const i of form.coordinates) if (i >= m) sprung.add(i - m);
  const places = Array.from({ length: d }, (_, k) => k);
  const bySprings = placesUnder(
    stiffness,
    m,
    places.filter((k) => sprung.has(k)),
    held,
  );
  if (bySprings !== undefined) return fail(bySprings);
  const byDampers = placesUnder(
    damping,
    m,
    places.filter((k) => !sprung.has(k)),
    held,
  );
  return byDampers === undefined ? succeed(held) : fail(byDampers);
}

/** Solves for the rows of some places, those of the others as they stand; a reason where terms cancel. */
function placesUnder(
  terms: Reduction["stiffness"],
  m: number,
  places: readonly number[],
  held: Float64Array,
): string | undefined {
  const count = places.length;
  if (count === 0) return undefined;
  const position = new Map(places.map((k, p) => [k + m, p]));
  const own = new Float64Array(count * count);
  const pull = new Float64Array(count * m);
  for (const { form, value } of terms) {
    form.coordinates.forEach((i, p) => {
      const row = position.get(i);
      if (row === undefined) return;
      form.coordinates.forEach((j, q) => {
        const entry = value * form.factors[p] * form.factors[q];
        const column = position.get(j);
        if (column !== undefined) own[row * count + column] += entry;
        else if (j < m) pull[row * m + j] -= entry;
        else for (let c = 0; c < m; c++) pull[row * m + c] -= entry * held[(j - m) * m + c];
      });
    });
  }
  const lu = factorLu(own, count);
  if (!lu.ok) return "springs or dampers of both signs cancel at a place without inertia";
  const solved = solveLu(lu.value, pull, m);
  places.forEach((k, p) => {
    held.set(solved.subarray(p * m, (p + 1) * m), k * m);
  });
  return undefined;
}

function transformation(basis: ModalBasis, held: Float64Array, m: number, d: number): Float64Array {
  const size = 2 * m + d;
  const { vectors } = basis.undamped;
  const out = new Float64Array(size * size);
  for (let r = 0; r < m; r++) {
    for (let i = 0; i < m; i++) {
      out[i * size + r] = vectors[r * m + i];
      out[(m + i) * size + m + r] = vectors[r * m + i];
    }
    for (let k = 0; k < d; k++) {
      let sum = 0;
      for (let i = 0; i < m; i++) sum += held[k * m + i] * vectors[r * m + i];
      out[(2 * m + k) * size + r] = sum;
    }
  }
  for (let k = 0; k < d; k++) out[(2 * m + k) * size + 2 * m + k] = 1;
  return out;
}

function inverseTransformation(basis: ModalBasis, held: Float64Array, m: number, d: number): Float64Array {
  const size = 2 * m + d;
  const { vectors, mass } = basis.undamped;
  const out = new Float64Array(size * size);
  for (let r = 0; r < m; r++) {
    const momentum = sparseTimesVector(mass, vectors.subarray(r * m, (r + 1) * m));
    for (let i = 0; i < m; i++) {
      out[r * size + i] = momentum[i];
      out[(m + r) * size + m + i] = momentum[i];
    }
  }
  for (let k = 0; k < d; k++) {
    out[(2 * m + k) * size + 2 * m + k] = 1;
    for (let i = 0; i < m; i++) out[(2 * m + k) * size + i] = -held[k * m + i];
  }
  return out;
}

/** C over modes and distances, (m + d)^2, with what is only rounding left out. */
function modalDamping(
  basis: ModalBasis,
  { reduction }: StateSpace,
  held: Float64Array,
  rates: Float64Array,
): Float64Array {
  const { inertial: m, relaxing: d } = reduction;
  const size = m + d;
  const forms = flatForms(reduction.damping);
  const strains = new Float64Array(size * forms.count);
  const { vectors } = basis.undamped;
  const row = new Float64Array(size);
  for (let r = 0; r < size; r++) {
    row.fill(0);
    if (r < m) {
      row.set(vectors.subarray(r * m, (r + 1) * m));
      for (let k = 0; k < d; k++) for (let i = 0; i < m; i++) row[m + k] += held[k * m + i] * row[i];
    } else row[r] = 1;
    formValues(forms, row, 0, strains.subarray(r * forms.count, (r + 1) * forms.count));
    cleared(forms, row, strains, r * forms.count);
  }
  const weighted = new Float64Array(forms.count * size);
  for (let e = 0; e < forms.count; e++) {
    for (let r = 0; r < size; r++) weighted[e * size + r] = forms.value[e] * strains[r * forms.count + e];
  }
  const damping = multiply(strains, weighted, size, forms.count, size);
  const sizes = new Float64Array(size);
  for (let r = 0; r < size; r++) {
    for (let e = 0; e < forms.count; e++) {
      sizes[r] += Math.abs(weighted[e * size + r] * strains[r * forms.count + e]);
    }
  }
  clearRounding(damping, sizes);
  for (let r = 0; r < m; r++) damping[r * size + r] += basis.assembly.massDamping + rates[r];
  return damping;
}

/** Strains that are rounding of their own terms become exactly zero: a free motion strains nothing. */
function cleared(forms: FlatForms, row: Float64Array, strains: Float64Array, at: number): void {
  const { starts, factor, coordinate } = forms;
  for (let e = 0; e < forms.count; e++) {
    let size = 0;
    for (let p = starts[e]; p < starts[e + 1]; p++) size += Math.abs(factor[p] * row[coordinate[p]]);
    if (Math.abs(strains[at + e]) <= ROUNDING * size) strains[at + e] = 0;
  }
}

/** `sizes` holds the sum of magnitudes of each diagonal entry. */
function clearRounding(damping: Float64Array, sizes: Float64Array): void {
  const size = sizes.length;
  const largest = sizes.reduce((most, v) => Math.max(most, v), 0);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < i; j++) {
      const mean = 0.5 * (damping[i * size + j] + damping[j * size + i]);
      const own = Math.sqrt(sizes[i] * sizes[j]);
      const floor = Math.max(UNCOUPLED * own, Math.min(NEGLIGIBLE * own, ROUNDING * largest));
      const kept = Math.abs(mean) > floor ? mean : 0;
      damping[i * size + j] = kept;
      damping[j * size + i] = kept;
    }
  }
}

interface RelaxedParts {
  /** C_dd^-1 C_de, d x m. */
  readonly following: Float64Array;
  /** C_dd^-1 K_dd, d x d. */
  readonly relaxing: Float64Array;
}

function relaxedParts({ reduction }: StateSpace, damping: Float64Array): Outcome<RelaxedParts> {
  const { inertial: m, relaxing: d, stiffness } = reduction;
  const size = m + d;
  const own = new Float64Array(d * d);
  const right = new Float64Array(d * size);
  for (let k = 0; k < d; k++) {
    for (let j = 0; j < d; j++) own[k * d + j] = damping[(m + k) * size + m + j];
    for (let j = 0; j < m; j++) right[k * size + j] = damping[(m + k) * size + j];
  }
  for (const { form, value } of stiffness) {
    form.coordinates.forEach((i, p) => {
      form.coordinates.forEach((j, q) => {
        if (i >= m && j >= m) right[(i - m) * size + j] += value * form.factors[p] * form.factors[q];
      });
    });
  }
  if (d === 0) return succeed({ following: right, relaxing: own });
  const lu = factorLu(own, d);
  if (!lu.ok) return fail("dampers cancel on a place without inertia");
  const solved = solveLu(lu.value, right, size);
  const following = new Float64Array(d * m);
  const relaxing = new Float64Array(d * d);
  for (let k = 0; k < d; k++) {
    following.set(solved.subarray(k * size, k * size + m), k * m);
    relaxing.set(solved.subarray(k * size + m, (k + 1) * size), k * d);
  }
  return succeed({ following, relaxing });
}

function stateMatrix(
  basis: ModalBasis,
  damping: Float64Array,
  { following, relaxing }: RelaxedParts,
  m: number,
  d: number,
): Float64Array {
  const size = 2 * m + d;
  const all = m + d;
  const { values } = basis.undamped;
  const a = new Float64Array(size * size);
  for (let r = 0; r < m; r++) {
    a[r * size + m + r] = 1;
    const row = (m + r) * size;
    for (let s = 0; s < m; s++) a[row + m + s] = -damping[r * all + s];
    a[row + r] = -values[r];
    for (let k = 0; k < d; k++) {
      const c = damping[r * all + m + k];
      if (c === 0) continue;
      for (let s = 0; s < m; s++) a[row + m + s] += c * following[k * m + s];
      for (let l = 0; l < d; l++) a[row + 2 * m + l] += c * relaxing[k * d + l];
    }
  }
  for (let k = 0; k < d; k++) {
    const row = (2 * m + k) * size;
    for (let s = 0; s < m; s++) a[row + m + s] = -following[k * m + s];
    for (let l = 0; l < d; l++) a[row + 2 * m + l] = -relaxing[k * d + l];
  }
  return a;
}

/** Modal damping acts on the motion relative to where a support's displacement alone would carry the mode. */
function addSupportRates(
  basis: ModalBasis,
  inputs: readonly StateInput[],
  rates: Float64Array,
  b1: Float64Array,
): void {
  const m = basis.undamped.count;
  if (!inputs.some(({ kind }) => kind === "support")) return;
  for (let r = 0; r < m; r++) {
    if (rates[r] === 0) continue;
    const places = supportPlaces(basis, r, basis.assembly.supports.length);
    inputs.forEach((input, j) => {
      if (input.kind === "support") b1[(m + r) * inputs.length + j] += rates[r] * places[input.support];
    });
  }
}

/** States joined by damping, mode by mode; relaxing places are joined to what their dampers reach. */
function componentsOf(damping: Float64Array, m: number, d: number): number[][] {
  const all = m + d;
  const label = new Int32Array(all).fill(-1);
  const components: number[][] = [];
  for (let seed = 0; seed < all; seed++) {
    if (label[seed] >= 0) continue;
    const members = [seed];
    label[seed] = components.length;
    for (let at = 0; at < members.length; at++) {
      const i = members[at];
      for (let j = 0; j < all; j++) {
        // All relaxing places stay together: springs join them as well.
        const joined = damping[i * all + j] !== 0 || (i >= m && j >= m);
        if (!joined || label[j] >= 0) continue;
        label[j] = components.length;
        members.push(j);
      }
    }
    components.push(members.flatMap((i) => (i < m ? [i, m + i] : [m + i])).sort((x, y) => x - y));
  }
  return components;
}
