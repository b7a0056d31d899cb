import type { StatementDescription } from "./description.ts";
import { BETWEEN, NAME, statement } from "./statement.ts";

export const part: StatementDescription = statement({
  keyword: "part",
  family: "joins",
  head: [NAME, { kind: "word", word: "=" }, { kind: "call", slot: "kit" }, ...BETWEEN],
  value: "none",
  details: [],
  quantities: [],
  says: "Places a kit between two things; its inner names are seen as NAME.inner.",
  text: "",
  example: "",
  snippet: "part $1 = $2($3) between $4 and $5",
  notYet: true,
});
