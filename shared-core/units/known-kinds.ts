import type { Kind } from "./dimension.ts";
import { isFault } from "./fault.ts";
import { NUMBER, RATE, sameKind } from "./quantity.ts";
import { type UnitMeaning, unitOf, type WrittenUnit } from "./unit-of.ts";

/** A kind of number that people of the trade have a name for. */
export interface KnownKind {
  readonly words: string;
  readonly kind: Kind;
  /** SI unit as text; `Hz` for a rate, `1` for a number. */
  readonly si: string;
  /** SI units of all sizes, ascending; the one that leaves a number from 1 to 1000 is shown. */
  readonly scales: readonly UnitMeaning[];
  readonly inch?: UnitMeaning;
  /** Units worth offering, the likeliest first. */
  readonly likely: readonly string[];
  /** The unit that a sentence names: "a stiffness such as N/m". */
  readonly say: string;
}

/**
 * Reads a unit from text without blanks and parentheses, `N*s/m^2`, as the tables of Thrum spell them. Text of
 * a model is read by the parser. Throws when a table is wrong.
 */
export function unitFromText(text: string): UnitMeaning {
  const meaning = unitOf(writtenUnit(text));
  if (isFault(meaning)) throw new Error(`${text}: ${meaning.message}`);
  return meaning;
}

/** The named kind that this one is, or undefined for an unusual dimension. */
export function knownKind(kind: Kind): KnownKind | undefined {
  return KNOWN_KINDS.find((known) => sameKind(known.kind, kind));
}

function writtenUnit(text: string): WrittenUnit {
  const factors = [...text.matchAll(/([*/]?)([^*/^]+)(?:\^(-?\d+))?/g)].map(([, sign, name, power]) => ({
    name,
    power: (sign === "/" ? -1 : 1) * Number(power ?? 1),
  }));
  return { text, factors };
}

/**
 * Words; SI scales from small to large, the SI unit marked by `=`; inch unit; likely units, with `=` at the one that a
 * sentence names where that is not the SI unit.
 */
type Row = readonly [words: string, scales: string, inch: string, likely: string];

/** Where two quantities share a dimension (torque and energy) the words name what a model holds oftenest. */
const ROWS: readonly Row[] = [
  ["a length", "um mm =m", "in", "mm m um in ft mil"],
  ["a mass", "g =kg t", "lbm", "kg t g lbm slug"],
  ["a time", "us ms =s", "s", "s ms min h"],
  ["a velocity", "um/s mm/s =m/s", "in/s", "mm/s m/s in/s"],
  ["an acceleration", "mm/s^2 =m/s^2", "in/s^2", "m/s^2 gn mm/s^2 in/s^2"],
  ["a force", "mN =N kN MN", "lbf", "N kN lbf kip"],
  ["a stiffness", "=N/m kN/m MN/m GN/m", "lbf/in", "N/mm kN/m N/m MN/m lbf/in"],
  ["a damping", "=N*s/m kN*s/m MN*s/m", "lbf*s/in", "N*s/m kN*s/m N*s/mm lbf*s/in"],
  [
    "a torque or torsional stiffness",
    "mN*m =N*m kN*m MN*m",
    "lbf*in",
    "N*m kN*m N*m/rad N*m/deg lbf*in lbf*ft",
  ],
  ["a torsional damping", "=N*m*s kN*m*s", "lbf*in*s", "N*m*s/rad N*m/rpm lbf*in*s/rad"],
  ["a moment of inertia", "=kg*m^2", "lbm*in^2", "kg*m^2 kg*mm^2 lbm*in^2 slug*ft^2"],
  ["an unbalance", "g*mm =kg*m", "lbm*in", "kg*m g*mm kg*mm oz*in"],
  ["a momentum", "=N*s kN*s", "lbf*s", "N*s kN*s lbf*s"],
  ["a power", "mW =W kW MW", "lbf*in/s", "W kW mW"],
  ["a decay rate", "=1/s", "1/s", "1/s"],
  ["an angular acceleration", "=1/s^2", "1/s^2", "=rad/s^2 rpm/s"],
  ["a pressure or modulus", "=Pa kPa MPa GPa", "psi", "MPa bar kPa GPa Pa psi"],
  ["an area", "mm^2 =m^2", "in^2", "mm^2 cm^2 m^2 in^2"],
  ["a volume", "mm^3 =m^3", "in^3", "l cm^3 m^3 in^3"],
  ["a second moment of area", "mm^4 =m^4", "in^4", "mm^4 cm^4 m^4 in^4"],
  ["a bending stiffness", "=N*m^2 kN*m^2 MN*m^2", "lbf*in^2", "N*m^2 kN*m^2 lbf*in^2"],
  ["a cubic stiffness", "=N/m^3 kN/m^3 MN/m^3 GN/m^3", "lbf/in^3", "N/m^3 N/mm^3 lbf/in^3"],
  ["a quadratic damping", "=N*s^2/m^2", "lbf*s^2/in^2", "N*s^2/m^2 kg/m"],
  ["a mass density", "=kg/m^3", "lbm/in^3", "kg/m^3 t/m^3 lbm/in^3"],
  ["a displacement density", "=m^2/Hz", "in^2/Hz", "mm^2/Hz m^2/Hz"],
  ["a velocity density", "=m^2/s", "in^2/s", "=(mm/s)^2/Hz (m/s)^2/Hz"],
  ["an acceleration density", "=m^2/s^3", "in^2/s^3", "=(m/s^2)^2/Hz gn^2/Hz"],
  ["a force density", "=N^2/Hz", "lbf^2/Hz", "N^2/Hz lbf^2/Hz"],
  ["a temperature", "=K", "K", "K"],
  ["a charge", "nC uC mC =C", "C", "C mC uC"],
  ["a current", "uA mA =A", "A", "A mA"],
  ["a voltage", "uV mV =V kV", "V", "V mV kV"],
  ["a resistance", "mohm =ohm kohm Mohm", "ohm", "ohm kohm mohm"],
  ["an inductance", "uH mH =H", "H", "mH H uH"],
  ["a capacitance", "pF nF uF mF =F", "F", "uF nF pF F"],
  ["an inverse capacitance", "=1/F", "1/F", "1/uF V/C"],
  ["a force factor", "=N/A", "lbf/A", "N/A V*s/m"],
  ["a flux linkage", "mWb =Wb", "Wb", "=V*s Wb"],
  ["a flux density", "mT =T", "T", "T mT"],
];

const NUMBER_KIND: KnownKind = {
  words: "a number",
  kind: NUMBER,
  si: "1",
  scales: [],
  likely: ["%", "ppm", "deg", "rad"],
  say: "1",
};

const RATE_KIND: KnownKind = {
  words: "a rate",
  kind: RATE,
  si: "Hz",
  get scales() {
    return unitsFrom("Hz kHz MHz");
  },
  get inch() {
    return unitsFrom("Hz")[0];
  },
  likely: ["Hz", "rpm", "rad/s", "cpm", "rev/s", "deg/s", "kHz"],
  say: "Hz",
};

/** `=` in front of a unit in a row. */
const isMarked = (unit: string): boolean => unit.startsWith("=");
const unmarked = (unit: string): string => unit.replace(/^=/, "");

const UNITS = new Map<string, readonly UnitMeaning[]>();

export const KNOWN_KINDS: readonly KnownKind[] = [NUMBER_KIND, RATE_KIND, ...ROWS.map(fromRow)];

function fromRow([words, scales, inch, likely]: Row): KnownKind {
  const [units, offers] = [scales.split(" "), likely.split(" ")];
  const si = unmarked(units.find(isMarked) ?? units[0]);
  return {
    words,
    kind: unitFromText(si).kind,
    si,
    get scales() {
      return unitsFrom(scales);
    },
    get inch() {
      return unitsFrom(inch)[0];
    },
    likely: offers.map(unmarked),
    say: unmarked(offers.find(isMarked) ?? si),
  };
}

/** Units in a cell of a row, read when they are first asked for: reading them all would delay every start. */
function unitsFrom(cell: string): readonly UnitMeaning[] {
  const known = UNITS.get(cell);
  if (known !== undefined) return known;
  const units = cell.split(" ").map((unit) => unitFromText(unmarked(unit)));
  UNITS.set(cell, units);
  return units;
}
