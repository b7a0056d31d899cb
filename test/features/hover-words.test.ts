import { existsSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { formOf, PAGES, statementPage, WORDS } from "../../shared-core/features/hover-docs.ts";
import { base64, base64Length } from "../../shared-core/features/readout-base64.ts";
import { markdownOf, phraseMarkdown } from "../../shared-core/features/readout-markdown.ts";
import { FUNCTIONS } from "../../shared-core/vocabulary/functions.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { hoverAt, said, understood, viewOf } from "./readout-view.ts";

const TEXT = `thrum 1
title "Bilge pump"

> Weighed with the guard fitted.
> source: weighbridge ticket 0417
let pump_mass = 310 kg +/- 3 % normal
limit zone_b = 4.5 mm/s
assume modal_damping = 1 %

mass pump = pump_mass
    starts_at = 2 mm
spring feet between pump and ground = 62 N/mm
    count = 4
    damping_ratio = 5 % at 4 Hz
> accept near-resonance: passed in two seconds on run-up
force imbalance on pump
    unbalance = 9e-3 kg*m
    speed = 260 rpm

ask sweep run_up
    of = pump.velocity, feet.force
    by = imbalance
    from = 1 Hz
    to = 40 Hz
expect smooth = value(run_up, pump.velocity, at: 260 rpm) <= zone_b
`;
const view = viewOf(TEXT);

describe("a hover on a word of the language", () => {
  it("says the form of every statement and ask, what it is for, and its details", () => {
    for (const description of [...STATEMENTS, ...ASKS]) {
      const { keyword, variant, says, details } = description;
      const text = variant ? `ask ${variant} a\n` : `${keyword} a\n`;
      const shown = said(viewOf(text, { upTo: "nothing" }), `^${keyword}`);
      expect(shown).toContain(formOf(description));
      expect(shown).toContain(says);
      if (!["asks", "holds"].includes(description.family)) {
        for (const { key } of details) expect(shown).toContain(`\`${key}\``);
      }
    }
  });

  it("writes a form as it would be typed", () => {
    const form = (keyword: string) =>
      formOf(STATEMENTS.find((each) => each.keyword === keyword) ?? STATEMENTS[0]);
    expect(form("spring")).toBe("spring NAME between A and B [= STIFFNESS]");
    expect(form("let")).toBe("let NAME = VALUE");
    expect(form("inductor")).toContain("in IN | between A and B");
  });

  it("says details with their units and what holds without them", () => {
    const shown = said(view, "^count =");
    expect(shown).toContain("count = 4");
    expect(shown).toContain("left out: 1");
    expect(said(view, "^unbalance =")).toMatch(/an unbalance, in kg\*m/);
    expect(said(view, "^from = 1")).toContain("it may not be left out");
  });

  it("says functions with signature and arguments, and a named argument by itself", () => {
    const shown = said(view, "^value(run_up");
    expect(shown).toContain("value(ask, quantity, at: …)");
    expect(shown).toContain("`quantity`:");
    expect(said(view, "^at: 260")).toContain("frequency or time");
    for (const { name, says } of FUNCTIONS) {
      const text = `thrum 1\nlet x = ${name}(1)\n`;
      expect(said(viewOf(text, { upTo: "nothing" }), `= ^${name}`)).toContain(says);
    }
  });

  it("says keys of assumptions, fixed words and constants", () => {
    expect(said(view, "^modal_damping")).toContain("damping ratio added to every mode");
    expect(said(view, "^normal")).toBe(WORDS.get("normal"));
    expect(said(view, "^between")).toBe(WORDS.get("between"));
    expect(said(view, "and ^ground")).toBe(WORDS.get("ground"));
    expect(said(viewOf("thrum 1\nlet x = 2 * pi\n"), "^pi")).toBe(WORDS.get("pi"));
  });

  it("says units: what they measure and their factor", () => {
    // Definitions: NIST SP 811, appendix B; 1 lbf/in = 4.4482216152605 N / 0.0254 m.
    const unit = (text: string) =>
      said(viewOf(`thrum 1\nlet x = 3 ${text}\n`, { upTo: "nothing" }), `3 ^${text}`);
    expect(unit("lbf/in")).toContain("`lbf/in`: a stiffness\n1 lbf/in = 175.12683524648 N/m");
    expect(unit("rpm")).toContain("1 Hz = 60 rpm");
    expect(unit("deg")).toContain("1 deg = 0.01745329251994");
    expect(unit("N")).toContain("the SI unit");
    expect(unit("in")).toContain("3 in = 76.2 mm");
    expect(unit("%")).toContain("3 % = 0.03");
  });

  it("says a literal in other units, on its digits too", () => {
    expect(said(view, "^62 N/mm")).toBe("62 N/mm = 62 kN/m = 354 lbf/in");
    expect(hoverAt(view, "ask sweep run_up")?.text).toBeDefined();
    expect(hoverAt(viewOf("thrum 1\nlet x = 3\n"), "^3")).toBeUndefined();
  });

  it("says quantities behind a dot, with their peaks where they are answered", () => {
    const shown = said(view, "pump.^velocity");
    expect(shown).toContain("`pump.velocity`: velocity");
    expect(shown).toMatch(/in `run_up`: up to [\d.]+ mm\/s at [\d.]+ Hz/);
    expect(said(view, "of = ^pump")).toContain("mass pump");
  });

  it("says nothing on blanks, operators and text", () => {
    expect(hoverAt(view, '"Bilge ^pump')).toBeUndefined();
    expect(hoverAt(view, " ^= 62 N/mm")).toBeUndefined();
    expect(hoverAt(view, "^\n\n> Weighed")).toBeUndefined();
  });
});

describe("what the author wrote", () => {
  it("stands in the hover: notes, tags, acceptances with what they silence", () => {
    const text = said(view, "let ^pump_mass");
    expect(text).toContain("> Weighed with the guard fitted.\n> source: weighbridge ticket 0417");
    const drive = said(view, "force ^imbalance");
    expect(drive).toContain(
      "accepted `near-resonance`: passed in two seconds on run-up, which silences: `imbalance` at",
    );
  });

  it("is told on the acceptance itself, with the page of its message", () => {
    const found = hoverAt(view, "accept ^near-resonance");
    expect(found?.text).toContain("silences: `imbalance` at 4.333 Hz runs");
    expect(found?.page).toBe("diagnostics/near-resonance.md");
    expect(hoverAt(view, "> ^Weighed")).toBeUndefined();
  });

  it("cannot act as Markdown", () => {
    const hostile = [
      "> ![x](https://example.invalid/x.png) <img src=x> **b** [a](command:x)",
      "> a | b ` c",
      "> # big",
      "> --- $(zap)",
      "> 1. one",
    ];
    const model = understood(
      `thrum 1\n${hostile.join("\n")}\nlet a_b = 3 kg\nmass m = a_b\nspring s between m and ground = 1 N/m\n`,
    );
    const markdown = hoverAt({ ...viewOf(model.tree.text) }, "let ^a_b")?.markdown ?? "";
    expect(markdown).toContain(
      "> !\\[x\\](https://example.invalid/x.png) \\<img src=x\\> \\*\\*b\\*\\* \\[a\\](command:x)",
    );
    expect(markdown).toContain("> a \\| b \\` c");
    expect(markdown).toContain("> \\# big");
    expect(markdown).toContain("> \\--- \\$(zap)");
    expect(markdown).toContain("> 1\\. one");
    expect(markdown).not.toMatch(/(^|[^\\])[<[]/m);
  });

  it("keeps names as code, and backticks without a partner as they are", () => {
    expect(phraseMarkdown("`a_b` is 3 kg*m^2 and c_d")).toBe("`a_b` is 3 kg\\*m^2 and c\\_d");
    expect(phraseMarkdown("one ` only")).toBe("one \\` only");
    expect(phraseMarkdown("`a|b`")).toBe("`a\\|b`");
    expect(phraseMarkdown("12.5 Hz")).toBe("12.5 Hz");
    expect(phraseMarkdown("-4 mm\nnext")).toBe("-4 mm next");
  });

  it("leaves out blocks that say nothing", () => {
    expect(
      markdownOf([
        { kind: "lines", lines: [] },
        { kind: "table", columns: [], rows: [] },
      ]),
    ).toBe("");
  });
});

describe("pages behind hovers", () => {
  const docs = (path: string) => fileURLToPath(new URL(`../../docs/${path}`, import.meta.url));

  it("exist, with their headings", () => {
    const anchors = new Set(
      [...readFileSync(docs("language.md"), "utf8").matchAll(/^#+ (.+)$/gm)].map(
        ([, title]) =>
          `language.md#${title
            .toLowerCase()
            .replace(/[^\w\s-]/g, "")
            .trim()
            .replace(/\s/g, "-")}`,
      ),
    );
    for (const page of Object.values(PAGES)) {
      if (page.includes("#")) expect(anchors).toContain(page);
      else expect(existsSync(docs(page)), page).toBe(true);
    }
    for (const description of [...STATEMENTS, ...ASKS]) {
      const page = statementPage(description);
      expect(existsSync(docs(page)), page).toBe(true);
    }
    expect(existsSync(docs("diagnostics/near-resonance.md"))).toBe(true);
    expect(hoverAt(view, "spring ^feet")?.page).toBe("reference/spring.md");
  });
});

describe("base64", () => {
  it("is that of RFC 4648", () => {
    // Test vectors of RFC 4648, section 10.
    const vectors = ["", "Zg==", "Zm8=", "Zm9v", "Zm9vYg==", "Zm9vYmE=", "Zm9vYmFy"];
    vectors.forEach((expected, length) => {
      expect(base64("foobar".slice(0, length))).toBe(expected);
      expect(base64Length("foobar".slice(0, length))).toBe(expected.length);
    });
  });

  it("takes UTF-8 of every plane", () => {
    for (const text of ["µ°²", "₂€", "𐐀x", "a\u0000b"])
      expect(base64(text)).toBe(Buffer.from(text).toString("base64"));
    expect(base64("\ud800x")).toBe(Buffer.from("\ufffdx").toString("base64"));
  });
});
