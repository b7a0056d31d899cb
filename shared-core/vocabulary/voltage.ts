import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, statement, wordAndPlace } from "./statement.ts";

export const voltage: StatementDescription = statement({
  keyword: "voltage",
  family: "drives",
  head: [NAME, ...wordAndPlace("on")],
  value: "none",
  details: driveDetails("voltage"),
  quantities: [],
  says: "A source in a loop.",
  text: "",
  example: "",
  snippet: "voltage $1 on $2\n    amplitude = $3 V\n    frequency = $4 Hz",
  notYet: true,
});
