import { formatNumber } from "./show.ts";
import type { UnitMeaning } from "./unit-of.ts";

/**
 * A number of the text in another unit of the same kind. Exact where that takes at most seven digits (26.5 N/mm is
 * 26500 N/m, 3 in is 76.2 mm); else three, or as many as are needed for the number to come back as it was written.
 */
export function convertNumber(written: string, from: UnitMeaning, to: UnitMeaning): string {
  const value = Number(written);
  const exact = (value * from.factor) / to.factor;
  if (!Number.isFinite(exact) || exact === 0) return written;
  const clean = formatNumber(exact, CLEAN_DIGITS);
  if (digitsOf(clean) <= SHORT_ENOUGH) return clean;
  const digits = Math.max(1, digitsOf(written));
  for (let kept = Math.max(digits, FEWEST); kept < CLEAN_DIGITS; kept++) {
    const shorter = formatNumber(exact, kept);
    const back = (Number(shorter) * to.factor) / from.factor;
    if (Number(back.toPrecision(digits)) === value) return shorter;
  }
  return clean;
}

/** Significant digits of a number as written; trailing zeros before the point count. */
export function digitsOf(written: string): number {
  const mantissa = written
    .toLowerCase()
    .split("e")[0]
    .replace(/[^0-9]/g, "");
  return mantissa.replace(/^0+/, "").length;
}

/** One pound written as 1 lbm is not 500 g. */
const FEWEST = 3;
/** Beyond this the digits of a double product are rounding. */
const CLEAN_DIGITS = 14;
/** Longer than a person would copy without a slip; chosen by reading. */
const SHORT_ENOUGH = 7;
