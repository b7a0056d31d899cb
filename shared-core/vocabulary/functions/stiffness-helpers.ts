import { formatNumber } from "../../units/show.ts";
import { EITHER, type FunctionDescription, given, measureResult } from "./function.ts";

const HANDBOOK = "any handbook of strength of materials";

/** Stiffness from shape and material, or from other stiffnesses. */
export const STIFFNESS_HELPERS: readonly FunctionDescription[] = [
  {
    name: "helical_spring",
    group: "helper",
    parameters: [
      given("wire", "length", "diameter of the wire"),
      given("coil", "length", "mean diameter of the coil"),
      given("turns", "number", "active turns"),
      given("shear_modulus", "pressure", "shear modulus of the wire"),
    ],
    result: measureResult("stiffness"),
    says: "rate of a round-wire helical spring",
    example: "helical_spring(8 mm, 60 mm, 6.5, 79 GPa)",
    formula: "k = G d^4 / (8 D^3 n)",
    validity: "small pitch angle; D/d from 4 to 20 and 2 active turns or more",
    source: "formula: any handbook of machine elements; range: EN 13906-1, from memory, to be verified",
    evaluate: ([wire, coil, turns, modulus]) => (modulus * wire ** 4) / (8 * coil ** 3 * turns),
    outside: ([wire, coil, turns]) => {
      const index = coil / wire;
      if (!(4 <= index && index <= 20)) return `coil over wire is ${formatNumber(index)}, outside 4 to 20`;
      return turns >= 2 ? undefined : `${formatNumber(turns)} active turns are fewer than 2`;
    },
  },
  beam("cantilever", "tip stiffness of a beam clamped at one end, load at the tip", 3),
  beam("simply_supported", "midspan stiffness of a beam on two hinged supports", 48),
  beam("fixed_fixed", "midspan stiffness of a beam clamped at both ends", 192),
  {
    name: "shaft",
    group: "helper",
    parameters: [
      given("G", "pressure", "shear modulus"),
      given("diameter", "length", "outer diameter"),
      given("length", "length", "length between its ends"),
      given("bore", "length", "inner diameter", { named: true, optional: true, standard: 0 }),
    ],
    result: { is: "measure", measure: "stiffness", motion: "turning" },
    says: "torsional stiffness of a round shaft, solid or bored",
    example: "shaft(80 GPa, 60 mm, 1.2 m, bore: 20 mm)",
    formula: "k = G pi (d^4 - b^4) / (32 L)",
    validity: "round and straight, one diameter; steps and keyways are softer",
    source: HANDBOOK,
    evaluate: ([modulus, diameter, length, bore]) =>
      (modulus * Math.PI * (diameter ** 4 - bore ** 4)) / (32 * length),
    outside: ([, diameter, , bore]) =>
      0 <= bore && bore < diameter ? undefined : "the bore is not smaller than the diameter",
  },
  {
    name: "series",
    group: "helper",
    parameters: [
      given("k", "stiffness", "stiffnesses one behind the other", { repeated: true, motions: EITHER }),
    ],
    result: measureResult("stiffness", 0),
    says: "stiffness of springs one behind the other",
    example: "series(300 N/m, 600 N/m)",
    formula: "1/k = sum of 1/k_i",
    source: HANDBOOK,
    evaluate: (stiffnesses) => 1 / stiffnesses.reduce((sum, each) => sum + 1 / each, 0),
  },
  {
    name: "parallel",
    group: "helper",
    parameters: [given("k", "stiffness", "stiffnesses side by side", { repeated: true, motions: EITHER })],
    result: measureResult("stiffness", 0),
    says: "stiffness of springs side by side",
    example: "parallel(300 N/m, 600 N/m)",
    formula: "k = sum of k_i",
    source: HANDBOOK,
    evaluate: (stiffnesses) => stiffnesses.reduce((sum, each) => sum + each, 0),
  },
  {
    name: "gas_spring",
    group: "helper",
    parameters: [
      given("pressure", "pressure", "absolute pressure at rest"),
      given("area", "area", "effective area"),
      given("volume", "volume", "enclosed volume at rest"),
      given("exponent", "number", "1 slow and isothermal, 1.4 fast and adiabatic in air"),
    ],
    result: measureResult("stiffness"),
    says: "stiffness of an enclosed gas volume at its working point",
    example: "gas_spring(6 bar, 0.012 m^2, 4.5 l, 1.4)",
    formula: "k = n p A^2 / V",
    validity: "small travel against V/A, constant area, absolute pressure; exponent from 1 to 5/3",
    source: "from p V^n = constant; any textbook of thermodynamics",
    evaluate: ([pressure, area, volume, exponent]) => (exponent * pressure * area ** 2) / volume,
    outside: ([, , , exponent]) =>
      1 <= exponent && exponent <= 5 / 3
        ? undefined
        : `an exponent of ${formatNumber(exponent)} lies outside 1 to 5/3, what a gas can have`,
  },
];

function beam(name: string, says: string, factor: number): FunctionDescription {
  return {
    name,
    group: "helper",
    parameters: [
      given("E", "pressure", "modulus of elasticity"),
      given("I", "second_moment", "second moment of area"),
      given("length", "length", "span"),
    ],
    result: measureResult("stiffness"),
    says,
    example: `${name}(210 GPa, 1670 mm^4, 0.5 m)`,
    formula: `k = ${factor} E I / L^3`,
    validity:
      "slender, small deflection, mass of the beam left out; shear softens a beam shorter than ten depths",
    source: HANDBOOK,
    evaluate: ([modulus, secondMoment, length]) => (factor * modulus * secondMoment) / length ** 3,
  };
}
