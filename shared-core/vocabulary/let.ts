import type { StatementDescription } from "./description.ts";
import { NAME, prose, statement } from "./statement.ts";

export const letNumber: StatementDescription = statement({
  keyword: "let",
  family: "numbers",
  head: [NAME],
  value: "required",
  details: [],
  quantities: [],
  says: "A named number with its unit, tolerance and source.",
  text: prose(
    "Gives a number a name, and with it a unit, a tolerance, a range and a source. A number that stands",
    "in two places, that somebody will want to vary, or that came from a drawing, a ticket or a test",
    "deserves a `let`; a review then says in one line that the mount went from 26.5 to 24 N/mm, and why.",
    "",
    "The value is any expression of literals, other lets, functions and helpers; order in the file does",
    "not matter. Behind it may stand a tolerance (`+/- 10 %` or `+/- 0.2 mm`, uniform unless `normal` or",
    "`lognormal` is said) and `within A to B`, the range in which `tune`, `fit` and the knobs of the",
    "sheet may move it. A `let` is one draw wherever it is used: four springs that share a `let` are soft",
    "together or stiff together.",
    "",
    "Notes above it travel with it. `> source: weighbridge ticket 0417` is what a colleague will look for",
    "in three years.",
  ),
  example: `thrum 1
title "Sluice pump on rubber feet"

> Weighed with the coupling guard fitted.
> source: weighbridge ticket 0417
let pump_mass = 265 kg +/- 3 %
let foot = 48 N/mm +/- 12 % within 30 N/mm to 70 N/mm
let feet_stiffness = 4 * foot

mass pump = pump_mass
spring feet between pump and ground = feet_stiffness

expect soft_enough = natural_frequency(1) <= 6 Hz
`,
  snippet: "let $1 = $2 kg",
});
