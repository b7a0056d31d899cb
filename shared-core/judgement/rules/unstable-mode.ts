import type { Mode } from "../../answers/answer.ts";
import type { Assembly, ExtraTerm } from "../../mechanics/assembly.ts";
import { span } from "../../text/span.ts";
import { growingModes } from "../growth.ts";
import { nameSpan, placeOf, statementOf } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";
import { type FreeShape, freeCoordinates, freeShape, onShape, squareOnShape } from "../shapes.ts";
import { number, rate, time } from "../wording.ts";
import { staticInstabilityOf } from "./static-instability.ts";

/** A mode that grows: which, how fast, and the element that feeds it. */
export const unstableMode: Rule = {
  code: "unstable-mode",
  cost: "modes",
  check(context) {
    const buckles = staticInstabilityOf(context.assembly) !== undefined;
    return growingModes(context.modes)
      .filter((mode) => !(buckles && mode.eigenvalue[1] === 0))
      .map((mode) => finding(context, mode));
  },
};

function finding(context: RuleContext, mode: Mode): Finding {
  const growth = Math.max(mode.eigenvalue[0], ...(mode.realRoots ?? []));
  const feeder = feederOf(context.assembly, mode);
  const statement = feeder === undefined ? undefined : statementOf(context.model, feeder);
  const what =
    mode.number === null || mode.frequencyHz === null
      ? `the system grows ${mode.eigenvalue[1] === 0 ? "without swinging" : `at ${rate(Math.abs(mode.eigenvalue[1]) / (2 * Math.PI))}`}`
      : `mode ${mode.number} at ${rate(mode.frequencyHz)} grows`;
  return {
    span:
      statement === undefined || feeder === undefined
        ? span(0, 0)
        : placeOf(context.model, feeder, "damping", "stiffness"),
    message: `${what} by ${number(growth)} 1/s and doubles every ${time(Math.LN2 / growth)}${feeder === undefined ? "" : `, fed by \`${feeder}\``}`,
    hint: "damp what moves in it, or reduce what feeds it",
    related: mover(context, mode),
  };
}

/** The element that puts most power into the mode at its own root. */
function feederOf(assembly: Assembly, mode: Mode): string | undefined {
  const root = freeShape(assembly, mode.complexShape ?? mode.shape);
  const [re, im] = mode.eigenvalue;
  const power = new Map<string, number>();
  const add = (owner: string, value: number): void => {
    power.set(owner, (power.get(owner) ?? 0) + value);
  };
  for (const { name, form, damping } of assembly.elements) {
    add(name, -damping * (re * re + im * im) * squareOnShape(form, root));
  }
  for (const term of assembly.extras ?? []) add(term.owner, powerOfTerm(term, mode.eigenvalue, root));
  const most = [...power].sort((a, b) => b[1] - a[1])[0];
  return most !== undefined && most[1] > 0 ? most[0] : undefined;
}

/** Mean power that a term puts into motion q = Re(shape e^{root t}): -Re(conj(root row) value root^k column). */
function powerOfTerm(term: ExtraTerm, [re, im]: Mode["eigenvalue"], shape: FreeShape): number {
  const [rowRe, rowIm] = onShape(term.row, shape);
  const [columnRe, columnIm] = onShape(term.column, shape);
  const rate = times([re, im], [rowRe, rowIm]);
  let pull: readonly [number, number] = [columnRe, columnIm];
  const derivatives = term.matrix === "mass" ? 2 : term.matrix === "damping" ? 1 : 0;
  for (let i = 0; i < derivatives; i++) pull = times([re, im], pull);
  return -term.value * (rate[0] * pull[0] + rate[1] * pull[1]);
}

const times = (a: readonly [number, number], b: readonly [number, number]): readonly [number, number] => [
  a[0] * b[0] - a[1] * b[1],
  a[0] * b[1] + a[1] * b[0],
];

/** The statement of the coordinate that moves most. */
function mover({ model, assembly }: RuleContext, mode: Mode): Finding["related"] {
  let most = -1;
  let index = -1;
  for (const i of freeCoordinates(assembly)) {
    const size = i < 0 ? -1 : Math.hypot(mode.shape.re[i], mode.shape.im[i]);
    if (size > most) {
      most = size;
      index = i;
    }
  }
  const coordinate = assembly.coordinates[index];
  const statement = coordinate === undefined ? undefined : statementOf(model, coordinate.owner);
  return statement === undefined
    ? undefined
    : [{ span: nameSpan(statement), message: `\`${coordinate.name}\` moves most in it` }];
}
