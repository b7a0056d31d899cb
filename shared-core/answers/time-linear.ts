/**
 * From an assembly and the drives of an ask to its exact linear motion.
 *
 * Inputs, in this order: the drives asked for (forces, then what motions make of their supports), and one steady
 * load of gravity and preloads. `as_written` starts at the written places and speeds with the steady load set
 * free at t = 0; `at_rest` starts in the equilibrium of the steady load and of forces that stand since before
 * t = 0, whatever places are written.
 */
import type { Assembly, LinearForm, QuantityRef } from "../mechanics/assembly.ts";
import { equilibrium } from "../mechanics/equilibrium.ts";
import { combineForms } from "../mechanics/forms.ts";
import { type StateInput, type StateSpace, stateSpace } from "../mechanics/state-space.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { identity, multiply, multiplyVector } from "../numerics/products.ts";
import { type DriveSignal, driveSignal } from "./drive-history.ts";
import { constantSignal, type Signal } from "./drive-signal.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { modalStates, type StateBasis } from "./time-basis.ts";
import { type ModalOutput, type ModalSystem, modalOutput, modalState, modalSystem } from "./time-modal.ts";
import { Motion } from "./time-motion.ts";
import { type MotionTerm, quantityParts } from "./time-quantity.ts";
import {
  type CleanState,
  DIRECT_ORDERS,
  derivativeForm,
  type OutputForm,
  type StateForm,
  withoutInputDerivatives,
} from "./time-state.ts";
import type { ModalQuantity } from "./time-trace.ts";

export interface LinearMotion {
  readonly motion: Motion;
  /** True where a drive is followed by interpolation, so that its closeness has to be shown. */
  readonly interpolated: boolean;
  quantity(ref: QuantityRef): ModalQuantity;
}

export interface MotionAsk {
  readonly by: readonly number[];
  /** s */
  readonly lasting: number;
  readonly start: "as_written" | "at_rest";
  /** Relative error of interpolated drives, and how many times closer than usual they are looked at. */
  readonly tolerance: number;
  readonly finer: number;
}

/** A motion before its equations are parted: what a torque over speed changes from stretch to stretch. */
export interface PreparedMotion {
  readonly states: States;
  /** Sets of states that do not feel each other. */
  readonly components: readonly (readonly number[])[];
  /** One an input; a torque over speed stands as zero. */
  readonly signals: readonly Signal[];
  /** The states before t = 0. */
  readonly start: Float64Array;
  readonly interpolated: boolean;
}

/**
 * `basis` holds the undamped modes; without it the states of the mechanics are split as they are, and the model
 * must have neither modal damping nor loss factors.
 */
export function linearMotion(assembly: Assembly, ask: MotionAsk, basis?: ModalBasis): Outcome<LinearMotion> {
  const prepared = preparedMotion(assembly, ask, basis);
  if (!prepared.ok) return fail(prepared.reason);
  const { states, components, signals, start, interpolated } = prepared.value;
  const modal = modalSystem(states.system, components);
  return succeed({
    motion: new Motion(modal, signals, ask.lasting, modalState(modal, start)),
    interpolated,
    quantity: (ref) => states.quantity(ref, modal),
  });
}

/** The same before it is parted. */
export function preparedMotion(
  assembly: Assembly,
  ask: MotionAsk,
  basis?: ModalBasis,
): Outcome<PreparedMotion> {
  const drives = drivesOf(assembly, ask);
  if (!drives.ok) return fail(drives.reason);
  const load = steadyLoad(assembly);
  const inputs: StateInput[] = ask.by.map((index) => inputOf(assembly, index));
  if (load !== undefined) inputs.push({ kind: "load", form: load });
  const space = stateSpace(assembly, inputs);
  if (!space.ok) return fail(space.reason);
  const chosen = chosenStates(space.value, inputs, basis);
  if (!chosen.ok) return fail(chosen.reason);
  const states = new States(assembly, space.value, inputs, chosen.value);
  const signals = drives.value.map((d) => d.signal);
  if (load !== undefined) signals.push(constantSignal(1));
  const start = startState(assembly, ask, states, load, drives.value);
  if (!start.ok) return fail(start.reason);
  return succeed({
    states,
    components: chosen.value.components,
    signals,
    start: start.value,
    interpolated: drives.value.some((d) => d.interpolated),
  });
}

function chosenStates(
  space: StateSpace,
  inputs: readonly StateInput[],
  basis: ModalBasis | undefined,
): Outcome<StateBasis> {
  if (basis !== undefined) return modalStates(basis, space, inputs, basis.modalRates(true));
  const one = identity(space.size);
  const all = Array.from({ length: space.size }, (_, i) => i);
  return succeed({ raw: space, columns: one, inverse: one, components: all.length > 0 ? [all] : [] });
}

/** Gravity on every mass with a weight and the preloads of all elements, as one force; undefined when none acts. */
export function steadyLoad(assembly: Assembly): LinearForm | undefined {
  const forms: LinearForm[] = [];
  const factors: number[] = [];
  for (const { form, weight, gravityMass } of assembly.coordinates) {
    const pull = weight * gravityMass * assembly.gravity;
    if (pull === 0) continue;
    forms.push(form);
    factors.push(pull);
  }
  for (const { form, preload } of assembly.elements) {
    if (preload === 0) continue;
    forms.push(form);
    factors.push(-preload);
  }
  const load = combineForms(forms, factors);
  return load.coordinates.length > 0 ? load : undefined;
}

function drivesOf(assembly: Assembly, ask: MotionAsk): Outcome<DriveSignal[]> {
  const out: DriveSignal[] = [];
  for (const index of ask.by) {
    if (assembly.drives[index].shape.kind === "speed-curve") {
      out.push({ signal: constantSignal(0), standing: 0, interpolated: false });
      continue;
    }
    const made = driveSignal(assembly.drives[index], ask);
    if (!made.ok) return fail(made.reason);
    out.push(made.value);
  }
  return succeed(out);
}

function inputOf(assembly: Assembly, index: number): StateInput {
  const { on } = assembly.drives[index];
  return on.kind === "form" ? { kind: "load", form: on.form } : { kind: "support", support: on.support };
}

/** The chosen states with the outputs that quantities need. */
export class States {
  readonly system: StateForm;
  readonly #assembly: Assembly;
  readonly #space: StateSpace;
  readonly #inputs: readonly StateInput[];
  readonly #clean: CleanState;
  readonly #chosen: StateBasis;
  /** free x N: coordinates from the chosen states. */
  readonly #displacement: Float64Array;
  readonly #outputs = new Map<LinearForm, OutputForm[]>();

  /** `system` stands in place of the equations of the chosen states, whose meaning stays as it is. */
  constructor(
    assembly: Assembly,
    space: StateSpace,
    inputs: readonly StateInput[],
    chosen: StateBasis,
    system?: StateForm,
  ) {
    this.#assembly = assembly;
    this.#space = space;
    this.#inputs = inputs;
    this.#chosen = chosen;
    this.#clean = withoutInputDerivatives(chosen.raw);
    this.#displacement = multiply(space.displacement, chosen.columns, assembly.free, space.size, space.size);
    this.system = system ?? this.#clean.system;
  }

  /** The same states under other equations. */
  under(system: StateForm): States {
    return new States(this.#assembly, this.#space, this.#inputs, this.#chosen, system);
  }

  /** Whether an input is felt without delay by a place: one on which it acts has no inertia. */
  actsAtOnce(input: number): boolean {
    const { displacementDirect } = this.#space;
    const count = this.system.inputs;
    for (let at = input; at < displacementDirect.length; at += count)
      if (displacementDirect[at] !== 0) return true;
    return false;
  }

  /** The chosen states at places `q` and speeds `v` of the free coordinates, supports at zero. */
  stateOf(q: Float64Array, v: Float64Array): Float64Array {
    return multiplyVector(
      this.#chosen.inverse,
      this.#space.stateOf(q, v),
      this.system.size,
      this.system.size,
    );
  }

  quantity(ref: QuantityRef, modal: ModalSystem): ModalQuantity {
    const parts = quantityParts(this.#assembly, ref);
    return {
      linear: this.#sum(parts.linear, modal),
      constant: parts.constant,
      products: parts.products.map(({ factor, a, aConstant, b }) => ({
        factor,
        a: this.#sum(a, modal),
        aConstant,
        b: this.#sum(b, modal),
      })),
    };
  }

  #sum(terms: readonly MotionTerm[], modal: ModalSystem): ModalOutput {
    const state = new Float64Array(this.system.size);
    const direct = new Float64Array(this.system.inputs * DIRECT_ORDERS);
    for (const { form, derivative, factor } of terms) {
      const output = this.output(form, derivative);
      for (let i = 0; i < state.length; i++) state[i] += factor * output.state[i];
      for (let i = 0; i < direct.length; i++) direct[i] += factor * output.direct[i];
    }
    return modalOutput(modal, { state, direct });
  }

  /** A form of the coordinates, its speed or its acceleration, from states and inputs. */
  output(form: LinearForm, derivative: 0 | 1 | 2): OutputForm {
    let known = this.#outputs.get(form);
    if (known === undefined) {
      const place = this.#place(form);
      const speed = derivativeForm(place, this.system);
      known = [place, speed, derivativeForm(speed, this.system)];
      this.#outputs.set(form, known);
    }
    return known[derivative];
  }

  #place(form: LinearForm): OutputForm {
    const n = this.system.size;
    const count = this.system.inputs;
    const { displacementDirect } = this.#space;
    const state = new Float64Array(n);
    const direct = new Float64Array(count * DIRECT_ORDERS);
    form.coordinates.forEach((q, k) => {
      for (let i = 0; i < n; i++) state[i] += form.factors[k] * this.#displacement[q * n + i];
      for (let j = 0; j < count; j++) {
        direct[j * DIRECT_ORDERS] += form.factors[k] * displacementDirect[q * count + j];
      }
    });
    this.#inputs.forEach((input, j) => {
      if (input.kind !== "support") return;
      const at = form.supports.indexOf(input.support);
      if (at >= 0) direct[j * DIRECT_ORDERS] += form.supportFactors[at];
    });
    // The raw state is z + p0 u + p1 u'.
    for (let i = 0; i < n; i++) {
      if (state[i] === 0) continue;
      for (let j = 0; j < count; j++) {
        direct[j * DIRECT_ORDERS] += state[i] * this.#clean.p0[i * count + j];
        direct[j * DIRECT_ORDERS + 1] += state[i] * this.#clean.p1[i * count + j];
      }
    }
    return { state, direct };
  }
}

function startState(
  assembly: Assembly,
  ask: MotionAsk,
  states: States,
  load: LinearForm | undefined,
  drives: readonly DriveSignal[],
): Outcome<Float64Array> {
  const { coordinates, free } = assembly;
  const v = new Float64Array(free);
  if (ask.start === "as_written") {
    const q = new Float64Array(free);
    for (const { form, startsAt, startsMoving } of coordinates) {
      if (form.coordinates.length !== 1 || form.factors[0] !== 1 || form.supports.length > 0) continue;
      q[form.coordinates[0]] = startsAt;
      v[form.coordinates[0]] = startsMoving;
    }
    return succeed(states.stateOf(q, v));
  }
  const forms: LinearForm[] = load === undefined ? [] : [load];
  const factors = forms.map(() => 1);
  drives.forEach(({ standing }, k) => {
    const { on } = assembly.drives[ask.by[k]];
    if (standing === 0 || on.kind !== "form") return;
    forms.push(on.form);
    factors.push(standing);
  });
  const held = equilibrium(assembly, combineForms(forms, factors));
  if (!held.ok) return fail(held.reason);
  const loose = coordinates.find(({ form }) => held.value.looseIn(form) !== undefined);
  if (loose !== undefined) {
    return fail(
      `nothing holds ${loose.name} against its steady load, so it has no equilibrium to start from`,
    );
  }
  return succeed(states.stateOf(held.value.q, v));
}
