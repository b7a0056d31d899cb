import type { StatementDescription } from "./description.ts";
import { choice, detail, NAME, statement } from "./statement.ts";

export const limit: StatementDescription = statement({
  keyword: "limit",
  family: "numbers",
  head: [NAME],
  value: "optional",
  details: [
    detail(
      "rows",
      {
        is: "table",
        columns: [
          { name: "frequency", measure: "rate" },
          { name: "value", measure: "any" },
        ],
      },
      "points of the limit curve, frequency and value",
      "8 Hz  4.5 mm/s",
    ),
    choice("between_points", ["log_log", "straight"], "how the curve runs between its points"),
    choice("of", ["peak", "rms"], "what the value limits: the amplitude, or the root mean square"),
    choice(
      "bands",
      ["none", "octave", "third_octave"],
      "bands in which a random answer is summed before it is judged",
    ),
  ],
  quantities: [],
  says: "A limit, one value or a curve over frequency, with the note as its source.",
  text: "",
  example: "",
  snippet: "limit $1 = $2 mm/s",
});
