/** Lines above asks, expectations and cases. They are placed at once; what they say is asked for later. */
import type { Entity } from "../model/model.ts";
import type { StatementNode } from "../syntax/tree.ts";
import type { Span } from "../text/span.ts";
import { changedModes, changedNumbers, changedVerdicts } from "./readout-changes.ts";
import { isNothing, type Numbers, numbersOf, showHz } from "./readout-numbers.ts";
import { verdictPhrase, verdictsOf, worstOf } from "./readout-verdicts.ts";
import type { View } from "./view.ts";

/** What a lens is about; what a click does follows from it. */
export type LensKind =
  /** Shows the answer of an ask. */
  | "show"
  /** Writes the answer of an ask to a CSV file. */
  | "csv"
  /** Says whether an expectation holds. */
  | "verdict"
  /** Says what a case changes. */
  | "case";

/** Placed from the text alone, so that lines do not jump when numbers arrive. */
export interface CodeLens {
  readonly kind: LensKind;
  /** The head of its statement. */
  readonly span: Span;
  /** Of the ask, expectation or case. */
  readonly name: string;
}

export interface ResolvedLens extends CodeLens {
  readonly title: string;
  readonly stale: boolean;
}

/** Every lens of a file, in order of place. */
export function codeLenses({ model }: View): readonly CodeLens[] {
  const names = new Map<StatementNode, Entity>();
  for (const entity of model.entities.values()) if (entity.file === undefined) names.set(entity.node, entity);
  return model.tree.statements.flatMap((statement) => {
    const name = names.get(statement)?.name;
    if (name === undefined) return [];
    return (KINDS.get(statement.keyword.text) ?? []).map((kind) => ({
      kind,
      span: statement.headSpan,
      name,
    }));
  });
}

const KINDS: ReadonlyMap<string, readonly LensKind[]> = new Map<string, readonly LensKind[]>([
  ["ask", ["show", "csv"]],
  ["expect", ["verdict"]],
  ["case", ["case"]],
]);

/** What a lens says now. Always a title: a line that has been placed stays. */
export function resolveLens(view: View, lens: CodeLens): ResolvedLens {
  if (lens.kind === "show") return { ...lens, title: "show", stale: false };
  if (lens.kind === "csv") return { ...lens, title: "write CSV", stale: false };
  const numbers = numbersOf(view);
  const title =
    lens.kind === "verdict" ? verdictTitle(view, numbers, lens.name) : caseTitle(view, numbers, lens.name);
  const stale = numbers !== undefined && view.stale;
  return { ...lens, title: stale ? `${title} …` : title, stale };
}

const AWAITED = "numbers are awaited";
const NO_NUMBERS = "no numbers: the model has errors";

const whyNone = ({ model }: View): string => (model.buildable ? AWAITED : NO_NUMBERS);

function verdictTitle(view: View, numbers: Numbers | undefined, name: string): string {
  const statement = view.model.entities.get(name)?.node;
  const worst = numbers && statement && worstOf(verdictsOf(numbers, view.model, statement));
  return worst === undefined ? whyNone(view) : verdictPhrase(worst);
}

/** Numbers and modes that a title names, at most so many of each. */
const NAMED = 3;

/** `contents 1450 kg → 0 kg · mode 1 6.1 → 13.2 Hz · fails: above_wave_slap`. */
function caseTitle(view: View, numbers: Numbers | undefined, name: string): string {
  const changed = changedNumbers(view.model, name, view.units).map(
    ({ name: number, from, to }) => `${number} ${from} → ${to}`,
  );
  const parts = [...firstOf(changed), ...(numbers === undefined ? [] : consequences(numbers, name))];
  return parts.length === 0 ? "changes nothing" : parts.join(" · ");
}

function consequences(numbers: Numbers, name: string): readonly string[] {
  const modes = changedModes(numbers, name)
    .filter(({ fromHz, toHz }) => !isNothing(toHz - fromHz, fromHz))
    .map(
      ({ number, fromHz, toHz }) => `mode ${number} ${showHz(numbers, fromHz)} → ${showHz(numbers, toHz)}`,
    );
  const { fail, hold } = changedVerdicts(numbers, name);
  return [
    ...firstOf(modes),
    ...(fail.length === 0 ? [] : [`fails: ${fail.join(", ")}`]),
    ...(hold.length === 0 ? [] : [`holds: ${hold.join(", ")}`]),
  ];
}

function firstOf(list: readonly string[]): readonly string[] {
  return list.length <= NAMED ? list : [...list.slice(0, NAMED), `${list.length - NAMED} more`];
}
