import { nearest } from "../text/nearest.ts";
import type { Dimension, Kind, Unit } from "./dimension.ts";
import type { Fault } from "./fault.ts";
import { lookupUnit, UNIT_NAMES, type UnitResolver } from "./lookup.ts";
import {
  dimension,
  multiplyDimensions,
  NO_DIMENSION,
  powerOfDimension,
  RATE,
  sameDimension,
} from "./quantity.ts";

/** A unit as written, factor by factor; a `UnitNode` of the tree is one. */
export interface WrittenUnit {
  readonly text: string;
  readonly factors: readonly { readonly name: string; readonly power: number }[];
}

/** What a written unit means: `number * factor` is the SI value (rates: Hz). */
export interface UnitMeaning {
  readonly text: string;
  readonly factor: number;
  readonly kind: Kind;
}

/** A fault in the factor with that index. */
export interface UnitFault extends Fault {
  readonly factorIndex: number;
}

const TIME: Dimension = dimension(0, 0, 1);

/**
 * What a unit means. A rate alone (Hz, rpm, cpm, and an angle over a time: rev/s, rad/s, deg/s) is of kind
 * rate, in Hz. In a compound, rpm, cpm and rev count 2 pi a turn and deg pi/180; Hz counts 1/s, in a density
 * only: a square over Hz. Fails with unknown-unit or ambiguous-rate and the index of the guilty factor.
 */
export function unitOf(written: WrittenUnit, other?: UnitResolver): UnitMeaning | UnitFault {
  const parts: Part[] = [];
  for (const [index, { name, power }] of written.factors.entries()) {
    if (name === "1") continue;
    const unit = lookupUnit(name, other);
    if (unit === undefined) return unknownUnit(name, index);
    parts.push({ unit, power, index });
  }
  return rateAlone(written.text, parts) ?? compound(written.text, parts);
}

interface Part {
  readonly unit: Unit;
  readonly power: number;
  readonly index: number;
}

function rateAlone(text: string, parts: readonly Part[]): UnitMeaning | undefined {
  if (parts.length === 1 && parts[0].unit.rate && parts[0].power === 1)
    return { text, factor: parts[0].unit.factor, kind: RATE };
  if (parts.length !== 2) return undefined;
  const angle = parts.find((part) => isAngle(part.unit) && part.power === 1);
  const time = parts.find((part) => sameDimension(part.unit.dimension, TIME) && part.power === -1);
  if (angle === undefined || time === undefined) return undefined;
  return { text, factor: turnsOf(angle.unit) / time.unit.factor, kind: RATE };
}

function compound(text: string, parts: readonly Part[]): UnitMeaning | UnitFault {
  let factor = 1;
  let total = NO_DIMENSION;
  for (const { unit, power, index } of parts) {
    const hertz = unit.rate && !isTurning(unit);
    if (hertz && !isDensity(parts)) return hertzFault(text, unit, index);
    factor *= (unit.rate && !hertz ? 2 * Math.PI * unit.factor : unit.factor) ** power;
    total = multiplyDimensions(total, powerOfDimension(unit.dimension, power));
  }
  return { text, factor, kind: { dimension: total, rate: false } };
}

/** rpm and cpm: a rate whose cycle is a turn. Any other rate of the table is Hz with or without a prefix. */
const isTurning = (unit: Unit): boolean => unit.name === "rpm" || unit.name === "cpm";

/** rad, deg, rev with their prefixes: units of an angle, which a share is not. */
const isAngle = (unit: Unit): boolean => /(^rev|^deg|rad)$/.test(unit.name);

/** Turns in one unit of angle, without the rounding of pi. */
function turnsOf(angle: Unit): number {
  if (angle.name === "rev") return 1;
  if (angle.name === "deg") return 1 / 360;
  return angle.factor / (2 * Math.PI);
}

/** A square over Hz: (m/s^2)^2/Hz, N^2/kHz. */
function isDensity(parts: readonly Part[]): boolean {
  const rates = parts.filter((part) => part.unit.rate && !isTurning(part.unit));
  const others = parts.filter((part) => !rates.includes(part));
  return (
    rates.length === 1 &&
    rates[0].power === -1 &&
    others.length > 0 &&
    others.every((part) => part.power % 2 === 0)
  );
}

function hertzFault(text: string, unit: Unit, factorIndex: number): UnitFault {
  return {
    code: "ambiguous-rate",
    message: `${text} leaves open whether ${unit.name} counts cycles or radians`,
    hint: "write rad/s for the angular rate, 1/s for a plain one; Hz stands in densities such as (m/s^2)^2/Hz only",
    factorIndex,
  };
}

function unknownUnit(name: string, factorIndex: number): UnitFault {
  const replace = nearestUnits(name);
  const hint = replace.length > 0 ? `${replace.join(" or ")}?` : undefined;
  return { code: "unknown-unit", message: `there is no unit ${name}`, hint, replace, factorIndex };
}

/** What people write for a unit of the table, in the trade and in other files. */
const MEANT: ReadonlyMap<string, readonly string[]> = new Map([
  ["lb", ["lbm", "lbf"]],
  ["lbs", ["lbm", "lbf"]],
  ["pound", ["lbm", "lbf"]],
  ["G", ["gn"]],
  ["g0", ["gn"]],
  ["sec", ["s"]],
  ["hr", ["h"]],
  ["ton", ["t"]],
  ["tons", ["t"]],
  ["inch", ["in"]],
  ["thou", ["mil"]],
  ["RPM", ["rpm"]],
  ["rps", ["rev/s"]],
  ["ksi", ["kip/in^2"]],
  ["pli", ["lbf/in"]],
]);

/** Units that a name which is none may have meant, the likeliest first; possibly none. */
export function nearestUnits(name: string): readonly string[] {
  const meant = MEANT.get(name);
  if (meant !== undefined) return meant;
  const otherCase = caseVariant(name);
  if (otherCase !== undefined) return [otherCase];
  const split = twoUnits(name);
  if (split !== undefined) return [split];
  const near = nearest(name, UNIT_NAMES);
  return near === undefined ? [] : [near];
}

/** `Nm` and `kNm` are two units without their sign. */
function twoUnits(name: string): string | undefined {
  for (let cut = name.length - 1; cut > 0; cut--) {
    const [left, right] = [name.slice(0, cut), name.slice(cut)];
    if (lookupUnit(left) !== undefined && UNIT_NAMES.includes(right)) return `${left}*${right}`;
  }
  return undefined;
}

/** `HZ`, `KN` and `kn` in the spelling of the table, with prefixes. */
function caseVariant(name: string): string | undefined {
  const spellings = UNIT_NAMES.flatMap((unit) => [unit, `k${unit}`, `m${unit}`, `M${unit}`]);
  return spellings.find(
    (unit) => unit.toLowerCase() === name.toLowerCase() && lookupUnit(unit) !== undefined,
  );
}
