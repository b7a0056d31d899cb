/**
 * The mode table: free modes (number 0), elastic ones from 1 with the complex roots matched to them, and the
 * roots that no undamped mode stands behind.
 */
import { formValue } from "../mechanics/forms.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import type { ElementShare, Mode, ModeTable } from "./answer.ts";
import { type ModalBasis, namedValues } from "./modes-basis.ts";
import { matchRoots } from "./modes-match.ts";
import type { Root } from "./modes-roots.ts";

type Shape = Mode["shape"];

/** Entries within this share of the largest are taken for equally large: the first of them becomes 1. */
const SAME_SIZE = 1e-9;

/** Roots, damping, shapes, participation and energy shares of an assembly's modes. */
export function modeTable(basis: ModalBasis): Outcome<ModeTable> {
  const { undamped } = basis;
  const found = basis.complexRoots();
  if (!found.ok) return fail(found.reason);
  const { roots, coupled } = found.value;
  const { free, held, count, values } = undamped;
  const { ofMode, left } = found.value.matching ?? matchRoots(roots, undamped, free + held);
  const modes: Mode[] = [];
  for (let r = 0; r < free; r++) modes.push(freeMode(basis, r));
  for (let r = free + held; r < count; r++) {
    const own = ofMode[r].map((s) => roots[s]);
    if (own.length === 0) return fail(`no root was found for the mode at ${hertz(values[r])} Hz`);
    modes.push(elasticMode(basis, r, own, coupled));
  }
  const others = left.map((s) => roots[s]).sort((a, b) => size(a) - size(b) || a.re - b.re);
  for (const root of others) modes.push(looseMode(basis, root));
  let stabilityMargin = Number.POSITIVE_INFINITY;
  for (const { re } of roots) stabilityMargin = Math.min(stabilityMargin, 0 - re);
  return succeed({ modes, stabilityMargin });
}

const size = ({ re, im }: Root): number => Math.hypot(re, im);

const hertz = (value: number): number => Math.sqrt(Math.max(0, value)) / (2 * Math.PI);

function freeMode(basis: ModalBasis, r: number): Mode {
  const { massDamping } = basis.assembly;
  return new ShapedMode(basis, r, {
    number: 0,
    frequencyHz: 0,
    dampedFrequencyHz: 0,
    dampingRatio: null,
    eigenvalue: [0, 0],
    realRoots: massDamping === 0 ? undefined : [-massDamping, 0],
  });
}

function elasticMode(basis: ModalBasis, r: number, roots: readonly Root[], coupled: boolean): Mode {
  const { free, held, values } = basis.undamped;
  const slow = roots.length > 1 && Math.abs(roots[1].re) < Math.abs(roots[0].re) ? roots[1] : roots[0];
  const own: OwnRoots = {
    number: r - free - held + 1,
    frequencyHz: hertz(values[r]),
    dampedFrequencyHz: slow.im / (2 * Math.PI),
    dampingRatio: dampingRatio(roots),
    eigenvalue: [slow.re, slow.im],
    realRoots: roots.length === 2 ? realRoots(roots) : undefined,
  };
  return new ShapedMode(basis, r, own, coupled ? slow : undefined);
}

/** A root that no undamped mode stands behind. */
function looseMode(basis: ModalBasis, root: Root): Mode {
  const shape = lazy(() => complexShape(basis, root));
  const shares = lazy(() => strainShares(basis, root));
  return {
    number: null,
    frequencyHz: null,
    dampedFrequencyHz: root.im / (2 * Math.PI),
    dampingRatio: root.im === 0 ? null : dampingRatio([root]),
    eigenvalue: [root.re, root.im],
    get shape() {
      return shape();
    },
    modalMass: null,
    effectiveMass: {},
    participation: {},
    get energyShare() {
      return shares();
    },
  };
}

/** -Re/|root| of a pair; of two real roots that both decay or both grow, the ratio of the oscillator they make. */
function dampingRatio(roots: readonly Root[]): number | null {
  const [first, second] = roots;
  if (second === undefined) return size(first) > 0 ? (0 - first.re) / size(first) : null;
  const product = first.re * second.re;
  return product > 0 ? (0 - first.re - second.re) / (2 * Math.sqrt(product)) : null;
}

function realRoots(roots: readonly Root[]): readonly [number, number] {
  const [a, b] = roots.map(({ re }) => re);
  return a <= b ? [a, b] : [b, a];
}

/** What the roots of a mode say of it. */
interface OwnRoots {
  readonly number: number;
  readonly frequencyHz: number;
  readonly dampedFrequencyHz: number;
  readonly dampingRatio: number | null;
  readonly eigenvalue: readonly [number, number];
  readonly realRoots: readonly [number, number] | undefined;
}

/** A mode with an undamped shape; what the shape gives is computed when looked at, in a large model seldom. */
class ShapedMode implements Mode {
  readonly number: number;
  readonly frequencyHz: number;
  readonly dampedFrequencyHz: number;
  readonly dampingRatio: number | null;
  readonly eigenvalue: readonly [number, number];
  readonly realRoots: readonly [number, number] | undefined;
  readonly #basis: ModalBasis;
  readonly #mode: number;
  readonly #root: Root | undefined;
  #scaled: { readonly shape: Shape; readonly largest: number } | undefined;
  #complex: Shape | undefined;
  #shares: Record<string, number> | undefined;

  /** `mode` counts in the basis; `root` is the one whose complex shape differs from the undamped one. */
  constructor(basis: ModalBasis, mode: number, own: OwnRoots, root?: Root) {
    this.number = own.number;
    this.frequencyHz = own.frequencyHz;
    this.dampedFrequencyHz = own.dampedFrequencyHz;
    this.dampingRatio = own.dampingRatio;
    this.eigenvalue = own.eigenvalue;
    this.realRoots = own.realRoots;
    this.#basis = basis;
    this.#mode = mode;
    this.#root = root;
  }

  get shape(): Shape {
    return this.#largest().shape;
  }

  get complexShape(): Shape | undefined {
    if (this.#root !== undefined) this.#complex ??= complexShape(this.#basis, this.#root);
    return this.#complex;
  }

  get modalMass(): number {
    return 1 / this.#largest().largest ** 2;
  }

  get effectiveMass(): Record<string, number> {
    const all = this.#basis.participation(this.#mode);
    return Object.fromEntries(all.map((p) => [p.direction, (p.factor * p.factor) / p.total]));
  }

  get participation(): Record<string, number> {
    const { largest } = this.#largest();
    const all = this.#basis.participation(this.#mode);
    return Object.fromEntries(all.map((p) => [p.direction, p.factor * largest]));
  }

  get energyShare(): Record<string, number> {
    this.#shares ??= byElement(this.#basis, this.#basis.energyShares(this.#mode));
    return this.#shares;
  }

  shareOf(element: string): number {
    if (this.#shares !== undefined) return this.#shares[element] ?? 0;
    const index = this.#basis.assembly.elements.findIndex(({ name }) => name === element);
    return this.#basis.energyShares(this.#mode)?.[index] ?? 0;
  }

  get largestShare(): ElementShare | undefined {
    const shares = this.#basis.energyShares(this.#mode);
    const { elements } = this.#basis.assembly;
    let most = -1;
    for (let e = 0; shares !== undefined && e < shares.length; e++) {
      const counts = elements[e].stiffness !== 0 && Number.isFinite(shares[e]);
      if (counts && (most < 0 || shares[e] > (shares as Float64Array)[most])) most = e;
    }
    return shares === undefined || most < 0 ? undefined : { name: elements[most].name, share: shares[most] };
  }

  #largest(): { readonly shape: Shape; readonly largest: number } {
    if (this.#scaled === undefined) {
      const named = namedValues(this.#basis.assembly, this.#basis.shape(this.#mode));
      const still = new Float64Array(named.length);
      const largest = named[largestAt(named, still)] || 1;
      this.#scaled = { shape: { re: named.map((v) => v / largest), im: still }, largest };
    }
    return this.#scaled;
  }
}

function byElement(basis: ModalBasis, shares: Float64Array | undefined): Record<string, number> {
  const out: Record<string, number> = {};
  if (shares === undefined) return out;
  basis.assembly.elements.forEach(({ name, stiffness }, e) => {
    if (stiffness !== 0) out[name] = shares[e];
  });
  return out;
}

/** Shape of a root over the free coordinates. */
export function freeShapeOf(basis: ModalBasis, { shape }: Root): Shape {
  const { reduction, condensed, count } = basis.undamped;
  const part = (given: Float64Array): Float64Array => {
    const inertial = shape.basis === "inertial" ? given : fromModes(basis, given);
    const reduced = Float64Array.from(condensed.inner, (form, i) => {
      return formValue(form, inertial) + (i < count ? 0 : given[i]);
    });
    return Float64Array.from(reduction.recovery, (form) => formValue(form, reduced));
  };
  return { re: part(shape.re), im: part(shape.im) };
}

/** Inertial coordinates for factors of the undamped modes. */
function fromModes({ undamped }: ModalBasis, factors: Float64Array): Float64Array {
  const { count, vectors } = undamped;
  const out = new Float64Array(count);
  for (let r = 0; r < count; r++) {
    const factor = factors[r];
    if (factor === 0) continue;
    for (let i = 0; i < count; i++) out[i] += factor * vectors[r * count + i];
  }
  return out;
}

/** Shape of a root over the named coordinates, largest entry 1. */
function complexShape(basis: ModalBasis, root: Root): Shape {
  const free = freeShapeOf(basis, root);
  const re = namedValues(basis.assembly, free.re);
  const im = namedValues(basis.assembly, free.im);
  const at = largestAt(re, im);
  const square = re[at] * re[at] + im[at] * im[at];
  if (!(square > 0)) return { re, im };
  const [a, b] = [re[at] / square, -im[at] / square];
  return { re: re.map((x, i) => x * a - im[i] * b), im: im.map((y, i) => y * a + re[i] * b) };
}

function strainShares(basis: ModalBasis, root: Root): Record<string, number> {
  const { re, im } = freeShapeOf(basis, root);
  const { elements } = basis.assembly;
  const energies = Float64Array.from(
    elements,
    ({ form, stiffness }) => stiffness * (formValue(form, re) ** 2 + formValue(form, im) ** 2),
  );
  const sum = energies.reduce((a, b) => a + b, 0);
  return byElement(basis, sum > 0 ? energies.map((energy) => energy / sum) : undefined);
}

function largestAt(re: Float64Array, im: Float64Array): number {
  let at = 0;
  let most = 0;
  for (let i = 0; i < re.length; i++) {
    const entry = im[i] === 0 ? Math.abs(re[i]) : Math.hypot(re[i], im[i]);
    if (entry > most * (1 + SAME_SIZE)) {
      most = entry;
      at = i;
    }
  }
  return at;
}

function lazy<T>(compute: () => T): () => T {
  let known: { value: T } | undefined;
  return () => {
    known ??= { value: compute() };
    return known.value;
  };
}
