/** Contexts for single rules around assemblies written by hand. */
import { analyse } from "../../shared-core/answers/analysis-of.ts";
import type { RuleContext } from "../../shared-core/judgement/rule.ts";
import type { Assembly, DriveInfo } from "../../shared-core/mechanics/assembly.ts";
import type { Ask, Instance, Model } from "../../shared-core/model/model.ts";

export function contextOf(assembly: Assembly, asks: readonly Ask[] = []): RuleContext {
  const model = {
    file: "hand-made.thrum",
    tree: { text: "", statements: [] },
    entities: new Map(),
  } as unknown as Model;
  const instance: Instance = {
    model,
    caseIndex: 0,
    parameters: new Map(),
    assembly,
    asks,
    limits: new Map(),
    diagnostics: [],
    sound: true,
  };
  const analysis = analyse(instance);
  return {
    model,
    instance,
    assembly,
    analysis,
    modes: analysis.modes(),
    answers: new Map(),
    judged: [],
    evaluate: () => ({ ok: false, reason: "there is nothing to evaluate" }),
  };
}

/** A steady force on one free coordinate. */
export const steadyForce = (coordinate: number, lowHz: number, highHz = lowHz): DriveInfo => ({
  name: "push",
  keyword: "force",
  on: {
    kind: "form",
    form: { coordinates: [coordinate], factors: [1], supports: [], supportFactors: [] },
  },
  derivative: 0,
  shape: { kind: "sine", amplitude: 1, frequencyHz: lowHz, phase: 0, order: 1 },
  unit: "N",
  writtenHz: lowHz,
  bandHz: [lowHz, highHz],
});
