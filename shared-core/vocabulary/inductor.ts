import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE, IN_LOOP_OR_BETWEEN } from "./joining.ts";
import { amount, NAME, prose, statement } from "./statement.ts";

export const inductor: StatementDescription = statement({
  keyword: "inductor",
  family: "joins",
  head: [NAME, IN_LOOP_OR_BETWEEN],
  value: "optional",
  principal: "inductance",
  details: [
    amount("inductance", "inductance", "the inductance", "0.5 mH", { positive: true, required: true }),
    ...COUNT_AND_LIKE,
  ],
  quantities: CIRCUIT_QUANTITIES,
  says: "An inductance in a loop, or shared by two.",
  text: prose(
    "The inductance of one loop, or of a branch that two loops share: then it carries the difference of",
    "their currents. In the equations of charge it stands where a mass stands, and a loop without one is",
    "a place without inertia.",
  ),
  example: `thrum 1
title "Two sections of the lamp filter share a choke"

loop first
loop second
inductor line in first = 4 mH
capacitor input in first = 100 uF
inductor shared between first and second = 2 mH
inductor tail in second = 4 mH
capacitor output in second = 100 uF

expect passes_slow = natural_frequency(1) <= 300 Hz
`,
  snippet: "inductor $1 in $2 = $3 mH",
  notYet: true,
});
