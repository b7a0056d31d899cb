import { describe, expect, it } from "vitest";
import {
  expectedOf,
  FOUR_DIGITS,
  hoverAt,
  near,
  numberBehind,
  numberOf,
  referenceText,
  row,
  said,
  THREE_DIGITS,
  TWO_DIGITS,
  viewOf,
} from "./readout-view.ts";

/** What a hover shows of a number lies within the rounding of its digits. */
function shows(
  text: string,
  word: string,
  si: number,
  unit: string,
  factor: number,
  digits = FOUR_DIGITS,
): void {
  const found = numberBehind(text, word);
  expect(found.unit).toBe(unit);
  expect(near(found.value * factor, si, digits), `${found.value} ${unit} for ${si}`).toBe(true);
}

function cellIs(cell: string, expected: number, digits: number): void {
  const { value } = numberOf(cell);
  expect(near(value, expected, digits), `${cell} for ${expected}`).toBe(true);
}

describe("a hover on what moves", () => {
  // p01: one mass on one spring with a damper, closed form.
  const text = said(viewOf(referenceText("p01-sdof-basics")), "mass ^block");

  it("says its modes with frequency, damping ratio and share", () => {
    const [, frequency, damping, share] = row(text, "1");
    cellIs(frequency, expectedOf("p01-sdof-basics", "undamped natural frequency"), FOUR_DIGITS);
    cellIs(damping, 100 * expectedOf("p01-sdof-basics", "damping ratio"), THREE_DIGITS);
    expect(share).toBe("100 %");
  });

  it("says its frequency with everything else held still", () => {
    shows(text, "held still:", expectedOf("p01-sdof-basics", "undamped natural frequency"), "Hz", 1);
    // Chain of p22: the lowest mass lies between two springs, the top one hangs on one; sqrt(k/m) / 2 pi.
    const chain = viewOf(referenceText("p22-effective-modal-mass"));
    shows(said(chain, "mass ^low"), "held still:", Math.sqrt(1200) / (2 * Math.PI), "Hz", 1);
    shows(said(chain, "mass ^top"), "held still:", Math.sqrt(600) / (2 * Math.PI), "Hz", 1);
  });

  it("says what share of each mode's motion is its own, the largest first", () => {
    // Equal chain, fixed at one end: x_j = sin(j (2r - 1) pi / 7), and the squares of a mode add up to 7/4.
    const text = said(viewOf(referenceText("p22-effective-modal-mass")), "mass ^top");
    const share = (mode: number) => (100 * Math.sin((3 * (2 * mode - 1) * Math.PI) / 7) ** 2) / 1.75;
    for (const mode of [1, 2, 3]) cellIs(row(text, String(mode))[3], share(mode), TWO_DIGITS);
    expect(text.match(/^ +\d /gm)?.map((line) => line.trim())).toEqual(["1", "2", "3"]);
  });

  it("says how far it sinks under gravity", () => {
    // p13: 250 lbf on 1800 lbf/in.
    const inch = viewOf(referenceText("p13-imperial-units"), { units: "inch" });
    const sag = expectedOf("p13-imperial-units", "static deflection");
    shows(said(inch, "mass ^block"), "static deflection under gravity:", sag, "in", 0.0254);
    const si = viewOf(referenceText("p13-imperial-units"), { units: "si" });
    shows(said(si, "mass ^block"), "static deflection under gravity:", sag, "mm", 1e-3);
  });

  it("says what holds nothing", () => {
    // p16: two masses joined by one spring and to nothing else.
    const text = said(viewOf(referenceText("p16-free-free-two-mass")), "mass ^a");
    expect(text).toContain("no static deflection: no spring holds");
  });

  it("says the modes of what turns, and no deflection", () => {
    const text = said(viewOf(referenceText("p33-geared-shafts", "b")), "inertia ^disc_1");
    cellIs(row(text, "1")[1], expectedOf("p33-geared-shafts", "(b) frequency 1"), FOUR_DIGITS);
    expect(text).not.toContain("deflection");
  });

  it("says amplitudes where there is no mass", () => {
    const text = said(viewOf(referenceText("p28-zener-mount", "a")), "junction ^joint");
    expect(text).toContain("amplitude");
    expect(text).not.toContain("held still");
  });
});

describe("a hover on what joins", () => {
  it("says its share of each mode's strain energy", () => {
    // Equal chain as above: the travel of spring j is proportional to cos((2j - 1)(2r - 1) pi / 14).
    const text = said(viewOf(referenceText("p22-effective-modal-mass")), "spring ^storey_1");
    const share = (mode: number) => Math.cos(((2 * mode - 1) * Math.PI) / 14) ** 2 / 1.75;
    for (const mode of [1, 2, 3]) {
      const [, frequency, part, move] = row(text, String(mode));
      cellIs(frequency, expectedOf("p22-effective-modal-mass", `mode ${mode} frequency`), FOUR_DIGITS);
      cellIs(part, 100 * share(mode), TWO_DIGITS);
      // A tenth more stiffness is a twentieth of its energy share in frequency, to first order.
      cellIs(move.split("(")[1], 5 * share(mode), TWO_DIGITS);
    }
  });

  it("says what it carries at rest, together and each", () => {
    const text = said(
      viewOf("thrum 1\nmass pump = 310 kg\nspring feet between pump and ground = 62 N/mm\n    count = 4\n"),
      "spring ^feet",
    );
    expect(text.split("\n")[0]).toBe("spring feet · 4 of 62 N/mm, 248 N/mm together");
    shows(text, "static load under gravity:", 310 * 9.80665, "kN", 1000);
    shows(text, "kN, ", (310 * 9.80665) / 4, "N", 1);
    shows(text, "travel", (310 * 9.80665) / 248e3, "mm", 1e-3);
  });

  it("says its peak travel and force in a sweep", () => {
    // p12: rotating unbalance, largest displacement and its speed; the force is k times the travel.
    const text = said(viewOf(referenceText("p12-rotating-unbalance"), { units: "si" }), "spring ^coil");
    const most = expectedOf("p12-rotating-unbalance", "largest displacement");
    shows(text, "`run`: travel up to", most, "m", 1);
    shows(text, " at", expectedOf("p12-rotating-unbalance", "speed of the largest displacement"), "Hz", 1);
    shows(text, "force up to", 1000 * most, "kN", 1000);
  });

  it("says its peak travel and force in a history", () => {
    // p05: step response.
    const text = said(viewOf(referenceText("p05-step-overshoot"), { units: "si" }), "spring ^coil");
    const most = expectedOf("p05-step-overshoot", "peak displacement");
    shows(text, "`sudden`: travel up to", most, "mm", 1e-3);
    shows(text, " at", expectedOf("p05-step-overshoot", "time of the peak"), "ms", 1e-3);
    shows(text, "force up to", 20_000 * most, "N", 1);
  });

  it("takes the force of a lossy spring from its complex stiffness", () => {
    // One oscillator with k (1 + i eta), r = f / f0: largest |x| = F / (k eta), where r = 1; |force| = k sqrt(1 + eta^2) |x|.
    const text = said(viewOf(referenceText("p09-structural-damping"), { units: "si" }), "spring ^coil");
    const most = expectedOf("p09-structural-damping", "amplitude at the natural frequency");
    shows(text, "travel up to", most, "mm", 1e-3);
    shows(text, "force up to", 1e5 * Math.hypot(1, 0.08) * most, "N", 1);
  });

  it("says what a damper gives to each mode", () => {
    const [, , given, more] = row(said(viewOf(referenceText("p01-sdof-basics")), "damper ^pot"), "1");
    const ratio = 100 * expectedOf("p01-sdof-basics", "damping ratio");
    cellIs(given, ratio, THREE_DIGITS);
    cellIs(more, ratio / 10, THREE_DIGITS);
  });

  it("follows the inertance of an inerter", () => {
    // p30: f = sqrt(k / (m + b)) / 2 pi with m = 5 kg, b = 1 kg: a tenth of b is 0.1/6 of the inertia, half of it in f.
    const [, frequency, , move] = row(said(viewOf(referenceText("p30-inerter")), "inerter ^flywheel"), "1");
    cellIs(frequency, expectedOf("p30-inerter", "natural frequency"), FOUR_DIGITS);
    cellIs(move.split("(")[1], (-100 * 0.1) / 6 / 2, TWO_DIGITS);
  });

  it("sums the members of a group", () => {
    // p10: springs and dampers of one machine; at rest the springs carry all of it.
    const text = said(
      viewOf(referenceText("p10-force-transmissibility"), { units: "si" }),
      "group ^isolation",
    );
    shows(text, "static load under gravity:", 100 * 9.80665, "N", 1);
    const [, , share, move] = row(text, "1");
    expect(share).toBe("100 %");
    cellIs(move.split("(")[1], 5, TWO_DIGITS);
    // Largest force passed on: transmissibility peak of any textbook, r^2 = (sqrt(1 + 8 z^2) - 1) / (4 z^2).
    const z = 0.2;
    const r2 = (Math.sqrt(1 + 8 * z * z) - 1) / (4 * z * z);
    const most = Math.sqrt((1 + 4 * z * z * r2) / ((1 - r2) ** 2 + 4 * z * z * r2));
    shows(text, "force up to", 400 * most, "kN", 1000);
  });
});

describe("a hover on a number", () => {
  it("says it as written and in SI, its band and its range", () => {
    const text = said(
      viewOf(
        "thrum 1\nlet foot = 26.5 N/mm +/- 10 % within 20 N/mm to 30 N/mm\nmass a = 420 kg\nspring s between a and ground = foot\n",
      ),
      "let ^foot",
    );
    expect(text).toContain("26.5 N/mm = 26.5 kN/m = 151.3 lbf/in");
    expect(text).toContain("tolerance: 23.85 N/mm to 29.15 N/mm (±10 %)");
    expect(text).toContain("may move within 20 N/mm to 30 N/mm");
    expect(text).toContain("used by `s`");
  });

  it("shows an expression as it is written, and its value", () => {
    const text = said(
      viewOf(
        "thrum 1\nlet foot = 48 N/mm\nlet feet = 4 * foot\nmass a = 420 kg\nspring s between a and ground = feet\n",
      ),
      "let ^feet",
    );
    expect(text).toContain("192 N/mm = 192 kN/m");
    expect(text).toContain("written: `4 * foot`");
  });

  it.each([
    ["k", "sensitivity d f/d k", 1000],
    ["m", "sensitivity d f/d m", 0.4],
  ])("says how far a tenth more of %s moves the natural frequencies", (name, quantity, change) => {
    const [, , move] = row(said(viewOf(referenceText("p68-tolerance-one-mass")), `let ^${name}`), "1");
    const { value, unit } = numberOf(move);
    expect(unit).toBe("Hz");
    const expected = expectedOf("p68-tolerance-one-mass", quantity) * change;
    expect(near(value, expected, THREE_DIGITS), `${move} for ${expected}`).toBe(true);
  });

  it.each(["k1", "k2", "k3", "m1", "m2"])("says it for %s of two masses", (name) => {
    const text = said(viewOf(referenceText("p69-tolerance-two-mass")), `let ^${name}`);
    for (const mode of [1, 2]) {
      const springs = name.startsWith("k") ? `(${name}/f) df/d${name}` : `to ${name}`;
      const relative = expectedOf("p69-tolerance-two-mass", `mode ${mode}: relative sensitivity ${springs}`);
      cellIs(row(text, String(mode))[2].split("(")[1], 10 * relative, TWO_DIGITS);
    }
  });

  it("follows a number into the factors of a bind", () => {
    // A lever: tip = r * heel, spring under the tip: f = r sqrt(k / m) / 2 pi, so r moves it in proportion.
    const text = said(
      viewOf(
        "thrum 1\nlet r = 3\nmass heel = 2 kg\njunction tip\nbind tip = r * heel\nspring s between tip and ground = 500 N/m\n",
      ),
      "let ^r",
    );
    const [, frequency, move] = row(text, "1");
    cellIs(frequency, (3 * Math.sqrt(250)) / (2 * Math.PI), FOUR_DIGITS);
    cellIs(move.split("(")[1], 10, TWO_DIGITS);
  });

  it("says what it matters most to, what it moves not, and where it is used", () => {
    const view = viewOf(
      "thrum 1\nlet m = 2 kg\nlet k = 800 N/m\nlet limit_rate = 300 rpm\nmass a = m\nspring s between a and ground = k\nexpect slow = natural_frequency(1) <= limit_rate\n",
    );
    expect(said(view, "let ^limit_rate")).toContain("it moves no natural frequency");
    expect(said(view, "let ^limit_rate")).toContain("used by `slow`");
    const both = [said(view, "let ^m"), said(view, "let ^k")].filter((text) =>
      text.includes("it matters most to `slow`"),
    );
    expect(both).toHaveLength(1);
  });

  it("says what each case makes of it", () => {
    const view = viewOf(
      "thrum 1\nlet load = 2 kg\nmass a = load + 1 kg\nspring s between a and ground = 800 N/m\ncase full\n    load = 11 kg\n",
    );
    expect(said(view, "let ^load")).toContain("case `full`: 11 kg");
    expect(said(view, "    ^load = 11")).toContain("let load");
  });

  it("names the file it comes from and those that use it", () => {
    const files = { "parts.thrum": "thrum 1\n> source: rubber sheet 4\nlet foot = 30 N/mm\n" };
    const using = 'thrum 1\nuse "parts.thrum"\nmass a = 9 kg\nspring s between a and ground = foot\n';
    const text = said(viewOf(using, { files }), "= ^foot");
    expect(text).toContain("from `parts.thrum`");
    expect(text).toContain("> source: rubber sheet 4");
  });
});

describe("a hover on a drive", () => {
  it("sets its frequency against the nearest modes", () => {
    const text = said(viewOf(referenceText("p10-force-transmissibility")), "force ^shake");
    const [, , ratio, separation, amplification, excites] = row(text, "1");
    const expected = expectedOf("p10-force-transmissibility", "frequency ratio");
    cellIs(ratio, expected, THREE_DIGITS);
    cellIs(separation, 100 * (expected - 1), THREE_DIGITS);
    // Displacement amplitude over F/k.
    const times = expectedOf("p10-force-transmissibility", "displacement amplitude") / (400 / 784_000);
    cellIs(amplification, times, TWO_DIGITS);
    expect(excites).toBe("yes");
  });

  it("says the amplitude of an unbalance at its speed", () => {
    const text = said(viewOf(referenceText("p12-rotating-unbalance"), { units: "si" }), "force ^imbalance");
    shows(
      text,
      "its amplitude at 5 Hz:",
      expectedOf("p12-rotating-unbalance", "rotating force amplitude m0 e W^2"),
      "kN",
      1000,
    );
  });

  it("tells a mode on whose node it pushes", () => {
    // Two equal masses, three equal springs: in the second mode the middle of the pair stands still.
    const text = said(
      viewOf(
        "thrum 1\nmass a = 1 kg\nmass b = 1 kg\njunction middle\nbind middle = 0.5 * a + 0.5 * b\nspring l between a and ground = 100 N/m\nspring m between a and b = 100 N/m\nspring r between b and ground = 100 N/m\nforce shake on middle\n    amplitude = 1 N\n    frequency = 2 Hz\n",
      ),
      "force ^shake",
    );
    expect(row(text, "1")[5]).toBe("yes");
    expect(row(text, "2")[5]).toBe("no");
  });

  it("takes the nearest end of a range, and says what has no frequency", () => {
    const base = "thrum 1\nmass a = 1 kg\nspring s between a and ground = 3947.84176 N/m\nforce f on a\n";
    const [, frequency, ratio, separation] = row(
      said(viewOf(`${base}    amplitude = 1 N\n    frequency = 12 Hz to 20 Hz\n`), "force ^f"),
      "1",
    );
    // k = (2 pi 10 Hz)^2 m.
    expect([frequency, ratio, separation]).toEqual(["10 Hz", "1.2", "20 %"]);
    expect(said(viewOf(`${base}    step = 3 N\n`), "force ^f")).toContain("it has no one frequency");
  });
});

describe("a hover on an ask", () => {
  it("says the answer and draws it", () => {
    const view = viewOf(referenceText("p08-resonance-peak-bandwidth"), { units: "si" });
    const found = hoverAt(view, "sweep ^run");
    const text = found?.text ?? "";
    // F / k with F = 10 N, k = (2 pi 12 Hz)^2 4 kg.
    const most = expectedOf("p08-resonance-peak-bandwidth", "peak displacement magnification");
    shows(text, "`block.displacement`: up to", (most * 10) / (4 * (2 * Math.PI * 12) ** 2), "mm", 1e-3);
    shows(
      text,
      " at",
      expectedOf("p08-resonance-peak-bandwidth", "displacement-resonance frequency"),
      "Hz",
      1,
    );
    expect(text).toMatch(/[\u2801-\u28ff]/);
    expect(text).not.toContain("base64");
    const picture =
      /!\[[^\]]+\]\(data:image\/svg\+xml;base64,([A-Za-z0-9+/=]+)\)/.exec(found?.markdown ?? "")?.[1] ?? "";
    expect(picture.length).toBeLessThanOrEqual(10_000);
    const svg = Buffer.from(picture, "base64").toString();
    expect(svg).toMatch(/^<svg xmlns="http:\/\/www.w3.org\/2000\/svg".*<path d="M.*<\/svg>\n$/s);
  });

  it("keeps its picture small, whatever the answer holds", () => {
    const masses = Array.from(
      { length: 12 },
      (_, i) =>
        `mass m${i} = ${1 + i} kg\nspring s${i} between m${i} and ${i ? `m${i - 1}` : "ground"} = ${4000 + 977 * i} N/m\n    damping_ratio = 0.05 % at 5 Hz`,
    );
    const text = `thrum 1\n${masses.join("\n")}\nforce f on m3\n    impulse = 2 N*s\nask history ring\n    of = ${Array.from({ length: 12 }, (_, i) => `m${i}.velocity`).join(", ")}\n    by = f\n    lasting = 40 s\n`;
    const found = hoverAt(viewOf(text), "history ^ring");
    const picture = /base64,([A-Za-z0-9+/=]+)\)/.exec(found?.markdown ?? "")?.[1] ?? "";
    expect(picture.length).toBeGreaterThan(1000);
    expect(picture.length).toBeLessThanOrEqual(10_000);
    expect(found?.text).toContain("and 9 more quantities");
  });

  it("says the first modes, with a picture of their shapes", () => {
    const view = viewOf(`${referenceText("p22-effective-modal-mass")}\nask modes\n`);
    const text = said(view, "ask ^modes");
    shows(text, "mode 1:", expectedOf("p22-effective-modal-mass", "mode 1 frequency"), "Hz", 1);
    shows(text, "mode 3:", expectedOf("p22-effective-modal-mass", "mode 3 frequency"), "Hz", 1);
    expect(hoverAt(view, "^ask modes")?.markdown).toContain("data:image/svg+xml;base64,");
  });

  it("says why there is no answer", () => {
    const undamped =
      "thrum 1\nmass a = 1 kg\nspring s between a and ground = 400 N/m\nforce f on a\n    amplitude = 1 N\nask sweep run\n    of = a.displacement\n    by = f\n    from = 1 Hz\n    to = 9 Hz\n";
    expect(said(viewOf(undamped), "sweep ^run")).toMatch(/`a.displacement`: no peak, not damped/);
    expect(said(viewOf(undamped, { upTo: "modes" }), "sweep ^run")).toContain("not answered yet");
    expect(said(viewOf(undamped, { upTo: "nothing" }), "sweep ^run")).toContain("numbers are awaited");
  });
});

describe("a hover on an expectation", () => {
  const text = (limit: string) =>
    `thrum 1\nlet m = 8 kg\nlet k = 5400 N/m\nmass block = m\nspring coil between block and ground = k\nexpect slow = natural_frequency(1) <= ${limit}\ncase light\n    m = 2 kg\n`;

  it("says value, limit, margin and what matters most, in every case", () => {
    // p01 without its damper; a quarter of the mass doubles the frequency; f goes with the roots of k and 1/m.
    const f = expectedOf("p01-sdof-basics", "undamped natural frequency");
    const shown = said(viewOf(text("5 Hz")), "expect ^slow");
    const [, word, value, limit, margin, most] = row(shown, "as written");
    expect([word, limit]).toEqual(["holds", "≤ 5 Hz"]);
    cellIs(value, f, FOUR_DIGITS);
    cellIs(margin, 100 * (1 - f / 5), TWO_DIGITS);
    expect(most).toMatch(/^`(k|m)`: \+10 % makes it [+−]5 %$/);
    const light = row(shown, "`light`");
    expect(light[1]).toBe("fails");
    cellIs(light[2], 2 * f, FOUR_DIGITS);
    cellIs(light[4], 100 * ((2 * f) / 5 - 1), TWO_DIGITS);
    expect(light[4]).toContain("beyond");
  });

  it("shows value and limit in the unit of the limit", () => {
    const [, , value, limit] = row(said(viewOf(text("300 rpm")), "expect ^slow"), "as written");
    expect(limit).toBe("≤ 300 rpm");
    cellIs(value, 60 * expectedOf("p01-sdof-basics", "undamped natural frequency"), FOUR_DIGITS);
  });

  it("says what was found over the tolerances, and both ends of a band", () => {
    const view = viewOf(
      "thrum 1\nlet k = 400 N/m +/- 19 %\nmass a = 1 kg\nspring s between a and ground = k\nexpect banded = 2 Hz <= natural_frequency(1) <= 3.3 Hz\n    tolerance = worst_case\n",
    );
    const shown = said(view, "expect ^banded");
    // sqrt(0.81) and sqrt(1.19) of 20 rad/s.
    expect(shown).toContain("`banded.low`, worst within its tolerances: 2.865 Hz, holds");
    expect(shown).toContain("`banded.high`, worst within its tolerances: 3.472 Hz, fails");
  });

  it("says why it could not be judged", () => {
    const shown = said(
      viewOf(
        "thrum 1\nmass a = 1 kg\nspring s between a and ground = 4 N/m\nexpect late = natural_frequency(2) <= 3 Hz\n",
      ),
      "expect ^late",
    );
    expect(row(shown, "open")[1]).toBe("–");
    expect(shown).toContain("`late` could not be judged: ");
  });
});

describe("a hover on a case or a limit", () => {
  it("says what the case changes and where that leads", () => {
    const shown = said(
      viewOf(
        "thrum 1\nlet m = 8 kg\nmass block = m\nspring coil between block and ground = 5400 N/m\nexpect slow = natural_frequency(1) <= 5 Hz\ncase light\n    m = 2 kg\n",
      ),
      "case ^light",
    );
    expect(row(shown, "`m`")).toEqual(["`m`", "8 kg", "2 kg"]);
    // p01 and twice that.
    expect(row(shown, "1").slice(1)).toEqual(["4.135 Hz", "8.27 Hz", "+4.13 Hz (+100 %)"]);
    expect(shown).toContain("fails here and not as written: `slow`");
  });

  it("says a limit and the points of a limit curve", () => {
    const text =
      "thrum 1\nlimit calm = 2.8 mm/s\nlimit zone\n    rows =\n        1 Hz 4 mm/s\n        10 Hz 2 mm/s\nmass a = 1 kg\nspring s between a and ground = 4 N/m\n";
    expect(said(viewOf(text), "limit ^calm")).toContain("2.8 mm/s, of peaks");
    expect(said(viewOf(text), "limit ^zone")).toContain("10 Hz: 2 mm/s");
  });
});
