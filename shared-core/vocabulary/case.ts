import type { StatementDescription } from "./description.ts";
import { NAME, statement } from "./statement.ts";

export const caseStatement: StatementDescription = statement({
  keyword: "case",
  family: "numbers",
  head: [NAME],
  value: "none",
  details: [],
  openDetails: true,
  quantities: [],
  says: "The model again with some numbers replaced.",
  text: "",
  example: "",
  snippet: "case $1\n    $2 = $3",
});
