import type { Ask, SweepAsk } from "../../model/model.ts";
import { undampedInBand, undampedWords } from "../functions/remarks.ts";
import { nameSpan, relatedTo } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";

/** A peak or rms over a band that holds an undamped mode. */
export const notDamped: Rule = {
  code: "not-damped",
  cost: "answers",
  check(context) {
    return context.instance.asks.flatMap((ask) => {
      if (ask.kind !== "sweep") return [];
      const unbounded = hasUnboundedPeak(context, ask) || isRemarked(context, ask);
      return unbounded ? [finding(context, ask)].flat() : [];
    });
  },
};

function hasUnboundedPeak({ answers }: RuleContext, ask: SweepAsk): boolean {
  const answer = answers.get(ask.name);
  if (!answer?.ok || answer.value.kind !== "sweep") return false;
  return [...answer.value.peaks.values()].some((peak) => "reason" in peak);
}

const isRemarked = ({ judged }: RuleContext, ask: Ask): boolean =>
  judged.some(({ remarks }) => remarks.some((remark) => remark.code === "not-damped" && remark.ask === ask));

function finding({ analysis, instance, modes, model }: RuleContext, ask: SweepAsk): Finding | [] {
  const undamped = undampedInBand({ modes: () => modes, analysis, instance }, ask);
  if (undamped.length === 0) return [];
  const drive = instance.assembly.drives[ask.by[0]];
  return {
    span: nameSpan(ask.node),
    ...undampedWords(ask, undamped),
    related: relatedTo(model, drive?.name, "the drive that excites it"),
  };
}
