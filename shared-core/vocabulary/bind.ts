import type { StatementDescription } from "./description.ts";
import { prose, statement } from "./statement.ts";

export const bind: StatementDescription = statement({
  keyword: "bind",
  family: "moves",
  head: [{ kind: "place", slot: "coordinate" }],
  value: "required",
  details: [],
  quantities: [],
  says: "Makes a coordinate a fixed multiple, or a sum of multiples, of others.",
  text: prose(
    "Ties a coordinate to others without any spring: gear wheels that mesh, a lever with its two ends, a",
    "rope over a pulley. The bound coordinate is no longer free; its masses and springs act on the others",
    "through the ratio, squared where they should be.",
    "",
    "The right-hand side is a sum of multiples of coordinates, and the multiples carry units where the",
    "two move differently: an angle times a radius is a displacement, so `bind rope_end = 0.15 m *",
    "pulley`. A rigid tie has no force that could be asked for. Where that force matters, write a stiff",
    "spring instead, stiff against its neighbours and not against nature.",
    "",
    "Two ties that contradict each other, or that tie a coordinate to itself, are an `inconsistent-bind`.",
  ),
  example: `thrum 1
title "Winch gear: a wheel that turns 3.2 times slower"

inertia motor = 0.5 kg*m^2
inertia pinion = 0.02 kg*m^2
inertia wheel = 0.3 kg*m^2
inertia drum = 4 kg*m^2

bind pinion = -3.2 * wheel

spring fast_shaft between motor and pinion = 30 kN*m/rad
spring slow_shaft between wheel and drum = 90 kN*m/rad

expect first_torsional = natural_frequency(1) >= 8 Hz
`,
  snippet: "bind $1 = $2 * $3",
});
