import type { StatementDescription } from "./description.ts";
import { driveDetails } from "./drive-shapes.ts";
import { NAME, statement, wordAndPlace } from "./statement.ts";

export const motion: StatementDescription = statement({
  keyword: "motion",
  family: "drives",
  head: [NAME, ...wordAndPlace("of")],
  value: "none",
  details: driveDetails("motion"),
  quantities: [],
  says: "Moves a support; the unit of its values says whether they are displacement, velocity or acceleration.",
  text: "",
  example: "",
  snippet: "motion $1 of $2\n    amplitude = $3 mm\n    frequency = $4 Hz",
});
