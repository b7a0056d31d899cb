import type { UnitSystem } from "../shared-core/index.ts";

/** What a user can set, `thrum.<area>.<name>`; each for a folder or file of its own, without a restart. */
export interface Settings {
  /** `thrum.units.system` */
  readonly units: UnitSystem;
  /** `thrum.numbers.delay`: how long typing must rest before numbers are computed, in ms. */
  readonly delay: number;
  /** `thrum.diagnostics.closedModels`: whether models that are not open are judged too. */
  readonly closedModels: boolean;
  readonly inlayHints: {
    /** `thrum.inlayHints.frequencies`: natural frequency behind what moves. */
    readonly frequencies: boolean;
    /** `thrum.inlayHints.values`: value behind an expression. */
    readonly values: boolean;
    /** `thrum.inlayHints.margins`: margin behind an expectation. */
    readonly margins: boolean;
  };
  readonly codeLens: {
    /** `thrum.codeLens.asks` */
    readonly asks: boolean;
    /** `thrum.codeLens.expectations` */
    readonly expectations: boolean;
    /** `thrum.codeLens.cases` */
    readonly cases: boolean;
  };
}

export const DEFAULTS: Settings = {
  units: "as-written",
  delay: 60,
  closedModels: false,
  inlayHints: { frequencies: true, values: true, margins: true },
  codeLens: { asks: true, expectations: true, cases: true },
};

/** Longer, and an editor would look as if it did nothing. */
const LONGEST_DELAY = 10_000;

/** Settings from what a client sends for the section `thrum`; whatever does not fit counts as not set. */
export function readSettings(sent: unknown): Settings {
  const at = (area: string, name: string): unknown => {
    const section = isRecord(sent) ? sent[area] : undefined;
    return isRecord(section) ? section[name] : undefined;
  };
  const flag = (area: string, name: string, standard: boolean): boolean => {
    const value = at(area, name);
    return typeof value === "boolean" ? value : standard;
  };
  const { inlayHints, codeLens } = DEFAULTS;
  const units = at("units", "system");
  const delay = at("numbers", "delay");
  return {
    units: SYSTEMS.find((known) => known === units) ?? DEFAULTS.units,
    delay: typeof delay === "number" && delay >= 0 ? Math.min(delay, LONGEST_DELAY) : DEFAULTS.delay,
    closedModels: flag("diagnostics", "closedModels", DEFAULTS.closedModels),
    inlayHints: {
      frequencies: flag("inlayHints", "frequencies", inlayHints.frequencies),
      values: flag("inlayHints", "values", inlayHints.values),
      margins: flag("inlayHints", "margins", inlayHints.margins),
    },
    codeLens: {
      asks: flag("codeLens", "asks", codeLens.asks),
      expectations: flag("codeLens", "expectations", codeLens.expectations),
      cases: flag("codeLens", "cases", codeLens.cases),
    },
  };
}

const SYSTEMS: readonly UnitSystem[] = ["as-written", "si", "inch"];

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === "object" && value !== null && !Array.isArray(value);
