import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE, IN_LOOP_OR_BETWEEN } from "./joining.ts";
import { amount, NAME, prose, statement } from "./statement.ts";

export const capacitor: StatementDescription = statement({
  keyword: "capacitor",
  family: "joins",
  head: [NAME, IN_LOOP_OR_BETWEEN],
  value: "optional",
  principal: "capacitance",
  details: [
    amount("capacitance", "capacitance", "the capacitance", "2 uF", { positive: true, required: true }),
    ...COUNT_AND_LIKE,
  ],
  quantities: CIRCUIT_QUANTITIES,
  says: "A capacitance in a loop, or shared by two.",
  text: prose(
    "The capacitance of one loop, or of a branch that two loops share. Its inverse stands where a",
    "stiffness stands: voltage in proportion to the charge that has passed. A small capacitor is a stiff",
    "spring.",
  ),
  example: `thrum 1
title "Tuned circuit of the fog signal"

loop resonator
inductor coil in resonator = 0.8 mH
capacitor plates in resonator = 3.3 uF
resistor losses in resonator = 0.4 ohm

expect on_tone = 3.0 kHz <= natural_frequency(1) <= 3.2 kHz
`,
  snippet: "capacitor $1 in $2 = $3 uF",
  notYet: true,
});
