import type { StatementDescription } from "./description.ts";
import { statement } from "./statement.ts";

export const title: StatementDescription = statement({
  keyword: "title",
  family: "file",
  head: [{ kind: "text", slot: "text" }],
  value: "none",
  details: [],
  quantities: [],
  says: "What the model is, shown above the sheet, the review and the report.",
  text: "",
  example: "",
  snippet: 'title "$1"',
});
