import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE, IN_LOOP_OR_BETWEEN } from "./joining.ts";
import { amount, NAME, statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "capacitor $1 in $2 = $3 uF",
  notYet: true,
});
