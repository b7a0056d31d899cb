import type { StatementDescription } from "./description.ts";
import { statement } from "./statement.ts";

export const use: StatementDescription = statement({
  keyword: "use",
  family: "file",
  head: [{ kind: "text", slot: "path" }],
  value: "none",
  details: [],
  quantities: [],
  says: "Takes the let, limit and kit statements of another file.",
  text: "",
  example: "",
  snippet: 'use "$1"',
});
