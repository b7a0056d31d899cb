import { COORDINATE_QUANTITIES } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { choice, NAME, statement } from "./statement.ts";

export const junction: StatementDescription = statement({
  keyword: "junction",
  family: "moves",
  head: [NAME],
  value: "none",
  details: [choice("kind", ["sliding", "turning"], "whether it is displaced or turns")],
  quantities: COORDINATE_QUANTITIES,
  says: "A point without mass in which elements meet.",
  text: "",
  example: "",
  snippet: "junction $1",
  assemble: () => {},
});
