import { COORDINATE_QUANTITIES, DIRECTIONS } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { AT_POINT, NAME, statement, wordAndPlace } from "./statement.ts";

export const point: StatementDescription = statement({
  keyword: "point",
  family: "moves",
  head: [NAME, ...wordAndPlace("on"), ...AT_POINT],
  value: "none",
  details: [],
  components: DIRECTIONS,
  quantities: COORDINATE_QUANTITIES,
  says: "A place on a body, in the drawing's axes.",
  text: "",
  example: "",
  snippet: "point $1 on $2 at ($3, $4, $5) m",
  notYet: true,
});
