import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE, IN_LOOP_OR_BETWEEN } from "./joining.ts";
import { amount, NAME, statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "resistor $1 in $2 = $3 ohm",
  notYet: true,
});
