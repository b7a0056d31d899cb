import { COORDINATE_QUANTITIES, DIRECTIONS } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, choice, detail, NAME, prose, statement } from "./statement.ts";

export const body: StatementDescription = statement({
  keyword: "body",
  family: "moves",
  head: [NAME],
  value: "optional",
  principal: "mass",
  details: [
    amount("mass", "mass", "the mass", "2.4 t", { positive: true, required: true }),
    detail(
      "centre",
      { is: "tuple", measure: "length", components: ["x", "y", "z"] },
      "where its centre of gravity lies in the drawing's axes",
      "(0.06, -0.03, 0.22) m",
      { standard: "(0, 0, 0) m" },
    ),
    detail(
      "inertia",
      { is: "tuple", measure: "inertia", components: ["x", "y", "z"] },
      "moments of inertia Ixx, Iyy, Izz about the centre of gravity",
      "(310, 840, 760) kg*m^2",
      { required: true },
    ),
    detail(
      "products",
      { is: "tuple", measure: "inertia", components: ["xy", "xz", "yz"] },
      "products of inertia as the integrals of xy, xz, yz over the mass",
      "(1.5, -2, -0.8) kg*m^2",
      { standard: "(0, 0, 0) kg*m^2" },
    ),
    detail("moves", { is: "words", words: DIRECTIONS }, "the directions it may move in", "z, rx, ry", {
      standard: "x, y, z, rx, ry, rz",
    }),
    detail(
      "spin",
      { is: "tuple", measure: "rate", components: ["x", "y", "z"] },
      "steady spin about an axis of rotation symmetry, with its gyroscopic terms",
      "(0, 0, 1500) rpm",
    ),
    choice("weight", ["off", "on"], "whether gravity pulls it, in -z"),
  ],
  components: DIRECTIONS,
  quantities: COORDINATE_QUANTITIES,
  says: "A rigid body with up to six directions of motion.",
  text: prose(
    "A rigid body with its six directions: x, y, z of its centre of gravity and rx, ry, rz about it, all",
    "small. `centre` says where the centre of gravity lies in the drawing's axes; every `at` of points",
    "and mounts is in those axes, so that numbers can be copied from a drawing and a changed centre of",
    "gravity is one changed line.",
    "",
    "The inertias are about the centre of gravity. `products` are the integrals of xy, xz and yz over the",
    "mass; the tensor holds their negatives. Data sheets differ in the sign they print, so check with one",
    "asymmetric case. `moves` keeps only the directions the guides leave free.",
    "`spin` adds the gyroscopic terms of a steady rotation about an axis of rotation symmetry.",
    "",
    "A coordinate of a body is written with its direction: `genset.z`, `genset.ry`.",
  ),
  example: `thrum 1
title "Quay generator as a rigid body on four mounts"

body genset = 2.4 t
    centre = (0.06, 0, 0.55) m
    inertia = (310, 840, 760) kg*m^2
    moves = z, rx, ry

mount north_west between genset and ground at (-0.9, 0.45, 0) m
    stiffness = (260, 260, 420) N/mm
mount north_east between genset and ground at (0.9, 0.45, 0) m
    like = north_west
mount south_west between genset and ground at (-0.9, -0.45, 0) m
    like = north_west
mount south_east between genset and ground at (0.9, -0.45, 0) m
    like = north_west

expect below_idle = natural_frequency(3) <= 15 Hz
`,
  snippet: "body $1 = $2 t\n    inertia = ($3, $4, $5) kg*m^2",
  notYet: true,
});
