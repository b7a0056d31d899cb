/** Limits that expectations set to the curves of an answer. */
import type { HistoryAnswer, SweepAnswer } from "../answers/answer.ts";
import { endsOf, limitAt } from "../judgement/limit-curve.ts";
import type { CaseReport, Verdict } from "../judgement/report.ts";
import type { LimitCurve } from "../model/model.ts";
import type { CallNode, Expression } from "../syntax/tree.ts";
import type { Curve, CurvePanel } from "../writing/figure/figure.ts";
import type { UnitView } from "../writing/units/unit-view.ts";

/** Points of a curve drawn between two frequencies. */
const POINTS = 200;
/** Functions whose limit is a level that a curve of the answer must not pass. */
const LEVELS: ReadonlySet<string> = new Set(["peak", "highest", "lowest"]);

/** Limits of one ask that belong to quantities drawn in this panel. */
export function limitCurves(
  report: CaseReport,
  ask: string,
  answer: SweepAnswer | HistoryAnswer,
  panel: CurvePanel,
  units: UnitView,
): Curve[] {
  const x = answer.kind === "sweep" ? answer.frequencyHz : answer.timeS;
  const found = report.verdicts.flatMap((verdict) => limitOf(report, verdict, ask, answer, x, units));
  const own = found.filter(({ quantity }) => panel.curves.some(({ name }) => name === quantity));
  // One limit may be set to several quantities of a panel.
  const names = new Set<string>();
  return own.flatMap(({ curve }) => {
    if (names.has(curve.name)) return [];
    names.add(curve.name);
    return [curve];
  });
}

interface Found {
  readonly quantity: string;
  readonly curve: Curve;
}

function limitOf(
  report: CaseReport,
  { expectation, limit, name }: Verdict,
  ask: string,
  answer: SweepAnswer | HistoryAnswer,
  x: Float64Array,
  units: UnitView,
): Found[] {
  const call = callIn(expectation.left);
  if (call === undefined || x.length === 0) return [];
  const [of, what, third] = call.positional.map(pathText);
  const series = answer.series.get(what ?? "");
  if (of !== ask || what === undefined || series === undefined) return [];
  const { factor } = units.unitFor(series.unit, 1);
  if (call.callee.text === "below") {
    const curve = report.instance.limits.get(third ?? "");
    if (curve === undefined || answer.kind !== "sweep") return [];
    return [
      { quantity: what, curve: { ...points(curve, x, factor), name: curve.name, style: 0, role: "limit" } },
    ];
  }
  if (!LEVELS.has(call.callee.text) || limit === null || expectation.left !== call) return [];
  const level = limit / factor;
  const ends = Float64Array.of(x[0], x[x.length - 1]);
  return [
    { quantity: what, curve: { name, x: ends, y: Float64Array.of(level, level), style: 0, role: "limit" } },
  ];
}

/** The first call of an answer in an expression that is nothing else, parentheses left out. */
function callIn(expression: Expression): CallNode | undefined {
  if (expression.kind === "call") return expression;
  return expression.kind === "parenthesis" ? callIn(expression.inner) : undefined;
}

const pathText = (expression: Expression): string | undefined =>
  expression.kind === "path" ? expression.names.map(({ text }) => text).join(".") : undefined;

function points(curve: LimitCurve, x: Float64Array, factor: number): { x: Float64Array; y: Float64Array } {
  const [low, high] = endsOf(curve);
  const [from, to] = [Math.max(low, x[0]), Math.min(high, x[x.length - 1])];
  if (!(from < to)) return { x: new Float64Array(), y: new Float64Array() };
  const corners = typeof curve.points === "number" ? [] : curve.points.map(({ atHz }) => atHz);
  const even = Array.from({ length: POINTS }, (_, i) => from * (to / from) ** (i / (POINTS - 1)));
  const all = [...even, ...corners.filter((hz) => from < hz && hz < to)].sort((a, b) => a - b);
  // A curve of rms values is drawn where the amplitude would touch it.
  const size = curve.of === "rms" ? Math.SQRT2 : 1;
  const ys = all.map((hz) => ((limitAt(curve, hz) ?? Number.NaN) * size) / factor);
  return { x: Float64Array.from(all), y: Float64Array.from(ys) };
}
