/**
 * Exact treatment of coordinates without inertia.
 *
 * The free coordinates are turned into three sorts: *inertial* ones, on which M is positive definite; *relaxing*
 * ones, without inertia but damped (a Maxwell branch), which follow a first-order equation; and ones that follow
 * the others at once and are eliminated: through springs where they feel no damper, through dampers where they
 * feel no spring. What belongs where is decided on the forms (null-space.ts), elimination is star-mesh.ts.
 *
 *   M p'' + C_mm p' + C_md d' + K_mm p + K_md d = F_m
 *           C_dm p' + C_dd d' + K_dm p + K_dd d = F_d
 */
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { Assembly, LinearForm } from "./assembly.ts";
import { combineForms, coordinateForm, formValue, supportValue } from "./forms.ts";
import { type SystemTerms, systemTerms, type Term } from "./matrices.ts";
import { type NullSpace, nullSpace } from "./null-space.ts";
import { eliminate, type SquareTerm, withoutCoordinate } from "./star-mesh.ts";

/** A system whose mass matrix is positive definite on the first `inertial` of its coordinates and zero beyond. */
export interface Reduction {
  readonly inertial: number;
  readonly relaxing: number;
  /** Forms over the reduced coordinates: inertial ones first, then relaxing ones; supports as in the assembly. */
  readonly mass: readonly SquareTerm[];
  /** Without `mass_damping`, which is that number times the mass terms. */
  readonly damping: readonly SquareTerm[];
  readonly stiffness: readonly SquareTerm[];
  /** Each free coordinate of the assembly as a form over the reduced ones and the supports, without loads. */
  readonly recovery: readonly LinearForm[];
  /** A load along a form over the free coordinates, as it acts on the reduced ones. */
  load(form: LinearForm): LinearForm;
  /**
   * What a unit load along the form adds to each free coordinate beside `recovery`, because it acts on
   * coordinates that were eliminated through springs. All zero for loads on masses.
   */
  compliance(form: LinearForm): Float64Array;
}

/** Keep: coordinates that feel dampers only stay relaxing ones (histories need their position). */
export interface ReductionOptions {
  readonly keepDamperOnly?: boolean;
}

/** Names of coordinates that neither an inertia, a spring nor a damper holds: nothing says where they are. */
export function floatingNames(assembly: Assembly): string[] {
  const terms = systemTerms(assembly);
  const forms = [...terms.mass, ...terms.stiffness, ...terms.damping].map((term) => term.row);
  const { vectors } = nullSpace(forms, indices(assembly.free), assembly.free);
  const names = new Set<string>();
  for (const vector of vectors) {
    const q = new Float64Array(assembly.free);
    vector.at.forEach((i, k) => {
      q[i] = vector.by[k];
    });
    for (const { name, form } of assembly.coordinates) if (formValue(form, q) !== 0) names.add(name);
  }
  return [...names];
}

/** Splits off and eliminates what has no inertia. Fails, with names, where something floats or cancels. */
export function reduceSystem(assembly: Assembly, options: ReductionOptions = {}): Outcome<Reduction> {
  if ((assembly.extras ?? []).length > 0) return fail("one-way and gyroscopic terms are not reduced yet");
  const negative = assembly.inertias.find(({ value }) => value < 0);
  if (negative) return fail(`the inertia of ${negative.owner} is negative`);
  return new Reducer(assembly, systemTerms({ ...assembly, massDamping: 0 })).run(options);
}

/** A reduction without relaxing coordinates. */
export interface Condensation extends Reduction {
  /** Each coordinate of the reduction it comes from, relaxing ones included, as a form over the inertial ones. */
  readonly inner: readonly LinearForm[];
}

/** Eliminates the relaxing coordinates through their springs: the undamped problem, all coordinates inertial. */
export function condense(reduction: Reduction): Outcome<Condensation> {
  if (reduction.relaxing === 0) {
    const { recovery, inertial } = reduction;
    const inner = isIdentity(recovery, inertial) ? recovery : indices(inertial).map(coordinateForm);
    return succeed({ ...reduction, inner });
  }
  const steps: Step[] = [];
  let stiffness = [...reduction.stiffness];
  const waiting = new Set(indices(reduction.relaxing).map((i) => reduction.inertial + i));
  while (waiting.size > 0) {
    const z = leastJoined(stiffness, waiting);
    const result = eliminate(stiffness, z);
    if (result === undefined) return fail("springs of both signs cancel at a place without inertia");
    stiffness = result.terms;
    steps.push({ at: z, form: result.form, flexibility: 1 / result.sum });
    waiting.delete(z);
  }
  const inner = recover(steps, reduction.inertial + reduction.relaxing);
  return succeed({
    ...reduction,
    relaxing: 0,
    inner,
    damping: [],
    stiffness,
    recovery: reduction.recovery.map((form) => substitute(form, inner)),
    load: (form) => distribute(steps, reduction.load(form)).load,
    compliance: (form) => {
      const added = reduction.compliance(form);
      const { offsets } = distribute(steps, reduction.load(form));
      const local = lift(steps, offsets, reduction.inertial + reduction.relaxing);
      return added.map((value, i) => value + formValue(reduction.recovery[i], local));
    },
  });
}

/** In order: coordinate `at` (before) is `form` (after), plus `flexibility` times the load that acts on it. */
interface Step {
  readonly at: number;
  readonly form: LinearForm;
  readonly flexibility: number;
}

type Sort = "mass" | "damping" | "stiffness";

class Reducer {
  readonly #assembly: Assembly;
  readonly #steps: Step[] = [];
  #terms: Record<Sort, SquareTerm[]>;

  constructor(assembly: Assembly, terms: SystemTerms) {
    this.#assembly = assembly;
    this.#terms = {
      mass: terms.mass.map(square),
      damping: terms.damping.map(square),
      stiffness: terms.stiffness.map(square),
    };
  }

  run(options: ReductionOptions): Outcome<Reduction> {
    const all = indices(this.#assembly.free);
    const massless = this.#split("mass", all);
    const undamped = this.#split("damping", massless);
    const floating = nullSpace(formsOf(this.#terms.stiffness), undamped, this.#assembly.free);
    if (floating.free.length > 0) {
      return fail(`nothing holds ${floatingNames(this.#assembly).join(", ") || "a massless place"}`);
    }
    const trouble = this.#eliminateAll(undamped, "stiffness");
    if (trouble !== undefined) return fail(trouble);
    const relaxing = new Set(massless);
    for (const i of undamped) relaxing.delete(i);
    if (options.keepDamperOnly !== true) {
      const loose = this.#split("stiffness", [...relaxing]);
      const stuck = this.#eliminateAll(loose, "damping");
      if (stuck !== undefined) return fail(stuck);
      for (const i of loose) relaxing.delete(i);
    }
    const gone = new Set(massless);
    return succeed(
      this.#finish(
        all.filter((i) => !gone.has(i)),
        [...relaxing],
      ),
    );
  }

  /**
   * Turns coordinates so that one sort of term does not feel the returned ones. Usually nothing is turned:
   * those coordinates simply have no such term. The other sorts follow.
   */
  #split(sort: Sort, subset: readonly number[]): number[] {
    const { free, vectors } = nullSpace(formsOf(this.#terms[sort]), subset, this.#assembly.free);
    if (vectors.some((vector) => vector.at.length > 1)) {
      this.#turn({ free, vectors });
      // What is zero by construction is made so to the last bit.
      this.#terms[sort] = this.#terms[sort].map(({ form, value }) => ({
        form: free.reduce(withoutCoordinate, form),
        value,
      }));
    }
    return [...free];
  }

  /** q_i = p_i + factor * p_free for the members of each null vector. */
  #turn({ free, vectors }: NullSpace): void {
    const values = indices(this.#assembly.free).map(coordinateForm);
    vectors.forEach((vector, k) => {
      vector.at.forEach((at, i) => {
        if (at === free[k]) return;
        const pair = (own: LinearForm) => combineForms([own, coordinateForm(free[k])], [1, vector.by[i]]);
        this.#steps.push({ at, form: pair(coordinateForm(at)), flexibility: 0 });
        values[at] = pair(values[at]);
      });
    });
    for (const sort of ["mass", "damping", "stiffness"] as const) {
      this.#terms[sort] = this.#terms[sort].map(({ form, value }) => ({
        form: substitute(form, values),
        value,
      }));
    }
  }

  /** Eliminates coordinates that feel one sort of term only; the reason where those cancel. */
  #eliminateAll(which: readonly number[], sort: "stiffness" | "damping"): string | undefined {
    const waiting = new Set(which);
    while (waiting.size > 0) {
      const z = leastJoined(this.#terms[sort], waiting);
      const result = eliminate(this.#terms[sort], z);
      if (result === undefined) {
        return `what is joined to ${this.#nameOf(z)} cancels, and it has no inertia`;
      }
      this.#terms[sort] = result.terms;
      // A load on a place held by dampers only makes it creep: no flexibility gives that.
      const flexibility = sort === "stiffness" ? 1 / result.sum : 0;
      this.#steps.push({ at: z, form: result.form, flexibility });
      waiting.delete(z);
    }
    return undefined;
  }

  #nameOf(coordinate: number): string {
    const found = this.#assembly.coordinates.find(
      ({ form }) => form.coordinates.length === 1 && form.coordinates[0] === coordinate,
    );
    return found?.name ?? "a massless place";
  }

  #finish(inertial: readonly number[], relaxing: readonly number[]): Reduction {
    const { free } = this.#assembly;
    const steps = this.#steps;
    const kept = [...inertial, ...relaxing];
    const place = new Int32Array(free).fill(-1);
    kept.forEach((i, k) => {
      place[i] = k;
    });
    const unchanged = kept.length === free && kept.every((i, k) => i === k) && steps.length === 0;
    const renumber = (form: LinearForm): LinearForm => {
      if (unchanged) return form;
      return combineForms([{ ...form, coordinates: form.coordinates.map((i) => place[i]) }], [1]);
    };
    const renumbered = (terms: SquareTerm[]) =>
      unchanged ? terms : terms.map(({ form, value }) => ({ form: renumber(form), value }));
    return {
      inertial: inertial.length,
      relaxing: relaxing.length,
      mass: renumbered(this.#terms.mass),
      damping: renumbered(this.#terms.damping),
      stiffness: renumbered(this.#terms.stiffness),
      recovery: recover(steps, free).map(renumber),
      load: (form) => renumber(distribute(steps, form).load),
      compliance: (form) => lift(steps, distribute(steps, form).offsets, free),
    };
  }
}

function indices(n: number): number[] {
  const out = new Array<number>(n);
  for (let i = 0; i < n; i++) out[i] = i;
  return out;
}

/** Whether form i is coordinate i of `size`, for all of them. */
function isIdentity(forms: readonly LinearForm[], size: number): boolean {
  return (
    forms.length === size &&
    forms.every(({ coordinates, factors, supports }, i) => {
      return coordinates.length === 1 && coordinates[0] === i && factors[0] === 1 && supports.length === 0;
    })
  );
}

const square = ({ row, value }: Term): SquareTerm => ({ form: row, value });
const formsOf = (terms: readonly SquareTerm[]): LinearForm[] => terms.map(({ form }) => form);

/** The waiting coordinate with the fewest terms: eliminating it first keeps the mesh small. */
function leastJoined(terms: readonly SquareTerm[], waiting: ReadonlySet<number>): number {
  const degrees = new Map<number, number>();
  for (const z of waiting) degrees.set(z, 0);
  for (const { form } of terms) {
    for (const i of form.coordinates) {
      const degree = degrees.get(i);
      if (degree !== undefined) degrees.set(i, degree + 1);
    }
  }
  let best = -1;
  let least = Number.POSITIVE_INFINITY;
  for (const [z, degree] of degrees) {
    if (degree < least) {
      best = z;
      least = degree;
    }
  }
  return best;
}

/** Every coordinate as it was before the steps, as a form over those that are left. */
function recover(steps: readonly Step[], size: number): LinearForm[] {
  const values = indices(size).map(coordinateForm);
  for (let s = steps.length - 1; s >= 0; s--) values[steps[s].at] = substitute(steps[s].form, values);
  return values;
}

/** A form with each of its coordinates replaced by a form. */
function substitute(form: LinearForm, values: readonly LinearForm[]): LinearForm {
  const own: LinearForm = {
    coordinates: [],
    factors: [],
    supports: form.supports,
    supportFactors: form.supportFactors,
  };
  return combineForms([own, ...form.coordinates.map((i) => values[i])], [1, ...form.factors]);
}

/** Moves a load through the steps by virtual work; `offsets` holds what each step's coordinate yields by itself. */
function distribute(steps: readonly Step[], form: LinearForm): { load: LinearForm; offsets: Float64Array } {
  const load = new Map<number, number>();
  form.coordinates.forEach((i, k) => {
    load.set(i, form.factors[k]);
  });
  const offsets = new Float64Array(steps.length);
  steps.forEach((step, s) => {
    const acting = load.get(step.at) ?? 0;
    if (acting === 0) return;
    offsets[s] = acting * step.flexibility;
    load.delete(step.at);
    step.form.coordinates.forEach((i, k) => {
      load.set(i, (load.get(i) ?? 0) + step.form.factors[k] * acting);
    });
  });
  const entries = [...load].filter(([, value]) => value !== 0).sort((a, b) => a[0] - b[0]);
  return {
    load: {
      coordinates: entries.map(([i]) => i),
      factors: entries.map(([, value]) => value),
      supports: [],
      supportFactors: [],
    },
    offsets,
  };
}

/** Displacements before the steps that the offsets alone give, all coordinates that are left held still. */
function lift(steps: readonly Step[], offsets: Float64Array, size: number): Float64Array {
  const q = new Float64Array(size);
  for (let s = steps.length - 1; s >= 0; s--) q[steps[s].at] = formValue(steps[s].form, q) + offsets[s];
  return q;
}

/** Values of all free coordinates from the reduced ones and the supports. */
export function recoverValues(
  reduction: Reduction,
  reduced: ArrayLike<number>,
  supports: ArrayLike<number> = [],
): Float64Array {
  return Float64Array.from(
    reduction.recovery,
    (form) => formValue(form, reduced) + (supports.length > 0 ? supportValue(form, supports) : 0),
  );
}
