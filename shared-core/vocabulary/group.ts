import type { StatementDescription } from "./description.ts";
import { NAME, statement, TURNING } from "./statement.ts";

export const group: StatementDescription = statement({
  keyword: "group",
  family: "joins",
  head: [NAME],
  value: "required",
  details: [],
  quantities: [
    { name: "force", measure: "force", says: "sum of the forces of its members" },
    { name: "torque", measure: "force", says: "sum of the torques of its members", whenMotion: TURNING },
  ],
  says: "Several joining elements as one; its force is their sum.",
  text: "",
  example: "",
  snippet: "group $1 = $2, $3",
});
