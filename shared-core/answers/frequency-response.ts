/**
 * The `FrequencyResponse` of an ask's drives: exact at any frequency, extremes found between samples.
 *
 * An undamped pole that the drives excite and the quantity sees has no peak, but a reason; one that they do not
 * is passed by with the finite value it has on both sides.
 */
import type { QuantityRef } from "../mechanics/assembly.ts";
import { minimise } from "../numerics/minimise.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { findRoot } from "../numerics/roots.ts";
import type { FrequencyResponse } from "./analysis.ts";
import type { Peak } from "./answer.ts";
import { type Pole, sampleFrequencies } from "./frequency-poles.ts";
import { type SteadyQuantity, steadyScale, steadyValue } from "./frequency-quantity.ts";
import { type SampledStates, sampledStates } from "./frequency-samples.ts";
import type { SteadySolution } from "./frequency-solution.ts";

/** Points a decade of every search, beside those around the poles. */
const PER_DECADE = 120;
/** Bands whose samples are kept at a time. */
const KEPT_TABLES = 2;
/** Local maxima below this share of the largest sample cannot win: poles are sampled to a few per cent. */
const CONTENDER = 0.7;
/** Nearer to an undamped pole than this share of its frequency, the value is taken from beside it. */
export const TOO_NEAR = 1e-9;
/** Width to which a peak is closed in, as a share of the samples around it: the value errs by its square. */
const PEAK_TOLERANCE = 1e-6;
/** How far beside: the mean of both sides is then good to the square of it. */
const BESIDE = 1e-6;
/** Distance of the two looks by which an undamped pole is found to be seen: a pole doubles the value between them. */
const LOOK = 1e-7;
const SEEN = 1.2;
/** Share of the furthest motion near a pole below which a value is rounding: the mode does not move there. */
const UNSEEN = 1e-10;

/** Values of one quantity along the axis. */
export type Reader = (axisHz: number) => Outcome<readonly [number, number]>;

/** `poles` and `undamped`, those of them that nothing damps, are found when they are first asked for. */
export function frequencyResponseOf(
  solution: SteadySolution,
  poles: () => readonly Pole[],
  undamped: () => readonly Pole[],
  quantityOf: (ref: QuantityRef) => SteadyQuantity,
): FrequencyResponse {
  const extremes = new Map<string, Outcome<Peak>>();
  const kept = (key: string, find: () => Outcome<Peak>): Outcome<Peak> => {
    const known = extremes.get(key);
    if (known !== undefined) return known;
    const found = find();
    extremes.set(key, found);
    return found;
  };
  const tables = new Map<string, SampledStates>();
  const samples = (from: number, to: number) => {
    const key = `${from} ${to}`;
    let found = tables.get(key);
    if (found === undefined) {
      found = sampledStates(solution, sampleFrequencies(poles(), from, to, PER_DECADE));
      if (tables.size >= KEPT_TABLES) tables.delete(tables.keys().next().value as string);
      tables.set(key, found);
    }
    return found;
  };
  const searchFor = (ref: QuantityRef): Search => {
    const quantity = quantityOf(ref);
    const reader = poleAwareReader(solution.quick, undamped(), quantity);
    return { solution: solution.quick, reader, quantity, poles: poles(), samples };
  };
  return {
    at: (quantity, frequencyHz) =>
      poleAwareReader(solution.at, undamped(), quantityOf(quantity))(frequencyHz),
    peak: (quantity, fromHz, toHz) =>
      kept(`peak ${fromHz} ${toHz} ${quantity.text}`, () => largest(searchFor(quantity), fromHz, toHz)),
    least: (quantity, fromHz, toHz) =>
      kept(`least ${fromHz} ${toHz} ${quantity.text}`, () => smallest(searchFor(quantity), fromHz, toHz)),
  };
}

/** The quantity at any frequency; a reason at an undamped pole that it sees. */
export function poleAwareReader(
  solution: SteadySolution["at"],
  poles: readonly Pole[],
  quantity: SteadyQuantity,
): Reader {
  const plain = plainReader(solution, quantity);
  return (axisHz) => {
    const pole = poles.find(
      ({ atHz, halfWidthHz }) => halfWidthHz === 0 && Math.abs(axisHz - atHz) <= TOO_NEAR * atHz,
    );
    if (pole === undefined) return plain(axisHz);
    if (seesPole(solution, quantity, pole)) return fail(undampedReason(pole));
    const low = plain(pole.atHz * (1 - BESIDE));
    const high = plain(pole.atHz * (1 + BESIDE));
    if (!low.ok) return low;
    if (!high.ok) return high;
    return succeed([0.5 * (low.value[0] + high.value[0]), 0.5 * (low.value[1] + high.value[1])] as const);
  };
}

function plainReader(solution: SteadySolution["at"], quantity: SteadyQuantity): Reader {
  const out = new Float64Array(2);
  return (axisHz) => {
    const states = solution(axisHz);
    if (!states.ok) return fail(states.reason);
    steadyValue(quantity, states.value, out);
    return succeed([out[0], out[1]] as const);
  };
}

/** Whether the value grows without bound towards an undamped pole, and by more than rounding does. */
export function seesPole(solution: SteadySolution["at"], quantity: SteadyQuantity, pole: Pole): boolean {
  const out = new Float64Array(2);
  const sizeAt = (share: number) => {
    const states = solution(pole.atHz * (1 + share));
    if (!states.ok) return Number.POSITIVE_INFINITY;
    steadyValue(quantity, states.value, out);
    const size = Math.hypot(out[0], out[1]);
    return size > UNSEEN * steadyScale(quantity, states.value) ? size : 0;
  };
  const near = Math.max(sizeAt(LOOK), sizeAt(-LOOK));
  return near > 0 && near > SEEN * Math.max(sizeAt(2 * LOOK), sizeAt(-2 * LOOK));
}

export const undampedReason = ({ name, atHz }: Pole): string =>
  `not damped: ${name} at ${Number(atHz.toPrecision(5))} Hz has no damping`;

/** A value of a quantity on the axis. */
export interface Sample {
  readonly f: number;
  readonly size: number;
  readonly re: number;
  readonly im: number;
}

/** What a search needs: the quantity, the poles and the states along the axis. */
interface Search {
  readonly solution: SteadySolution["at"];
  readonly reader: Reader;
  readonly quantity: SteadyQuantity;
  readonly poles: readonly Pole[];
  readonly samples: (from: number, to: number) => SampledStates;
}

/** Samples between the ends; those where there is no value are left out. */
function samplesOf(
  { reader, quantity, poles, samples }: Search,
  from: number,
  to: number,
): Outcome<Sample[]> {
  const undamped = poles.filter(({ halfWidthHz }) => halfWidthHz === 0);
  const states = samples(from, to);
  const out: Sample[] = [];
  const value = new Float64Array(2);
  for (let i = 0; i < states.axis.length; i++) {
    const f = states.axis[i];
    if (undamped.some(({ atHz }) => Math.abs(f - atHz) <= TOO_NEAR * atHz)) {
      const got = reader(f);
      if (got.ok) out.push(sampleAt(f, got.value[0], got.value[1]));
      continue;
    }
    const at = states.at(i);
    if (at === undefined) continue;
    steadyValue(quantity, at, value);
    out.push(sampleAt(f, value[0], value[1]));
  }
  return out.length > 0 ? succeed(out) : fail("there is no finite value between the ends");
}

const sampleAt = (f: number, re: number, im: number): Sample => ({ f, re, im, size: Math.hypot(re, im) });

function largest(search: Search, from: number, to: number): Outcome<Peak> {
  if (!(0 <= from && from <= to)) return fail("the band must rise from a frequency to a higher one");
  const unbounded = unboundedReason(search, from, to);
  if (unbounded !== undefined) return fail(unbounded);
  const samples = samplesOf(search, from, to);
  return samples.ok ? succeed(polishedPeak(search.reader, samples.value)) : fail(samples.reason);
}

/** Why the quantity has no largest value in the band, if so: an undamped pole that it sees, a body that drifts. */
export function unboundedReason(
  { solution, quantity, poles, reader }: Pick<Search, "solution" | "quantity" | "poles" | "reader">,
  from: number,
  to: number,
): string | undefined {
  for (const pole of poles) {
    const inside = from * (1 - TOO_NEAR) <= pole.atHz && pole.atHz <= to * (1 + TOO_NEAR);
    if (pole.halfWidthHz === 0 && inside && seesPole(solution, quantity, pole)) return undampedReason(pole);
  }
  if (from > 0) return undefined;
  const first = reader(from);
  return first.ok ? undefined : first.reason;
}

/** The largest magnitude: of the samples, and of the local maxima between them that may exceed them. */
export function polishedPeak(reader: Reader, list: readonly Sample[]): Peak {
  let best = list[0];
  for (const s of list) if (s.size > best.size) best = s;
  let peak: Peak = { value: best.size, at: best.f };
  const sizeAt = sizeReader(reader);
  for (let i = 0; i < list.length; i++) {
    const here = list[i];
    const left = list[Math.max(0, i - 1)];
    const right = list[Math.min(list.length - 1, i + 1)];
    if (here.size < left.size || here.size < right.size || here.size < CONTENDER * best.size) continue;
    if (!(right.f > left.f) || !(here.size > 0)) continue;
    // The inverse square of a resonance is nearly a parabola, so that few steps are needed.
    const turn = minimise((f) => (here.size / sizeAt(f)) ** 2, left.f, right.f, {
      tolerance: PEAK_TOLERANCE * (right.f - left.f),
    });
    const found = turn.ok ? turn.value : turn.upTo;
    if (found === undefined || !(found.value > 0)) continue;
    const value = here.size / Math.sqrt(found.value);
    if (value > peak.value) peak = { value, at: found.x };
  }
  return peak;
}

function smallest(search: Search, from: number, to: number): Outcome<Peak> {
  if (!(0 <= from && from <= to)) return fail("the band must rise from a frequency to a higher one");
  const { reader } = search;
  const samples = samplesOf(search, from, to);
  if (!samples.ok) return fail(samples.reason);
  const list = samples.value;
  let best = list[0];
  for (const s of list) if (s.size < best.size) best = s;
  let least: Peak = { value: best.size, at: best.f };
  const take = (f: number, value: number) => {
    if (value < least.value) least = { value, at: f };
  };
  for (let i = 0; i + 1 < list.length; i++) {
    const zero = zeroBetween(reader, list[i], list[i + 1]);
    if (zero !== undefined) take(zero.at, zero.value);
  }
  const sizeAt = sizeReader(reader);
  for (let i = 0; i < list.length; i++) {
    const left = list[Math.max(0, i - 1)];
    const right = list[Math.min(list.length - 1, i + 1)];
    if (list[i].size > left.size || list[i].size > right.size || !(right.f > left.f)) continue;
    const scale = Math.max(left.size, right.size) || 1;
    const turn = minimise((f) => sizeAt(f) / scale, left.f, right.f, {
      tolerance: 1e-9 * (right.f - left.f),
    });
    const found = turn.ok ? turn.value : turn.upTo;
    if (found !== undefined) take(found.x, found.value * scale);
  }
  return succeed(least);
}

/** A response that turns by about half a cycle between two samples passes zero there, or a pole. */
export function zeroBetween(reader: Reader, a: Sample, b: Sample): Peak | undefined {
  const along = a.re * b.re + a.im * b.im;
  if (!(along < -0.9 * a.size * b.size)) return undefined;
  // The part along the left phasor changes sign once.
  const root = findRoot(
    (f) => {
      const got = reader(f);
      return got.ok ? (got.value[0] * a.re + got.value[1] * a.im) / a.size : Number.NaN;
    },
    a.f,
    b.f,
  );
  if (!root.ok) return undefined;
  const got = reader(root.value.x);
  if (!got.ok) return undefined;
  const value = Math.hypot(got.value[0], got.value[1]);
  return value < Math.min(a.size, b.size) ? { value, at: root.value.x } : undefined;
}

function sizeReader(reader: Reader): (f: number) => number {
  return (f) => {
    const got = reader(f);
    return got.ok ? Math.hypot(got.value[0], got.value[1]) : Number.NaN;
  };
}
