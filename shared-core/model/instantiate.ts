import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import type {
  Assembly,
  CoordinateInfo,
  DriveInfo,
  LinearForm,
  QuantityRef,
  QuantityTerm,
} from "../mechanics/assembly.ts";
import { buildSystem } from "../mechanics/builder-sum.ts";
import { groundForm, supportForm } from "../mechanics/forms.ts";
import type { Span } from "../text/span.ts";
import { formatQuantity } from "../units/show.ts";
import type { StatementValues } from "../vocabulary/description.ts";
import { bindForms } from "./bind-forms.ts";
import { type Frame, numberFault } from "./code.ts";
import { Findings } from "./findings.ts";
import type { Ask, Instance, LimitCurve, Model, Overrides, ParameterValue } from "./model.ts";
import { bandOf, evaluate } from "./number.ts";
import type {
  Place,
  Plan,
  PlannedDrive,
  PlannedLet,
  PlannedNumber,
  PlannedQuantity,
  PlannedStatement,
  Putting,
} from "./plan.ts";

export { derivatives } from "./derivatives.ts";
export { evaluateExpression } from "./evaluate.ts";

/**
 * Puts numbers into a model: those of a case (0: as written), with some of them replaced. Never fails: what is
 * wrong with these numbers is in `diagnostics`, and `sound` is false where they leave no system to compute. The
 * asks and limits are put in when they are first looked at.
 */
export function instantiate(model: Model, caseIndex: number, overrides: Overrides = {}): Instance {
  const index = Math.max(0, Math.min(caseIndex, model.cases.length - 1));
  return new PutModel(model, index, overrides);
}

/** Numbers in the place of lets: the frame of a case with its overrides. */
export function frameFor(
  plan: Plan,
  caseIndex: number,
  overrides: Overrides,
  wrong?: Putting["wrong"],
): Frame {
  const frame = new Float64Array(plan.slots);
  for (const planned of plan.lets[caseIndex] ?? plan.lets[0]) {
    const replaced = planned.visible ? overrides.parameters?.get(planned.name) : undefined;
    const nominal = replaced ?? planned.compute(frame);
    const value = evaluate(planned, frame, overrides.draws, nominal);
    if (!Number.isFinite(value) && wrong !== undefined) sayNoNumber(planned, frame, plan, wrong);
    frame[planned.slot] = value;
  }
  return frame;
}

class PutModel implements Instance {
  readonly model: Model;
  readonly caseIndex: number;
  readonly overrides: Overrides;
  readonly assembly: Assembly;
  readonly sound: boolean;
  readonly diagnostics: readonly Diagnostic[];
  readonly frame: Frame;
  readonly #findings = new Findings();
  readonly #put: Putting;
  #parameters: ReadonlyMap<string, ParameterValue> | undefined;
  #asks: readonly Ask[] | undefined;
  #limits: ReadonlyMap<string, LimitCurve> | undefined;

  constructor(model: Model, caseIndex: number, overrides: Overrides) {
    this.model = model;
    this.caseIndex = caseIndex;
    this.overrides = overrides;
    const wrong = (span: Span, message: string) => this.#findings.say("not-positive", span, message);
    this.frame = frameFor(model.plan, caseIndex, overrides, wrong);
    this.#put = {
      frame: this.frame,
      number: (of) => this.#number(of),
      wrong,
    };
    this.assembly = this.#assemble();
    this.sound = !this.#findings.hasErrors;
    this.diagnostics = this.#ownDiagnostics();
  }

  get parameters(): ReadonlyMap<string, ParameterValue> {
    this.#parameters ??= this.#readParameters();
    return this.#parameters;
  }

  get asks(): readonly Ask[] {
    this.#asks ??= this.model.plan.asks.flatMap(
      (ask) => ask.resolve?.(this.#put, (of) => this.quantity(of)) ?? [],
    );
    return this.#asks;
  }

  get limits(): ReadonlyMap<string, LimitCurve> {
    this.#limits ??= new Map(this.model.plan.limits.map((limit) => [limit.name, limit.resolve(this.#put)]));
    return this.#limits;
  }

  /** A quantity over the coordinates, supports and elements of the assembly. */
  quantity(of: PlannedQuantity): QuantityRef {
    const terms = of.terms.map(({ term, factor }): QuantityTerm => {
      const value = factor(this.frame);
      if (term.of === "element") {
        const element = this.model.plan.elements.get(term.name) ?? -1;
        return { of: "element", element, measure: term.measure, factor: value };
      }
      const { index, derivative } = term;
      return term.of === "coordinate"
        ? { of: "coordinate", coordinate: index, derivative, factor: value }
        : { of: "support", support: index, derivative, factor: value };
    });
    return { text: of.text, terms, unit: of.unit };
  }

  #number(of: PlannedNumber): number {
    const value = evaluate(of, this.frame, this.overrides.draws);
    if (!Number.isFinite(value)) {
      const fault = numberFault(of.code, this.frame);
      this.#findings.say("not-positive", fault?.span ?? of.span, fault?.message ?? "this is no number");
    }
    return value;
  }

  #assemble(): Assembly {
    const { plan } = this.model;
    const forms = bindForms(plan, this.frame, this.#findings);
    const builder = buildSystem({
      free: forms.free,
      coordinates: plan.coordinates.map((planned, i) => this.#coordinate(planned, forms.forms[i])),
      supports: plan.supports,
      ...this.#assumptions(),
    });
    const formOf = (place: Place): LinearForm => {
      if (place.is === "ground") return groundForm;
      return place.is === "support" ? supportForm(place.index) : forms.forms[place.index];
    };
    for (const statement of plan.statements) {
      statement.description.assemble?.(this.#values(statement, formOf), builder);
    }
    for (const drive of plan.drives) builder.drive(this.#drive(drive, formOf));
    return builder.finish();
  }

  #coordinate(planned: Plan["coordinates"][number], form: LinearForm): CoordinateInfo {
    const { name, motion, owner, massless, weight, mass, startsAt, startsMoving } = planned;
    const speed = startsMoving ? this.#number(startsMoving) : 0;
    return {
      name,
      motion,
      form,
      owner,
      massless,
      startsAt: startsAt ? this.#number(startsAt) : 0,
      startsMoving: startsMoving?.kind.rate ? 2 * Math.PI * speed : speed,
      weight,
      gravityMass: mass ? this.#number(mass) : 0,
    };
  }

  #assumptions() {
    const { assumptions } = this.model.plan;
    const value = (key: string, standard: number): number => {
      const number = assumptions.get(key);
      return number === undefined ? standard : this.#number(number);
    };
    return {
      gravity: value("gravity", STANDARD_GRAVITY),
      modalDamping: value("modal_damping", 0),
      massDamping: value("mass_damping", 0),
      stiffnessDamping: value("stiffness_damping", 0),
      resonanceBand: value("resonance_band", STANDARD_RESONANCE_BAND),
    };
  }

  #values(statement: PlannedStatement, formOf: (place: Place) => LinearForm): StatementValues {
    const { name, motion, ends, numbers, ats, words, positive } = statement;
    const read = (key: string): number | undefined => {
      const number = numbers.get(key);
      if (number === undefined) return undefined;
      const value = this.#number(number);
      if (positive.has(key) && !(value > 0)) this.#notPositive(key, number, value);
      return value;
    };
    const count = read("count") ?? 1;
    if (!Number.isInteger(count)) {
      const span = numbers.get("count")?.span ?? statement.node.span;
      this.#findings.say("wrong-kind", span, `\`count\` is a whole number, found ${count}`);
    }
    return {
      name,
      motion,
      count,
      has: (key) => numbers.has(key) || ats.has(key) || words.has(key),
      number: read,
      at: (key) => {
        const at = ats.get(key);
        if (at === undefined) return undefined;
        const [value, atHz] = [this.#number(at.value), this.#number(at.at)];
        if (!(atHz > 0)) this.#notPositive(key, at.at, atHz);
        return { value, atHz };
      },
      word: (key) => words.get(key),
      end: (slot) => formOf(ends[slot] ?? { is: "ground" }),
    };
  }

  #notPositive(key: string, number: PlannedNumber, value: number): void {
    if (!Number.isFinite(value)) return;
    const found = formatQuantity({ ...number.kind, value });
    this.#findings.say("not-positive", number.span, `\`${key}\` is to be above zero, found ${found}`);
  }

  #drive(planned: PlannedDrive, formOf: (place: Place) => LinearForm): DriveInfo {
    const { name, keyword, place, derivative, unit } = planned;
    for (const { key, number } of planned.positive) {
      const value = this.#number(number);
      if (!(value > 0)) this.#notPositive(key, number, value);
    }
    const on: DriveInfo["on"] =
      place.is === "support"
        ? { kind: "support", support: place.index }
        : { kind: "form", form: formOf(place) };
    const [writtenHz, bandHz] = [planned.writtenHz(this.#put), planned.bandHz(this.#put)];
    return {
      name,
      keyword,
      on,
      derivative,
      shape: planned.shape(this.#put),
      unit,
      ...(writtenHz === undefined ? {} : { writtenHz }),
      ...(bandHz === undefined ? {} : { bandHz }),
    };
  }

  #readParameters(): ReadonlyMap<string, ParameterValue> {
    const { plan } = this.model;
    const parameters = new Map<string, ParameterValue>();
    for (const planned of plan.lets[this.caseIndex] ?? plan.lets[0]) {
      if (!planned.visible) continue;
      parameters.set(planned.name, this.#parameter(planned));
    }
    return parameters;
  }

  #parameter(planned: PlannedLet): ParameterValue {
    const { name, written, kind, unitNode, tolerance, within, slot } = planned;
    const nominal = this.overrides.parameters?.get(name) ?? planned.compute(this.frame);
    const band = bandOf(planned, this.frame, nominal);
    return {
      ...kind,
      name,
      written,
      value: this.frame[slot],
      ...(unitNode ? { unitNode } : {}),
      ...(band ? { low: band[0], high: band[1] } : {}),
      ...(within ? { range: [within[0](this.frame), within[1](this.frame)] as const } : {}),
      ...(tolerance ? { draw: tolerance.draw } : {}),
    };
  }

  /** Those that the model itself does not say already; with the case, where it is not the model as written. */
  #ownDiagnostics(): readonly Diagnostic[] {
    const said = new Set(this.model.diagnostics.map(keyOf));
    const own = this.#findings.list.filter((each) => !said.has(keyOf(each)));
    const name = this.caseIndex === 0 ? undefined : this.model.cases[this.caseIndex].name;
    return name === undefined ? own : own.map((each) => ({ ...each, case: name }));
  }
}

/** m/s^2, ISO 80000-3. */
const STANDARD_GRAVITY = 9.80665;
/** Share; common practice. */
const STANDARD_RESONANCE_BAND = 0.2;

const keyOf = ({ code, span, message }: Diagnostic): string => `${code} ${span.start} ${span.end} ${message}`;

function sayNoNumber(planned: PlannedLet, frame: Frame, plan: Plan, wrong: Putting["wrong"]): void {
  const inherited = [...planned.reads].some((slot) => !Number.isFinite(frame[slot]));
  if (inherited) return;
  const fault = numberFault(planned.code, frame);
  const message = fault?.message ?? `\`${planned.name}\` is no number`;
  const inUsed = planned.file === undefined ? undefined : plan.uses.get(planned.file);
  wrong(inUsed ?? fault?.span ?? planned.span, inUsed ? `\`${planned.name}\`: ${message}` : message);
}
