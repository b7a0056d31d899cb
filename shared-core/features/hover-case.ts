import type { Model } from "../model/model.ts";
import type { UnitSystem } from "../units/show.ts";
import { type Block, lines, numeric, wordy } from "./readout.ts";
import { changedModes, changedNumbers, changedVerdicts } from "./readout-changes.ts";
import { isNothing, type Numbers, showHz, showMove } from "./readout-numbers.ts";

/** The first modes that a case moves, at most so many. */
const MOST = 5;

/** A case: the numbers it replaces, and where that leads. */
export function caseReadout(
  model: Model,
  numbers: Numbers | undefined,
  name: string,
  system: UnitSystem,
): readonly Block[] {
  const changed = changedNumbers(model, name, system);
  return [
    {
      kind: "table",
      columns: [wordy("number"), numeric("as written"), numeric("here")],
      rows: changed.map((each) => [`\`${each.name}\``, each.from, each.to]),
    },
    ...(numbers === undefined ? [] : consequences(numbers, name)),
  ];
}

function consequences(numbers: Numbers, name: string): readonly Block[] {
  const moved = changedModes(numbers, name).filter(({ fromHz, toHz }) => !isNothing(toHz - fromHz, fromHz));
  const { fail, hold } = changedVerdicts(numbers, name);
  const names = (list: readonly string[]): string => list.map((each) => `\`${each}\``).join(", ");
  return [
    {
      kind: "table",
      columns: [numeric("mode"), numeric("as written"), numeric("here"), numeric("change")],
      rows: moved
        .slice(0, MOST)
        .map(({ number, fromHz, toHz }) => [
          String(number),
          showHz(numbers, fromHz),
          showHz(numbers, toHz),
          showMove(numbers, "Hz", fromHz, toHz - fromHz),
        ]),
    },
    lines(
      fail.length === 0 ? undefined : `fails here and not as written: ${names(fail)}`,
      hold.length === 0 ? undefined : `holds here and not as written: ${names(hold)}`,
    ),
  ];
}
