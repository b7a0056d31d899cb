import type { StatementDescription } from "./description.ts";
import { NAME, statement } from "./statement.ts";

export const kit: StatementDescription = statement({
  keyword: "kit",
  family: "file",
  head: [
    NAME,
    { kind: "parameters", slot: "parameters", optional: true },
    { kind: "word", word: "between" },
    { kind: "name", slot: "a" },
    { kind: "word", word: "and" },
    { kind: "name", slot: "b" },
  ],
  value: "none",
  details: [],
  holdsStatements: true,
  quantities: [],
  says: "A reusable assembly between two places, with parameters.",
  text: "",
  example: "",
  snippet: "kit $1($2) between $3 and $4\n    $5",
  notYet: true,
});
