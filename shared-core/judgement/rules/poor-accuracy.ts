import type { SweepAsk } from "../../model/model.ts";
import { span } from "../../text/span.ts";
import { frequencyByEnergy, imbalanceAt } from "../own-checks.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";
import { elasticModes, stiffestShare } from "../shapes.ts";
import { rate } from "../wording.ts";

/** Relative difference from its own check above which fewer than six digits of an answer stand. */
const LARGEST_DIFFERENCE = 1e-6;

/** An answer whose own check is poor: a mode whose energies, or a sweep whose forces, do not balance. */
export const poorAccuracy: Rule = {
  code: "poor-accuracy",
  cost: "answers",
  check: (context) => [...poorModes(context), ...poorSweeps(context)],
};

const CURE = "stiffnesses or masses lie too many orders apart; replace the stiffest spring by a bind";

function poorModes({ model, assembly, modes }: RuleContext): readonly Finding[] {
  if (!modes.ok) return [];
  return elasticModes(modes.value).flatMap((mode) => {
    const check = frequencyByEnergy(assembly, mode);
    if (check === undefined || mode.frequencyHz === 0) return [];
    const apart = Math.abs(check / mode.frequencyHz - 1);
    if (!(apart > LARGEST_DIFFERENCE)) return [];
    const holder = stiffestShare(mode);
    const statement = holder === undefined ? undefined : statementOf(model, holder);
    return [
      {
        span: statement === undefined ? span(0, 0) : nameSpan(statement),
        message: `mode ${mode.number} is found at ${rate(mode.frequencyHz)}, its energies give ${rate(check)}: ${digitsOf(apart)}`,
        hint: CURE,
      },
    ];
  });
}

function poorSweeps(context: RuleContext): readonly Finding[] {
  return context.instance.asks.flatMap((ask) => {
    if (ask.kind !== "sweep" || !context.answers.get(ask.name)?.ok) return [];
    const worst = worstBalance(context, ask);
    if (worst === undefined || !(worst.apart > LARGEST_DIFFERENCE)) return [];
    return [
      {
        span: nameSpan(ask.node),
        message: `at ${rate(worst.atHz)} the forces in \`${ask.name}\` do not balance: ${digitsOf(worst.apart)}`,
        hint: CURE,
      },
    ];
  });
}

/** At both ends and in the middle: digits are lost towards low frequencies first. */
function worstBalance(
  { assembly, analysis }: RuleContext,
  ask: SweepAsk,
): { readonly atHz: number; readonly apart: number } | undefined {
  const response = analysis.frequencyResponse(ask.by);
  if (!response.ok) return undefined;
  let worst: { atHz: number; apart: number } | undefined;
  for (const atHz of [ask.fromHz, Math.sqrt(ask.fromHz * ask.toHz), ask.toHz]) {
    const apart = imbalanceAt(assembly, response.value, ask.by, atHz);
    if (apart !== undefined && apart > (worst?.apart ?? 0)) worst = { atHz, apart };
  }
  return worst;
}

function digitsOf(apart: number): string {
  const digits = Math.max(0, Math.floor(-Math.log10(apart)));
  if (digits === 0) return "no digit stands";
  return digits === 1 ? "one digit stands" : `${digits} digits stand`;
}
