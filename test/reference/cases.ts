import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import type { CaseReport } from "../../shared-core/index.ts";

/** One expected number of data/cases.json, with the source that stands behind it. */
export interface ExpectedNumber {
  readonly quantity: string;
  readonly value: number;
  readonly unit: string;
  readonly rel_tol: number;
  readonly abs_tol?: number;
}

export interface ReferenceCase {
  readonly id: string;
  readonly topic: string;
  readonly statement: string;
  readonly expected: readonly ExpectedNumber[];
  readonly source: { readonly kind: string; readonly citation: string };
}

const here = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

export const referenceCases: readonly ReferenceCase[] = JSON.parse(
  readFileSync(here("data/cases.json"), "utf8"),
);

/** The models of a case: `ID.thrum`, or `ID.a.thrum`, `ID.b.thrum` for its parts. */
export function modelsOf(
  id: string,
): { readonly part: string; readonly path: string; readonly text: string }[] {
  return readdirSync(here("cases"))
    .filter((file) => file.split(".")[0] === id && file.endsWith(".thrum"))
    .sort()
    .map((file) => ({
      part: file.split(".").length === 3 ? file.split(".")[1] : "",
      path: file,
      text: readFileSync(here(`cases/${file}`), "utf8"),
    }));
}

/** Units of data/cases.json in SI (rates in Hz): the definitions of NIST SP 811. */
const UNITS: Readonly<Record<string, number>> = {
  "1": 1,
  "%": 0.01,
  Hz: 1,
  "Hz per N/m": 1,
  "Hz/kg": 1,
  "rad/s": 1 / (2 * Math.PI),
  "1/s": 1,
  "r/min": 1 / 60,
  s: 1,
  m: 1,
  in: 0.0254,
  "in^4": 0.0254 ** 4,
  "m^4": 1,
  micrometre: 1e-6,
  "micrometre (= g mm/kg)": 1e-6,
  "m/s": 1,
  "mm/s": 1e-3,
  "mm/s rms": 1e-3,
  "mm/s peak": 1e-3,
  "m/s^2": 1,
  g: 9.80665,
  deg: Math.PI / 180,
  kg: 1,
  "kg m^2": 1,
  "g mm": 1e-6,
  slug: 4.4482216152605 / 0.3048,
  "lbf s^2/in": 4.4482216152605 / 0.0254,
  N: 1,
  "N s/m": 1,
  "N/m": 1,
  "m/N": 1,
  W: 1,
  "N m/rad": 1,
  "N m s/rad": 1,
  "lbf in/rad": 4.4482216152605 * 0.0254,
};

/** `g` is standard gravity in the cases about shock and random vibration, the gram in the one about balancing. */
export const unitFactor = (id: string, unit: string): number =>
  unit === "g" && id === "p61-limits-balance-grade" ? 1e-3 : UNITS[unit];

type Reader = (report: CaseReport) => number;

const table = (report: CaseReport) => {
  if (!report.modes.ok) throw new Error(report.modes.reason);
  return report.modes.table.modes;
};
const mode = (report: CaseReport, number: number) => {
  const found = table(report).find((row) => row.number === number);
  if (!found) throw new Error(`no mode ${number}`);
  return found;
};
const coordinate = (report: CaseReport, name: string): number =>
  report.instance.assembly.coordinates.findIndex((c) => c.name === name);
/** Ratio of two entries of an undamped shape. */
const ratio = (report: CaseReport, number: number, over: string, under: string): number => {
  const { re } = mode(report, number).shape;
  return re[coordinate(report, over)] / re[coordinate(report, under)];
};
const size = (report: CaseReport, number: number): number => Math.hypot(...mode(report, number).eigenvalue);
const unpartnered = (report: CaseReport): readonly (readonly [number, number])[] =>
  table(report)
    .filter((row) => row.number === null)
    .map((row) => row.eigenvalue);
/** Every root of a table, both of a pair and both real ones of an overdamped mode. */
const roots = (report: CaseReport): (readonly [number, number])[] =>
  table(report).flatMap((row) => {
    if (row.realRoots) return row.realRoots.map((r) => [r, 0] as const);
    const [re, im] = row.eigenvalue;
    return im === 0 ? [[re, 0] as const] : [[re, im] as const, [re, -im] as const];
  });
/** Where a shape crosses zero on a line of the given length between two coordinates, from the first. */
const node = (report: CaseReport, number: number, a: string, b: string, length: number): number =>
  length / (1 - ratio(report, number, b, a));

/** Numbers that no expectation speaks of, read from the mode table. Key: case, then part and quantity. */
export const FROM_MODES: Readonly<Record<string, Readonly<Record<string, Reader>>>> = {
  "p15-equal-chains": { "c: free-free, mode 1": (r) => mode(r, 0).frequencyHz ?? Number.NaN },
  "p16-free-free-two-mass": {
    ": rigid-body frequency": (r) => mode(r, 0).frequencyHz ?? Number.NaN,
    ": elastic mode amplitude ratio x2/x1": (r) => ratio(r, 1, "b", "a"),
  },
  "p20-nonproportional-damping": {
    ": mode 1 |s|/2pi": (r) => size(r, 1) / (2 * Math.PI),
    ": mode 2 |s|/2pi": (r) => size(r, 2) / (2 * Math.PI),
  },
  "p22-effective-modal-mass": {
    ": mode 1 participation factor with top-floor amplitude scaled to 1": (r) => {
      const shape = [1, ratio(r, 1, "middle", "top"), ratio(r, 1, "low", "top")];
      return shape.reduce((a, x) => a + x, 0) / shape.reduce((a, x) => a + x * x, 0);
    },
  },
  "p23-two-mass-frf": { ": mode 1 amplitude ratio x2/x1": (r) => ratio(r, 1, "two", "one") },
  "p24-half-car": {
    ": mode 1 distance of the node from the centre of gravity, |z/p|": (r) => Math.abs(ratio(r, 1, "z", "p")),
    ": mode 2 distance of the node from the centre of gravity, |z/p|": (r) => Math.abs(ratio(r, 2, "z", "p")),
  },
  "p28-zener-mount": {
    "a: oscillating pair |s|/2pi": (r) => size(r, 1) / (2 * Math.PI),
    "a: real eigenvalue": (r) => unpartnered(r)[0][0],
  },
  "p29-maxwell-mount-massless-node": {
    "a: zero eigenvalue": (r) => Math.min(...roots(r).map((z) => Math.hypot(...z))),
    "a: |s| of the other pair": (r) => Math.max(...roots(r).map((z) => Math.hypot(...z))) / (2 * Math.PI),
    "a: sum of the other two eigenvalues": (r) => roots(r).reduce((sum, z) => sum + z[0], 0),
    "a: damping ratio of the pair": (r) => {
      const [re, im] = [...roots(r)].sort((a, b) => Math.hypot(b[0], b[1]) - Math.hypot(a[0], a[1]))[0];
      return -re / Math.hypot(re, im);
    },
  },
  "p31-two-disc-imperial": {
    "a: distance of the node from the 12 lbf in s^2 disc": (r) => node(r, 1, "one", "two", 40 * 0.0254),
    "a: rigid-body frequency": (r) => mode(r, 0).frequencyHz ?? Number.NaN,
  },
  "p32-three-disc": {
    ": rigid-body frequency": (r) => mode(r, 0).frequencyHz ?? Number.NaN,
    ": mode 1 amplitude ratio of rotor 2 to rotor 1": (r) => ratio(r, 1, "b", "a"),
    ": mode 1 amplitude ratio of rotor 3 to rotor 1": (r) => ratio(r, 1, "c", "a"),
    ": mode 2 amplitude ratio of rotor 2 to rotor 1": (r) => ratio(r, 2, "b", "a"),
    ": mode 2 amplitude ratio of rotor 3 to rotor 1": (r) => ratio(r, 2, "c", "a"),
    ": mode 1 node distance from A (between A and B)": (r) => node(r, 1, "a", "b", 1.5),
    ": mode 2 node distance from A (between A and B)": (r) => node(r, 2, "a", "b", 1.5),
  },
  "p33-geared-shafts": { "b: (b) rigid-body frequency": (r) => mode(r, 0).frequencyHz ?? Number.NaN },
};

const GIVEN = "a published figure that a model quotes in a `limit`; nothing is computed from it";
const WIDTH = "`bandwidth` gives the distance of the half-power points, no function gives each of them";

/** Expected numbers that stand for no computation of Thrum, with the reason. `*`: all of the case. */
export const NOT_EXPRESSIBLE: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  "p08-resonance-peak-bandwidth": {
    "upper half-power frequency (displacement, power half of the peak)": WIDTH,
    "lower half-power frequency": WIDTH,
  },
  "p09-structural-damping": { "upper half-power frequency": WIDTH, "lower half-power frequency": WIDTH },
  "p14-practice-three-sigma": {
    "share of time outside 3 sigma for a Gaussian signal": "the language has no error function",
  },
  "p20-nonproportional-damping": {
    "largest off-diagonal / smallest diagonal of the modal damping matrix (undamped mass-normalised modes)":
      "no function speaks of the modal damping matrix",
  },
  "p59-limits-iso-10816-1": {
    "Class I (to 15 kW) zone A/B": GIVEN,
    "Class I zone B/C": GIVEN,
    "Class I zone C/D": GIVEN,
    "Class II (15-75 kW) zone A/B": GIVEN,
    "Class II zone B/C": GIVEN,
    "Class II zone C/D": GIVEN,
    "zone number (A=1..D=4) of 3.5 mm/s rms on a Class II machine": "the language does not number zones",
    "zone number of that sine on a Class I machine": "the language does not number zones",
  },
  "p60-limits-iso-20816-3": { "*": GIVEN },
  "p62-limits-vc-curves": {
    "VC-A": GIVEN,
    "VC-C": GIVEN,
    "VC-E": GIVEN,
    "VC-A as usually quoted in SI": GIVEN,
    "ratio of neighbouring curves": GIVEN,
  },
  "p63-limits-din-4150-3": {
    "dwellings, 1-10 Hz, foundation": GIVEN,
    "dwellings, 50 Hz": GIVEN,
    "dwellings, 100 Hz": GIVEN,
    "dwellings, top floor horizontal, all frequencies": GIVEN,
  },
  "p64-limits-iso-2631-1": { "*": GIVEN },
  "p66-spring-mass-one-third": {
    "frequency of the continuous spring (first mode)": "a continuous spring is outside lumped models",
    "error of the one-third rule": "a continuous spring is outside lumped models",
  },
};

/** Expected numbers that wait for a statement or an ask this version does not compute. `*`: all of the case. */
export const WAITING: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  "p26-ziegler-follower": { "*": "feed" },
  "p27-gyroscopic-whirl": { "*": "body" },
  "p28-zener-mount": { "damper that minimises the transmissibility peak": "ask tune" },
  "p34-rigid-4-mounts-decoupled": { "*": "body, mount" },
  "p35-rigid-4-mounts-high-cg": { "*": "body, mount" },
  "p36-rigid-offset-cg": { "*": "body, mount" },
  "p37-pendulum-large-angle": { "*": "pendulum" },
  "p38-pendulum-large-swing": { "*": "pendulum" },
  "p39-pendulum-trolley": { "*": "pendulum" },
  "p40-pendulum-tuned-damper": { "*": "pendulum" },
  "p41-pendulum-compound-double": { "*": "pendulum" },
  "p42-rlc-series": { "*": "loop" },
  "p44-rlc-coupled-mutual": { "*": "loop, mutual" },
  "p45-voice-coil": { "*": "loop, transducer" },
  "p46-duffing-free": { "*": "cubic of a spring" },
  "p47-duffing-forced": { "*": "cubic of a spring" },
  "p48-slack-cord-drop": { "*": "cord" },
  "p49-coulomb-friction": { "*": "friction" },
  "p50-bump-stop": { "*": "stop" },
  "p51-srs-undamped-pulses": { "*": "ask shock_spectrum" },
  "p52-srs-q10": { "*": "ask shock_spectrum" },
  "p54-miles-white-noise": { "*": "ask random" },
  "p55-white-noise-force": { "*": "ask random" },
  "p56-grms-published-spectra": { "*": "ask random" },
  "p57-sdof-shaped-random": { "*": "ask random" },
  "p58-mdof-random-base": { "*": "ask random" },
  "p68-tolerance-one-mass": {
    "m fixed: 5 % quantile of f": "ask spread",
    "m fixed: 95 % quantile of f": "ask spread",
    "m fixed: exact mean of f": "ask spread",
    "both vary: 1 % quantile of f": "ask spread",
    "both vary: 99 % quantile of f": "ask spread",
  },
};
