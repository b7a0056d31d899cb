/** What is answered where the numbers are: features that look at a report. All of it is plain data. */
import {
  answerFiles,
  type CodeLens,
  codeActions,
  type Diagnostic,
  type Hover,
  hover,
  type InlayHint,
  type InlayKind,
  inlayHints,
  type Model,
  type OfferedAction,
  type PackedContent,
  packContent,
  type ResolvedLens,
  resolveLens,
  type SheetChoice,
  type Span,
  sheetContent,
  type UnitSystem,
  type View,
} from "../shared-core/index.ts";

/** A code action; `cures` is the index of its diagnostic. */
export type Action = Omit<OfferedAction, "diagnostic"> & { readonly cures?: number };

/** The text of a file, or why there is none. */
export type CsvAnswer = { readonly text: string } | { readonly refused: string };

/**
 * `now`: with the newest modes, even while answers are still computed; `whole`: with the newest report that has
 * everything, though it may be of an earlier text.
 */
export interface Views {
  readonly now: View;
  readonly whole: View;
  readonly earlier: EarlierModel | undefined;
}

/** What the model was at the revision that was told last. */
export interface EarlierModel {
  readonly revision: string;
  readonly model: Model;
}

/** A revision that is wanted, and why it cannot be read if it cannot. */
export interface WantedEarlier {
  readonly revision: string;
  readonly label: string;
  readonly reason: string | undefined;
}

export const NUMERIC = {
  hover: ({ now, whole }: Views, offset: number): Hover | null =>
    hover(speaksOfAnswers(now, offset) ? whole : now, offset) ?? null,

  inlayHints(
    { now, whole }: Views,
    range: Span,
    kinds: readonly InlayKind[],
    cursor: number | undefined,
  ): readonly InlayHint[] {
    const isLate = (kind: InlayKind) => kind === "margin" || kind === "found";
    const [early, late] = [kinds.filter((kind) => !isLate(kind)), kinds.filter(isLate)];
    const hints = [
      ...inlayHints(now, range, { kinds: new Set(early), cursor }),
      ...(late.length > 0 ? inlayHints(whole, range, { kinds: new Set(late), cursor }) : []),
    ];
    return hints.sort((a, b) => a.offset - b.offset);
  },

  resolveLens: ({ whole }: Views, lens: CodeLens): ResolvedLens => resolveLens(whole, lens),

  codeActions(
    { whole }: Views,
    range: Span,
    said: readonly Diagnostic[],
    only: readonly string[] | undefined,
  ): readonly Action[] {
    const actions = codeActions(whole, range, said).filter(({ kind }) => isWanted(kind, only));
    return actions.map(({ diagnostic, ...action }) =>
      diagnostic === undefined ? action : { ...action, cures: said.indexOf(diagnostic) },
    );
  },

  /**
   * Packed here: one text travels between threads faster than rows do. While answers are awaited, modes of this
   * text are worth more than everything of an earlier one.
   */
  sheet(
    { now, earlier }: Views,
    choice: SheetChoice,
    units: UnitSystem | undefined,
    wanted: WantedEarlier | undefined,
  ): PackedContent {
    const model = earlier?.revision === wanted?.revision ? earlier?.model : undefined;
    const before = wanted && {
      label: wanted.label,
      ...(model && { model }),
      ...(wanted.reason !== undefined && { reason: wanted.reason }),
    };
    return packContent(sheetContent({ ...now, units: units ?? now.units }, choice, before));
  },

  csv({ whole }: Views, ask: string, caseName: string | undefined): CsvAnswer {
    const { report, units, model } = whole;
    const first = model.cases[0].name;
    const found = report?.cases.find(({ name }) => name === (caseName ?? first));
    if (report === undefined || found === undefined) {
      return { refused: caseName ? `there is no case ${caseName}` : "there are no numbers" };
    }
    const answer = found.answers.get(ask);
    if (answer?.ok === false) return { refused: answer.reason };
    const [file] = answerFiles({ ...report, cases: [found] }, { asks: [ask], as: "csv", units });
    return file === undefined ? { refused: `nothing was asked by the name ${ask}` } : { text: file.text };
  },
} as const satisfies Record<string, (views: Views, ...args: never[]) => unknown>;

export type NumericFeature = keyof typeof NUMERIC;
export type NumericArgs<F extends NumericFeature> =
  Parameters<(typeof NUMERIC)[F]> extends [Views, ...infer A] ? A : never;
export type NumericResult<F extends NumericFeature> = ReturnType<(typeof NUMERIC)[F]>;

/** Whether a place belongs to what is asked, expected or varied: its numbers come last. */
function speaksOfAnswers({ model }: View, offset: number): boolean {
  const at = model.tree.statements.find(({ span }) => span.start <= offset && offset <= span.end);
  return at !== undefined && ["ask", "expect", "case"].includes(at.keyword.text);
}

/** A client that wants `refactor` wants `refactor.extract` too. */
const isWanted = (kind: string, only: readonly string[] | undefined): boolean =>
  only === undefined ||
  only.some((wanted) => wanted === "" || kind === wanted || kind.startsWith(`${wanted}.`));
