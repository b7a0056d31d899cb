/** The largest size of a quantity in an answer that has been computed, found between its samples too. */
import type { Peak } from "../answers/answer.ts";
import type { CaseReport } from "../judgement/report.ts";
import type { QuantityRef } from "../mechanics/assembly.ts";
import type { HistoryAsk, SweepAsk } from "../model/model.ts";

/** Asks of a case that have an answer, in file order. */
export function answeredAsks({ instance, answers }: CaseReport): readonly (SweepAsk | HistoryAsk)[] {
  return instance.asks.filter(
    (ask): ask is SweepAsk | HistoryAsk =>
      (ask.kind === "sweep" || ask.kind === "history") && answers.get(ask.name)?.ok === true,
  );
}

/**
 * Size in the unit of the quantity and where it stands (Hz or s); undefined where the answer has none, as where a
 * mode of the band is not damped.
 */
export function peakIn(
  report: CaseReport,
  ask: SweepAsk | HistoryAsk,
  quantity: QuantityRef,
): Peak | undefined {
  return ask.kind === "sweep" ? inSweep(report, ask, quantity) : inHistory(report, ask, quantity);
}

function inSweep({ analysis }: CaseReport, ask: SweepAsk, quantity: QuantityRef): Peak | undefined {
  const response = analysis.frequencyResponse(ask.by);
  if (!response.ok) return undefined;
  const peak = response.value.peak(quantity, ask.fromHz, ask.toHz);
  return peak.ok ? peak.value : undefined;
}

function inHistory({ analysis }: CaseReport, ask: HistoryAsk, quantity: QuantityRef): Peak | undefined {
  const response = analysis.timeResponse(ask);
  if (!response.ok) return undefined;
  const [high, low] = [response.value.highest(quantity), response.value.lowest(quantity)];
  if (!high.ok || !low.ok) return undefined;
  const [up, down] = [Math.abs(high.value.value), Math.abs(low.value.value)];
  return up >= down ? { value: up, at: high.value.at } : { value: down, at: low.value.at };
}
