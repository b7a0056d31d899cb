/** Sweeps: steady responses along an axis that is fine where they are steep. */
import type { Assembly } from "../mechanics/assembly.ts";
import type { SweepAsk } from "../model/model.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { FrequencyResponse } from "./analysis.ts";
import type { ModeTable, Peak, SweepAnswer } from "./answer.ts";
import { modalTransfer } from "./frequency-modal.ts";
import { growingMode, type Pole, polesOf, sampleFrequencies, withPoles } from "./frequency-poles.ts";
import { plainMotions, type SteadyQuantity, steadyQuantity, steadyValue } from "./frequency-quantity.ts";
import {
  frequencyResponseOf,
  poleAwareReader,
  polishedPeak,
  type Sample,
  unboundedReason,
} from "./frequency-response.ts";
import { type SteadySolution, steadySolution } from "./frequency-solution.ts";
import { type FreeDamping, type SteadySystem, steadySystem } from "./frequency-system.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { hasAddedDamping, supportPlaces } from "./time-damping.ts";

/** Points of one sweep, refinement included. */
const MOST_POINTS = 200_000;
/** What is drawn around a pole: two points within the half-power width, then ever fewer. */
const STORED_SPACING = { first: 0.5, growth: 2, closest: 1e-4 };
/** Points a decade that peaks are looked for at beside the stored ones. */
const SEARCH_PER_DECADE = 120;
/** Rounds in which dips between points are closed in, and points added in all. */
const DIP_ROUNDS = 6;
const MOST_DIP_POINTS = 2000;

/** The parts of all steady answers of one model. */
export interface SteadyModel {
  readonly assembly: Assembly;
  readonly table: ModeTable;
  readonly basis: ModalBasis;
  readonly system: SteadySystem;
  readonly lossy: boolean;
}

/** Fails where a mode grows: there is no steady response then. */
export function steadyModel(assembly: Assembly, basis: ModalBasis, table: ModeTable): Outcome<SteadyModel> {
  const growing = growingMode(table);
  if (growing !== undefined) return fail(growing);
  const added = hasAddedDamping(assembly, false) ? freeDamping(basis) : undefined;
  const lossy = assembly.elements.some(({ lossFactor, stiffness }) => lossFactor * stiffness !== 0);
  return succeed({ assembly, table, basis, system: steadySystem(assembly, added), lossy });
}

/** Dense models from this size on are searched by superposition of their roots. */
const SUPERPOSED_SIZE = 6;

function solutionFor(model: SteadyModel, by: readonly number[]): Outcome<SteadySolution> {
  const { assembly, basis, system, table, lossy } = model;
  return steadySolution(assembly, system, by, () => {
    if (lossy || system.route === "band" || system.free < SUPERPOSED_SIZE) return undefined;
    const rates = table.modes.map(({ eigenvalue }) => eigenvalue[1] / (2 * Math.PI)).filter((f) => f > 0);
    const transfer = modalTransfer(assembly, basis, by);
    if (!transfer.ok || rates.length === 0) return undefined;
    const low = Math.min(...rates);
    const high = Math.max(...rates);
    // Below, between and above the roots, at no round ratio.
    const checkHz = [0.317 * low, Math.sqrt(low * high) * 1.0713, 1.713 * high];
    return { transfer: transfer.value, checkHz };
  });
}

/** The response to some drives at any frequency. */
export function steadyResponse(model: SteadyModel, by: readonly number[]): Outcome<FrequencyResponse> {
  const solution = solutionFor(model, by);
  if (!solution.ok) return fail(solution.reason);
  const quantities = new Map<string, SteadyQuantity>();
  let found: readonly Pole[] | undefined;
  const poles = (): readonly Pole[] => {
    found ??= polesFor(model, solution.value);
    return found;
  };
  // Refining the poles costs more than many values; a value at one frequency needs none where all are damped.
  const undamped = mayBeUndamped(model.table) ? poles : () => [];
  return succeed(
    frequencyResponseOf(solution.value, poles, undamped, (ref) => {
      const known = quantities.get(ref.text);
      if (known !== undefined) return known;
      const made = steadyQuantity(model.assembly, ref);
      quantities.set(ref.text, made);
      return made;
    }),
  );
}

/**
 * The stored sweep: the points that the spacing asks for, exactly, with more around every pole and every dip. A
 * point at which there is no finite value holds NaN in both parts.
 */
export function sweepAnswer(model: SteadyModel, ask: SweepAsk): Outcome<SweepAnswer> {
  const base = basePoints(ask);
  if (!base.ok) return fail(base.reason);
  const solved = solutionFor(model, ask.by);
  if (!solved.ok) return fail(solved.reason);
  const solution = solved.value;
  const poles = polesFor(model, solution);
  const quantities = ask.of.map((ref) => steadyQuantity(model.assembly, ref));
  const axis = withPoles(base.value, poles, STORED_SPACING);
  if (axis.length > MOST_POINTS) return fail(`the sweep would hold more than ${MOST_POINTS} points`);
  const table = closeDips(solution, poles, quantities, evaluate(solution, poles, quantities, axis));
  const searched = merged(
    table,
    evaluate(solution, poles, quantities, sampleFrequencies([], ask.fromHz, ask.toHz, SEARCH_PER_DECADE)),
  );
  const series = new Map<string, { unit: string; re: Float64Array; im: Float64Array }>();
  const peaks = new Map<string, Peak | { reason: string }>();
  ask.of.forEach((ref, q) => {
    series.set(ref.text, { unit: ref.unit, re: table.re[q], im: table.im[q] });
    peaks.set(ref.text, peakOf(solution.quick, poles, quantities[q], searched, q, ask));
  });
  return succeed({ kind: "sweep", frequencyHz: table.axis, series, peaks });
}

function peakOf(
  solution: SteadySolution["at"],
  poles: readonly Pole[],
  quantity: SteadyQuantity,
  { axis, re, im }: Values,
  q: number,
  { fromHz, toHz }: SweepAsk,
): Peak | { reason: string } {
  const reader = poleAwareReader(solution, poles, quantity);
  const reason = unboundedReason({ solution, quantity, poles, reader }, fromHz, toHz);
  if (reason !== undefined) return { reason };
  const samples: Sample[] = [];
  for (let i = 0; i < axis.length; i++) {
    const size = Math.sqrt(re[q][i] * re[q][i] + im[q][i] * im[q][i]);
    if (Number.isFinite(size)) samples.push({ f: axis[i], size, re: re[q][i], im: im[q][i] });
  }
  if (samples.length === 0) return { reason: "it has no finite value in the band" };
  return polishedPeak(reader, samples);
}

/** Whether refining could leave a root without damping: loss factors and dampers change it by far less. */
const mayBeUndamped = ({ modes }: ModeTable): boolean =>
  modes.some(({ eigenvalue: [re, im] }) => im > 0 && Math.abs(re) <= 1e-6 * im);

function polesFor(model: SteadyModel, solution: SteadySolution): Pole[] {
  const ratios = solution.groups.map((g) => g.ratio);
  return polesOf(model.table, ratios, model.lossy ? model.system : undefined);
}

function basePoints({ fromHz, toHz, points, spacing }: SweepAsk): Outcome<Float64Array> {
  if (!(0 <= fromHz && fromHz <= toHz && Number.isFinite(toHz))) {
    return fail(`a sweep runs from a frequency up to a higher one, found ${fromHz} Hz to ${toHz} Hz`);
  }
  if (spacing === "log" && fromHz === 0) {
    return fail("a sweep with log spacing cannot start at 0 Hz; write spacing = even or a higher start");
  }
  if (fromHz === toHz) return succeed(Float64Array.of(fromHz));
  const count = Math.min(MOST_POINTS, Math.max(2, Math.ceil(points)));
  const last = count - 1;
  const at =
    spacing === "log"
      ? (i: number) => fromHz * (toHz / fromHz) ** (i / last)
      : (i: number) => fromHz + ((toHz - fromHz) * i) / last;
  return succeed(
    Float64Array.from({ length: count }, (_, i) => (i === 0 ? fromHz : i === last ? toHz : at(i))),
  );
}

interface Values {
  readonly axis: Float64Array;
  readonly re: Float64Array[];
  readonly im: Float64Array[];
}

function evaluate(
  solution: SteadySolution,
  poles: readonly Pole[],
  quantities: readonly SteadyQuantity[],
  axis: Float64Array,
): Values {
  const re = quantities.map(() => new Float64Array(axis.length));
  const im = quantities.map(() => new Float64Array(axis.length));
  const out = new Float64Array(2);
  const undamped = poles.filter((p) => p.halfWidthHz === 0);
  const plain = solution.groups.length === 1 ? plainMotions(quantities) : undefined;
  let careful: ReturnType<typeof poleAwareReader>[] | undefined;
  for (let i = 0; i < axis.length; i++) {
    const atPole = undamped.some((p) => Math.abs(axis[i] - p.atHz) <= 1e-9 * p.atHz);
    const states = atPole ? undefined : solution.quick(axis[i]);
    if (plain !== undefined && states?.ok) {
      plain(states.value[0], i, re, im);
      continue;
    }
    for (let q = 0; q < quantities.length; q++) {
      if (states?.ok) {
        steadyValue(quantities[q], states.value, out);
      } else {
        careful ??= quantities.map((quantity) => poleAwareReader(solution.quick, poles, quantity));
        const got = careful[q](axis[i]);
        out[0] = got.ok ? got.value[0] : Number.NaN;
        out[1] = got.ok ? got.value[1] : Number.NaN;
      }
      re[q][i] = out[0];
      im[q][i] = out[1];
    }
  }
  return { axis, re, im };
}

/** Puts points into dips: where a magnitude has a local minimum at which the response turns sharply. */
function closeDips(
  solution: SteadySolution,
  poles: readonly Pole[],
  quantities: readonly SteadyQuantity[],
  first: Values,
): Values {
  let table = first;
  let left = Math.min(MOST_DIP_POINTS, MOST_POINTS - table.axis.length);
  for (let round = 0; round < DIP_ROUNDS && left > 0; round++) {
    const wanted = new Set<number>();
    quantities.forEach((_, q) => {
      for (const f of dipPoints(table, q)) wanted.add(f);
    });
    const more = Float64Array.from(wanted).sort().slice(0, left);
    if (more.length === 0) break;
    left -= more.length;
    table = merged(table, evaluate(solution, poles, quantities, more));
  }
  return table;
}

/** Where the straight lines of the complex response beside a local minimum pass nearest to zero. */
function dipPoints(table: Values, q: number): number[] {
  const { axis } = table;
  const re = table.re[q];
  const im = table.im[q];
  const found: number[] = [];
  let before = Number.POSITIVE_INFINITY;
  let here = re[0] * re[0] + im[0] * im[0];
  for (let i = 0; i + 1 < axis.length; i++) {
    const next = re[i + 1] * re[i + 1] + im[i + 1] * im[i + 1];
    if (i > 0 && here < before && here < next) {
      for (const other of [i - 1, i + 1]) {
        const dr = re[other] - re[i];
        const di = im[other] - im[i];
        const square = dr * dr + di * di;
        const share = square > 0 ? -(re[i] * dr + im[i] * di) / square : 0;
        // A dip that the points at hand already show to a tenth needs no more of them.
        if (!(share > 0.02 && share < 0.98)) continue;
        const across = re[i] * di - im[i] * dr;
        if (across * across < 0.8 * here * square) found.push(axis[i] + share * (axis[other] - axis[i]));
      }
    }
    before = here;
    here = next;
  }
  return found;
}

function merged(a: Values, b: Values): Values {
  const total = a.axis.length + b.axis.length;
  const axis = new Float64Array(total);
  const from = new Int32Array(total);
  let [i, j, count] = [0, 0, 0];
  while (i < a.axis.length || j < b.axis.length) {
    const takeA = j >= b.axis.length || (i < a.axis.length && a.axis[i] <= b.axis[j]);
    const f = takeA ? a.axis[i] : b.axis[j];
    if (count === 0 || axis[count - 1] !== f) {
      axis[count] = f;
      from[count++] = takeA ? i : -1 - j;
    }
    if (takeA) i++;
    else j++;
  }
  const pick = (p: Float64Array, r: Float64Array) => {
    const out = new Float64Array(count);
    for (let k = 0; k < count; k++) out[k] = from[k] >= 0 ? p[from[k]] : r[-1 - from[k]];
    return out;
  };
  return {
    axis: axis.slice(0, count),
    re: a.re.map((column, q) => pick(column, b.re[q])),
    im: a.im.map((column, q) => pick(column, b.im[q])),
  };
}

/** Modal damping over the free coordinates; loss factors stay with their springs. */
function freeDamping(basis: ModalBasis): FreeDamping | undefined {
  const rates = basis.modalRates(false);
  const { assembly, undamped } = basis;
  const n = assembly.free;
  const supports = assembly.supports.length;
  const matrix = new Float64Array(n * n);
  const support = new Float64Array(n * supports);
  for (let r = 0; r < undamped.count; r++) {
    if (rates[r] === 0) continue;
    const momentum = momentumOf(assembly, basis.shape(r));
    for (let i = 0; i < n; i++) {
      const factor = rates[r] * momentum[i];
      if (factor !== 0) for (let j = 0; j < n; j++) matrix[i * n + j] += factor * momentum[j];
    }
    const places = supportPlaces(basis, r, supports);
    for (let s = 0; s < supports; s++) {
      for (let i = 0; i < n; i++) support[i * supports + s] += rates[r] * momentum[i] * places[s];
    }
  }
  return { matrix, support };
}

/** M phi over the free coordinates. */
function momentumOf(assembly: Assembly, shape: Float64Array): Float64Array {
  const out = new Float64Array(assembly.free);
  for (const { form, value } of assembly.inertias) {
    let travel = 0;
    form.coordinates.forEach((i, k) => {
      travel += form.factors[k] * shape[i];
    });
    form.coordinates.forEach((i, k) => {
      out[i] += value * travel * form.factors[k];
    });
  }
  return out;
}
