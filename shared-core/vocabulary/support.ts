import { COORDINATE_QUANTITIES, DIRECTIONS } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { choice, NAME, statement } from "./statement.ts";

export const support: StatementDescription = statement({
  keyword: "support",
  family: "moves",
  head: [NAME],
  value: "none",
  details: [
    choice("kind", ["sliding", "turning", "body"], "what it can do: slide, turn, or all six directions"),
  ],
  components: DIRECTIONS,
  quantities: [
    ...COORDINATE_QUANTITIES,
    { name: "reaction", measure: "force", says: "force on it: the sum over what is joined to it" },
  ],
  says: "Something whose motion is given: still, unless a motion moves it.",
  text: "",
  example: "",
  snippet: "support $1",
  assemble: () => {},
});
