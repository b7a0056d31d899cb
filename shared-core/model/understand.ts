/**
 * Text -> model. Names first, then what moves, joins and drives, then what is asked and must hold; each step
 * uses what the ones before settled. Longer than other files because it is the one list of these steps.
 */
import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import { parse } from "../syntax/parser.ts";
import type { Expression, TextNode, Tree } from "../syntax/tree.ts";
import { acceptances } from "./acceptances.ts";
import type { Asked } from "./answer-calls.ts";
import { planAsk } from "./asks.ts";
import { planAssumption } from "./assumptions.ts";
import { planBind } from "./binds.ts";
import { planCase } from "./cases.ts";
import { type Draft, sayNotYet, spoil } from "./draft.ts";
import { planDrive } from "./drives.ts";
import { planExpectation } from "./expectations.ts";
import { Findings } from "./findings.ts";
import { checkGroup } from "./groups.ts";
import { instantiate } from "./instantiate.ts";
import { planJoin } from "./joins.ts";
import { understandLets } from "./let-order.ts";
import { type FileContext, LetTable } from "./lets.ts";
import { planLimit } from "./limits.ts";
import type { CaseInfo, Entity, FileReader, Instance, Model } from "./model.ts";
import { collectNames, type Described, describeStatements, nameSpan } from "./names.ts";
import { withoutConsequences } from "./one-slip.ts";
import { PARSING } from "./parsing.ts";
import { planMoving } from "./places.ts";
import type { Plan, PlannedAsk, PlannedExpression, PlannedLet } from "./plan.ts";
import { sayUnusedNumbers } from "./unused.ts";
import { readUses, sayErrorsOfUsed, type Uses } from "./used.ts";

/**
 * Understands a file, whatever stands in it: the model holds what has a meaning, its diagnostics say what has
 * none. `path` is the file's own, with `/`; other files are asked of the reader by paths relative to the same
 * root. With a text, what the parser says is among the diagnostics; with a tree it is not.
 */
export function understand(path: string, source: string | Tree, reader: FileReader): Model {
  const parsed = typeof source === "string" ? parse(source, PARSING) : { tree: source, diagnostics: [] };
  const { tree } = parsed;
  const findings = new Findings();
  const contexts = new Map<Entity, FileContext>();
  const files = new Set<string>();
  const uses = readUses(path, tree, reader, findings, contexts, files);
  const statements = describeStatements(tree);
  const names = collectNames(statements, uses.names, tree, findings);
  const main: FileContext = { tree, findings, names, contextOf: (entity) => contexts.get(entity) ?? main };
  const draft = newDraft(path, main, statements, reader, files);
  planNumbers(draft, uses);
  planMechanics(draft);
  const asked = planAsked(draft);
  const expectations = statementsOf(draft, "expect").flatMap((each) => planExpectation(each, asked));
  const cases = planCases(draft);
  sayErrorsOfUsed(uses, findings);
  noteLostText(draft, parsed.diagnostics);
  sayUnusedNumbers(draft);
  const model: Model = {
    file: path,
    tree,
    title: titleOf(draft),
    entities: names,
    draws: draft.lets.draws,
    cases: cases.map(({ info }) => info),
    expectations,
    diagnostics: [],
    buildable: draft.buildable,
    accepted: acceptances(tree, findings),
    files: [...files],
    plan: planOf(
      draft,
      asked,
      cases.map(({ lets }) => lets),
      uses,
    ),
  };
  const said = withoutConsequences(tree, statements, parsed.diagnostics, findings.list);
  return withNumbersAsWritten({ ...model, diagnostics: inOrder([...parsed.diagnostics, ...said]) });
}

function newDraft(
  path: string,
  main: FileContext,
  statements: readonly Described[],
  reader: FileReader,
  files: Set<string>,
): Draft {
  const lets = new LetTable(new Set(main.names.values()));
  const byName = new Map<string, Described>();
  const counted = statements.filter((each) => {
    if (each.name === undefined) return true;
    const holds = main.names.get(each.name)?.node === each.node;
    if (holds) byName.set(each.name, each);
    return holds;
  });
  return {
    main,
    findings: main.findings,
    lets,
    numbers: lets.contextFor(main),
    reader,
    path,
    statements,
    counted,
    byName,
    coordinates: [],
    coordinateByName: new Map(),
    supports: [],
    supportByName: new Map(),
    binds: [],
    planned: [],
    plannedByName: new Map(),
    elements: new Map(),
    drives: [],
    driveByName: new Map(),
    assumptions: new Map(),
    limits: new Map(),
    unsound: new Set(),
    given: new Map(),
    likeOpen: [],
    files,
    buildable: true,
  };
}

const statementsOf = (draft: Draft, keyword: string): Described[] =>
  draft.counted.filter(({ node }) => node.keyword.text === keyword);

function planNumbers(draft: Draft, uses: Uses): void {
  for (const { context } of uses.all) understandLets(context, draft.lets);
  understandLets(draft.main, draft.lets);
  for (const statement of statementsOf(draft, "assume")) planAssumption(statement, draft);
  for (const { used } of uses.direct) {
    for (const statement of used.statements) takeLimit(statement, draft, used.context);
  }
  for (const statement of statementsOf(draft, "limit")) takeLimit(statement, draft, draft.main);
  for (const { node, description } of statementsOf(draft, "kit")) {
    if (description.notYet) sayNotYet(draft, node.keyword.span, "a kit");
  }
}

function takeLimit(statement: Described, draft: Draft, file: FileContext): void {
  if (statement.node.keyword.text !== "limit" || statement.name === undefined) return;
  if (draft.main.names.get(statement.name)?.node !== statement.node) return;
  const limit = planLimit(statement, draft, file);
  if (limit === undefined) draft.unsound.add(statement.name);
  else draft.limits.set(statement.name, limit);
}

function planMechanics(draft: Draft): void {
  for (const statement of familyOf(draft, "moves")) {
    if (statement.node.keyword.text !== "bind") planMoving(statement, draft);
  }
  for (const statement of statementsOf(draft, "bind")) planBind(statement, draft);
  for (const statement of familyOf(draft, "joins")) {
    if (statement.node.keyword.text !== "group") planJoin(statement, draft);
  }
  for (const statement of statementsOf(draft, "group")) checkGroup(statement, draft);
  for (const statement of familyOf(draft, "drives")) planDrive(statement, draft);
  sayTooLarge(draft);
}

/**
 * Most free coordinates that are computed: a table of all their modes holds their square, 32 MB of numbers here,
 * and dense damped modes take the cube. Text, names and units are checked for files of any size.
 */
const MOST_COORDINATES = 2000;

function sayTooLarge(draft: Draft): void {
  const free = draft.coordinates.length - draft.binds.length;
  if (free <= MOST_COORDINATES) return;
  const moving = familyOf(draft, "moves").filter(({ node }) => node.keyword.text !== "bind");
  const at = moving[Math.min(MOST_COORDINATES, moving.length - 1)].node;
  const message = `the model has ${free} free coordinates, at most ${MOST_COORDINATES} are computed`;
  draft.findings.say("too-large", nameSpan(at), message, {
    hint: "split it into files, or lump what moves together; the text is checked all the same",
  });
  spoil(draft, undefined);
}

const familyOf = (draft: Draft, family: string): Described[] =>
  draft.counted.filter(({ description }) => description.family === family);

function planAsked(draft: Draft): Asked {
  const asks = new Map<string, PlannedAsk>();
  for (const statement of familyOf(draft, "asks")) {
    const ask = planAsk(statement, draft);
    if (ask !== undefined) asks.set(ask.name, ask);
  }
  return { draft, asks, expressions: new Map<Expression, PlannedExpression | null>() };
}

function planCases(draft: Draft): { info: CaseInfo; lets: readonly PlannedLet[] }[] {
  const asWritten = { info: { name: "as written" }, lets: draft.lets.planned };
  const others = statementsOf(draft, "case").flatMap((statement) => {
    const lets = planCase(statement, draft);
    const name = statement.name;
    return lets === undefined || name === undefined ? [] : [{ info: { name, node: statement.node }, lets }];
  });
  return [asWritten, ...others];
}

/** A line that could not be read may have been a mass or a spring: without it there is no system to compute. */
function noteLostText(draft: Draft, syntax: readonly Diagnostic[]): void {
  const known = new Set(draft.statements.map(({ node }) => node));
  const lost = draft.main.tree.statements.some((node) => !known.has(node));
  const broken = draft.statements.some(
    ({ node, description }) =>
      (node.broken || node.details.some((detail) => detail.broken)) && MECHANICS.has(description.family),
  );
  const beside = syntax.some((each) => each.code === "too-large" || each.code === "version-unknown");
  if (lost || broken || beside) spoil(draft, undefined);
}

const MECHANICS: ReadonlySet<string> = new Set(["moves", "joins", "drives"]);

function titleOf(draft: Draft): string | undefined {
  const [first, second] = statementsOf(draft, "title");
  if (second !== undefined) {
    draft.findings.say("duplicate-name", second.node.keyword.span, "the title is given twice", {
      related: [{ span: nameSpan(first.node), message: "here it is given first" }],
    });
  }
  const text = first?.node.slots.text;
  return text?.kind === "text" ? (text as TextNode).text : undefined;
}

function planOf(draft: Draft, asked: Asked, lets: readonly (readonly PlannedLet[])[], uses: Uses): Plan {
  return {
    slots: draft.lets.slots,
    lets,
    coordinates: draft.coordinates,
    supports: draft.supports,
    binds: draft.binds,
    statements: draft.planned,
    drives: draft.drives,
    assumptions: draft.assumptions,
    asks: [...asked.asks.values()],
    limits: [...draft.limits.values()],
    expressions: asked.expressions,
    elements: draft.elements,
    uses: new Map(uses.direct.map(({ used, span }) => [used.path, span])),
    numbers: draft.numbers,
    asked,
  };
}

/**
 * What is wrong with the numbers as written belongs to the text: it is said at once and leaves no system. Where
 * there is none anyway, binds may be missing, so nothing is said about how they go together.
 */
function withNumbersAsWritten(model: Model): Model {
  const instance = instantiate(model, 0);
  const found = instance.diagnostics;
  const diagnostics = model.buildable ? found : found.filter((each) => each.code !== "inconsistent-bind");
  if (diagnostics.length === 0) {
    newest = instance;
    return model;
  }
  const buildable = model.buildable && !diagnostics.some((each) => each.severity === "error");
  return { ...model, buildable, diagnostics: inOrder([...model.diagnostics, ...diagnostics]) };
}

/** The numbers as written of the model that was understood last, for whom judges it next. */
let newest: Instance | undefined;

/** The model with its numbers as written, where they were put in just now: else undefined. Hands it out once. */
export function instanceOf(model: Model): Instance | undefined {
  const known = newest?.model === model && newest.diagnostics.length === 0 ? newest : undefined;
  newest = undefined;
  return known;
}

const inOrder = (diagnostics: readonly Diagnostic[]): Diagnostic[] =>
  [...diagnostics].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
