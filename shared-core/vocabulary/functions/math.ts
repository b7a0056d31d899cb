import { type FunctionDescription, given, measureResult, type ResultContent } from "./function.ts";

/** Functions of numbers. Angles are in radians as every number is; a rate times a time in sin and cos is one cycle a turn. */
export const MATH_FUNCTIONS: readonly FunctionDescription[] = [
  of("sqrt", "the square root", "sqrt(2 * k / m)", Math.sqrt, { any: true, result: { is: "root" } }),
  of("exp", "e to the power of a number", "exp(-t / 0.5 s)", Math.exp),
  of("ln", "the natural logarithm", "ln(3.2)", positive(Math.log)),
  of("log10", "the logarithm to base 10", "log10(200)", positive(Math.log10)),
  of("sin", "the sine of an angle, or of a rate times a time", "sin(12 Hz * t)", Math.sin),
  of("cos", "the cosine of an angle, or of a rate times a time", "cos(12 Hz * t)", Math.cos),
  of("tan", "the tangent of an angle", "tan(30 deg)", Math.tan),
  of("asin", "the angle of a sine", "asin(0.5)", Math.asin),
  of("acos", "the angle of a cosine", "acos(0.5)", Math.acos),
  of("atan", "the angle of a tangent", "atan(0.5)", Math.atan),
  {
    name: "atan2",
    group: "math",
    parameters: [given("y", "any", "across"), given("x", "any", "along, of the same kind")],
    result: measureResult("number"),
    says: "the angle of a point (x, y), -180 to 180 deg",
    example: "atan2(3 mm, 4 mm)",
    evaluate: ([y, x]) => Math.atan2(y, x),
  },
  of("abs", "the size without the sign", "abs(-4 mm)", Math.abs, { any: true, result: { is: "same" } }),
  several("min", "the smallest", "min(8 N/mm, limit_stiffness)", (numbers) => Math.min(...numbers)),
  several("max", "the largest", "max(8 N/mm, limit_stiffness)", (numbers) => Math.max(...numbers)),
  of("floor", "the whole number below", "floor(3.7)", Math.floor),
  of("ceil", "the whole number above", "ceil(3.2)", Math.ceil),
  of("round", "the nearest whole number, halves upwards", "round(3.5)", Math.round),
  of("sign", "-1, 0 or 1", "sign(travel)", Math.sign, { any: true }),
];

function of(
  name: string,
  says: string,
  example: string,
  run: (x: number) => number,
  { any = false, result = measureResult("number") }: { any?: boolean; result?: ResultContent } = {},
): FunctionDescription {
  return {
    name,
    group: "math",
    parameters: [given("x", any ? "any" : "number", any ? "any number" : "a number without a unit")],
    result,
    says,
    example,
    evaluate: ([x]) => run(x),
  };
}

function several(
  name: string,
  says: string,
  example: string,
  evaluate: (numbers: readonly number[]) => number,
): FunctionDescription {
  const parameters = [given("x", "any", "numbers of one kind", { repeated: true })];
  return {
    name,
    group: "math",
    parameters,
    result: { is: "same" },
    says: `${says} of several`,
    example,
    evaluate,
  };
}

/** No number where there is no logarithm, rather than minus infinity. */
function positive(run: (x: number) => number): (x: number) => number {
  return (x) => (x > 0 ? run(x) : Number.NaN);
}
