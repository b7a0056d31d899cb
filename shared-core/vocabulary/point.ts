import { COORDINATE_QUANTITIES, DIRECTIONS } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { AT_POINT, NAME, prose, statement, wordAndPlace } from "./statement.ts";

export const point: StatementDescription = statement({
  keyword: "point",
  family: "moves",
  head: [NAME, ...wordAndPlace("on"), ...AT_POINT],
  value: "none",
  details: [],
  components: DIRECTIONS,
  quantities: COORDINATE_QUANTITIES,
  says: "A place on a body, in the drawing's axes.",
  text: prose(
    "A place on a body: where a pipe is flanged on, where a person stands, where a force acts. Its motion",
    "is that of the body at that place, displacement of the centre of gravity plus rotation times the",
    "arm, and a spring or a force on it acts on the body with the matching moment.",
    "",
    "The place is given in the drawing's axes, the same that `centre` and the mounts use. A point adds no",
    "coordinate and no mass.",
  ),
  example: `thrum 1
title "Exhaust flange on the quay generator"

body genset = 2.4 t
    inertia = (310, 840, 760) kg*m^2
    moves = z, rx, ry
point flange on genset at (1.1, 0.2, 0.7) m

mount west between genset and ground at (-0.9, 0, -0.5) m
    stiffness = (500, 500, 800) N/mm
mount east between genset and ground at (0.9, 0, -0.5) m
    stiffness = (500, 500, 800) N/mm
spring tilt between genset.rx and ground = 160 kN*m/rad
spring bellows between flange.z and ground = 35 N/mm

force firing on genset.rx
    amplitude = 240 N*m

ask sweep engine
    of = flange.z.velocity
    by = firing
    from = 5 Hz
    to = 60 Hz

expect bellows_safe = peak(engine, flange.z.velocity) <= 60 mm/s
`,
  snippet: "point $1 on $2 at ($3, $4, $5) m",
  notYet: true,
});
