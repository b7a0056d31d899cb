import type { StatementDescription } from "./description.ts";
import { COUNT_AND_LIKE } from "./joining.ts";
import { amount, NAME, statement, wordAndPlace } from "./statement.ts";

export const feed: StatementDescription = statement({
  keyword: "feed",
  family: "joins",
  head: [NAME, ...wordAndPlace("from"), ...wordAndPlace("to")],
  value: "none",
  details: [
    amount("stiffness", "stiffness", "force on B for each displacement of A", "12 kN/m", {
      standard: "0 N/m",
    }),
    amount("damping", "damping", "force on B for each velocity of A", "800 N*s/m", { standard: "0 N*s/m" }),
    amount("inertance", "inertance", "force on B for each acceleration of A", "15 kg", { standard: "0 kg" }),
    ...COUNT_AND_LIKE,
  ],
  quantities: [{ name: "force", measure: "force", says: "force on B" }],
  says: "A force on one place from the motion of another, with none back.",
  text: "",
  example: "",
  snippet: "feed $1 from $2 to $3\n    damping = $4 N*s/m",
  notYet: true,
});
