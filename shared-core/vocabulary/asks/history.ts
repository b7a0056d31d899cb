import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, choice, statement } from "../statement.ts";

export const history: StatementDescription = statement({
  keyword: "ask",
  variant: "history",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("lasting", "time", "how long it runs, from t = 0", "2 s", { positive: true, required: true }),
    amount("step", "time", "spacing of the stored answer; the integration chooses its own", "1 ms", {
      positive: true,
    }),
    amount("accuracy", "number", "relative error of each peak", "1e-8", { positive: true, standard: "1e-6" }),
    choice("start", ["as_written", "at_rest"], "from the written start values, or from static equilibrium"),
  ],
  quantities: [],
  says: "The response in time to its drives and start values.",
  text: "",
  example: "",
  snippet: "ask history $1\n    of = $2\n    lasting = $3 s",
});
