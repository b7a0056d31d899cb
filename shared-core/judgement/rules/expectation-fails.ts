import type { Fix, RelatedPlace } from "../../diagnostics/diagnostic.ts";
import { formatNumber } from "../../units/show.ts";
import { unitOf } from "../../units/unit-of.ts";
import { nameSpan, statementOf } from "../places.ts";
import type { Cure, Finding, Judged, Rule, RuleContext } from "../rule.ts";
import { showAs, showParameter } from "../shown-unit.ts";
import { percent } from "../wording.ts";
import { leftText, limitText } from "./expectation-words.ts";

/** An expectation does not hold, or cannot be judged for a reason that nothing else has said. */
export const expectationFails: Rule = {
  code: "expectation-fails",
  cost: "answers",
  check: (context) =>
    context.judged.flatMap((judged) => {
      if (judged.verdict.holds === false) return [fails(context, judged)];
      return judged.verdict.holds === null && !judged.explained ? [notJudged(context, judged)] : [];
    }),
};

function fails(context: RuleContext, judged: Judged): Finding {
  const { verdict, expectation, cures } = judged;
  const { instance } = context;
  const value = showAs(
    { ...verdict.kind, value: verdict.value ?? 0 },
    instance,
    expectation.right,
    expectation.left,
  );
  const by = verdict.margin === null ? "" : `, ${percent(-verdict.margin)} beyond it`;
  return {
    span: expectation.comparison.span,
    message: `\`${verdict.name}\` fails: \`${leftText(context, judged)}\` is ${value}, ${limitText(context, judged)} wanted${by}`,
    hint: hintOf(context, judged),
    related: cures.flatMap((cure) => placeOf(context, cure)),
    fixes: cures.flatMap((cure) => fixesFor(context, cure)),
  };
}

function hintOf({ instance }: RuleContext, { cures, verdict }: Judged): string | undefined {
  if (cures.length > 0) {
    const ways = cures.map((cure) => `with ${cureText(instance, cure)}`).join(", or ");
    return `it would hold ${ways}, all else as it is`;
  }
  if (verdict.mattersMost === undefined) {
    return "no let moves it: name the number that may change as a let to be told the value it needs";
  }
  const { name, sensitivity } = verdict.mattersMost;
  return `\`${name}\` matters most, ${percent(sensitivity / 100)} for each 1 % of it, and does not cure it within a factor of ten`;
}

/** "`mount` at most 3.05 kN/mm (now 4.4 kN/mm)". */
function cureText(instance: RuleContext["instance"], cure: Cure): string {
  const { parameter, side } = cure;
  const { value } = roundedCure(instance, cure);
  const now = instance.parameters.get(parameter)?.value ?? 0;
  return `\`${parameter}\` ${side} ${showParameter(instance, parameter, value)} (now ${showParameter(instance, parameter, now)})`;
}

function placeOf({ model }: RuleContext, { parameter }: Cure): readonly RelatedPlace[] {
  const statement = statementOf(model, parameter);
  if (statement === undefined) return [];
  return [{ span: nameSpan(statement), message: `\`${parameter}\` can cure it alone` }];
}

function notJudged(context: RuleContext, judged: Judged): Finding {
  const { verdict, expectation } = judged;
  return {
    span: expectation.comparison.span,
    message: `\`${verdict.name}\` cannot be judged: ${verdict.reason ?? "its value could not be computed"}`,
    hint: `what is not computed does not hold: mend \`${leftText(context, judged)}\` or take the expectation out`,
  };
}

/** Three digits, rounded to the side that holds, in the unit of the parameter. */
function roundedCure(
  instance: RuleContext["instance"],
  cure: Cure,
): { readonly text: string; readonly value: number } {
  const unit = instance.parameters.get(cure.parameter)?.unitNode;
  const meaning = unit === undefined ? undefined : unitOf(unit);
  const scale = meaning !== undefined && "kind" in meaning ? meaning.factor : 1;
  const shown = cure.value / scale;
  const step = 10 ** (Math.floor(Math.log10(Math.abs(shown))) - 2);
  const steps = cure.side === "at most" ? Math.floor(shown / step) : Math.ceil(shown / step);
  const rounded = Number((steps * step).toPrecision(6));
  return { text: formatNumber(rounded, 6), value: rounded * scale };
}

/** Writes the value into the `let`, when that is a plain number and the case does not replace it. */
function fixesFor({ model, instance }: RuleContext, cure: Cure): readonly Fix[] {
  const statement = statementOf(model, cure.parameter);
  if (statement === undefined || instance.caseIndex !== 0) return [];
  const item = statement.value?.[0];
  if (item?.kind !== "value" || item.expression.kind !== "number") return [];
  const found = item.expression;
  const { text } = roundedCure(instance, cure);
  const unit = found.unit === undefined ? "" : ` ${found.unit.text}`;
  return [
    {
      title: `Set ${cure.parameter} to ${text}${unit}`,
      edits: [{ span: found.span, text: `${text}${unit}` }],
      safe: false,
    },
  ];
}
