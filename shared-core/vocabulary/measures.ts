import type { Motion } from "../mechanics/builder.ts";
import { likelyUnits } from "../units/describe.ts";
import type { Kind } from "../units/dimension.ts";
import { dimension, kindOf, NUMBER, RATE } from "../units/quantity.ts";
import type { Measure } from "./description.ts";

/**
 * The kind of number a measure is for what moves so; undefined for "any". A turning speed is a rate, so its
 * value is in Hz.
 */
export function dimensionOf(measure: Measure, motion: Motion = "sliding"): Kind | undefined {
  return BY_MOTION[motion].get(measure) ?? COMMON.get(measure);
}

/** How a person calls a measure in a sentence, with its article: "a stiffness". */
export function wordsOf(measure: Measure, motion: Motion = "sliding"): string {
  return WORDS_BY_MOTION[motion].get(measure) ?? WORDS.get(measure) ?? `a ${measure}`;
}

/** Units worth offering for a measure, the likeliest first. */
export function unitsOf(measure: Measure, motion: Motion = "sliding"): readonly string[] {
  const particular = UNITS_BY_MOTION[motion].get(measure) ?? UNITS.get(measure);
  const kind = dimensionOf(measure, motion);
  return particular ?? (kind ? likelyUnits(kind) : []);
}

const COMMON: ReadonlyMap<Measure, Kind> = new Map<Measure, Kind>([
  ["number", NUMBER],
  ["share", NUMBER],
  ["angle", NUMBER],
  ["rate", RATE],
  ["mass", kindOf(dimension(0, 1))],
  ["inertia", kindOf(dimension(2, 1))],
  ["length", kindOf(dimension(1))],
  ["time", kindOf(dimension(0, 0, 1))],
  ["unbalance", kindOf(dimension(1, 1))],
  ["decay", kindOf(dimension(0, 0, -1))],
  ["resistance", kindOf(dimension(2, 1, -3, -2))],
  ["inductance", kindOf(dimension(2, 1, -2, -2))],
  ["capacitance", kindOf(dimension(-2, -1, 4, 2))],
  ["charge", kindOf(dimension(0, 0, 1, 1))],
  ["current", kindOf(dimension(0, 0, 0, 1))],
  ["voltage", kindOf(dimension(2, 1, -3, -1))],
  ["pressure", kindOf(dimension(-1, 1, -2))],
  ["area", kindOf(dimension(2))],
  ["volume", kindOf(dimension(3))],
  ["second_moment", kindOf(dimension(4))],
  ["power", kindOf(dimension(2, 1, -3))],
  ["energy", kindOf(dimension(2, 1, -2))],
]);

/** What depends on the coordinate: per metre, per radian or per coulomb of travel. */
const BY_MOTION: Readonly<Record<Motion, ReadonlyMap<Measure, Kind>>> = {
  sliding: new Map([
    ["stiffness", kindOf(dimension(0, 1, -2))],
    ["damping", kindOf(dimension(0, 1, -1))],
    ["inertance", kindOf(dimension(0, 1))],
    ["force", kindOf(dimension(1, 1, -2))],
    ["travel", kindOf(dimension(1))],
    ["speed", kindOf(dimension(1, 0, -1))],
    ["acceleration", kindOf(dimension(1, 0, -2))],
    ["momentum", kindOf(dimension(1, 1, -1))],
    ["cubic", kindOf(dimension(-2, 1, -2))],
    ["quadratic", kindOf(dimension(-1, 1))],
    ["force_factor", kindOf(dimension(1, 1, -2, -1))],
  ]),
  turning: new Map([
    ["stiffness", kindOf(dimension(2, 1, -2))],
    ["damping", kindOf(dimension(2, 1, -1))],
    ["inertance", kindOf(dimension(2, 1))],
    ["force", kindOf(dimension(2, 1, -2))],
    ["travel", NUMBER],
    ["speed", RATE],
    ["acceleration", kindOf(dimension(0, 0, -2))],
    ["momentum", kindOf(dimension(2, 1, -1))],
    ["cubic", kindOf(dimension(2, 1, -2))],
    ["quadratic", kindOf(dimension(2, 1))],
    ["force_factor", kindOf(dimension(2, 1, -2, -1))],
  ]),
  charge: new Map([
    ["stiffness", kindOf(dimension(2, 1, -4, -2))],
    ["damping", kindOf(dimension(2, 1, -3, -2))],
    ["inertance", kindOf(dimension(2, 1, -2, -2))],
    ["force", kindOf(dimension(2, 1, -3, -1))],
    ["travel", kindOf(dimension(0, 0, 1, 1))],
    ["speed", kindOf(dimension(0, 0, 0, 1))],
    ["acceleration", kindOf(dimension(0, 0, -1, 1))],
    ["momentum", kindOf(dimension(2, 1, -2, -1))],
    ["cubic", kindOf(dimension(2, 1, -6, -4))],
    ["quadratic", kindOf(dimension(2, 1, -3, -3))],
    ["force_factor", kindOf(dimension(2, 1, -3, -2))],
  ]),
};

const WORDS: ReadonlyMap<Measure, string> = new Map<Measure, string>([
  ["share", "a share"],
  ["inertia", "a moment of inertia"],
  ["angle", "an angle"],
  ["inertance", "an inertance"],
  ["travel", "a displacement"],
  ["speed", "a velocity"],
  ["acceleration", "an acceleration"],
  ["unbalance", "an unbalance"],
  ["cubic", "a cubic stiffness"],
  ["quadratic", "a quadratic damping"],
  ["inductance", "an inductance"],
  ["force_factor", "a force factor"],
  ["decay", "a decay rate"],
  ["area", "an area"],
  ["second_moment", "a second moment of area"],
  ["energy", "an energy"],
  ["any", "a number with its unit"],
]);

const WORDS_BY_MOTION: Readonly<Record<Motion, ReadonlyMap<Measure, string>>> = {
  sliding: new Map(),
  turning: new Map<Measure, string>([
    ["stiffness", "a torsional stiffness"],
    ["damping", "a torsional damping"],
    ["inertance", "a torsional inertance"],
    ["force", "a torque"],
    ["travel", "an angle"],
    ["speed", "a turning speed"],
    ["acceleration", "an angular acceleration"],
    ["momentum", "an angular momentum"],
  ]),
  charge: new Map<Measure, string>([
    ["force", "a voltage"],
    ["travel", "a charge"],
    ["speed", "a current"],
    ["momentum", "a flux linkage"],
  ]),
};

/** Where the measure says more than its kind: a share is no angle, a stiffness of a shaft no torque. */
const UNITS: ReadonlyMap<Measure, readonly string[]> = new Map<Measure, readonly string[]>([
  ["number", []],
  ["share", ["%", "ppm"]],
  ["angle", ["deg", "rad", "mrad"]],
  ["energy", ["J", "kJ", "mJ"]],
]);

const UNITS_BY_MOTION: Readonly<Record<Motion, ReadonlyMap<Measure, readonly string[]>>> = {
  sliding: new Map(),
  turning: new Map<Measure, readonly string[]>([
    ["stiffness", ["N*m/rad", "kN*m/rad", "N*m/deg", "lbf*in/rad"]],
    ["force", ["N*m", "kN*m", "lbf*in", "lbf*ft"]],
    ["travel", ["deg", "rad", "mrad"]],
    ["speed", ["rpm", "rad/s", "rev/s", "deg/s"]],
    ["cubic", ["N*m/rad^3"]],
    ["quadratic", ["N*m*s^2/rad^2"]],
    ["force_factor", ["N*m/A"]],
  ]),
  charge: new Map(),
};
