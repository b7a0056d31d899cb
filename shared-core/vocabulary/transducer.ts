import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE } from "./joining.ts";
import { amount, BETWEEN, NAME, statement } from "./statement.ts";

export const transducer: StatementDescription = statement({
  keyword: "transducer",
  family: "joins",
  head: [NAME, ...BETWEEN],
  value: "optional",
  principal: "factor",
  details: [
    amount("factor", "force_factor", "force over current, which is voltage over rate", "4 N/A", {
      required: true,
    }),
    ...COUNT_AND_LIKE,
  ],
  quantities: [
    { name: "force", measure: "force", says: "force on the coordinate, factor times current" },
    { name: "voltage", measure: "voltage", says: "voltage in the loop, factor times rate" },
  ],
  says: "Couples a coordinate and a loop: coil and magnet, motor and generator.",
  text: "",
  example: "",
  snippet: "transducer $1 between $2 and $3 = $4 N/A",
  notYet: true,
});
