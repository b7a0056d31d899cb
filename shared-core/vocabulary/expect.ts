import type { StatementDescription } from "./description.ts";
import { amount, detail, NAME, prose, statement } from "./statement.ts";

export const expect: StatementDescription = statement({
  keyword: "expect",
  family: "holds",
  head: [NAME],
  value: "required",
  details: [
    amount("margin", "share", "warn when less than this share of the limit is left", "10 %"),
    detail(
      "cases",
      { is: "names", families: ["numbers"], keywords: ["case"] },
      "the cases it is judged in",
      "winter, full_load",
      {
        standard: "all",
      },
    ),
    detail(
      "tolerance",
      { is: "tolerance" },
      "nominal values, every corner of the bands, or the share of draws that must hold",
      "worst_case",
      { standard: "nominal" },
    ),
  ],
  quantities: [],
  says: "A comparison that must hold; a build fails with it.",
  text: prose(
    "Something that must hold, with a name that a build server can report: exactly one comparison, the",
    "value on the left and the limit on the right. `A <= x <= B` makes two, NAME.low and NAME.high.",
    "Either side is an expression of functions of the answers, lets and literals.",
    "",
    "It is judged in every case unless `cases` names some. `margin = 10 %` warns when less than a tenth",
    "of the limit is left, so that a slow drift is seen before it fails. `tolerance` says what the bands",
    "of the numbers are to mean: `nominal` leaves them out, `worst_case` takes every corner and, where",
    "the quantity is not monotonic, the inside too, and `99 %` asks for the share of draws that holds.",
    "",
    "An expectation that could not be computed does not hold and does not fail: it is null, with the",
    "reason beside it, and a build that needs it does not pass.",
  ),
  example: `thrum 1
title "Bilge pump: what must hold"

let foot = 62 N/mm +/- 10 %

mass pump = 310 kg
spring feet between pump and ground = foot
    count = 4
    loss_factor = 0.08
force imbalance on pump
    unbalance = 9e-3 kg*m
    speed = 1180 rpm

ask sweep run_up
    of = pump.velocity
    by = imbalance
    from = 1 Hz
    to = 40 Hz

expect soft_enough = natural_frequency(1) <= 0.35 * 1180 rpm
    tolerance = worst_case
expect smooth = value(run_up, pump.velocity, at: 1180 rpm) <= 4.5 mm/s
    margin = 10 %
expect in_band = 3 Hz <= natural_frequency(1) <= 6 Hz
`,
  snippet: "expect $1 = $2 <= $3 Hz",
});
