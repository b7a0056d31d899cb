import type { ParseOptions } from "../syntax/parser.ts";
import { nearest } from "../text/nearest.ts";
import { isFault } from "../units/fault.ts";
import { isUnitName, UNIT_NAMES } from "../units/lookup.ts";
import { unitOf } from "../units/unit-of.ts";
import { grammarTable } from "../vocabulary/registry.ts";

/** What the parser is given for the language of this version. */
export const PARSING: ParseOptions = {
  grammar: grammarTable(),
  isUnit: isUnitName,
  nearestUnit(name) {
    const meaning = unitOf({ text: name, factors: [{ name, power: 1 }] });
    return (isFault(meaning) ? meaning.replace?.[0] : undefined) ?? nearest(name, UNIT_NAMES);
  },
};
