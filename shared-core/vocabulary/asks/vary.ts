import { ASK_HEAD, WATCH } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { amount, detail, statement } from "../statement.ts";

export const vary: StatementDescription = statement({
  keyword: "ask",
  variant: "vary",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    detail(
      "change",
      { is: "changes" },
      "one or two numbers and the range each runs through",
      "mount from 15 N/mm to 40 N/mm",
      {
        required: true,
      },
    ),
    amount("points", "number", "points for each number", "25", { positive: true, standard: "21" }),
    WATCH,
  ],
  quantities: [],
  says: "Each watched quantity against one or two parameters.",
  text: "",
  example: "",
  snippet: "ask vary $1\n    change = $2 from $3 N/mm to $4 N/mm\n    watch = $5",
  notYet: true,
});
