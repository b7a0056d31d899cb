import type { Mode } from "../../shared-core/answers/answer.ts";
import type { CaseReport, FileReport, Verdict } from "../../shared-core/judgement/report.ts";
import type { Assembly, CoordinateInfo } from "../../shared-core/mechanics/assembly.ts";
import type { Instance, Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { dimension, kindOf, NUMBER, RATE } from "../../shared-core/units/quantity.ts";

/** A report made by hand, as writers get it: one mass, one free mode and one root without a partner. */

export const TEXT = `thrum 1
title "A drum on a slab"

let mount = 26.5 N/mm +/- 10 %

mass unit = 420 kg
spring mounts between unit and ground = mount
force shake on unit
    amplitude = 1 N
ask sweep run
    of = unit.velocity
    from = 1 Hz
    to = 8 Hz

expect soft = natural_frequency(1) <= 6 Hz
expect quiet = peak(run, unit.velocity) <= 12 mm/s
expect damped = damping_ratio(1) >= 5 %
`;

export function sampleReport(): FileReport {
  const model = understand("models/drum.thrum", TEXT, {
    read: () => ({ ok: false, why: "missing", detail: "" }),
  });
  return {
    file: "models/drum.thrum",
    model,
    diagnostics: [
      {
        code: "not-damped",
        severity: "warning",
        message: "mode 1 at 1.264 Hz has no damping",
        hint: "add a damper or a loss factor",
        span: { start: TEXT.indexOf("mounts"), end: TEXT.indexOf("mounts") + 6 },
        fixes: [
          {
            title: "Add a damper",
            safe: false,
            edits: [{ span: { start: TEXT.length, end: TEXT.length }, text: "x" }],
          },
        ],
      },
    ],
    accepted: [],
    faults: [],
    cases: [sampleCase(model)],
  };
}

function sampleCase(model: Model): CaseReport {
  const instance = sampleInstance(model);
  return {
    name: "as written",
    instance,
    analysis: { instance } as CaseReport["analysis"],
    modes: { ok: true, table: { modes: sampleModes(), stabilityMargin: 0 } },
    answers: new Map([
      ["run", { ok: true, value: sampleSweep() }],
      ["fall", { ok: true, value: sampleHistory() }],
      ["noise", { ok: false, kind: "random", reason: "random answers are not computed by this version" }],
    ]),
    verdicts: sampleVerdicts(model),
  };
}

function sampleVerdicts(model: Model): Verdict[] {
  const [soft, quiet, damped] = model.expectations;
  const shared = { reason: undefined };
  return [
    {
      ...shared,
      name: "soft",
      expectation: soft,
      holds: true,
      value: 1.264,
      limit: 6,
      kind: RATE,
      unit: "Hz",
      margin: 0.789,
      mattersMost: { name: "mount", sensitivity: 0.5 },
    },
    {
      name: "quiet",
      expectation: quiet,
      holds: null,
      value: null,
      limit: 0.012,
      kind: kindOf(dimension(1, 0, -1)),
      unit: "m/s",
      margin: null,
      reason: "mode 1 is undamped",
    },
    {
      ...shared,
      name: "damped",
      expectation: damped,
      holds: false,
      value: 0.031,
      limit: 0.05,
      kind: NUMBER,
      unit: "1",
      margin: -0.38,
    },
  ];
}

function sampleModes(): Mode[] {
  const shape = (...re: number[]) => ({ re: Float64Array.from(re), im: new Float64Array(re.length) });
  const rest = { modalMass: 1, participation: {}, effectiveMass: { line: 1 }, energyShare: { mounts: 1 } };
  return [
    {
      ...rest,
      number: 0,
      frequencyHz: 0,
      dampedFrequencyHz: 0,
      dampingRatio: null,
      eigenvalue: [0, 0],
      shape: shape(1, 1),
    },
    {
      ...rest,
      number: 1,
      frequencyHz: 1.264,
      dampedFrequencyHz: 1.264,
      dampingRatio: 0.031,
      eigenvalue: [-0.246, 7.94],
      shape: shape(1, -0.25),
    },
    {
      ...rest,
      number: null,
      frequencyHz: null,
      dampedFrequencyHz: 0,
      dampingRatio: null,
      eigenvalue: [-12, 0],
      shape: shape(0.5, 1),
    },
  ];
}

/** A resonance between two samples: only the peak knows its height. */
function sampleSweep() {
  const frequencyHz = Float64Array.from([1, 2, 4, 8]);
  const re = Float64Array.from([1e-3, 2e-3, -1e-3, -1e-4]);
  const im = Float64Array.from([0, -1e-3, 0, Number.NaN]);
  return {
    kind: "sweep" as const,
    frequencyHz,
    series: new Map([["unit.velocity", { unit: "m/s", re, im }]]),
    peaks: new Map([["unit.velocity", { value: 0.5, at: 2.5 }]]),
  };
}

function sampleHistory() {
  return {
    kind: "history" as const,
    timeS: Float64Array.from([0, 0.1, 0.2]),
    series: new Map([["unit.displacement", { unit: "m", values: Float64Array.from([0, -0.002, 0.001]) }]]),
    peaks: new Map([["unit.displacement", { value: 0.0025, at: 0.09 }]]),
  };
}

function sampleInstance(model: Model): Instance {
  const stiffness = kindOf(dimension(0, 1, -2));
  return {
    model,
    caseIndex: 0,
    parameters: new Map([
      ["mount", { ...stiffness, name: "mount", value: 26500, written: "26.5 N/mm", low: 23850, high: 29150 }],
    ]),
    assembly: sampleAssembly(),
    asks: [],
    limits: new Map(),
    sound: true,
    diagnostics: [],
  };
}

/** m q1'' + k (q1 - q2), with a force on q1 and a support below q2. */
export function sampleAssembly(): Assembly {
  const form = (
    coordinates: number[],
    factors: number[],
    supports: number[] = [],
    supportFactors: number[] = [],
  ) => ({
    coordinates,
    factors,
    supports,
    supportFactors,
  });
  const coordinate = (name: string, index: number): CoordinateInfo => ({
    name,
    motion: "sliding",
    form: form([index], [1]),
    owner: name,
    massless: false,
    startsAt: 0,
    startsMoving: 0,
    weight: 0,
    gravityMass: 0,
  });
  const element = {
    keyword: "spring",
    motion: "sliding" as const,
    count: 1,
    damping: 0,
    inertance: 0,
    lossFactor: 0,
    preload: 0,
  };
  return {
    free: 2,
    coordinates: [coordinate("unit", 0), coordinate("slab", 1)],
    supports: [{ name: "floor", motion: "sliding" }],
    inertias: [
      { owner: "unit", form: form([0], [1]), value: 420, relative: false },
      { owner: "slab", form: form([1], [1]), value: 9600, relative: false },
    ],
    elements: [
      { ...element, name: "mounts", form: form([0, 1], [1, -1]), stiffness: 26500, damping: 210 },
      { ...element, name: "beams", form: form([1], [1], [0], [-1]), stiffness: 1.12e7 },
    ],
    drives: [
      {
        name: "imbalance",
        keyword: "force",
        on: { kind: "form", form: form([0], [1]) },
        derivative: 0,
        shape: { kind: "unbalance", unbalance: 0.018, phase: 0 },
        unit: "N",
      },
    ],
    gravity: 9.80665,
    modalDamping: 0,
    massDamping: 0,
    stiffnessDamping: 0,
    resonanceBand: 0.2,
  };
}
