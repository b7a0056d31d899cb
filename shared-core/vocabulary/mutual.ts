import type { StatementDescription } from "./description.ts";
import { CIRCUIT_QUANTITIES, COUNT_AND_LIKE } from "./joining.ts";
import { amount, BETWEEN, NAME, statement } from "./statement.ts";

export const mutual: StatementDescription = statement({
  keyword: "mutual",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "inductance",
  details: [
    amount("inductance", "inductance", "mutual inductance, signed by the loops' directions", "0.2 mH", {
      required: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: CIRCUIT_QUANTITIES,
  says: "Couples two loops by their common flux.",
  text: "",
  example: "",
  snippet: "mutual $1 between $2 and $3 = $4 mH",
  notYet: true,
});
