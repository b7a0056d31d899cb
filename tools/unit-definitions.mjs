/**
 * The units of the language, and the definitions whose factor is exact where a table has a rounded one or none.
 * `ask` is what mathjs is asked for the dimension (and, without an entry in EXACT, the factor); null: a number.
 */
const si = (name, ask) => ({ name, ask, prefixes: true });

export const LANGUAGE_UNITS = [
  ...["m", "g", "s", "A", "K", "mol", "cd"].map((name) => si(name)),
  ...["N", "Pa", "J", "W", "C", "V", "F", "H", "S", "Wb", "T"].map((name) => si(name)),
  si("ohm"),
  // U+03A9 is the Greek letter, U+2126 the sign; both are typed.
  si("\u03a9", "ohm"),
  si("\u2126", "ohm"),
  si("rad"),
  si("l"),
  si("L"),
  si("bar"),
  { ...si("Hz"), rate: true },
  { name: "t" },
  { name: "min" },
  { name: "h" },
  { name: "in" },
  { name: "mil" },
  { name: "ft" },
  { name: "lbf" },
  { name: "kip" },
  { name: "lbm" },
  { name: "oz" },
  { name: "slug", ask: "lbf s^2 / ft" },
  { name: "psi" },
  { name: "gn", ask: "m / s^2" },
  { name: "rpm", ask: "Hz", rate: true },
  { name: "cpm", ask: "Hz", rate: true },
  { name: "deg", ask: "deg" },
  { name: "rev", ask: null },
  { name: "%", ask: null },
  { name: "ppm", ask: null },
];

const POUND = 0.45359237;
const FOOT = 0.3048;
const INCH = 0.0254;
const STANDARD_GRAVITY = 9.80665;
const POUND_FORCE = 4.4482216152605;

/** Sources: NIST SP 811 (2008), appendix B, and ISO 80000-3. The decimal text is the definition or its exact quotient. */
export const EXACT = {
  gn: { factor: STANDARD_GRAVITY, source: "standard gravity, ISO 80000-3" },
  lbf: { factor: POUND_FORCE, source: "0.45359237 kg x 9.80665 m/s^2, NIST SP 811" },
  kip: { factor: 4448.2216152605, source: "1000 lbf, NIST SP 811" },
  psi: { factor: POUND_FORCE / (INCH * INCH), source: "lbf/in^2, NIST SP 811" },
  slug: { factor: POUND_FORCE / FOOT, source: "lbf s^2/ft, NIST SP 811" },
  oz: { factor: POUND / 16, source: "lbm/16, avoirdupois, NIST SP 811" },
  mil: { factor: 2.54e-5, source: "0.001 in, NIST SP 811" },
  deg: { factor: Math.PI / 180, source: "pi/180 rad, ISO 80000-3" },
  rpm: { factor: 1 / 60, source: "one cycle a minute, held in Hz" },
  cpm: { factor: 1 / 60, source: "one cycle a minute, held in Hz" },
  rev: { factor: 2 * Math.PI, source: "one turn, ISO 80000-3" },
  "%": { factor: 0.01, source: "ISO 80000-1" },
  ppm: { factor: 1e-6, source: "parts per million" },
};
