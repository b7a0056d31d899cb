import type { Mode } from "../../answers/answer.ts";
import type { Assembly } from "../../mechanics/assembly.ts";
import { span } from "../../text/span.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Rule } from "../rule.ts";
import { elasticModes, freeShape, onShape, squareOnShape, stiffestShare } from "../shapes.ts";
import { number, rate } from "../wording.ts";

/** Relative difference of a frequency from its own energy check above which fewer than six digits stand. */
const LARGEST_DIFFERENCE = 1e-6;

/** A mode whose energies, added up element by element, do not give its frequency back. */
export const poorAccuracy: Rule = {
  code: "poor-accuracy",
  cost: "modes",
  check({ model, assembly, modes }) {
    if (!modes.ok) return [];
    return elasticModes(modes.value).flatMap((mode) => {
      const check = frequencyByEnergy(assembly, mode);
      if (check === undefined || mode.frequencyHz === 0) return [];
      const apart = Math.abs(check / mode.frequencyHz - 1);
      if (!(apart > LARGEST_DIFFERENCE)) return [];
      const holder = stiffestShare(mode);
      const statement = holder === undefined ? undefined : statementOf(model, holder);
      const digits = Math.max(0, Math.floor(-Math.log10(apart)));
      return [
        {
          span: statement === undefined ? span(0, 0) : nameSpan(statement),
          message: `mode ${mode.number} is found at ${rate(mode.frequencyHz)}, its energies give ${rate(check)}: ${digits === 1 ? "one digit stands" : `${number(digits)} digits stand`}`,
          hint: "stiffnesses or masses in the model lie too many orders apart; replace the stiffest spring by a bind",
        },
      ];
    });
  },
};

/**
 * Frequency from Rayleigh's quotient, the strain energy summed over elements and the kinetic energy over
 * inertias. The sums of positive terms lose no digits, and the quotient's error is the square of the shape's.
 */
function frequencyByEnergy(assembly: Assembly, mode: Mode): number | undefined {
  const shape = freeShape(assembly, mode.shape);
  if (shape.im.some((value) => value !== 0)) return undefined;
  let strain = 0;
  for (const element of assembly.elements) strain += element.stiffness * squareOnShape(element.form, shape);
  for (const { matrix, row, column, value } of assembly.extras ?? []) {
    if (matrix === "mass") return undefined;
    if (matrix === "stiffness") strain += value * onShape(row, shape)[0] * onShape(column, shape)[0];
  }
  let inertia = 0;
  for (const { form, value } of assembly.inertias) inertia += value * squareOnShape(form, shape);
  return strain > 0 && inertia > 0 ? Math.sqrt(strain / inertia) / (2 * Math.PI) : undefined;
}
