/**
 * Histories with torques over speed: a linear motion from one change of piece to the next.
 *
 * Between two rows of a curve the torque is intercept + slope * speed. With b the states' gain from the torque and
 * c the speed's row, z' = A z + b T becomes z' = (A + slope b c) z + b intercept: exact within a piece. A stretch
 * ends where a speed is 1e-12 of the largest knot beyond its piece; the torque is continuous there, so nothing is
 * lost by changing late, and a speed that rests on a knot does not change for ever. States keep their meaning, so
 * that one stretch begins where the one before ended.
 */
import type { Assembly } from "../mechanics/assembly.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { constantSignal, laterSignal, type Signal } from "./drive-signal.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { type CurvePieces, curvePieces, pieceAt, rangeOf } from "./speed-curves.ts";
import { crossingsOf, Prober } from "./time-extremes.ts";
import { demandedGrid, surveyDemands } from "./time-grid.ts";
import { type LinearMotion, type MotionAsk, type PreparedMotion, preparedMotion } from "./time-linear.ts";
import { type ModalOutput, type ModalSystem, modalOutput, modalState, modalSystem } from "./time-modal.ts";
import { Motion, outputValue } from "./time-motion.ts";
import { DIRECT_ORDERS, type OutputForm, type StateForm } from "./time-state.ts";
import { followTrace, type ModalQuantity, QuantityReader } from "./time-trace.ts";

/** A linear motion that holds from `from` (s) for its duration; its clock starts there. */
export interface Stretch {
  readonly from: number;
  readonly linear: LinearMotion;
  /** The speeds of the curves, in rad/s, and between which values each holds in this stretch. */
  readonly speeds: readonly { readonly name: string; readonly speed: ModalQuantity; readonly range: Range }[];
}

type Range = readonly [number, number];

/** Share of the largest knot by which a speed may leave its piece. */
const SLACK = 1e-12;
/** Changes of piece after which a history is given up. */
const MOST_CHANGES = 20_000;
/** Parts of the whole time in which the first change is looked for; later ones in twice the stretch before. */
const FIRST_LOOK = 256;
/** A change found early in the time looked at is looked for again: a speed that runs away hides what came before. */
const EARLY = 1 / 16;
/** Instants closer than this share of the whole are one, as on the time line. */
const SAME_INSTANT = 1e-13;
/** Closeness with which speeds are followed when changes are looked for; where they are found is exact. */
const FOLLOWED = 1e-8;

/** Drives of the ask that give torque over speed. */
export const speedCurvesOf = ({ drives }: Assembly, by: readonly number[]): readonly number[] =>
  by.flatMap((index, input) => (drives[index].shape.kind === "speed-curve" ? [input] : []));

/** The stretches of a history, ascending; `upTo` of a failure holds those that were reached. */
export function switchedMotion(
  assembly: Assembly,
  ask: MotionAsk,
  basis?: ModalBasis,
): Outcome<readonly Stretch[]> {
  const prepared = preparedMotion(assembly, ask, basis);
  if (!prepared.ok) return fail(prepared.reason);
  const curves: Curve[] = [];
  for (const input of speedCurvesOf(assembly, ask.by)) {
    const curve = curveOf(assembly, ask, prepared.value, input);
    if (!curve.ok) return fail(curve.reason);
    curves.push(curve.value);
  }
  return new Switching(prepared.value, curves, ask.lasting).run();
}

interface Curve {
  readonly name: string;
  readonly input: number;
  readonly pieces: CurvePieces;
  /** The speed from the states; no input takes part in it. */
  readonly speed: OutputForm;
  /** rad/s */
  readonly slack: number;
}

function curveOf(
  assembly: Assembly,
  ask: MotionAsk,
  { states }: PreparedMotion,
  input: number,
): Outcome<Curve> {
  const { name, on, shape } = assembly.drives[ask.by[input]];
  if (shape.kind !== "speed-curve" || on.kind !== "form")
    return fail(`torque ${name} is no torque over speed`);
  const speed = states.output(on.form, 1);
  if (states.actsAtOnce(input) || speed.direct.some((factor) => factor !== 0)) {
    return fail(
      `torque ${name} acts on something without an inertia of its own, or bound to a support; a torque over speed needs an inertia to act on`,
    );
  }
  const pieces = curvePieces(shape.speedsHz, shape.torques);
  const largest = Math.max(...pieces.knots.map(Math.abs));
  return succeed({ name, input, pieces, speed, slack: SLACK * (largest > 0 ? largest : 1) });
}

/** What holds while every curve is on one piece. */
interface Region {
  readonly modal: ModalSystem;
  readonly quantity: LinearMotion["quantity"];
  readonly stateOf: readonly ModalOutput[];
  readonly speeds: Stretch["speeds"];
  readonly intercepts: readonly Signal[];
}

class Switching {
  readonly #prepared: PreparedMotion;
  readonly #curves: readonly Curve[];
  readonly #lasting: number;
  readonly #same: number;
  readonly #regions = new Map<string, Region>();
  readonly #stretches: Stretch[] = [];

  constructor(prepared: PreparedMotion, curves: readonly Curve[], lasting: number) {
    this.#prepared = prepared;
    this.#curves = curves;
    this.#lasting = lasting;
    this.#same = SAME_INSTANT * lasting;
  }

  run(): Outcome<readonly Stretch[]> {
    let time = 0;
    let look = this.#lasting / FIRST_LOOK;
    let z = Float64Array.from(this.#prepared.start);
    let pieces: readonly number[] | undefined;
    for (let changes = 0; ; changes++) {
      this.#kick(z, time);
      pieces = this.#piecesAt(z, pieces);
      if (changes > MOST_CHANGES) return this.#tooMany(time);
      const region = this.#region(pieces);
      const made = this.#stretch(region, z, time, look);
      if (!made.ok) return fail(made.reason, this.#stretches);
      const { linear } = made.value;
      const { duration } = linear.motion;
      this.#stretches.push({ from: time, linear, speeds: region.speeds });
      if (time + duration >= this.#lasting - this.#same) return succeed(this.#stretches);
      const end = endState(region, linear.motion);
      if (!end.ok) return fail(end.reason, this.#stretches);
      z = end.value;
      time += duration;
      look = 2 * duration;
    }
  }

  /** The motion in a region until a speed leaves it, or to the end. */
  #stretch(
    region: Region,
    z: Float64Array,
    time: number,
    firstLook: number,
  ): Outcome<{ linear: LinearMotion }> {
    const left = this.#lasting - time;
    const start = modalState(region.modal, z);
    const linear = (duration: number): LinearMotion => ({
      motion: new Motion(region.modal, this.#signals(region, time, duration), duration, start),
      interpolated: this.#prepared.interpolated,
      quantity: region.quantity,
    });
    let look = Math.min(left, Math.max(firstLook, this.#lasting * SAME_INSTANT * 1e3));
    for (;;) {
      const tried = linear(look);
      const exit = this.#firstExit(region, tried.motion);
      if (!exit.ok) return fail(exit.reason);
      if (exit.value === undefined && look >= left) return succeed({ linear: tried });
      if (exit.value === undefined) look = Math.min(left, 2 * look);
      else if (exit.value > EARLY * look || look <= 8 * this.#same) {
        return succeed({ linear: linear(Math.min(left, Math.max(exit.value, 2 * this.#same))) });
      } else look = Math.max(2 * exit.value, 8 * this.#same);
    }
  }

  /** When a speed first leaves its piece; undefined where none does. */
  #firstExit({ speeds }: Region, motion: Motion): Outcome<number | undefined> {
    const quantities = speeds.map(({ speed }) => speed);
    const demands = surveyDemands(motion, quantities, FOLLOWED);
    const known = demands.ok ? demands.value : demands.upTo;
    if (known === undefined) return fail(demands.ok ? "" : demands.reason);
    const grid = demandedGrid(motion, known, new Float64Array(0));
    if (!grid.ok) return fail(grid.reason);
    const followed = followTrace(motion, grid.value, quantities);
    const trace = followed.ok ? followed.value : followed.upTo;
    let first: number | undefined;
    for (let k = 0; k < speeds.length && trace !== undefined; k++) {
      const prober = new Prober(motion, new QuantityReader(motion.modal, quantities[k]));
      const [low, high] = speeds[k].range;
      const { slack } = this.#curves[k];
      for (const level of [low - slack, high + slack]) {
        if (!Number.isFinite(level)) continue;
        const found = crossingsOf(trace, k, prober, level, "any");
        if (!found.ok) return fail(found.reason);
        if (found.value.length > 0) first = Math.min(first ?? found.value[0], found.value[0]);
      }
    }
    return first === undefined && !followed.ok ? fail(followed.reason) : succeed(first);
  }

  #signals({ intercepts }: Region, time: number, duration: number): Signal[] {
    // What lies beyond the end of the history tells whether it comes to rest.
    const until = time + duration >= this.#lasting - this.#same ? Number.POSITIVE_INFINITY : time + duration;
    const signals = this.#prepared.signals.map((signal) => laterSignal(signal, time, until, this.#same));
    this.#curves.forEach(({ input }, k) => {
      signals[input] = intercepts[k];
    });
    return signals;
  }

  /** Adds the impulses of an instant to the states. */
  #kick(z: Float64Array, time: number): void {
    const { system } = this.#prepared.states;
    this.#prepared.signals.forEach(({ impulses }, j) => {
      for (const impulse of impulses) {
        if (Math.abs(impulse.time - time) > this.#same) continue;
        for (let i = 0; i < z.length; i++) z[i] += impulse.size * system.b[i * system.inputs + j];
      }
    });
  }

  #piecesAt(z: Float64Array, before: readonly number[] | undefined): readonly number[] {
    return this.#curves.map(({ pieces, speed, slack }, k) =>
      pieceAt(pieces, dot(speed.state, z), before?.[k], slack / 2),
    );
  }

  #region(pieces: readonly number[]): Region {
    const key = pieces.join();
    let known = this.#regions.get(key);
    if (known === undefined) {
      known = this.#makeRegion(pieces);
      this.#regions.set(key, known);
    }
    return known;
  }

  #makeRegion(pieces: readonly number[]): Region {
    const { states, components } = this.#prepared;
    const system = fedBack(states.system, this.#curves, pieces);
    const modal = modalSystem(system, joinedComponents(system, components, this.#curves));
    const under = states.under(system);
    const none = new Float64Array(system.inputs * DIRECT_ORDERS);
    const output = (state: Float64Array): ModalOutput => modalOutput(modal, { state, direct: none });
    return {
      modal,
      quantity: (ref) => under.quantity(ref, modal),
      stateOf: Array.from({ length: system.size }, (_, i) => output(unit(system.size, i))),
      speeds: this.#curves.map(({ name, speed, pieces: curve }, k) => ({
        name,
        speed: { linear: output(speed.state), constant: 0, products: [] },
        range: rangeOf(curve, pieces[k]),
      })),
      intercepts: this.#curves.map((curve, k) => constantSignal(curve.pieces.intercepts[pieces[k]])),
    };
  }

  #tooMany(time: number): Outcome<readonly Stretch[]> {
    const names = this.#curves.map(({ name }) => name).join(" and ");
    return fail(
      `the speed passes from one row to the next of ${names} more than ${MOST_CHANGES} times; it was followed until ${time} s`,
      this.#stretches,
    );
  }
}

/** A + sum of slope b c over the curves. */
function fedBack(system: StateForm, curves: readonly Curve[], pieces: readonly number[]): StateForm {
  const { size, inputs, b } = system;
  const a = Float64Array.from(system.a);
  curves.forEach(({ input, pieces: { slopes }, speed }, k) => {
    const slope = slopes[pieces[k]];
    for (let i = 0; i < size; i++) {
      const gain = slope * b[i * inputs + input];
      if (gain === 0) continue;
      for (let j = 0; j < size; j++) a[i * size + j] += gain * speed.state[j];
    }
  });
  return { ...system, a };
}

/** Components that a curve's torque or speed touches feel each other. */
function joinedComponents(
  { size, inputs, b }: StateForm,
  components: readonly (readonly number[])[],
  curves: readonly Curve[],
): readonly (readonly number[])[] {
  let sets = components;
  for (const { input, speed } of curves) {
    const touched = Array.from(
      { length: size },
      (_, i) => b[i * inputs + input] !== 0 || speed.state[i] !== 0,
    );
    const isTouched = (states: readonly number[]): boolean => states.some((i) => touched[i]);
    const together = sets.filter(isTouched);
    if (together.length > 1)
      sets = [together.flat().sort((p, q) => p - q), ...sets.filter((s) => !isTouched(s))];
  }
  return sets;
}

function endState({ stateOf }: Region, motion: Motion): Outcome<Float64Array<ArrayBuffer>> {
  const row = new Float64Array(motion.width);
  const inputs = new Float64Array(motion.signals.length * DIRECT_ORDERS);
  const got = motion.rowAt(motion.duration, "before", row, inputs);
  if (!got.ok) return fail(got.reason);
  return succeed(Float64Array.from(stateOf, (output) => outputValue(output, row, inputs)));
}

function unit(size: number, at: number): Float64Array {
  const out = new Float64Array(size);
  out[at] = 1;
  return out;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}
