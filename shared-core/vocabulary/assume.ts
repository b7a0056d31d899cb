import type { DetailDescription, StatementDescription } from "./description.ts";
import { amount, prose, statement } from "./statement.ts";

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
  text: prose(
    "Numbers that hold for the whole model rather than for one part of it. They change answers everywhere",
    "at once, so a report prints them in a list of their own.",
    "",
    "`modal_damping` is added to every mode, on top of what dampers and loss factors give; it is the",
    "usual stand-in for the joints, bearings and cable loops that nobody models. `mass_damping` and",
    "`stiffness_damping` build a damping matrix from the mass and stiffness matrices: the ratio in a mode",
    "of angular rate w is (a/w + b w)/2, which fits two frequencies and no more. `mass_damping_for` and",
    "`stiffness_damping_for` compute both from two measured points.",
    "",
    "`gravity` only acts on masses that say which way they hang (`weight`) and in `static_deflection`.",
    "`resonance_band` is how near a steady drive may come to a mode before `near-resonance` speaks; 20 %",
    "is common practice, no source.",
  ),
  example: `thrum 1
title "Crane cab on its isolators"

assume modal_damping = 1 %
assume mass_damping = mass_damping_for(2 %, 3 Hz, 3 %, 20 Hz)
assume stiffness_damping = stiffness_damping_for(2 %, 3 Hz, 3 %, 20 Hz)

mass cab = 1.9 t
spring isolators between cab and ground = 0.42 MN/m

expect damped_enough = damping_ratio(1) >= 2.5 %
`,
  snippet: "assume $1 = $2 gn",
});
