/** Sweeps: steady responses along an axis that is fine where they are steep. */
import type { Assembly } from "../mechanics/assembly.ts";
import type { SweepAsk } from "../model/model.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { FrequencyResponse } from "./analysis.ts";
import type { ModeTable, Peak, SweepAnswer, SweepSeries } from "./answer.ts";
import { modalTransfer, symmetricTransfer } from "./frequency-modal.ts";
import { SteadyPoints, type Values } from "./frequency-points.ts";
import { growingMode, type Pole, polesOf, sampleFrequencies, withPoles } from "./frequency-poles.ts";
import { type SteadyQuantity, steadyQuantity } from "./frequency-quantity.ts";
import {
  frequencyResponseOf,
  poleAwareReader,
  polishedPeak,
  type Sample,
  unboundedReason,
} from "./frequency-response.ts";
import { type SteadySolution, steadySolution } from "./frequency-solution.ts";
import { type FreeDamping, type SteadySystem, steadySystem } from "./frequency-system.ts";
import { LazyMap, once } from "./lazy-map.ts";
import type { ModalBasis } from "./modes-basis.ts";
import { closeDips } from "./sweep-dips.ts";
import { hasAddedDamping, supportPlaces } from "./time-damping.ts";

/** Points of one sweep, refinement included. */
const MOST_POINTS = 200_000;
/** What is drawn around a pole: two points within the half-power width, then ever fewer. */
const STORED_SPACING = { first: 0.5, growth: 2, closest: 1e-4 };
/** Points a decade that peaks are looked for at beside the stored ones. */
const SEARCH_PER_DECADE = 120;

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
  return steadySolution(assembly, system, by, function* () {
    if (lossy || system.route === "band" || system.free < SUPERPOSED_SIZE) return;
    const rates = table.modes.map(({ eigenvalue }) => eigenvalue[1] / (2 * Math.PI)).filter((f) => f > 0);
    if (rates.length === 0) return;
    const low = Math.min(...rates);
    const high = Math.max(...rates);
    // Below, between and above the roots, at no round ratio.
    const checkHz = [0.317 * low, Math.sqrt(low * high) * 1.0713, 1.713 * high];
    const own = symmetricTransfer(assembly, basis, by);
    if (own !== undefined) yield { transfer: own, checkHz };
    const transfer = modalTransfer(assembly, basis, by);
    if (transfer.ok) yield { transfer: transfer.value, checkHz };
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
 * point at which a quantity has no finite value holds NaN in both parts, and its series says why. Peaks are
 * searched when they are first looked at.
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
  const points = new SteadyPoints(solution, poles, quantities);
  const table = closeDips(points, points.at(axis), MOST_POINTS - axis.length);
  const series = new Map<string, SweepSeries>();
  ask.of.forEach((ref, q) => {
    const reason = points.missing(q);
    const parts = { unit: ref.unit, re: table.re[q], im: table.im[q] };
    series.set(ref.text, reason === undefined ? parts : { ...parts, reason });
  });
  const searched = once(() => points.at(sampleFrequencies([], ask.fromHz, ask.toHz, SEARCH_PER_DECADE)));
  const indexOf = new Map(ask.of.map(({ text }, q) => [text, q]));
  const peaks = new LazyMap([...indexOf.keys()], (text) => {
    const q = indexOf.get(text) ?? 0;
    return peakOf(solution.quick, poles, quantities[q], samplesOf(table, searched(), q), ask);
  });
  return succeed({ kind: "sweep", frequencyHz: table.axis, series, peaks });
}

function peakOf(
  solution: SteadySolution["at"],
  poles: readonly Pole[],
  quantity: SteadyQuantity,
  samples: readonly Sample[],
  { fromHz, toHz }: SweepAsk,
): Peak | { reason: string } {
  const reader = poleAwareReader(solution, poles, quantity);
  const reason = unboundedReason({ solution, quantity, poles, reader }, fromHz, toHz);
  if (reason !== undefined) return { reason };
  if (samples.length === 0) return { reason: "it has no finite value in the band" };
  return polishedPeak(reader, samples);
}

/** Finite values of quantity q in both tables, by frequency, each frequency once. */
function samplesOf(a: Values, b: Values, q: number): Sample[] {
  const out: Sample[] = [];
  let [i, j] = [0, 0];
  while (i < a.axis.length || j < b.axis.length) {
    const [fa, fb] = [a.axis[i] ?? Number.POSITIVE_INFINITY, b.axis[j] ?? Number.POSITIVE_INFINITY];
    const [from, at] = fa <= fb ? [a, i] : [b, j];
    if (fa <= fb) i++;
    if (fb <= fa) j++;
    const [re, im] = [from.re[q][at], from.im[q][at]];
    const size = Math.sqrt(re * re + im * im);
    if (Number.isFinite(size)) out.push({ f: from.axis[at], size, re, im });
  }
  return out;
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
  const out = new Float64Array(count);
  for (let i = 1; i < last; i++) {
    out[i] =
      spacing === "log" ? fromHz * (toHz / fromHz) ** (i / last) : fromHz + ((toHz - fromHz) * i) / last;
  }
  out[0] = fromHz;
  out[last] = toHz;
  return succeed(out);
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
