/** What editors ask a model beside what it says by itself. Nothing here is a diagnostic; text may be half typed. */
import type { Motion } from "../mechanics/builder.ts";
import { parse } from "../syntax/parser.ts";
import type { Expression, Tree } from "../syntax/tree.ts";
import type { Kind } from "../units/dimension.ts";
import { planAnswerExpression } from "./answer-calls.ts";
import { isHarmonic, isTimed } from "./asks.ts";
import { Findings } from "./findings.ts";
import type { Entity, Model } from "./model.ts";
import { PARSING } from "./parsing.ts";
import { planSeries } from "./quantities.ts";
import { understand } from "./understand.ts";

/** The kind of number a `let` is; undefined where it has an error or is none. */
export function kindOfLet(model: Model, name: string): Kind | undefined {
  const entity = model.entities.get(name);
  return entity?.keyword === "let" ? model.plan.asked.draft.lets.plannedOf(entity)?.kind : undefined;
}

/** Whether a `let` has a range written behind `within`, in which it may be moved. */
export function hasRange(model: Model, name: string): boolean {
  const entity = model.entities.get(name);
  return entity !== undefined && model.plan.asked.draft.lets.plannedOf(entity)?.within !== undefined;
}

/** How a coordinate, a support, or a joining element of that name moves: `unit`, `floor.z`, `mounts`. */
export function motionOf(model: Model, name: string): Motion | undefined {
  const { draft } = model.plan.asked;
  const coordinate = draft.coordinateByName.get(name);
  if (coordinate !== undefined) return draft.coordinates[coordinate].motion;
  const support = draft.supportByName.get(name);
  return support === undefined ? draft.plannedByName.get(name)?.motion : draft.supports[support].motion;
}

/** Whether a drive can drive an ask of that kind; of one that is not understood or not computed, nothing is held against it. */
export function drivesAsk(model: Model, drive: string, askKind: string): boolean {
  const { draft } = model.plan.asked;
  const planned = draft.drives[draft.driveByName.get(drive) ?? -1];
  if (planned === undefined) return true;
  return askKind === "sweep" ? isHarmonic(planned) : askKind !== "history" || isTimed(planned);
}

/** The kind of an expression of the file, also of a quantity such as `unit.velocity`; undefined where it has none. */
export function kindOfExpression(model: Model, node: Expression, tree = model.tree): Kind | undefined {
  const findings = new Findings();
  const { plan } = model;
  const draft = { ...plan.asked.draft, findings, main: { ...plan.asked.draft.main, tree } };
  if (node.kind === "path" && node.names.length > 1) return planSeries(node, draft)?.kind;
  const asked = { ...plan.asked, draft, expressions: new Map() };
  const planned = planAnswerExpression(node, asked, { ...plan.numbers, findings, tree, root: node });
  if (planned?.zero) return undefined;
  return planned?.kind ?? planSeries(node, draft)?.kind;
}

/** As `kindOfExpression`, of a text that may stand in the file. */
export function kindOfText(model: Model, text: string): Kind | undefined {
  const { tree, diagnostics } = parse(`let x = ${text}`, PARSING);
  const [value] = tree.statements[0]?.value ?? [];
  const broken = diagnostics.some(({ severity }) => severity === "error");
  return value?.kind === "value" && !broken ? kindOfExpression(model, value.expression, tree) : undefined;
}

/** The tree in which an entity stands: of the model's own file, or of the file that it is taken from. */
export function treeOf(model: Model, entity: Entity): Tree {
  return model.plan.asked.draft.main.contextOf(entity).tree;
}

/** The same file with another text, reading the same other files. */
export function understandAgain(model: Model, text: string): Model {
  return understand(model.file, text, model.plan.asked.draft.reader);
}
