import { describe, expect, it } from "vitest";
import { codeActions, type OfferedAction } from "../../shared-core/features/fixes.ts";
import type { View } from "../../shared-core/features/view.ts";
import { cursorIn, edited, errorsOf, frequenciesOf, viewOf } from "./views.ts";

interface Done {
  readonly text: string;
  readonly action: OfferedAction;
}

const actionsAt = (view: View, offset: number): readonly OfferedAction[] =>
  codeActions(view, { start: offset, end: offset }, view.report?.diagnostics ?? view.model.diagnostics);

/**
 * The text after the action whose title holds some words, or why it is refused. The result has no new error, and a
 * safe action leaves the natural frequencies as they were, to rounding.
 */
function done(marked: string, words: string | RegExp, judged = false): Done | string {
  const { text, offset } = cursorIn(marked);
  const view = viewOf(text, { judged });
  const all = actionsAt(view, offset);
  const action = all.find(({ title }) =>
    typeof words === "string" ? title.includes(words) : words.test(title),
  );
  if (!action) throw new Error(`no action ${words} among: ${all.map(({ title }) => title).join("; ")}`);
  if (action.disabled) return action.disabled;
  const after = edited(text, action.edits);
  const before = errorsOf(text);
  expect(errorsOf(after).filter((each) => !before.includes(each))).toEqual([]);
  if (action.safe && view.model.buildable) {
    const [old, now] = [frequenciesOf(text), frequenciesOf(after)];
    expect(now).toHaveLength(old.length);
    now.forEach((frequency, i) => {
      expect(Math.abs(frequency - old[i])).toBeLessThanOrEqual(1e-9 * old[i]);
    });
  }
  return { text: after, action };
}

const textAfter = (marked: string, words: string | RegExp, judged = false): string => {
  const result = done(marked, words, judged);
  return typeof result === "string" ? `refused: ${result}` : result.text;
};

/** Titles offered at the cursor. */
function titles(marked: string, judged = false): string[] {
  const { text, offset } = cursorIn(marked);
  return actionsAt(viewOf(text, { judged }), offset).map(({ title }) => title);
}

describe("naming a literal", () => {
  it.each<[string, string]>([
    [
      "let a = 1\n\nmass unit = 42|0 kg +/- 3 %  # weighed\n",
      "let a = 1\nlet unit_mass = 420 kg\n\nmass unit = unit_mass +/- 3 %  # weighed\n",
    ],
    [
      'thrum 1\ntitle "x"\nmass unit = 3 kg\nspring s between unit and ground = 2 * 26.5 N/m|m\n',
      'thrum 1\ntitle "x"\nlet stiffness = 26.5 N/mm\n\nmass unit = 3 kg\nspring s between unit and ground = 2 * stiffness\n',
    ],
    [
      "let mass_2 = 1 kg\r\nlet mass_3 = mass_2 + 4| kg\r\n> µ²°𐐀\r\nmass u = mass_3\r\n",
      "let mass_2 = 1 kg\r\nlet mass_3 = mass_2 + mass\r\nlet mass = 4 kg\r\n> µ²°𐐀\r\nmass u = mass_3\r\n",
    ],
    [
      "mass u = 3 kg\nspring s between u and ground = 4 N/mm\n    loss_factor = 3| %\n",
      "let s_loss_factor = 3 %\n\nmass u = 3 kg\nspring s between u and ground = 4 N/mm\n    loss_factor = s_loss_factor\n",
    ],
    ["let u_mass = 2\nmass u = 3| kg\n", "let u_mass = 2\nlet u_mass_2 = 3 kg\nmass u = u_mass_2\n"],
    [
      "mass u = 3 kg\n    starts_at = -4| mm\n",
      "let length = 4 mm\n\nmass u = 3 kg\n    starts_at = -length\n",
    ],
  ])("%j", (marked, expected) => {
    expect(textAfter(marked, "with `let")).toBe(expected);
  });

  it.each<[string, string]>([
    ["limit a\n    rows =\n        2| Hz  3 mm/s\n", "rows hold numbers, never names"],
    [
      "body b = 2 t\n    inertia = (31|0, 840, 760) kg*m^2\n",
      "its unit stands behind the parenthesis, for all of them",
    ],
    ["let w = 2| * pi * 3 Hz\n", "it makes the angular rate of 2 * pi * rate, which a name would not"],
    ["let a = (3 mm)^2|\n", "the unit of the result depends on an exponent, so it is a plain number"],
    [
      "let a = 3.2 +/- 5| %\n",
      "a tolerance in % is a share of its value; by a name it could be read as a number beside it",
    ],
    ["expect a = 1 <= 2\n    tolerance = 99| %\n", "`tolerance` takes no name"],
    ["let w = 3 mm + 0|\n", "the number 0 fits any dimension, a name would fit one"],
  ])("refuses %j", (marked, reason) => {
    expect(textAfter(marked, "with `let")).toBe(`refused: ${reason}`);
  });

  it("is not offered where the number has a name", () => {
    expect(titles("let a = 3| kg\n").filter((each) => each.includes("`let"))).toEqual([]);
  });
});

const ON_FEET = (let_: string, spring: string): string =>
  `${let_}\nmass unit = 420 kg\nspring s between unit and ground = ${spring}\n`;

describe("putting a number in the place of its name", () => {
  it.each<[string, string]>([
    [
      ON_FEET("let k| = 26.5 N/mm +/- 10 % within 20 N/mm to 30 N/mm", "k"),
      "mass unit = 420 kg\nspring s between unit and ground = 26.5 N/mm +/- 10 % within 20 N/mm to 30 N/mm\n",
    ],
    [
      ON_FEET("let k| = 26.5 N/mm", "2*k"),
      "mass unit = 420 kg\nspring s between unit and ground = 2*(26.5 N/mm)\n",
    ],
    [
      ON_FEET("let k| = 1 N/mm + 2 N/mm", "4 * k + 1 N/mm"),
      "mass unit = 420 kg\nspring s between unit and ground = 4 * (1 N/mm + 2 N/mm) + 1 N/mm\n",
    ],
    [
      ON_FEET("let k| = 26.5 N/mm", "1 N/mm + k"),
      "mass unit = 420 kg\nspring s between unit and ground = 1 N/mm + 26.5 N/mm\n",
    ],
    [
      ON_FEET("let n| = 3", "n * 2 N/mm"),
      "mass unit = 420 kg\nspring s between unit and ground = 3 * 2 N/mm\n",
    ],
    [
      ON_FEET("let l| = 2 mm", "1 N*mm / l^2"),
      "mass unit = 420 kg\nspring s between unit and ground = 1 N*mm / (2 mm)^2\n",
    ],
    [
      "> weighed\n> source: ticket 0417\nlet m| = 420 kg  # nett\n\n> on feet\nmass unit = m\nspring s between unit and ground = 3 N/mm\n",
      "# nett\n\n> on feet\n> weighed\n> source: ticket 0417\nmass unit = 420 kg\nspring s between unit and ground = 3 N/mm\n",
    ],
    [
      "> handbook\r\nlet loss| = 3 %\r\nmass u = 3 kg\r\nspring s between u and ground = 4 N/mm\r\n    loss_factor = loss\r\n",
      "mass u = 3 kg\r\nspring s between u and ground = 4 N/mm\r\n    > handbook\r\n    loss_factor = 3 %\r\n",
    ],
  ])("%j", (marked, expected) => {
    expect(textAfter(marked, "in its place")).toBe(expected);
  });

  it("keeps the angular rate of 2 * pi * rate", () => {
    const text = "let f| = 12 Hz\nmass u = 3 kg\nspring s between u and ground = 3 kg * (2*pi*f)^2\n";
    expect(textAfter(text, "in its place")).toBe(
      "mass u = 3 kg\nspring s between u and ground = 3 kg * (2*pi*(12 Hz))^2\n",
    );
  });

  it("takes the last blank line that would be left over", () => {
    expect(textAfter("let a = 1 kg\n\nlet b| = 2 kg\n\nmass u = a + b\n", "in its place")).toBe(
      "let a = 1 kg\n\nmass u = a + 2 kg\n",
    );
  });

  const TOL = "let k| = 26.5 N/mm +/- 10 %";
  it.each<[string, RegExp]>([
    [`${ON_FEET(TOL, "k")}spring two between unit and ground = k\n`, /one draw for 2 places/],
    [ON_FEET(TOL, "2 * k"), /cannot stand inside the expression of `spring s`/],
    [`${ON_FEET(TOL, "k")}    count = 4\n`, /one draw for all of `s`/],
    [ON_FEET(TOL, "k +/- 3 %"), /has a tolerance or range of its own/],
    [
      `${ON_FEET("let k| = 26.5 N/mm", "k")}case soft\n    k = 20 N/mm\n`,
      /`case soft` speaks of `k` by its name/,
    ],
    [
      `${ON_FEET("let k| = 2 N/mm", "k")}expect a = sensitivity(natural_frequency(1), k) <= 1\n`,
      /`expect a` speaks of `k`/,
    ],
    ["let a| = 5 %\nlet b = 3.2 +/- a\n", /a tolerance of `let b` is written with it/],
    ["let k| = 26.5 N/mm\n", /nothing uses `k`/],
    [
      `${ON_FEET("let k| = 2 N/mm", "k")}spring t between unit and ground = k\n`,
      /line 4 cannot be read, and it holds `k`/,
    ],
  ])("refuses %j", (marked, reason) => {
    expect(textAfter(marked, "in its place")).toMatch(reason);
  });

  it("refuses what other files use", () => {
    const { text, offset } = cursorIn("let foot| = 48 N/mm\n");
    const files = {
      "pier/fan.thrum": 'use "pump.thrum"\nmass fan = 1 kg\nspring m between fan and ground = foot\n',
    };
    const [action] = actionsAt(viewOf(text, { files }), offset).filter(({ title }) =>
      title.includes("in its place"),
    );
    expect(action.disabled).toBe("`pier/fan.thrum` uses `foot` too");
  });
});

const TWO = (first: string, second: string, rest = ""): string =>
  `mass unit = 420 kg\nmass slab = 9 t\n${first}\n${second}\nspring base between slab and ground = 11 MN/m\n${rest}`;

describe("springs side by side", () => {
  it("merges unlike ones with the sum shown, turned round or not", () => {
    const text = TWO(
      "spring a| between unit and slab = 300 N/m",
      "spring b between slab and unit = 600 N/m\n    count = 2",
    );
    const result = done(text, "Merge") as Done;
    expect(result.action.title).toBe("Merge `b` into `a`: 300 N/m + 1200 N/m = 1500 N/m");
    expect(result.text).toBe(
      TWO("spring a between unit and slab = parallel(300 N/m, 2 * 600 N/m)", "").replace("\n\n", "\n"),
    );
  });

  it("merges like ones into a count, tolerance and details kept", () => {
    const one = "= 300 N/m +/- 10 %\n    loss_factor = 3 %";
    const text = TWO(`spring a between unit and slab ${one}`, `spring b| between unit and slab ${one}`);
    expect(textAfter(text, "Merge")).toBe(
      TWO(
        "spring a between unit and slab = 300 N/m +/- 10 %\n    count = 2\n    loss_factor = 3 %",
        "",
      ).replace("\n\n", "\n"),
    );
  });

  it.each<[string, RegExp]>([
    [
      TWO("spring a| between unit and slab = 300 N/m +/- 5 %", "spring b between unit and slab = 2 N/m"),
      /a draw of its own/,
    ],
    [
      TWO(
        "spring a| between unit and slab = 300 N/m",
        "spring b between unit and slab = 2 N/m\n    loss_factor = 1 %",
      ),
      /details are not alike/,
    ],
    [
      TWO(
        "spring a| between unit and slab = 300 N/m",
        "spring b between unit and slab = 2 N/m",
        "group feet = a, b\n",
      ),
      /`group feet` names `a`/,
    ],
    [
      TWO("spring a| between unit and slab = 300 N/m", "> new\nspring b between unit and slab = 2 N/m"),
      /`b` has notes/,
    ],
    [
      TWO(
        "spring a| between unit and slab = 300 N/m",
        "spring b between unit and slab = 2 N/m\n    preload = 1 N",
      ),
      /`b` has `preload`/,
    ],
  ])("refuses %j", (text, reason) => {
    expect(textAfter(text, "Merge")).toMatch(reason);
  });

  it("splits a sum, a call and a count, the name going to their group", () => {
    const base =
      "mass u = 3 kg\n> two kinds\nspring s| between u and ground = VALUE  # rubber\n    loss_factor = 3 %\nask sweep\n    of = s.force\n    from = 1 Hz\n    to = 9 Hz\nforce f on u\n";
    expect(textAfter(base.replace("VALUE", "parallel(1 N/mm, 2 N/mm)"), "Split")).toBe(
      base.replace(
        "spring s| between u and ground = VALUE  # rubber\n    loss_factor = 3 %\n",
        "spring s_1 between u and ground = 1 N/mm\n    loss_factor = 3 %\nspring s_2 between u and ground = 2 N/mm\n    loss_factor = 3 %\ngroup s = s_1, s_2\n# rubber\n",
      ),
    );
    expect(textAfter(base.replace("VALUE", "1 N/mm + 2 N/mm"), "Split")).toContain(
      "spring s_2 between u and ground = 2 N/mm",
    );
    expect(
      textAfter("mass u = 3 kg\nspring s| between u and ground = 2 N/mm +/- 5 %\n    count = 3\n", "Split"),
    ).toBe(
      "mass u = 3 kg\n" +
        [1, 2, 3].map((n) => `spring s_${n} between u and ground = 2 N/mm +/- 5 %\n`).join(""),
    );
  });
});

describe("a spring in a group", () => {
  it("is split in the group too", () => {
    const text = `mass u = 3 kg
spring s| between u and ground = 2 N/mm
    count = 2
damper d between u and ground = 2 N*s/m
group feet = s, d
`;
    expect(textAfter(text, "Split")).toContain("group feet = s_1, s_2, d\n");
    expect(textAfter(text, "Split")).not.toContain("group s =");
  });
});

describe("springs one behind the other", () => {
  const CHAIN = (details = "", rest = ""): string =>
    `mass u = 3 kg\njunction middle\nspring upper between u and middle = 300 N/m\n${details}spring low|er between middle and ground = 600 N/m\n${details}${rest}`;

  it("merges them over their junction, with the sum shown", () => {
    const result = done(CHAIN("    loss_factor = 3 %\n"), "Merge") as Done;
    expect(result.action.title).toBe(
      "Merge `lower` behind `upper`: 1 / (1 / 300 N/m + 1 / 600 N/m) = 200 N/m",
    );
    expect(result.text).toBe(
      "mass u = 3 kg\nspring upper between u and ground = series(300 N/m, 600 N/m)\n    loss_factor = 3 %\n",
    );
  });

  it.each<[string, RegExp]>([
    [CHAIN("", "damper d between middle and ground = 3 N*s/m\n"), /`damper d` names `middle`/],
    [CHAIN("", "expect a = static_force(upper) <= 3 N\n"), /`expect a` names `upper`/],
    [CHAIN().replace("600 N/m", "600 N/m +/- 3 %"), /a draw of its own/],
  ])("refuses %j", (text, reason) => {
    expect(textAfter(text, "Merge")).toMatch(reason);
  });

  it("splits `series` over new junctions, also for what turns", () => {
    expect(
      textAfter(
        "mass u = 3 kg\nspring s| between u and ground = series(300 N/m, 600 N/m)\n    loss_factor = 2 %\n",
        "Split",
      ),
    ).toBe(
      "mass u = 3 kg\njunction s_joint\nspring s_1 between u and s_joint = 300 N/m\n    loss_factor = 2 %\nspring s_2 between s_joint and ground = 600 N/m\n    loss_factor = 2 %\n",
    );
    const turning = textAfter(
      "inertia u = 3 kg*m^2\nspring s| between u and ground = series(3 N*m/rad, 6 N*m/rad, 6 N*m/rad)\n",
      "Split",
    );
    expect(turning).toContain("junction s_joint_2\n    kind = turning\n");
  });
});

describe("damping", () => {
  const SPRING =
    "let k = 30 N/mm +/- 5 %\nmass u = 300 kg\nspring s| between u and ground = k\n    count = 4\n    damping_ratio = 5 % at 12 Hz\n";
  const ratioOf = (text: string): number => {
    const view = viewOf(text, { judged: true });
    const modes = view.report?.cases[0].modes;
    return modes?.ok ? (modes.table.modes[0].dampingRatio ?? 0) : 0;
  };

  it("writes a ratio as a damper, and the mode is damped as before", () => {
    const after = textAfter(SPRING, "as a damper");
    expect(after).toBe(
      "let k = 30 N/mm +/- 5 %\nmass u = 300 kg\nspring s between u and ground = k\n    count = 4\ndamper s_damping between u and ground = 2 * 5 % * k / (2 * pi * 12 Hz)\n    count = 4\n",
    );
    const before = ratioOf(cursorIn(SPRING).text);
    expect(before).toBeGreaterThan(0.01);
    expect(Math.abs(ratioOf(after) / before - 1)).toBeLessThan(1e-12);
  });

  it("and back, with the ratio at the mode that strains the spring", () => {
    const text = textAfter(SPRING, "as a damper").replace("damper s_damping", "damper s_damp|ing");
    const result = done(text, "as the damping ratio", true) as Done;
    // c = 2 zeta k / omega: the ratio grows with the frequency it is given at, here sqrt(4 k / m) / (2 pi) = 3.18 Hz.
    expect(result.text).toBe(
      "let k = 30 N/mm +/- 5 %\nmass u = 300 kg\nspring s between u and ground = k\n    count = 4\n    damping_ratio = 1.325 % at 3.18 Hz\n",
    );
    expect(Math.abs(ratioOf(result.text) / ratioOf(cursorIn(text).text) - 1)).toBeLessThan(1e-6);
  });

  it.each<[string, string, RegExp]>([
    [SPRING.replace("= k", "= k +/- 3 %"), "as a damper", /give the number a `let` first/],
    [`${SPRING}expect a = static_force(s) <= 3 N\n`, "as a damper", /`expect a` takes its force/],
    [
      "mass u = 3 kg\nspring s between u and ground = 3 N/m\ndamper d| between u and ground = 3 N*s/m\n",
      "as the damping ratio",
      /not computed yet/,
    ],
    [
      "mass u = 3 kg\nspring s between u and ground = 3 N/m +/- 5 %\ndamper d| between u and ground = 3 N*s/m\n",
      "as the damping ratio",
      /move with the tolerance/,
    ],
  ])("refuses %j: %s", (text, words, reason) => {
    expect(textAfter(text, words)).toMatch(reason);
  });

  it("adds a damper of 5 % across a spring", () => {
    const text =
      "mass u = 300 kg +/- 3 %\nspring s| between ground and u = 30 N/mm +/- 5 %  # rubber\n    count = 4\nask modes\n";
    const after = textAfter(text, "Add a damper");
    expect(after).toBe(
      "mass u = 300 kg +/- 3 %\nspring s between ground and u = 30 N/mm +/- 5 %  # rubber\n    count = 4\ndamper s_damper between ground and u = 0.05 * critical_damping(30 N/mm, 300 kg)\n    count = 4\nask modes\n",
    );
    // Four springs k and four dampers of 0.05 * 2 sqrt(k m): zeta = 4 * 0.05 * 2 sqrt(k m) / (2 sqrt(4 k m)) = 10 %.
    expect(ratioOf(after)).toBeCloseTo(0.1, 10);
    expect(
      titles(
        "mass u = 3 kg\nspring s| between u and ground = 3 N/m\ndamper d between u and ground = 1 N*s/m\n",
      ).filter((each) => each.includes("Add a damper")),
    ).toEqual([]);
  });

  it("adds one between things that turn", () => {
    const after = textAfter(
      "inertia u = 3 kg*m^2\nspring s| between u and ground = 30 N*m/rad\n",
      "Add a damper",
    );
    expect(after).toContain("= 0.05 * critical_damping(30 N*m/rad, 3 kg*m^2)");
  });
});

describe("an absorber", () => {
  it("splits the mode that it is made for, and its own damping does the rest", () => {
    const text = "mass unit| = 1 t\nspring s between unit and ground = 1 MN/m\nforce f on unit\n";
    const result = done(text, "Add an absorber", true) as Done;
    expect(result.action.title).toBe("Add an absorber on `unit` for mode 1 at 5.033 Hz");
    // Mass ratio 5 %: m = 50 kg; f = 5.033 Hz / 1.05; c = 2 sqrt(3 mu / (8 (1+mu)^3)) m omega, by hand.
    expect(result.text).toContain("mass unit_absorber = 50 kg\n");
    expect(result.text).toContain(
      "spring unit_absorber_spring between unit_absorber and unit = 45.35 kN/m\n",
    );
    expect(result.text).toContain(
      "damper unit_absorber_damper between unit_absorber and unit = 383.3 N*s/m\n",
    );
    const [low, high] = frequenciesOf(result.text);
    expect(low).toBeLessThan(5.033);
    expect(high).toBeGreaterThan(5.033);
    // Den Hartog: both peaks near sqrt(1 + 2/mu) times the static deflection, 6.4 here.
    const swept = `${result.text}ask sweep run\n    of = unit.displacement\n    from = 2 Hz\n    to = 9 Hz\n`;
    const peak = viewOf(swept, { judged: true }).report?.cases[0].answers.get("run");
    const value = peak?.ok ? [...peak.value.peaks.values()][0] : undefined;
    expect(value && "value" in value ? value.value * 1e6 : 0).toBeGreaterThan(6.2);
    expect(value && "value" in value ? value.value * 1e6 : 9).toBeLessThan(6.9);
  });

  it("waits for the modes, and leaves out modes in which the thing rests", () => {
    expect(
      textAfter("mass unit| = 1 t\nspring s between unit and ground = 1 MN/m\n", "Add an absorber"),
    ).toMatch(/not computed yet/);
    const two =
      "mass a| = 1 t\nspring s between a and ground = 1 MN/m\nmass b = 1 t\nspring t between b and ground = 9 MN/m\n";
    expect(titles(two, true).filter((each) => each.includes("absorber"))).toHaveLength(1);
  });
});

describe("today's answer as an expectation", () => {
  const MODEL =
    "mass unit = 420 kg\nspring s between unit and ground = 26.5 N/mm\n    loss_factor = 8 %\nforce f on unit\n    amplitude = 3 N\nASK\n\nexpect there = natural_frequency(1) <= 60 Hz\n";
  const verdicts = (text: string) =>
    viewOf(text, { judged: true }).report?.cases[0].verdicts.map(({ name, holds }) => `${name} ${holds}`);

  it("holds the natural frequencies", () => {
    const after = textAfter(MODEL.replace("ASK", "ask mo|des"), "natural_frequency(1)", true);
    // sqrt(26500 / 420) / (2 pi) = 1.2642 Hz, 3 % each way.
    expect(after).toContain("\nexpect mode_1_stays = 1.22 Hz <= natural_frequency(1) <= 1.31 Hz\n");
    expect(verdicts(after)).toEqual(["there true", "mode_1_stays.low true", "mode_1_stays.high true"]);
  });

  it.each(["sweep run", "sweep"])("holds the peaks of %s", (ask) => {
    const text = MODEL.replace(
      "ASK",
      `ask ${ask}|\n    of = unit.velocity, s.force\n    from = 0.5 Hz\n    to = 9 Hz`,
    );
    const after = textAfter(text, "unit.velocity", true);
    expect(verdicts(after)?.[1]).toMatch(/_unit_velocity true$/);
    expect(titles(text, true).filter((each) => each.startsWith("Expect peak("))).toHaveLength(2);
  });

  it("holds turning speeds and differences in their own units", () => {
    const text = `inertia a = 3 kg*m^2
inertia b = 2 kg*m^2
spring s between a and ground = 900 N*m/rad
    loss_factor = 8 %
spring u between a and b = 900 N*m/rad
    loss_factor = 8 %
torque f on b
    amplitude = 30 N*m
ask sweep| run
    of = a.speed, a.angle - b.angle
    from = 0.5 Hz
    to = 9 Hz
`;
    for (const quantity of ["a.speed", "a.angle - b.angle"]) {
      const after = textAfter(text, `Expect peak(run, ${quantity})`, true);
      expect(verdicts(after)).toEqual([expect.stringMatching(/ true$/)]);
      const value = viewOf(after, { judged: true }).report?.cases[0].verdicts[0];
      expect((value?.value ?? 0) / (value?.limit ?? 1)).toBeGreaterThan(0.98);
    }
  });

  it("waits for the answer", () => {
    expect(textAfter(MODEL.replace("ASK", "ask mo|des"), "Expect today's")).toMatch(/not computed yet/);
  });
});

describe("sorting and tidying", () => {
  it("puts families in order, each block with its comments and notes", () => {
    const text = `thrum 1
# heating
expect low = natural_frequency(1) <= 90 Hz
ask modes|
# the feet
> rubber
spring s between u and ground = k
    count = 2

let k = 3 N/mm
mass u = 3 kg
`;
    expect(textAfter(text, "Sort")).toBe(`thrum 1
let k = 3 N/mm

mass u = 3 kg

# the feet
> rubber
spring s between u and ground = k
    count = 2

ask modes

# heating
expect low = natural_frequency(1) <= 90 Hz
`);
    expect(textAfter(text.replaceAll("\n", "\r\n"), "Sort")).toBe(
      textAfter(text, "Sort").replaceAll("\n", "\r\n"),
    );
  });

  it("is not offered where all is sorted, and refused where a line cannot be read", () => {
    expect(titles("let a = 1\nmass u = 3 kg|\n").filter((each) => each.includes("Sort"))).toEqual([]);
    expect(textAfter("mass u = 3 kg|\nlet a = 1\nspring !\n", "Sort")).toBe("refused: line 3 cannot be read");
    expect(textAfter("mass u = 3 kg|\n> loose\n\nlet a = 1\n", "Sort")).toMatch(/loose note/);
  });

  it("tidies the layout and makes the safe fixes", () => {
    expect(
      textAfter("mass  u = 3 kg|\ncount = 3\nspring s between u and ground=3 N/mm\n    count 4\n", "Tidy"),
    ).toMatch(/^thrum 1\nmass u = 3 kg\n/);
    expect(
      textAfter("mass  u = 3 kg|\r\nspring s between u and ground=3 N/mm\r\n    count 4\r\n", "Tidy"),
    ).toBe("thrum 1\r\nmass u = 3 kg\r\nspring s between u and ground = 3 N/mm\r\n    count = 4\r\n");
  });
});
