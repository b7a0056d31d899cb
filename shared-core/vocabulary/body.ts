import { COORDINATE_QUANTITIES, DIRECTIONS } from "./coordinate-quantities.ts";
import type { StatementDescription } from "./description.ts";
import { amount, choice, detail, NAME, statement } from "./statement.ts";

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
  text: "",
  example: "",
  snippet: "body $1 = $2 t\n    inertia = ($3, $4, $5) kg*m^2",
  notYet: true,
});
