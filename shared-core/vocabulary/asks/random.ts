import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, choice, statement } from "../statement.ts";

export const random: StatementDescription = statement({
  keyword: "ask",
  variant: "random",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("from", "rate", "lowest frequency", "5 Hz", { positive: true }),
    amount("to", "rate", "highest frequency", "500 Hz", { positive: true }),
    amount("duration", "time", "time for which the expected peak is given", "10 min", { positive: true }),
    choice("bands", ["none", "octave", "third_octave"], "bands in which the response is summed"),
  ],
  quantities: [],
  says: "The response to stationary random drives: density, rms and expected peak.",
  text: "",
  example: "",
  snippet: "ask random $1\n    of = $2\n    by = $3\n    duration = $4 min",
  notYet: true,
});
