import { formatNumber } from "../../units/show.ts";
import { EITHER, type FunctionDescription, given, measureResult } from "./function.ts";

const MECHANICS = "any textbook of mechanics";
const VIBRATION = "any textbook of vibration";

/** Moments of inertia of plain shapes. */
const INERTIA_HELPERS: readonly FunctionDescription[] = [
  {
    name: "disc",
    group: "helper",
    parameters: [given("mass", "mass", "its mass"), given("radius", "length", "its radius")],
    result: measureResult("inertia"),
    says: "moment of inertia of a solid disc or cylinder about its axis",
    example: "disc(85 kg, 0.3 m)",
    formula: "J = m r^2 / 2",
    validity: "uniform, about the axis of the cylinder",
    source: MECHANICS,
    evaluate: ([mass, radius]) => (mass * radius ** 2) / 2,
  },
  {
    name: "rod",
    group: "helper",
    parameters: [given("mass", "mass", "its mass"), given("length", "length", "its length")],
    result: measureResult("inertia"),
    says: "moment of inertia of a slender rod about its centre, across its length",
    example: "rod(120 kg, 6 m)",
    formula: "J = m L^2 / 12",
    validity: "uniform and slender; about an end it is m L^2 / 3",
    source: MECHANICS,
    evaluate: ([mass, length]) => (mass * length ** 2) / 12,
  },
  {
    name: "ring",
    group: "helper",
    parameters: [
      given("mass", "mass", "its mass"),
      given("inner", "length", "inner radius"),
      given("outer", "length", "outer radius"),
    ],
    result: measureResult("inertia"),
    says: "moment of inertia of a ring or hollow cylinder about its axis",
    example: "ring(40 kg, 0.2 m, 0.3 m)",
    formula: "J = m (r_i^2 + r_o^2) / 2",
    validity: "uniform, about the axis of the cylinder",
    source: MECHANICS,
    evaluate: ([mass, inner, outer]) => (mass * (inner ** 2 + outer ** 2)) / 2,
    outside: ([, inner, outer]) =>
      0 <= inner && inner <= outer ? undefined : "the inner radius is larger than the outer one",
  },
];

const RAYLEIGH_PARAMETERS = [
  given("z1", "share", "damping ratio at the first frequency"),
  given("f1", "rate", "first frequency"),
  given("z2", "share", "damping ratio at the second frequency"),
  given("f2", "rate", "second frequency"),
];
const RAYLEIGH_VALIDITY =
  "both coefficients not negative; between the two frequencies the ratio dips, outside it grows";

const DAMPING_HELPERS: readonly FunctionDescription[] = [
  {
    name: "stiffness_for",
    group: "helper",
    parameters: [
      given("rate", "rate", "natural frequency wanted"),
      given("mass", "inertance", "mass or moment of inertia on it", { motions: EITHER }),
    ],
    result: measureResult("stiffness", 1),
    says: "stiffness that gives a mass a natural frequency",
    example: "stiffness_for(4 Hz, 420 kg)",
    formula: "k = m (2 pi f)^2",
    validity: "one mass on one spring to ground",
    source: VIBRATION,
    evaluate: ([hertz, mass]) => mass * (2 * Math.PI * hertz) ** 2,
  },
  {
    name: "critical_damping",
    group: "helper",
    parameters: [
      given("k", "stiffness", "stiffness", { motions: EITHER }),
      given("m", "inertance", "mass or moment of inertia", { motions: EITHER }),
    ],
    result: measureResult("damping", 0),
    says: "damping at which one mass on one spring just no longer swings",
    example: "0.05 * critical_damping(26.5 N/mm, 105 kg)",
    formula: "c = 2 sqrt(k m)",
    validity: "one mass on one spring to ground",
    source: VIBRATION,
    evaluate: ([k, m]) => 2 * Math.sqrt(k * m),
  },
  {
    name: "decay_ratio",
    group: "helper",
    parameters: [
      given("first", "any", "a peak of a free decay"),
      given("next", "any", "the peak so many cycles later, of the same kind"),
      given("cycles", "number", "cycles between the two"),
    ],
    result: measureResult("share"),
    says: "damping ratio from two peaks of a free decay",
    example: "decay_ratio(8.4 mm, 2.1 mm, 5)",
    formula: "delta = ln(first/next)/cycles, zeta = delta / sqrt(4 pi^2 + delta^2)",
    validity: "viscous damping, one mode, peaks of the same side",
    source: VIBRATION,
    evaluate: ([first, next, cycles]) => {
      const decrement = first / next > 0 ? Math.log(first / next) / cycles : Number.NaN;
      return decrement / Math.hypot(2 * Math.PI, decrement);
    },
    outside: ([first, next, cycles]) => {
      if (!(cycles > 0)) return `${formatNumber(cycles)} cycles lie between no two peaks`;
      return Math.abs(first) >= Math.abs(next) ? undefined : "the later peak is the larger one: this grows";
    },
  },
  {
    name: "mass_damping_for",
    group: "helper",
    parameters: RAYLEIGH_PARAMETERS,
    result: measureResult("decay"),
    says: "the mass_damping that, with stiffness_damping_for, gives two damping ratios at two frequencies",
    example: "mass_damping_for(2 %, 2 Hz, 5 %, 15 Hz)",
    formula: "zeta = (a/w + b w)/2 at both; a = 2 w1 w2 (z1 w2 - z2 w1)/(w2^2 - w1^2)",
    validity: RAYLEIGH_VALIDITY,
    source: VIBRATION,
    evaluate: (numbers) => rayleigh(numbers).mass,
    outside: negativeRayleigh,
  },
  {
    name: "stiffness_damping_for",
    group: "helper",
    parameters: RAYLEIGH_PARAMETERS,
    result: measureResult("time"),
    says: "the stiffness_damping that, with mass_damping_for, gives two damping ratios at two frequencies",
    example: "stiffness_damping_for(2 %, 2 Hz, 5 %, 15 Hz)",
    formula: "zeta = (a/w + b w)/2 at both; b = 2 (z2 w2 - z1 w1)/(w2^2 - w1^2)",
    validity: RAYLEIGH_VALIDITY,
    source: VIBRATION,
    evaluate: (numbers) => rayleigh(numbers).stiffness,
    outside: negativeRayleigh,
  },
];

export const MASS_AND_DAMPING_HELPERS: readonly FunctionDescription[] = [
  ...INERTIA_HELPERS,
  ...DAMPING_HELPERS,
];

/** Solves zeta = (a/w + b w)/2 at two frequencies: a in 1/s, b in s; not finite where they are one frequency. */
function rayleigh([z1, f1, z2, f2]: readonly number[]): {
  readonly mass: number;
  readonly stiffness: number;
} {
  const [w1, w2] = [2 * Math.PI * f1, 2 * Math.PI * f2];
  const spread = (w2 - w1) * (w2 + w1);
  return {
    mass: (2 * w1 * w2 * (z1 * w2 - z2 * w1)) / spread,
    stiffness: (2 * (z2 * w2 - z1 * w1)) / spread,
  };
}

function negativeRayleigh(numbers: readonly number[]): string | undefined {
  const { mass, stiffness } = rayleigh(numbers);
  if (mass < 0) return `mass_damping is negative, ${formatNumber(mass)} 1/s: low modes would be driven`;
  if (stiffness < 0)
    return `stiffness_damping is negative, ${formatNumber(stiffness)} s: high modes would be driven`;
  return undefined;
}
