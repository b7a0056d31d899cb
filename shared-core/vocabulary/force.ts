import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, statement, wordAndPlace } from "./statement.ts";

export const force: StatementDescription = statement({
  keyword: "force",
  family: "drives",
  head: [NAME, ...wordAndPlace("on")],
  value: "none",
  details: driveDetails("force"),
  quantities: [],
  says: "A force on a coordinate.",
  text: "",
  example: "",
  snippet: "force $1 on $2\n    amplitude = $3 N\n    frequency = $4 Hz",
});
