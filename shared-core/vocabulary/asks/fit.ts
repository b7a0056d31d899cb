import { ASK_HEAD, CHANGE_LETS } from "../asks/ask.ts";
import type { StatementDescription } from "../description.ts";
import { detail, statement } from "../statement.ts";

export const fit: StatementDescription = statement({
  keyword: "ask",
  variant: "fit",
  family: "asks",
  head: ASK_HEAD,
  value: "none",
  details: [
    CHANGE_LETS,
    detail(
      "measured",
      {
        is: "table",
        columns: [
          { name: "mode", measure: "number" },
          { name: "frequency", measure: "rate" },
          { name: "damping ratio", measure: "share" },
        ],
        orFile: true,
      },
      "measured modes, or a file of a measured response",
      "1  4.2 Hz  3 %",
      { required: true },
    ),
  ],
  quantities: [],
  says: "Parameters that reproduce a measurement, with their confidence intervals.",
  text: "",
  example: "",
  snippet: "ask fit $1\n    change = $2\n    measured =\n        $3  4.2 Hz",
  notYet: true,
});
