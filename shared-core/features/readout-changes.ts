/** What a case changes: numbers, and with them natural frequencies and verdicts. */
import { instantiate } from "../model/instantiate.ts";
import type { Model } from "../model/model.ts";
import type { UnitSystem } from "../units/show.ts";
import { elasticModes } from "./readout-modes.ts";
import { type Numbers, showParameter } from "./readout-numbers.ts";

export interface ChangedNumber {
  readonly name: string;
  readonly from: string;
  readonly to: string;
}

/** The lets that a case itself replaces, in the order of the case. */
export function changedNumbers(model: Model, name: string, system: UnitSystem): readonly ChangedNumber[] {
  const index = model.cases.findIndex((each) => each.name === name);
  const node = model.cases[index]?.node;
  if (index < 1 || node === undefined) return [];
  const [before, after] = [instantiate(model, 0).parameters, instantiate(model, index).parameters];
  return node.details.flatMap(({ key }) => {
    const [from, to] = [before.get(key.text), after.get(key.text)];
    if (from === undefined || to === undefined) return [];
    const [shownFrom, shownTo] = [from, to].map((each) => showParameter(each, each.value, system));
    return [{ name: key.text, from: shownFrom, to: shownTo }];
  });
}

export interface ChangedMode {
  readonly number: number;
  readonly fromHz: number;
  readonly toHz: number;
}

/** Elastic modes of the same number as written and in a case; both sides must have them. */
export function changedModes({ report, asWritten }: Numbers, name: string): readonly ChangedMode[] {
  const there = report.cases.find((each) => each.name === name);
  if (there === undefined || !there.modes.ok || !asWritten.modes.ok) return [];
  const after = new Map(elasticModes(there.modes.table).map((mode) => [mode.number, mode.frequencyHz]));
  return elasticModes(asWritten.modes.table).flatMap(({ number, frequencyHz }) => {
    const toHz = after.get(number);
    return toHz === undefined ? [] : [{ number, fromHz: frequencyHz, toHz }];
  });
}

/** Expectations that hold as written and fail in the case, and the reverse. */
export function changedVerdicts(
  { report, asWritten }: Numbers,
  name: string,
): { readonly fail: readonly string[]; readonly hold: readonly string[] } {
  const there = report.cases.find((each) => each.name === name)?.verdicts ?? [];
  const before = new Map(asWritten.verdicts.map((verdict) => [verdict.name, verdict.holds]));
  const went = (from: boolean, to: boolean) =>
    there
      .filter((verdict) => verdict.holds === to && before.get(verdict.name) === from)
      .map((each) => each.name);
  return { fail: went(true, false), hold: went(false, true) };
}
