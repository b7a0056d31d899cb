import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE, IN_LOOP_OR_BETWEEN } from "./joining.ts";
import { amount, NAME, prose, statement } from "./statement.ts";

export const resistor: StatementDescription = statement({
  keyword: "resistor",
  family: "joins",
  head: [NAME, IN_LOOP_OR_BETWEEN],
  value: "optional",
  principal: "resistance",
  details: [
    amount("resistance", "resistance", "the resistance", "5.6 ohm", { positive: true, required: true }),
    ...COUNT_AND_LIKE,
  ],
  quantities: CIRCUIT_QUANTITIES,
  says: "A resistance in a loop, or shared by two.",
  text: prose(
    "The resistance of one loop, or of a branch that two loops share. It stands where a damper stands:",
    "voltage in proportion to current, energy into heat. Its `.power` is what warms it.",
  ),
  example: `thrum 1
title "Damped supply filter of the tide gauge"

loop supply
inductor choke in supply = 12 mH
resistor winding in supply = 1.8 ohm
capacitor smoothing in supply = 470 uF

expect damped_enough = damping_ratio(1) >= 15 %
`,
  snippet: "resistor $1 in $2 = $3 ohm",
  notYet: true,
});
