import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE, IN_LOOP_OR_BETWEEN } from "./joining.ts";
import { amount, NAME, statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "inductor $1 in $2 = $3 mH",
  notYet: true,
});
