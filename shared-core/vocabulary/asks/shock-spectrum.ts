import { ASK_HEAD, BY, OF } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, statement } from "../statement.ts";

export const shockSpectrum: StatementDescription = statement({
  keyword: "ask",
  variant: "shock_spectrum",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    OF,
    BY,
    amount("q_factor", "number", "quality factor of the oscillators", "20", {
      positive: true,
      standard: "10",
    }),
    amount("from", "rate", "lowest frequency", "5 Hz", { positive: true, required: true }),
    amount("to", "rate", "highest frequency", "2 kHz", { positive: true, required: true }),
  ],
  quantities: [],
  says: "Peak acceleration of a row of oscillators that ride on a motion.",
  text: "",
  example: "",
  snippet: "ask shock_spectrum $1\n    of = $2\n    by = $3\n    from = $4 Hz\n    to = $5 kHz",
  notYet: true,
});
