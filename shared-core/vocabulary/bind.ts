import type { StatementDescription } from "./description.ts";
import { statement } from "./statement.ts";

export const bind: StatementDescription = statement({
  keyword: "bind",
  family: "moves",
  head: [{ kind: "place", slot: "coordinate" }],
  value: "required",
  details: [],
  quantities: [],
  says: "Makes a coordinate a fixed multiple, or a sum of multiples, of others.",
  text: "",
  example: "",
  snippet: "bind $1 = $2 * $3",
});
