/**
 * From an assembly and the drives of an ask to its exact linear motion.
 *
 * Inputs, in this order: the drives asked for (forces, then what motions make of their supports), and one steady
 * load of gravity and preloads. `as_written` starts at the written places and speeds with the steady load set
 * free at t = 0; `at_rest` starts in the equilibrium of the steady load and of forces that stand since before
 * t = 0, whatever places are written.
 */
import type { Assembly, LinearForm, QuantityRef } from "../mechanics/assembly.ts";
import { combineForms } from "../mechanics/forms.ts";
import { type StateInput, type StateSpace, stateSpace } from "../mechanics/state-space.ts";
import { balance } from "../numerics/balance.ts";
import { generalEigen } from "../numerics/general-eigen.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { type DriveSignal, driveSignal } from "./drive-history.ts";
import { constantSignal } from "./drive-signal.ts";
import type { AddedDamping } from "./time-damping.ts";
import {
  type ModalOutput,
  type ModalSystem,
  modalOutput,
  modalState,
  modalSystem,
  type StateRoots,
} from "./time-modal.ts";
import { Motion } from "./time-motion.ts";
import { type MotionTerm, quantityParts } from "./time-quantity.ts";
import { equilibriumRow } from "./time-settled.ts";
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

export function linearMotion(
  assembly: Assembly,
  ask: MotionAsk,
  added?: AddedDamping,
): Outcome<LinearMotion> {
  const drives = drivesOf(assembly, ask);
  if (!drives.ok) return fail(drives.reason);
  const load = steadyLoad(assembly);
  const inputs: StateInput[] = ask.by.map((index) => inputOf(assembly, index));
  if (load !== undefined) inputs.push({ kind: "load", form: load });
  const space = stateSpace(assembly, inputs, added?.matrix);
  if (!space.ok) return fail(space.reason);
  if (added !== undefined) addSupportDamping(space.value, inputs, added);
  const states = new States(assembly, space.value, inputs);
  const signals = drives.value.map((d) => d.signal);
  if (load !== undefined) signals.push(constantSignal(1));
  const modal = modalSystem(states.system, stateRoots(states.system));
  const before = [...drives.value.map((d) => d.standing), ...(load === undefined ? [] : [1])];
  const start = startRow(assembly, ask, states, modal, Float64Array.from(before));
  if (!start.ok) return fail(start.reason);
  return succeed({
    motion: new Motion(modal, signals, ask.lasting, start.value),
    interpolated: drives.value.some((d) => d.interpolated),
    quantity: (ref) => states.quantity(ref, modal),
  });
}

/** The roots of a balanced system with their vectors. */
export function stateRoots(system: StateForm): Outcome<StateRoots> {
  const n = system.size;
  const found = generalEigen(system.a, n);
  if (!found.ok) return fail(found.reason);
  const { re, im, right } = found.value;
  if (right === undefined) return fail("the roots have no vectors");
  const vectors = Float64Array.from(right.re);
  for (let k = 0; k < n; k++) {
    if (im[k] === 0) continue;
    for (let i = 0; i < n; i++) vectors[i * n + k + 1] = right.im[i * n + k];
    k++;
  }
  return succeed({ re, im, vectors });
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

/** Modal damping acts on the motion relative to where a support's displacement alone would carry the system. */
function addSupportDamping(space: StateSpace, inputs: readonly StateInput[], added: AddedDamping): void {
  const m = space.reduction.inertial;
  const supports = m > 0 ? added.support.length / m : 0;
  inputs.forEach((input, j) => {
    if (input.kind !== "support") return;
    for (let i = 0; i < m; i++) {
      space.b1[(m + i) * inputs.length + j] += added.support[i * supports + input.support];
    }
  });
}

/** The balanced state form with the outputs that quantities need. */
class States {
  readonly system: StateForm;
  readonly #assembly: Assembly;
  readonly #space: StateSpace;
  readonly #inputs: readonly StateInput[];
  readonly #clean: CleanState;
  /** z = scale * balanced z. */
  readonly #scale: Float64Array;
  readonly #outputs = new Map<LinearForm, OutputForm[]>();

  constructor(assembly: Assembly, space: StateSpace, inputs: readonly StateInput[]) {
    this.#assembly = assembly;
    this.#space = space;
    this.#inputs = inputs;
    this.#clean = withoutInputDerivatives(space);
    const { size, a, b } = this.#clean.system;
    const balanced = Float64Array.from(a);
    this.#scale = balance(balanced, size);
    const scaledInput = b.map((v, p) => v / this.#scale[Math.floor(p / Math.max(1, inputs.length))]);
    this.system = { size, a: balanced, inputs: inputs.length, b: scaledInput };
  }

  /** The balanced state at written places and speeds. */
  written(): Float64Array {
    const { coordinates, free } = this.#assembly;
    const q = new Float64Array(free);
    const v = new Float64Array(free);
    for (const { form, startsAt, startsMoving } of coordinates) {
      if (form.coordinates.length !== 1 || form.factors[0] !== 1 || form.supports.length > 0) continue;
      q[form.coordinates[0]] = startsAt;
      v[form.coordinates[0]] = startsMoving;
    }
    return this.#space.stateOf(q, v).map((value, i) => value / this.#scale[i]);
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
      const output = this.#output(form, derivative);
      for (let i = 0; i < state.length; i++) state[i] += factor * output.state[i];
      for (let i = 0; i < direct.length; i++) direct[i] += factor * output.direct[i];
    }
    return modalOutput(modal, { state, direct });
  }

  #output(form: LinearForm, derivative: 0 | 1 | 2): OutputForm {
    let known = this.#outputs.get(form);
    if (known === undefined) {
      const place = this.#displacement(form);
      const speed = derivativeForm(place, this.system);
      known = [place, speed, derivativeForm(speed, this.system)];
      this.#outputs.set(form, known);
    }
    return known[derivative];
  }

  #displacement(form: LinearForm): OutputForm {
    const n = this.system.size;
    const count = this.system.inputs;
    const { displacement, displacementDirect } = this.#space;
    const state = new Float64Array(n);
    const direct = new Float64Array(count * DIRECT_ORDERS);
    form.coordinates.forEach((q, k) => {
      for (let i = 0; i < n; i++) state[i] += form.factors[k] * displacement[q * n + i];
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
      state[i] *= this.#scale[i];
    }
    return { state, direct };
  }
}

function startRow(
  assembly: Assembly,
  ask: MotionAsk,
  states: States,
  modal: ModalSystem,
  before: Float64Array,
): Outcome<Float64Array> {
  if (ask.start === "as_written") return succeed(modalState(modal, states.written()));
  for (let k = 0; k < ask.by.length; k++) {
    // Supports stand at zero before t = 0.
    if (assembly.drives[ask.by[k]].on.kind === "support") before[k] = 0;
  }
  return equilibriumRow(modal, before, 1, new Float64Array(2 * modal.count + modal.rest));
}
