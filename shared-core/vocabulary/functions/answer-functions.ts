import {
  type FunctionDescription,
  given,
  measureResult,
  type ParameterDescription,
  type ResultContent,
} from "./function.ts";

const RESPONSES = ["sweep", "history", "random", "shock_spectrum"];

const MODE = given("mode", "number", "number of the mode, 1 the lowest elastic one");
const QUANTITY: ParameterDescription = {
  name: "quantity",
  content: { is: "series" },
  says: "quantity, as unit.velocity; it need not stand in the ask",
};
const AT: ParameterDescription = given("at", "any", "frequency or time", { named: true });
const ELEMENT: ParameterDescription = {
  name: "element",
  content: { is: "element" },
  says: "joining element or group",
};
const ask = (...kinds: readonly string[]): ParameterDescription => ({
  name: "ask",
  content: { is: "ask", kinds },
  says: `name of ${kinds.length === 1 ? `a ${kinds[0].replace("_", " ")}` : "an ask"}`,
});
const SHARE: ResultContent = measureResult("share");
const SERIES: ResultContent = { is: "series" };
const PLACE: ResultContent = { is: "place" };
const RANDOM = { notYet: true };

/** Functions that read the answers; their arguments are resolved by the model. */
export const ANSWER_FUNCTIONS: readonly FunctionDescription[] = [
  ...modeFunctions(),
  answer("static_deflection", [ELEMENT], measureResult("travel"), {
    says: "size of its travel when gravity acts on every mass in its positive direction and on bodies in -z",
    example: "static_deflection(mounts)",
  }),
  answer("static_force", [ELEMENT], measureResult("force"), {
    says: "size of its force when gravity acts on every mass in its positive direction and on bodies in -z",
    example: "static_force(mounts)",
  }),
  ...extremes(),
  ...valuesAt(),
  ...responses(),
  ...randomFunctions(),
  answer(
    "below",
    [ask(...RESPONSES), QUANTITY, { name: "limit", content: { is: "limit" }, says: "limit" }],
    SHARE,
    {
      says: "largest ratio of the answer to a limit curve; <= 1 holds",
      example: "below(run_up, unit.velocity, zone_b)",
    },
  ),
  answer(
    "period",
    [
      { name: "pendulum", content: { is: "pendulum" }, says: "pendulum" },
      given("amplitude", "angle", "largest angle of the swing"),
    ],
    measureResult("time"),
    { says: "exact period of a pendulum at an amplitude", example: "period(load, 20 deg)", notYet: true },
  ),
  answer(
    "sensitivity",
    [
      { name: "quantity", content: { is: "expression" }, says: "what changes, as natural_frequency(1)" },
      { name: "parameter", content: { is: "let" }, says: "the let that changes it" },
    ],
    SHARE,
    {
      says: "relative change of a quantity per relative change of a parameter",
      example: "sensitivity(natural_frequency(1), mount)",
    },
  ),
];

function modeFunctions(): readonly FunctionDescription[] {
  const rateResult = measureResult("rate");
  return [
    answer("natural_frequency", [MODE], rateResult, {
      says: "undamped natural frequency of a mode",
      example: "natural_frequency(1)",
    }),
    answer("damped_frequency", [MODE], rateResult, {
      says: "frequency at which a mode rings with its damping",
      example: "damped_frequency(1)",
    }),
    answer("damping_ratio", [MODE], SHARE, {
      says: "damping ratio of a mode, 1 at critical damping",
      example: "damping_ratio(1)",
    }),
    answer(
      "effective_mass",
      [
        MODE,
        {
          name: "direction",
          content: { is: "word", words: ["line", "turn", "x", "y", "z", "rx", "ry", "rz"] },
          says: "direction; not needed where everything moves along one",
          optional: true,
        },
      ],
      SHARE,
      { says: "share of the moving mass that a mode carries", example: "effective_mass(1)" },
    ),
    answer("separation", [MODE, given("rate", "rate", "rate of a drive")], SHARE, {
      says: "distance of a rate from a mode, as a share of the mode's frequency",
      example: "separation(1, fan_speed)",
      formula: "abs(rate / natural_frequency(n) - 1)",
    }),
    answer(
      "clear_of_modes",
      [
        { name: "rate", content: { is: "range" }, says: "rate, or a range of rates" },
        {
          name: "orders",
          content: { is: "list", measure: "number" },
          says: "multiples of the rate",
          named: true,
          optional: true,
        },
      ],
      SHARE,
      {
        says: "least separation of any elastic mode that the drive can excite",
        example: "clear_of_modes(600 rpm to 1500 rpm, orders: (1, 2))",
      },
    ),
    answer("stability_margin", [], measureResult("decay"), {
      says: "smallest decay rate of any mode; negative: one grows",
      example: "stability_margin()",
    }),
  ];
}

function extremes(): readonly FunctionDescription[] {
  const of = (name: string, says: string, result: ResultContent): FunctionDescription =>
    answer(name, [ask(...RESPONSES), QUANTITY], result, { says, example: `${name}(run_up, unit.velocity)` });
  return [
    of("peak", "largest absolute value of an answer, found between samples too", SERIES),
    of("highest", "largest signed value of an answer", SERIES),
    of("lowest", "smallest signed value of an answer", SERIES),
    of("rms", "root mean square over the whole answer", SERIES),
    of("peak_at", "frequency or time of the peak", PLACE),
    of("least", "smallest absolute value of an answer", SERIES),
    of("least_at", "frequency or time of the smallest absolute value", PLACE),
  ];
}

function valuesAt(): readonly FunctionDescription[] {
  const of = (
    name: string,
    kinds: readonly string[],
    says: string,
    result: ResultContent,
    notYet?: boolean,
  ): FunctionDescription =>
    answer(name, [ask(...kinds), QUANTITY, AT], result, {
      says,
      example: `${name}(run_up, unit.velocity, at: 20 Hz)`,
      notYet,
    });
  const spectrum = ["shock_spectrum"];
  return [
    of(
      "value",
      RESPONSES,
      "value at that very frequency or time: magnitude in a sweep, signed in a history",
      SERIES,
    ),
    of("phase", ["sweep"], "argument of the complex amplitude at that very frequency; negative lags", {
      is: "measure",
      measure: "angle",
    }),
    of("residual", spectrum, "spectrum after the pulse, at that frequency", SERIES, true),
    of("primary", spectrum, "spectrum during the pulse, at that frequency", SERIES, true),
  ];
}

function responses(): readonly FunctionDescription[] {
  return [
    answer(
      "transmissibility",
      [
        ask("sweep"),
        { name: "of", content: { is: "series" }, says: "element, group or quantity" },
        given("at", "rate", "frequency", { named: true }),
      ],
      SHARE,
      {
        says: "force in it over the amplitude of the ask's one drive, or motion over the drive's motion",
        example: "transmissibility(run_up, feet, at: fan_speed)",
      },
    ),
    answer(
      "settling_time",
      [
        ask("history"),
        QUANTITY,
        given("band", "any", "half-width of the band; a bare number is a share of the largest deviation"),
      ],
      measureResult("time"),
      {
        says: "last time the history leaves a band around its final value",
        example: "settling_time(stop, leaf.displacement, 0.5 mm)",
      },
    ),
    answer("bandwidth", [ask("sweep"), QUANTITY], measureResult("rate"), {
      says: "width of the highest peak at 1/sqrt(2) of it",
      example: "bandwidth(run_up, unit.velocity)",
    }),
    answer("period_of", [ask("history"), QUANTITY], measureResult("time"), {
      says: "mean time between upward crossings of zero",
      example: "period_of(swing, load.displacement)",
    }),
  ];
}

function randomFunctions(): readonly FunctionDescription[] {
  return [
    answer("crossing_rate", [ask("random"), QUANTITY], measureResult("rate"), {
      says: "rate of upward zero crossings",
      example: "crossing_rate(road, crate.acceleration)",
      formula: "nu = rms rate / (2 pi rms)",
      ...RANDOM,
    }),
    answer("expected_peak", [ask("random"), QUANTITY], SERIES, {
      says: "expected largest value in the duration of the ask",
      example: "expected_peak(road, crate.acceleration)",
      formula: "rms (a + 0.5772/a), a = sqrt(2 ln(nu T))",
      ...RANDOM,
    }),
    answer(
      "correlation",
      [ask("random"), { ...QUANTITY, name: "first" }, { ...QUANTITY, name: "second" }],
      measureResult("number"),
      {
        says: "correlation of two quantities, -1 to 1",
        example: "correlation(road, crate.acceleration, lid.acceleration)",
        ...RANDOM,
      },
    ),
  ];
}

function answer(
  name: string,
  parameters: readonly ParameterDescription[],
  result: ResultContent,
  rest: Pick<FunctionDescription, "says" | "example" | "formula" | "notYet">,
): FunctionDescription {
  return { name, group: "answer", parameters, result, ...rest };
}
