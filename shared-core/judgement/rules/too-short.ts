import type { DriveInfo } from "../../mechanics/assembly.ts";
import type { HistoryAsk } from "../../model/model.ts";
import { excitedModes } from "../drives.ts";
import { detailOf, nameSpan, relatedTo } from "../places.ts";
import type { Finding, Rule, RuleContext } from "../rule.ts";
import { rate, time } from "../wording.ts";

/** A history that ends before it means anything: before its drives have acted, or within the first cycle. */
export const tooShort: Rule = {
  code: "too-short",
  cost: "modes",
  check(context) {
    return context.instance.asks
      .filter((ask): ask is HistoryAsk => ask.kind === "history")
      .flatMap((ask) => beforeDrivesEnd(context, ask) ?? withinFirstCycle(context, ask) ?? []);
  },
};

function beforeDrivesEnd(context: RuleContext, ask: HistoryAsk): Finding | undefined {
  for (const index of ask.by) {
    const drive = context.assembly.drives[index];
    const end = drive === undefined ? undefined : endOf(drive);
    if (drive === undefined || end === undefined || ask.lasting >= end * (1 - 1e-9)) continue;
    return {
      span: lastingSpan(ask),
      message: `\`${ask.name}\` lasts ${time(ask.lasting)}, and \`${drive.name}\` acts until ${time(end)}`,
      hint: "let it last until the drive has acted and the slowest mode has swung",
      related: relatedTo(context.model, drive.name, `\`${drive.name}\` acts until ${time(end)}`),
    };
  }
  return undefined;
}

/** When a drive that ends by itself has done its work; undefined for one that goes on. */
function endOf({ shape }: DriveInfo): number | undefined {
  switch (shape.kind) {
    case "pulse":
      return shape.start + shape.duration;
    case "step":
      return shape.start + shape.rise;
    case "impulse":
      return shape.start;
    case "chirp":
      return shape.lasting;
    default:
      return undefined;
  }
}

function withinFirstCycle(context: RuleContext, ask: HistoryAsk): Finding | undefined {
  if (!context.modes.ok) return undefined;
  const drives = ask.by.map((index) => context.assembly.drives[index]).filter((drive) => drive !== undefined);
  const lowest = excitedModes(context.analysis, context.assembly, context.modes.value, drives)[0];
  const frequencyHz = lowest?.frequencyHz;
  if (!frequencyHz || !(ask.lasting * frequencyHz < 1)) return undefined;
  return {
    span: lastingSpan(ask),
    message: `\`${ask.name}\` lasts ${time(ask.lasting)}, less than one cycle of mode ${lowest.number} at ${rate(frequencyHz)} (${time(1 / frequencyHz)})`,
    hint: "its peaks need not have come yet; several cycles are usual",
  };
}

const lastingSpan = (ask: HistoryAsk): Finding["span"] =>
  detailOf(ask.node, "lasting")?.items[0]?.span ?? nameSpan(ask.node);
