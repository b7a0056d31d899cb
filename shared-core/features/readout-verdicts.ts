/** Verdicts in words, for hovers, hints and lenses alike. */
import type { CaseReport, Verdict } from "../judgement/report.ts";
import type { Model } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import { formatNumber } from "../units/show.ts";
import { inUnit } from "../writing/units/unit-view.ts";
import { verdictUnit } from "../writing/verdict-text.ts";
import type { Phrase } from "./readout.ts";
import type { Numbers } from "./readout-numbers.ts";

export interface CaseVerdict {
  readonly report: CaseReport;
  /** Of the case as written it is true. */
  readonly asWritten: boolean;
  readonly verdict: Verdict;
}

/** What became of an `expect` statement of the text as it stands, in every case in which it is judged. */
export function verdictsOf(numbers: Numbers, model: Model, statement: StatementNode): readonly CaseVerdict[] {
  const names = new Set(model.expectations.filter(({ node }) => node === statement).map(({ name }) => name));
  return numbers.report.cases.flatMap((report, index) =>
    report.verdicts
      .filter(({ name }) => names.has(name))
      .map((verdict) => ({ report, asWritten: index === 0, verdict })),
  );
}

/** `3.95 Hz`, or `–` where it could not be computed. */
export function valueText({ report: file, system }: Numbers, { report, verdict }: CaseVerdict): Phrase {
  if (verdict.value === null) return "–";
  return inUnit(verdict.value, verdictUnit(file, report.instance, verdict, system));
}

/** `≤ 5.6 Hz`. */
export function limitText({ report: file, system }: Numbers, { report, verdict }: CaseVerdict): Phrase {
  if (verdict.limit === null) return "–";
  return `${SIGNS[verdict.expectation.operator]} ${inUnit(verdict.limit, verdictUnit(file, report.instance, verdict, system))}`;
}

const SIGNS = { "<=": "≤", ">=": "≥", "<": "<", ">": ">" } as const;

/** `29 % left`, `12 % beyond`; empty where it has no meaning, as for a limit of zero. */
export function marginText({ margin }: Verdict): Phrase {
  if (margin === null || !Number.isFinite(margin)) return "";
  return `${formatNumber(Math.abs(margin) * 100, 2)} % ${margin < 0 ? "beyond" : "left"}`;
}

export const verdictWord = ({ holds }: Verdict): "holds" | "fails" | "open" =>
  holds === null ? "open" : holds ? "holds" : "fails";

/** Whether its tolerance, where one is asked for, holds too. */
export const holdsThroughout = ({ holds, tolerance }: Verdict): boolean =>
  holds === true && tolerance?.holds !== false;

/** The one that is nearest to failing: what fails, then what is open, then the least margin. */
export function worstOf(verdicts: readonly CaseVerdict[]): CaseVerdict | undefined {
  const rank = ({ verdict }: CaseVerdict): number => {
    if (verdict.holds === false) return Number.NEGATIVE_INFINITY;
    if (verdict.holds === null) return -1;
    return verdict.margin ?? Number.POSITIVE_INFINITY;
  };
  let worst: CaseVerdict | undefined;
  for (const each of verdicts) {
    if (worst === undefined || rank(each) < rank(worst) || isWorseFailure(each, worst)) worst = each;
  }
  return worst;
}

function isWorseFailure(a: CaseVerdict, b: CaseVerdict): boolean {
  if (a.verdict.holds !== false || b.verdict.holds !== false) return false;
  return (a.verdict.margin ?? 0) < (b.verdict.margin ?? 0);
}

/** `holds, 29 % left`, `fails in \`winter\`, 12 % beyond`: the worst of all cases in one phrase. */
export function verdictPhrase(worst: CaseVerdict): Phrase {
  const { verdict, asWritten, report } = worst;
  const where = asWritten ? "" : ` in ${report.name}`;
  const word =
    verdict.holds === true && !holdsThroughout(verdict)
      ? "holds, not under its tolerances"
      : verdictWord(verdict);
  const margin = marginText(verdict);
  return `${word}${where}${margin === "" ? "" : `, ${margin}`}`;
}
