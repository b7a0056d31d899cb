import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, choice, statement } from "../statement.ts";

export const sweep: StatementDescription = statement({
  keyword: "ask",
  variant: "sweep",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("from", "rate", "lowest frequency", "2 Hz", { positive: true, required: true }),
    amount("to", "rate", "highest frequency", "80 Hz", { positive: true, required: true }),
    amount("points", "number", "points at least; more are put around resonances", "400", {
      positive: true,
      standard: "200",
    }),
    choice("spacing", ["log", "even"], "how its own points are spread"),
  ],
  quantities: [],
  says: "The steady response to harmonic drives over a range of frequencies.",
  text: "",
  example: "",
  snippet: "ask sweep $1\n    of = $2\n    by = $3\n    from = $4 Hz\n    to = $5 Hz",
});
