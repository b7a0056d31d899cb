import { ANSWER_FUNCTIONS } from "./functions/answer-functions.ts";
import type { FunctionDescription } from "./functions/function.ts";
import { MASS_AND_DAMPING_HELPERS } from "./functions/mass-and-damping-helpers.ts";
import { MATH_FUNCTIONS } from "./functions/math.ts";
import { STIFFNESS_HELPERS } from "./functions/stiffness-helpers.ts";

export type {
  ArgumentContent,
  FunctionDescription,
  FunctionGroup,
  ParameterDescription,
  ResultContent,
} from "./functions/function.ts";
export { argumentKinds, resultKind } from "./functions/function.ts";

/**
 * Every function of the language but `if(condition, then, else)`, which evaluates one branch only and so is no
 * function of numbers.
 */
export const FUNCTIONS: readonly FunctionDescription[] = [
  ...MATH_FUNCTIONS,
  ...STIFFNESS_HELPERS,
  ...MASS_AND_DAMPING_HELPERS,
  ...ANSWER_FUNCTIONS,
];

export function functionOf(name: string): FunctionDescription | undefined {
  return BY_NAME.get(name);
}

/** `natural_frequency(mode)`, `shaft(G, diameter, length, bore: 0)`: for signature help and the reference. */
export function signature({ name, parameters }: FunctionDescription): string {
  const shown = parameters.map((parameter) => {
    const { standard, named, repeated, optional } = parameter;
    if (named) return `${parameter.name}: ${standard ?? "…"}`;
    const text = repeated ? `${parameter.name}1, ${parameter.name}2, …` : parameter.name;
    return optional ? `[${text}]` : text;
  });
  return `${name}(${shown.join(", ")})`;
}

const BY_NAME: ReadonlyMap<string, FunctionDescription> = new Map(FUNCTIONS.map((each) => [each.name, each]));
