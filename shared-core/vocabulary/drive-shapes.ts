import type { DetailDescription, Measure } from "./description.ts";
import { amount, choice, detail } from "./statement.ts";

/** Statements that drive. */
export type DriveKeyword = "force" | "torque" | "voltage" | "motion";

/**
 * Details of a drive: one shape each. The shape and its place are read from these details by the model, not by
 * an `assemble`, because records, laws and ranges need the text around them.
 */
export function driveDetails(keyword: DriveKeyword): readonly DetailDescription[] {
  const value: Measure = keyword === "motion" ? "any" : "force";
  const unit = UNIT[keyword];
  const rotating = keyword === "force" || keyword === "torque";
  return [
    amount("amplitude", value, "peak of the steady sine", `120 ${unit}`),
    amount("frequency", "rate", "its frequency; a range is for judging", "12 Hz", {
      positive: true,
      orRange: true,
    }),
    amount("speed", "rate", "running speed of the machine; a range is for judging", "1180 rpm", {
      positive: true,
      orRange: true,
    }),
    amount("order", "number", "cycles a turn of the running speed", "2", { positive: true, standard: "1" }),
    amount("phase", "angle", "phase of the cosine at t = 0", "-90 deg", { standard: "0 deg" }),
    ...(rotating ? UNBALANCE : []),
    ...pulse(value, unit),
    amount("step", value, "height of the step", `2 ${unit}`),
    ...(keyword === "motion"
      ? []
      : [amount("impulse", "momentum", "momentum given at once", `25 ${unit}*s`)]),
    amount("start", "time", "when a pulse, step or impulse begins", "0.1 s", { standard: "0 s" }),
    law(keyword, value, unit),
    ...(keyword === "torque" ? [SPEED_CURVE] : []),
    detail(
      "chirp",
      { is: "range", measure: "rate" },
      "a run-up in time: the rate rises linearly from one value to the other",
      "from 2 Hz to 40 Hz",
    ),
    amount("lasting", "time", "how long the chirp lasts", "30 s", { positive: true }),
    ...record(keyword),
    density(unit),
  ];
}

const UNIT: Readonly<Record<DriveKeyword, string>> = {
  force: "N",
  torque: "N*m",
  voltage: "V",
  motion: "mm",
};

const UNBALANCE: readonly DetailDescription[] = [
  amount(
    "unbalance",
    "unbalance",
    "mass times eccentricity; amplitude unbalance (2 pi speed)^2",
    "0.018 kg*m",
  ),
  choice("turning", ["x", "y", "z"], "axis of rotation of an unbalance on a point of a body", {
    standard: undefined,
    notYet: true,
  }),
];

const PULSES: readonly string[] = [
  "half_sine",
  "haversine",
  "triangle",
  "rectangle",
  "rising_sawtooth",
  "falling_sawtooth",
  "trapezoid",
];

function pulse(value: Measure, unit: string): readonly DetailDescription[] {
  return [
    choice("pulse", PULSES, "shape of a single pulse", { standard: undefined }),
    amount("peak", value, "peak of the pulse", `500 ${unit}`),
    amount("duration", "time", "whole base of the pulse", "11 ms", { positive: true }),
    amount("rise", "time", "rise of a trapezoid or of a ramped step", "2 ms", { standard: "0 s" }),
    amount("fall", "time", "fall of a trapezoid", "2 ms", { standard: "0 s" }),
  ];
}

function law(keyword: DriveKeyword, measure: Measure, unit: string): DetailDescription {
  const variables = keyword === "torque" ? (["t", "rate"] as const) : (["t"] as const);
  const says = `an expression in ${variables.join(" and ")}`;
  return detail("law", { is: "law", variables, measure }, says, `40 ${unit} * exp(-t / 0.5 s)`);
}

const SPEED_CURVE: DetailDescription = detail(
  "curve",
  {
    is: "table",
    columns: [
      { name: "speed", measure: "rate" },
      { name: "torque", measure: "force" },
    ],
    orFile: true,
  },
  "torque over speed, rows or a file",
  "1450 rpm  220 N*m",
);

function record(keyword: DriveKeyword): readonly DetailDescription[] {
  return [
    detail(
      "record",
      { is: "text", file: true },
      "file of a measured history, linear between samples",
      '"quay-wall.csv"',
    ),
    detail("column", { is: "text" }, "heading or number of the column of values", '"z"', {
      standard: "the second",
    }),
    detail("time_column", { is: "text" }, "heading or number of the column of times", '"t"', {
      standard: "the first",
    }),
    amount("sampled_at", "rate", "rate of sampling, where the file has no times", "2 kHz", {
      positive: true,
    }),
    detail("unit", { is: "unit" }, "unit of the values", keyword === "motion" ? "gn" : UNIT[keyword]),
    amount("scale", "number", "factor on the values", "0.5", { standard: "1" }),
  ];
}

function density(unit: string): DetailDescription {
  return detail(
    "density",
    {
      is: "table",
      columns: [
        { name: "frequency", measure: "rate" },
        { name: "level", measure: "any" },
      ],
      orFile: true,
    },
    "one-sided density per Hz, rows or a file, straight on log-log paper",
    `20 Hz  0.5 ${unit}^2/Hz`,
    { notYet: true },
  );
}
