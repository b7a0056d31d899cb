/** An expectation: value, limit, margin and the parameter that matters most, in every case. */
import type { Model } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { formatNumber } from "../units/show.ts";
import { inUnit } from "../writing/units/unit-view.ts";
import { verdictUnit } from "../writing/verdict-text.ts";
import { type Block, lines, numeric, type Phrase, type TableColumn, wordy } from "./readout.ts";
import { type Numbers, signed } from "./readout-numbers.ts";
import {
  type CaseVerdict,
  limitText,
  marginText,
  valueText,
  verdictsOf,
  verdictWord,
} from "./readout-verdicts.ts";

export function expectReadout(numbers: Numbers, model: Model, statement: StatementNode): readonly Block[] {
  const verdicts = verdictsOf(numbers, model, statement);
  if (verdicts.length === 0) return [lines("not judged yet")];
  const severalNames = new Set(verdicts.map(({ verdict }) => verdict.name)).size > 1;
  const severalCases = numbers.report.cases.length > 1;
  const columns: TableColumn[] = [
    ...(severalNames ? [wordy("expectation")] : []),
    ...(severalCases ? [wordy("case")] : []),
    wordy(""),
    numeric("value"),
    numeric("limit"),
    numeric("margin"),
    wordy("matters most"),
  ];
  const rows = verdicts.map((each) => [
    ...(severalNames ? [`\`${each.verdict.name}\``] : []),
    ...(severalCases ? [each.asWritten ? "as written" : `\`${each.report.name}\``] : []),
    verdictWord(each.verdict),
    valueText(numbers, each),
    limitText(numbers, each),
    marginText(each.verdict),
    mattersMost(each),
  ]);
  return [
    { kind: "table", columns, rows },
    lines(...verdicts.flatMap((each) => toleranceLines(numbers, each))),
  ];
}

/** `mount, +10 % makes it +4.9 %`, to first order. */
function mattersMost({ verdict: { mattersMost: most } }: CaseVerdict): Phrase {
  if (most === undefined) return "";
  const share = most.sensitivity * 10;
  return `\`${most.name}\`: +10 % makes it ${signed(share, `${formatNumber(Math.abs(share), 2)} %`)}`;
}

/** What was found over its tolerances, and why something could not be computed. */
function toleranceLines(numbers: Numbers, each: CaseVerdict): readonly Phrase[] {
  const { verdict, report, asWritten } = each;
  const { tolerance, reason, holds } = verdict;
  const label = `\`${verdict.name}\`${asWritten ? "" : ` in \`${report.name}\``}`;
  const said: Phrase[] = [];
  if (holds === null) said.push(`${label} could not be judged: ${reason ?? "it could not be computed"}`);
  if (tolerance?.holds === null)
    said.push(`${label}, tolerance: ${tolerance.reason ?? "it could not be judged"}`);
  if (tolerance?.kind === "worst_case" && tolerance.worst !== null) {
    const worst = inUnit(
      tolerance.worst,
      verdictUnit(numbers.report, report.instance, verdict, numbers.system),
    );
    const how = tolerance.how === "proven" ? "proven over all corners" : "searched";
    said.push(
      `${label}, worst within its tolerances: ${worst}, ${tolerance.holds ? "holds" : "fails"} (${how})`,
    );
  }
  if (tolerance?.share !== undefined) {
    said.push(
      `${label} holds in ${formatNumber(tolerance.share * 100, 3)} % of ${tolerance.samples ?? "all"} draws`,
    );
  }
  return said;
}
