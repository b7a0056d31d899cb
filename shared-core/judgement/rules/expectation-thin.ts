import type { Finding, Judged, Rule, RuleContext } from "../rule.ts";
import { showAs, showOwner } from "../shown-unit.ts";
import { list, percent } from "../wording.ts";
import { leftText, limitText } from "./expectation-words.ts";

/** An expectation holds, but with less than its margin, or not under its tolerances. */
export const expectationThin: Rule = {
  code: "expectation-thin",
  cost: "answers",
  check: (context) =>
    context.judged.flatMap((judged) => {
      if (judged.verdict.holds !== true) return [];
      return [underTolerances(context, judged) ?? insideMargin(context, judged) ?? []].flat();
    }),
};

function insideMargin(context: RuleContext, judged: Judged): Finding | undefined {
  const { verdict, expectation } = judged;
  if (expectation.margin === undefined || verdict.margin === null || verdict.margin >= expectation.margin) {
    return undefined;
  }
  return {
    span: expectation.comparison.span,
    message: `\`${verdict.name}\` holds with ${percent(verdict.margin)} left, less than its margin of ${percent(expectation.margin)}: \`${leftText(context, judged)}\` is ${shown(context, judged, verdict.value)}, ${limitText(context, judged)} wanted`,
    hint: followed(judged),
  };
}

function underTolerances(context: RuleContext, judged: Judged): Finding | undefined {
  const { verdict, expectation } = judged;
  const { tolerance } = verdict;
  if (tolerance === undefined || tolerance.holds === true) return undefined;
  const span = expectation.comparison.span;
  if (tolerance.holds === null) {
    return {
      span,
      message: `\`${verdict.name}\` holds as written, and cannot be judged under its tolerances: ${tolerance.reason ?? "a value could not be computed"}`,
      hint: "narrow the bands that lead there",
    };
  }
  const worst = shown(context, judged, tolerance.worst);
  const limit = `${limitText(context, judged)} wanted`;
  if (tolerance.kind === "share") {
    const wanted = typeof expectation.tolerance === "object" ? expectation.tolerance.share : 1;
    return {
      span,
      message: `\`${verdict.name}\` holds as written, but in ${percent(tolerance.share ?? 0)} of ${tolerance.samples} draws only, ${percent(wanted)} wanted: \`${leftText(context, judged)}\` reaches ${worst} there, ${limit}`,
      hint: followed(judged),
    };
  }
  return {
    span,
    message: `\`${verdict.name}\` holds as written, but not under its tolerances: \`${leftText(context, judged)}\` reaches ${worst}, ${limit}`,
    hint: whereWorst(context, judged),
  };
}

function shown({ instance }: RuleContext, { verdict, expectation }: Judged, value: number | null): string {
  return showAs({ ...verdict.kind, value: value ?? 0 }, instance, expectation.right, expectation.left);
}

/** More would not be read. */
const NAMED = 4;

function whereWorst({ instance }: RuleContext, judged: Judged): string | undefined {
  const { at, how } = judged.verdict.tolerance ?? {};
  if (at === undefined) return followed(judged);
  const all = Object.entries(at).map(
    ([owner, value]) => `\`${owner}\` at ${showOwner(instance, owner, value)}`,
  );
  const names = all.length > NAMED ? [...all.slice(0, NAMED), `${all.length - NAMED} more`] : all;
  return `worst with ${list(names)} (${how === "proven" ? "all corners" : "searched, not proven"})`;
}

function followed({ verdict }: Judged): string | undefined {
  if (verdict.mattersMost === undefined) return undefined;
  const { name, sensitivity } = verdict.mattersMost;
  return `\`${name}\` matters most: ${percent(sensitivity / 100)} for each 1 % of it`;
}
