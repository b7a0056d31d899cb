import type { DetailDescription, StatementDescription } from "./description.ts";
import { amount, statement } from "./statement.ts";

const KEYS: readonly DetailDescription[] = [
  amount("gravity", "acceleration", "pull of gravity on every mass with weight", "9.81 m/s^2", {
    standard: "1 gn",
  }),
  amount("modal_damping", "share", "damping ratio added to every mode", "1 %", { standard: "0 %" }),
  amount("mass_damping", "decay", "adds this times the mass matrix to the damping matrix", "0.34 1/s", {
    standard: "0 1/s",
  }),
  amount(
    "stiffness_damping",
    "time",
    "adds this times the stiffness matrix to the damping matrix",
    "1.02 ms",
    {
      standard: "0 s",
    },
  ),
  amount(
    "resonance_band",
    "share",
    "how near to a mode a steady drive may run before it is warned of",
    "15 %",
    {
      standard: "20 %",
    },
  ),
];

export const assume: StatementDescription = statement({
  keyword: "assume",
  family: "numbers",
  head: [{ kind: "choice", slot: "key", choices: KEYS.map(({ key }) => key) }],
  value: "required",
  details: [],
  keys: KEYS,
  quantities: [],
  says: "A number that holds for the whole model.",
  text: "",
  example: "",
  snippet: "assume $1 = $2 gn",
});
