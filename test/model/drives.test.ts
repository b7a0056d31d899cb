import { describe, expect, it } from "vitest";
import type { DriveInfo, DriveShape } from "../../shared-core/mechanics/assembly.ts";
import { check, codesOf, fixed, instanceOf, modelOf } from "./check.ts";

const BASE =
  "mass unit = 420 kg\ninertia rotor = 3 kg*m^2\nsupport floor\nsupport yoke\n    kind = turning\n";

function drive(text: string, files: Readonly<Record<string, string>> = {}): DriveInfo {
  return instanceOf(BASE + text, 0, files).assembly.drives[0];
}

const shape = <K extends DriveShape["kind"]>(text: string, kind: K): Extract<DriveShape, { kind: K }> => {
  const found = drive(text).shape;
  expect(found.kind).toBe(kind);
  return found as Extract<DriveShape, { kind: K }>;
};

describe("shapes of drives, in SI", () => {
  it("nothing said is one unit in a sweep", () => {
    expect(drive("force f on unit")).toMatchObject({ shape: { kind: "none" }, unit: "N", derivative: 0 });
  });

  it("steady sines: frequency, or order times speed", () => {
    expect(
      drive("force f on unit\n    amplitude = 2 kN\n    frequency = 600 rpm\n    phase = -90 deg"),
    ).toMatchObject({
      shape: { kind: "sine", amplitude: 2000, frequencyHz: 10, phase: -Math.PI / 2, order: 1 },
      writtenHz: 10,
      bandHz: [10, 10],
    });
    expect(
      drive("torque q on rotor\n    amplitude = 3 N*m\n    speed = 600 rpm\n    order = 2"),
    ).toMatchObject({
      shape: { kind: "sine", amplitude: 3, frequencyHz: 20, order: 2, speed: [10, 10] },
      unit: "N*m",
      writtenHz: 20,
    });
  });

  it("a range of speed is for judging", () => {
    const found = drive(
      "force f on unit\n    amplitude = 2 N\n    speed = 600 rpm to 1500 rpm\n    order = 2",
    );
    expect(found).toMatchObject({ shape: { frequencyHz: undefined, speed: [10, 25] }, bandHz: [20, 50] });
    expect(found.writtenHz).toBeUndefined();
  });

  it("unbalance, pulses, steps, impulses and chirps", () => {
    expect(shape("force f on unit\n    unbalance = 18 g*m\n    speed = 1200 rpm", "unbalance")).toMatchObject(
      {
        unbalance: 0.018,
        frequencyHz: 20,
      },
    );
    expect(
      shape(
        "force f on unit\n    pulse = trapezoid\n    peak = 3 kN\n    duration = 0.9 s\n    rise = 60 ms\n    fall = 0.3 s\n    start = 1 s",
        "pulse",
      ),
    ).toEqual({
      kind: "pulse",
      shape: "trapezoid",
      peak: 3000,
      duration: 0.9,
      rise: 0.06,
      fall: 0.3,
      start: 1,
    });
    expect(shape("force f on unit\n    step = 3 N\n    rise = 1 ms", "step")).toEqual({
      kind: "step",
      step: 3,
      start: 0,
      rise: 0.001,
    });
    expect(shape("force f on unit\n    impulse = 3 N*s", "impulse")).toEqual({
      kind: "impulse",
      impulse: 3,
      start: 0,
    });
    expect(
      shape(
        "force f on unit\n    chirp = from 120 rpm to 40 Hz\n    amplitude = 3 N\n    lasting = 30 s",
        "chirp",
      ),
    ).toMatchObject({
      fromHz: 2,
      toHz: 40,
      lasting: 30,
      amplitude: 3,
    });
  });

  it("the unit of a motion says what it gives", () => {
    const derivative = (text: string) => {
      const { derivative: found, unit, shape: of } = drive(text);
      return [found, unit, of.kind === "sine" ? of.amplitude : undefined];
    };
    expect(derivative("motion m of floor\n    amplitude = 3 mm")).toEqual([0, "m", 0.003]);
    expect(derivative("motion m of floor\n    amplitude = 3 mm/s")).toEqual([1, "m/s", 0.003]);
    expect(derivative("motion m of floor\n    amplitude = 2 gn")).toEqual([2, "m/s^2", 2 * 9.80665]);
    expect(derivative("motion m of yoke\n    amplitude = 180 deg")).toEqual([0, "rad", Math.PI]);
    expect(derivative("motion m of yoke\n    amplitude = 60 rpm")[2]).toBeCloseTo(2 * Math.PI, 12);
    expect(derivative("motion m of yoke\n    amplitude = 60 rpm").slice(0, 2)).toEqual([1, "rad/s"]);
    expect(derivative("motion m of yoke\n    amplitude = 3 rad/s^2")).toEqual([2, "rad/s^2", 3]);
  });
});

describe("laws", () => {
  it("are functions of time with the times at which they are not smooth", () => {
    const { law } = shape(
      "let hold = 2 s\nforce f on unit\n    law = if(t < hold, 3 N/s * t, 6 N) + max(0 N, 1 N/s * (t - 5 s)) + abs(1 N - 0.1 N/s * t) + 2 N * sin(12 Hz * t)",
      "law",
    );
    expect(law.kinks.map((time) => Number(time.toPrecision(12)))).toEqual([2, 5, 10]);
    expect(law.fastestHz).toBeCloseTo(12, 12);
    const at = (t: number) =>
      (t < 2 ? 3 * t : 6) + Math.max(0, t - 5) + Math.abs(1 - 0.1 * t) + 2 * Math.sin(24 * Math.PI * t);
    for (const t of [0, 0.31, 1.99, 2.5, 7.7, 13]) expect(law.at(t)).toBeCloseTo(at(t), 9);
  });

  it("do not disturb each other", () => {
    const { drives } = instanceOf(
      `${BASE}force f on unit\n    law = 3 N/s * t\nforce g on unit\n    law = 5 N/s * t`,
    ).assembly;
    const [f, g] = drives.map(({ shape: of }) => (of.kind === "law" ? of.law : undefined));
    expect([f?.at(2), g?.at(3), f?.at(2)]).toEqual([6, 15, 6]);
  });

  it("of a motion give what their unit says", () => {
    expect(drive("motion m of floor\n    law = 3 mm/s * t")).toMatchObject({ derivative: 0, unit: "m" });
    expect(drive("motion m of floor\n    law = 3 mm/s^2 * t")).toMatchObject({ derivative: 1, unit: "m/s" });
    const yoke = drive("motion m of yoke\n    law = 60 rpm * exp(-t / 1 s)");
    expect(yoke).toMatchObject({ derivative: 1, unit: "rad/s" });
    expect(yoke.shape.kind === "law" && yoke.shape.law.at(0)).toBeCloseTo(2 * Math.PI, 9);
  });

  it("are marked where they are wrong", () => {
    check(`${BASE}
force f1 on unit
    law = 40 N * exp(t)
#                    ^ unit-mismatch expected a number, found a time
force f2 on unit
    law = 40 N * t
#         ^^^^^^^^ unit-mismatch expected a force such as N
force f3 on unit
    law = 40 N/s * t +/- 3 %
#                    ^^^^^^^ wrong-kind a law takes no tolerance
force f4 on unit
    law = 3 N*s / t
#                 ^ not-positive at t = 0 this is zero
force f5 on unit
    law = 3 N * rate
#               ^^^^ unknown-name
torque q on rotor
    law = 3 N*m*s * rate
#         ^^^^^^^^^^^^^^ not-yet-computed
let late = t * 2
#          ^ unknown-name
`);
  });
});

describe("records", () => {
  const files = {
    "quay.csv": "t,x,z\n0,1,10\n0.1,2,20\n0.2,3,30\n",
    "values.csv": "1\n2\n3\n",
    "german.csv": "t;z\n0,0;1,5\n0,5;2,5\n",
    "bad.csv": "t,z\n0,1\n0.1,oops\n0.2,3\n0.2,4\n",
    "short.csv": "t,z\n0,1\n",
    "sub/deep.csv": "t,z\n0,1\n1,2\n",
  };
  const samples = (text: string) => {
    const { shape: of } = drive(`motion m of floor\n    ${text.replaceAll("\n", "\n    ")}`, files);
    return of.kind === "record" ? [[...of.samples.times], [...of.samples.values]] : undefined;
  };

  it("are read by name, by number, and by the first two columns", () => {
    expect(samples('record = "quay.csv"\nunit = mm')).toEqual([
      [0, 0.1, 0.2],
      [0.001, 0.002, 0.003],
    ]);
    expect(samples('record = "quay.csv"\ncolumn = "z"\nunit = m')?.[1]).toEqual([10, 20, 30]);
    expect(samples('record = "quay.csv"\ncolumn = z\nunit = m')?.[1]).toEqual([10, 20, 30]);
    expect(samples('record = "quay.csv"\ncolumn = 3\ntime_column = "t"\nunit = m\nscale = 2')?.[1]).toEqual([
      20, 40, 60,
    ]);
    expect(samples('record = "german.csv"\nunit = m/s^2')).toEqual([
      [0, 0.5],
      [1.5, 2.5],
    ]);
    expect(samples('record = "values.csv"\nsampled_at = 2 kHz\nunit = gn')?.[0]).toEqual([0, 0.0005, 0.001]);
    expect(samples('record = "sub/deep.csv"\nunit = m')?.[1]).toEqual([1, 2]);
  });

  it("are marked where they cannot be used", () => {
    const model = check(
      `${BASE}
motion m1 of floor
    record = "bad.csv"
#            ^^^^^^^^^ record-bad-row \`bad.csv\`, line 3: "oops" stands where a number was expected; 1 more row likewise
    unit = gn
motion m2 of floor
    record = "none.csv"
#            ^^^^^^^^^^ file-missing
    unit = gn
motion m3 of floor
    record = "quay.csv"
    column = "zz"
#            ^^^^ unknown-name \`quay.csv\` has no column "zz" for the value; it has "t", "x", "z"
    unit = gn
motion m4 of floor
    record = "quay.csv"
    unit = kg
#          ^^ unit-mismatch expected the unit of a displacement, a velocity or an acceleration
motion m9 of floor
    record = "quay.csv"
    unit = g
#          ^ gram-as-gravity g is gram; standard gravity is gn
motion m5 of floor
    record = "quay.csv"
    unit = mm/sec
#             ^^^ unknown-unit
motion m6 of floor
#      ^^ missing-detail needs \`unit\`
    record = "quay.csv"
motion m7 of floor
    record = "short.csv"
#            ^^^^^^^^^^^ record-bad-row holds 1 sample
    unit = gn
motion m8 of floor
    record = "quay.csv"
    unit = gn
    amplitude = 3 mm
#   ^^^^^^^^^ wrong-kind this motion is a record, and \`amplitude\` belongs to a steady sine
`,
      files,
    );
    expect(model.diagnostics[0].related).toHaveLength(2);
    expect(model.files).toContain("quay.csv");
  });

  it("keep their last reading while only the model changes", () => {
    const rows = Array.from({ length: 100_000 }, (_, i) => `${i / 1000},${i % 7}`).join("\n");
    const long = { "long.csv": `t,z\n${rows}` };
    const text = `${BASE}motion m of floor\n    record = "long.csv"\n    unit = gn\n`;
    const first = modelOf(text, long);
    const second = modelOf(`${text}# a comment\n`, long);
    expect(first.diagnostics).toEqual([]);
    expect(second.diagnostics).toEqual([]);
  });
});

describe("what a drive cannot be", () => {
  it("is marked", () => {
    check(
      `${BASE}
force f1 on rotor
#           ^^^^^ wrong-kind \`rotor\` turns, and a force acts on what slides
torque q1 on unit
#            ^^^^ wrong-kind \`unit\` slides, and a torque acts on what turns
force f2 on floor
#           ^^^^^ wrong-kind \`floor\` is a support, whose motion is given
force f3 on ground
#           ^^^^^^ wrong-kind
motion m1 of ground
#            ^^^^^^ wrong-kind ground stands still
motion m2 of unit
#            ^^^^ wrong-kind \`unit\` moves by itself
force f4 on unit
    pulse = half_sine
    amplitude = 3 N
#   ^^^^^^^^^ wrong-kind this force is a pulse, and \`amplitude\` belongs to a steady sine
force f5 on unit
#     ^^ missing-detail \`force f5\` needs \`duration\`
    pulse = half_sine
    peak = 3 N
force f6 on unit
    amplitude = 3 N
    frequency = 3 Hz
    speed = 4 Hz
#   ^^^^^ wrong-kind \`speed\` and \`frequency\` both say how fast it is
force f7 on unit
    unbalance = 3 kg*m
    frequency = 12 Hz
#   ^^^^^^^^^ wrong-kind this force is a rotating unbalance
force f8 on unit
    amplitude = 3 N
    frequency = 12 Hz to 3 Hz
#               ^^^^^^^^^^^^^ wrong-kind the range runs from 12 Hz to 3 Hz
force f9 on unit
    pulse = half_sine
    peak = 3 N
    duration = 1 s
    rise = 1 ms
#   ^^^^ wrong-kind \`rise\` belongs to a trapezoid
force f10 on unit
    pulse = trapezoid
#   ^^^^^ not-positive rise and fall take 2 s together, and the pulse lasts 1 s
    peak = 3 N
    duration = 1 s
    rise = 1 s
    fall = 1 s
force f11 on unit
    amplitude = 3 N
    frequency = -3 Hz
#               ^^^^^ not-positive \`frequency\` is to be above zero, found -3 Hz
motion m3 of floor
    amplitude = 20 g
#                  ^ gram-as-gravity \`g\`
motion m4 of floor
    amplitude = 3 kg
#               ^^^^ unit-mismatch expected a displacement, a velocity or an acceleration
force f12 on unit
    density = 3 N
#   ^^^^^^^ not-yet-computed
force f13 on unit
    chirp = 3 Hz
#           ^^^^ wrong-kind \`chirp\` takes two rates
    amplitude = 3 N
    lasting = 3 s
`.replace(" gram-as-gravity `g`", " gram-as-gravity g is gram"),
    );
  });

  it("has fixes where one is plain", () => {
    expect(fixed(`${BASE}force f on rotor`, "Write `torque`")).toContain("torque f on rotor");
    expect(fixed(`${BASE}motion m of floor\n    amplitude = 20 g`, "Write `20 gn`")).toContain(
      "amplitude = 20 gn",
    );
    expect(codesOf(`${BASE}force f on unit\n    impulse = 3 N`)).toEqual(["unit-mismatch"]);
    expect(codesOf(`${BASE}motion m of floor\n    impulse = 3 N*s`)).toEqual(["unknown-detail"]);
  });
});
