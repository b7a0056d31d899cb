import type { StatementDescription } from "./description.ts";
import { NAME, prose, statement, TURNING } from "./statement.ts";

export const group: StatementDescription = statement({
  keyword: "group",
  family: "joins",
  head: [NAME],
  value: "required",
  details: [],
  quantities: [
    { name: "force", measure: "force", says: "sum of the forces of its members" },
    { name: "torque", measure: "force", says: "sum of the torques of its members", whenMotion: TURNING },
  ],
  says: "Several joining elements as one; its force is their sum.",
  text: prose(
    "Several joining elements looked at as one. Its `.force` is the sum of the forces of its members,",
    "with their phases: what the mounts and the dampers beside them hand to the slab together, which is",
    "what a transmissibility asks for. It has no stiffness of its own and changes nothing in the",
    "equations.",
    "",
    "All members must move alike, all sliding or all turning. Mind the signs: a force is positive where",
    "it pulls A and B together, so members should be written with their ends in the same order.",
  ),
  example: `thrum 1
title "Air compressor on the quay"

mass compressor = 720 kg
spring mounts between compressor and ground = 95 N/mm
    count = 4
damper oil between compressor and ground = 1.2 kN*s/m
    count = 4
group feet = mounts, oil

force imbalance on compressor
    unbalance = 0.03 kg*m

ask sweep run_up
    of = feet.force
    by = imbalance
    from = 2 Hz
    to = 40 Hz

expect isolated = transmissibility(run_up, feet, at: 24 Hz) <= 25 %
`,
  snippet: "group $1 = $2, $3",
});
