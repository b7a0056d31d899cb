/** The answer of an earlier revision of a model, drawn faint under today's. */
import { plainCase } from "../judgement/plain-case.ts";
import type { CaseReport } from "../judgement/report.ts";
import type { Model } from "../model/model.ts";

/** What the model was at a revision that somebody chose. */
export interface Earlier {
  /** How the revision is called on the page: `3 November, softer mounts`. */
  readonly label: string;
  /** Left out where it cannot be read, and `reason` says why. */
  readonly model?: Model;
  readonly reason?: string;
}

/** Its numbers in one case, or why there are none. */
export type EarlierCase =
  | { readonly ok: true; readonly label: string; readonly report: CaseReport; readonly asWritten: boolean }
  | { readonly ok: false; readonly label: string; readonly reason: string };

/** A model never changes: what was computed of it stays true, and a sheet asks for it after every edit. */
const KNOWN = new WeakMap<Model, Map<number, CaseReport>>();

/** The case of the same name; as written where it had none. Without tolerances and rules, as for moved numbers. */
export function earlierCase({ label, model, reason }: Earlier, caseName: string): EarlierCase {
  if (model === undefined) return { ok: false, label, reason: reason ?? "it cannot be read" };
  if (!model.buildable) return { ok: false, label, reason: "it has errors and leaves nothing to compute" };
  const found = model.cases.findIndex(({ name }) => name === caseName);
  const index = Math.max(0, found);
  const known = KNOWN.get(model) ?? new Map<number, CaseReport>();
  KNOWN.set(model, known);
  const report = known.get(index) ?? plainCase(model, index, {});
  known.set(index, report);
  if (!report.instance.sound) {
    const why = report.instance.diagnostics[0]?.message;
    return { ok: false, label, reason: why ?? "its numbers leave nothing to compute" };
  }
  return { ok: true, label, report, asWritten: found < 0 || index === 0 };
}
