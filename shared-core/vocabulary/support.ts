import { COORDINATE_QUANTITIES, DIRECTIONS } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { choice, NAME, prose, statement } from "./statement.ts";

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
  text: prose(
    "Something whose motion is given from outside: a floor, a foundation, a vehicle bed, a shaker table.",
    "It stands still until a `motion` moves it. `ground` is a support that is always there and always",
    "still; a support of its own is needed where it moves, or where the reaction on it is asked for apart",
    "from other places.",
    "",
    "`kind` says what it can do: slide along the line of the model, turn, or all six directions for",
    "bodies. Its `reaction` is the sum of the forces of all that is joined to it.",
  ),
  example: `thrum 1
title "Chart table above the engine room"

support deck
mass table = 62 kg
spring feet between table and deck = 28 N/mm
    loss_factor = 0.12

motion engine of deck
    amplitude = 0.9 mm/s
    frequency = 9.5 Hz

ask sweep deck_sweep
    of = table.velocity, deck.reaction
    by = engine
    from = 1 Hz
    to = 40 Hz

expect isolated = transmissibility(deck_sweep, table.velocity, at: 9.5 Hz) <= 45 %
`,
  snippet: "support $1",
  assemble: () => {},
});
