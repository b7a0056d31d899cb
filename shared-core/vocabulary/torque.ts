import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, statement, wordAndPlace } from "./statement.ts";

export const torque: StatementDescription = statement({
  keyword: "torque",
  family: "drives",
  head: [NAME, ...wordAndPlace("on")],
  value: "none",
  details: driveDetails("torque"),
  quantities: [],
  says: "A torque on a turning coordinate.",
  text: "",
  example: "",
  snippet: "torque $1 on $2\n    amplitude = $3 N*m\n    frequency = $4 Hz",
});
