import type { StatementDescription } from "./description.ts";
import { NAME, statement } from "./statement.ts";

export const letNumber: StatementDescription = statement({
  keyword: "let",
  family: "numbers",
  head: [NAME],
  value: "required",
  details: [],
  quantities: [],
  says: "A named number with its unit, tolerance and source.",
  text: "",
  example: "",
  snippet: "let $1 = $2 kg",
});
