import { freeCoordinates } from "../judgement/shapes.ts";
import type { Assembly, DriveInfo, ElementInfo, LinearForm, Motion } from "../mechanics/assembly.ts";
import { instantiate } from "../model/instantiate.ts";
import type { Ask, Expectation, Instance, LimitCurve, Model, ParameterValue } from "../model/model.ts";
import type { StatementNode, ToleranceNode } from "../syntax/tree.ts";
import { siUnit } from "../units/show.ts";
import { canonicalNumber, canonicalValue, expressionText } from "./expression-text.ts";

/** The outline of a model with all its cases. */
export function outlineOf(model: Model): string {
  const instances = model.buildable ? model.cases.map((_, index) => instantiate(model, index)) : [];
  return outlineText(model, instances);
}

/**
 * The canonical text of a model, for diffs: resolved numbers in SI, one fact a line, sorted by name within each
 * kind of fact. Order, layout, comments and the choice of units leave it unchanged; a note is a fact.
 *
 * @param instances one for each case of the model, the first as written; empty when it cannot be built
 */
export function outlineText(model: Model, instances: readonly Instance[]): string {
  const [written, ...cases] = instances;
  const blocks = [
    model.title === undefined ? [] : [`title ${model.title}`],
    notes(model),
    written ? parameters(written) : [],
    tolerances(model),
    cases.flatMap((instance) => caseFacts(instance, written)),
    groups(model),
    written ? [...written.limits.values()].flatMap(limitFacts) : [],
    written ? system(written.assembly) : ["unresolved: the model has errors"],
    written ? written.asks.flatMap((ask) => askFacts(ask, written)) : [],
    model.expectations.flatMap(expectationFacts),
  ];
  const lines = blocks.map((block) => [...block].sort(byText)).filter((block) => block.length > 0);
  return `${lines.map((block) => block.join("\n")).join("\n\n")}\n`;
}

const byText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

function notes(model: Model): string[] {
  return model.tree.statements.flatMap((statement) =>
    statement.notes.map((note, i) => `note ${nameOf(statement)} ${i + 1}: ${note.text.trim()}`),
  );
}

function nameOf(statement: StatementNode): string {
  const { name } = statement.slots;
  return name?.kind === "name" ? name.text : statement.keyword.text;
}

function parameters(instance: Instance): string[] {
  return [...instance.parameters.values()].flatMap((parameter) =>
    parameterFacts(`let ${parameter.name}`, parameter),
  );
}

function parameterFacts(start: string, parameter: ParameterValue): string[] {
  const unit = siUnit(parameter);
  const { value, low, high, range } = parameter;
  return [
    `${start} = ${canonicalValue(value, unit)}`,
    ...(low === undefined || high === undefined
      ? []
      : [`${start} band = ${canonicalNumber(low)} to ${canonicalValue(high, unit)}`]),
    ...(range === undefined
      ? []
      : [`${start} range = ${canonicalNumber(range[0])} to ${canonicalValue(range[1], unit)}`]),
  ];
}

/** Tolerances written on elements, and how any tolerance is drawn; the band of a `let` stands with its value. */
function tolerances(model: Model): string[] {
  const written = new Map(tolerancesIn(model.tree.statements).map((node) => [node.span.start, node]));
  return model.draws.flatMap(({ owner, span, file, distribution, copies }) => {
    const node = file === undefined ? written.get(span.start) : undefined;
    const amount = node ? ` = +/- ${expressionText(node.amount)}` : "";
    return [`tolerance ${owner}${amount} ${distribution}${copies > 1 ? `, ${copies} draws` : ""}`];
  });
}

function tolerancesIn(node: object): ToleranceNode[] {
  if ("kind" in node && node.kind === "tolerance") return [node as ToleranceNode];
  return Object.values(node).flatMap((child) =>
    typeof child === "object" && child !== null ? tolerancesIn(child) : [],
  );
}

function groups(model: Model): string[] {
  const statements = model.tree.statements.filter((statement) => statement.keyword.text === "group");
  return statements.map((statement) => {
    const members = (statement.value ?? []).map((item) =>
      item.kind === "value" ? expressionText(item.expression) : "?",
    );
    return `group ${nameOf(statement)} = ${members.sort(byText).join(", ")}`;
  });
}

function limitFacts({ name, points, betweenPoints, of, bands, kind }: LimitCurve): string[] {
  const start = `limit ${name}`;
  const unit = siUnit(kind);
  const values =
    typeof points === "number"
      ? [`${start} = ${canonicalValue(points, unit)}`]
      : points.map(
          (point) => `${start} at ${canonicalValue(point.atHz, "Hz")} = ${canonicalValue(point.value, unit)}`,
        );
  return [...values, `${start} is ${of}, ${betweenPoints}, bands ${bands}`];
}

/** A case says the parameters whose value or band it changes. */
function caseFacts(instance: Instance, written: Instance | undefined): string[] {
  const { name } = instance.model.cases[instance.caseIndex];
  return [...instance.parameters.values()].flatMap((parameter) => {
    const start = `let ${parameter.name}`;
    const before = written?.parameters.get(parameter.name);
    const known = new Set(before ? parameterFacts(start, before) : []);
    return parameterFacts(start, parameter)
      .filter((fact) => !known.has(fact))
      .map((fact) => `case ${name}: ${fact}`);
  });
}

function system(assembly: Assembly): string[] {
  const form = formWriter(assembly);
  return [
    `assume gravity = ${canonicalValue(assembly.gravity, "m/s^2")}`,
    ...fact("assume modal_damping", assembly.modalDamping, "1"),
    ...fact("assume mass_damping", assembly.massDamping, "1/s"),
    ...fact("assume stiffness_damping", assembly.stiffnessDamping, "s"),
    `assume resonance_band = ${canonicalNumber(assembly.resonanceBand)}`,
    ...assembly.supports.map((support) => `support ${support.name} is ${support.motion}`),
    ...assembly.coordinates.flatMap((coordinate) => [
      `coordinate ${coordinate.name} is ${coordinate.motion}`,
      ...fact(`coordinate ${coordinate.name} starts_at`, coordinate.startsAt, MOTION_UNIT[coordinate.motion]),
      ...fact(
        `coordinate ${coordinate.name} starts_moving`,
        coordinate.startsMoving,
        `${MOTION_UNIT[coordinate.motion]}/s`,
      ),
      ...fact(`coordinate ${coordinate.name} weight`, coordinate.weight, "1"),
    ]),
    ...assembly.inertias.map(
      ({ owner, form: along, value, relative }) =>
        `${relative ? "inertance" : "inertia"} of ${owner} along ${form(along)} = ${canonicalNumber(value)}`,
    ),
    ...assembly.elements.flatMap((element) => elementFacts(element, form(element.form))),
    ...assembly.drives.flatMap((drive) => driveFacts(drive, assembly, form)),
  ];
}

const MOTION_UNIT: Readonly<Record<Motion, string>> = { sliding: "m", turning: "rad", charge: "C" };

/** Zero is what a property is when nobody speaks of it. */
function fact(start: string, value: number | undefined, unit: string): string[] {
  return value === undefined || value === 0 ? [] : [`${start} = ${canonicalValue(value, unit)}`];
}

function elementFacts(element: ElementInfo, travel: string): string[] {
  const start = `${element.keyword} ${element.name}`;
  return [
    `${start} travel = ${travel}`,
    ...fact(`${start} stiffness`, element.stiffness, ""),
    ...fact(`${start} damping`, element.damping, ""),
    ...fact(`${start} inertance`, element.inertance, ""),
    ...fact(`${start} loss_factor`, element.lossFactor, ""),
    ...fact(`${start} preload`, element.preload, ""),
    ...fact(`${start} rated_travel`, element.ratedTravel, ""),
    ...fact(`${start} rated_force`, element.ratedForce, ""),
  ];
}

function driveFacts(drive: DriveInfo, assembly: Assembly, form: (of: LinearForm) => string): string[] {
  const start = `${drive.keyword} ${drive.name}`;
  const on = drive.on.kind === "form" ? form(drive.on.form) : assembly.supports[drive.on.support].name;
  const shape = Object.entries(drive.shape).flatMap(([key, value]) => {
    const text = shapeText(value);
    return text === undefined || key === "kind" ? [] : [`${start} ${key} = ${text}`];
  });
  return [`${start} on ${on} is ${drive.shape.kind}, in ${drive.unit}`, ...shape];
}

/** Functions and samples have no short text; what they come from stands in the notes and the text itself. */
function shapeText(value: unknown): string | undefined {
  if (typeof value === "number") return canonicalNumber(value);
  if (typeof value === "string") return value;
  if (Array.isArray(value)) return value.map((each) => canonicalNumber(Number(each))).join(", ");
  return undefined;
}

/** `unit - slab`, `0.5 * heel`: a form over the free coordinates and the supports by name, in name order. */
function formWriter(assembly: Assembly): (form: LinearForm) => string {
  const free = freeCoordinates(assembly);
  const name = (index: number): string => assembly.coordinates[free[index]]?.name ?? `q${index + 1}`;
  return (form) => {
    const terms = [
      ...form.coordinates.map((index, i) => ({ name: name(index), factor: form.factors[i] })),
      ...form.supports.map((index, i) => ({
        name: assembly.supports[index].name,
        factor: form.supportFactors[i],
      })),
    ].sort((a, b) => byText(a.name, b.name));
    const text = terms.map(({ name: of, factor }, i) => {
      const size = Math.abs(factor) === 1 ? of : `${canonicalNumber(Math.abs(factor))} * ${of}`;
      if (i === 0) return factor < 0 ? `-${size}` : size;
      return `${factor < 0 ? "- " : "+ "}${size}`;
    });
    return text.join(" ") || "ground";
  };
}

function askFacts(ask: Ask, instance: Instance): string[] {
  const start = `ask ${ask.name}`;
  if (ask.kind === "later") return [`${start} is ${ask.askKind}`];
  if (ask.kind === "modes")
    return [
      `${start} is modes`,
      ...fact(`${start} up_to`, ask.upToHz, "Hz"),
      ...fact(`${start} count`, ask.count, ""),
    ];
  const shared = [
    `${start} is ${ask.kind}`,
    ...ask.of.map((quantity) => `${start} of ${quantity.text}`),
    ...ask.by.map((index) => `${start} by ${instance.assembly.drives[index].name}`),
  ];
  if (ask.kind === "sweep")
    return [
      ...shared,
      `${start} from = ${canonicalValue(ask.fromHz, "Hz")}`,
      `${start} to = ${canonicalValue(ask.toHz, "Hz")}`,
      `${start} points = ${ask.points} ${ask.spacing}`,
    ];
  return [
    ...shared,
    `${start} lasting = ${canonicalValue(ask.lasting, "s")}`,
    ...fact(`${start} step`, ask.step, "s"),
    `${start} accuracy = ${canonicalNumber(ask.accuracy)}`,
    `${start} start = ${ask.start}`,
  ];
}

function expectationFacts(expectation: Expectation): string[] {
  const start = `expect ${expectation.name}`;
  const { left, operator, right, tolerance, cases, margin } = expectation;
  const share = typeof tolerance === "object" ? canonicalNumber(tolerance.share) : tolerance;
  return [
    `${start} = ${expressionText(left)} ${operator} ${expressionText(right)}`,
    ...fact(`${start} margin`, margin, ""),
    ...(tolerance === "nominal" ? [] : [`${start} tolerance = ${share}`]),
    ...(cases === undefined ? [] : [`${start} cases = ${cases.join(", ")}`]),
  ];
}
