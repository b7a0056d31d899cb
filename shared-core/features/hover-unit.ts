import type { NumberNode, UnitNode } from "../syntax/tree.ts";
import type { Kind } from "../units/dimension.ts";
import { isFault } from "../units/fault.ts";
import { knownKind } from "../units/known-kinds.ts";
import { isNumber } from "../units/quantity.ts";
import { formatNumber, formatQuantity, siUnit } from "../units/show.ts";
import { unitOf } from "../units/unit-of.ts";
import { type Block, lines, type Phrase } from "./readout.ts";

/** What a unit measures and how much SI it is; undefined where it is none, which its message says. */
export function unitReadout(unit: UnitNode): readonly Block[] | undefined {
  const meaning = unitOf(unit);
  if (isFault(meaning)) return undefined;
  const { kind, factor, text } = meaning;
  const si = siUnit(kind);
  const same = text === si;
  const words = isNumber(kind) ? "a number" : (knownKind(kind)?.words ?? `a quantity in ${si}`);
  return [
    lines(
      `\`${text}\`: ${kind.rate ? "a rate, whatever its spelling" : words}`,
      same
        ? "the SI unit"
        : `1 ${text} = ${formatNumber(factor, FACTOR_DIGITS)}${si === "1" ? "" : ` ${si}`}`,
      kind.rate && !same ? `1 Hz = ${formatNumber(1 / factor, FACTOR_DIGITS)} ${text}` : undefined,
    ),
  ];
}

/** Enough for every factor of the table to be read exactly. */
const FACTOR_DIGITS = 14;

/** A literal in SI and in inch units: `26.5 N/mm = 26.5 kN/m = 151.3 lbf/in`. */
export function literalReadout({ value, unit }: NumberNode): readonly Block[] | undefined {
  if (unit === undefined) return undefined;
  const meaning = unitOf(unit);
  if (isFault(meaning)) return undefined;
  return [
    lines(
      equalities(`${formatNumber(value, FACTOR_DIGITS)} ${unit.text}`, value * meaning.factor, meaning.kind),
    ),
  ];
}

/** A value as it is written, then in SI and in inch units where they differ from that. */
export function equalities(written: string, value: number, kind: Kind): Phrase {
  const quantity = { dimension: kind.dimension, rate: kind.rate, value };
  const shown = [
    written,
    formatQuantity(quantity, { system: "si" }),
    ...(isNumber(kind) ? [] : [formatQuantity(quantity, { system: "inch" })]),
  ];
  return [...new Set(shown)].join(" = ");
}
