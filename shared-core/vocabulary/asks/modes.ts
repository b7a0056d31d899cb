import { ASK_HEAD } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, statement } from "../statement.ts";

export const modes: StatementDescription = statement({
  keyword: "ask",
  variant: "modes",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    amount("up_to", "rate", "highest natural frequency to list", "200 Hz", { positive: true }),
    amount("count", "number", "most modes to list", "6", { positive: true }),
  ],
  quantities: [],
  says: "Natural frequencies, damping ratios, shapes, effective masses and energy shares.",
  text: "",
  example: "",
  snippet: "ask modes",
});
