import { ASK_HEAD, WATCH } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, statement } from "../statement.ts";

export const spread: StatementDescription = statement({
  keyword: "ask",
  variant: "spread",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    amount("samples", "number", "models drawn", "2000", { positive: true, standard: "1000" }),
    amount("seed", "number", "start of the random numbers", "7", { standard: "1" }),
    WATCH,
  ],
  quantities: [],
  says: "What the tolerances do: the distribution of each watched quantity and the share that holds.",
  text: "",
  example: "",
  snippet: "ask spread $1\n    samples = $2\n    watch = $3",
  notYet: true,
});
