import type { Kind } from "./dimension.ts";
import { isFault } from "./fault.ts";
import { sameKind } from "./quantity.ts";
import { unitOf, type WrittenUnit } from "./unit-of.ts";

/** A unit taken for another one so often that the message names it. */
export interface Slip {
  readonly code: "weight-as-mass" | "gram-as-gravity";
  /** What was meant: name of the unit that stands in the text, of the one it should be, and the change of the number. */
  readonly from: string;
  readonly to: string;
  /** The number is multiplied by this when the unit is replaced. */
  readonly ratio: number;
  readonly message: string;
}

/**
 * The slip that would explain why a written unit is not of the wanted kind: one of its factors replaced gives
 * that kind (`lbf` for a mass, `g^2/Hz` for an acceleration density). Undefined: no known slip.
 */
export function slipIn(
  written: WrittenUnit,
  wanted: Kind,
): (Slip & { readonly factorIndex: number }) | undefined {
  for (const [factorIndex, factor] of written.factors.entries()) {
    for (const slip of SLIPS) {
      if (slip.from !== factor.name) continue;
      const factors = written.factors.map((each, i) =>
        i === factorIndex ? { ...each, name: slip.to } : each,
      );
      const meant = unitOf({ text: written.text, factors });
      if (!isFault(meant) && sameKind(meant.kind, wanted))
        return { ...slip, ratio: slip.ratio ** factor.power, factorIndex };
    }
  }
  return undefined;
}

const STANDARD_GRAVITY = 9.80665;

const weight = (from: string, to: string, ratio: number): Slip => ({
  code: "weight-as-mass",
  from,
  to,
  ratio,
  message: `${from} is a weight, and a mass belongs here; ${to}?`,
});

export const SLIPS: readonly Slip[] = [
  weight("lbf", "lbm", 1),
  weight("kip", "lbm", 1000),
  weight("N", "kg", 1 / STANDARD_GRAVITY),
  weight("kN", "kg", 1000 / STANDARD_GRAVITY),
  weight("MN", "t", 1000 / STANDARD_GRAVITY),
  {
    code: "gram-as-gravity",
    from: "g",
    to: "gn",
    ratio: 1,
    message: "g is gram; standard gravity is gn",
  },
  {
    code: "gram-as-gravity",
    from: "mg",
    to: "gn",
    ratio: 1e-3,
    message: "mg is milligram; standard gravity is gn",
  },
];
