import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { complete } from "../../shared-core/features/complete.ts";
import { codeActions, fixAll, type OfferedAction } from "../../shared-core/features/fixes.ts";
import { foldingRanges } from "../../shared-core/features/fold.ts";
import { formatRange } from "../../shared-core/features/format.ts";
import { definition, highlights, references } from "../../shared-core/features/navigate.ts";
import { prepareRename, rename } from "../../shared-core/features/rename.ts";
import { selectionRanges } from "../../shared-core/features/select.ts";
import { signatureHelp } from "../../shared-core/features/signature.ts";
import { documentSymbols } from "../../shared-core/features/symbols.ts";
import { semanticTokens } from "../../shared-core/features/tokens.ts";
import type { View } from "../../shared-core/features/view.ts";
import { judge } from "../../shared-core/judgement/judge.ts";
import { cursorIn, edited, frequenciesOf, viewOf } from "./views.ts";

const said = (view: View) => view.report?.diagnostics ?? view.model.diagnostics;

/** Quick fixes of every diagnostic of a text. */
function fixesIn(view: View): readonly OfferedAction[] {
  const whole = { start: 0, end: view.model.tree.text.length };
  return codeActions(view, whole, said(view)).filter(({ kind }) => kind === "quickfix");
}

/** The wrong examples of the pages about messages, and texts with several slips each. */
const WRONG: readonly (readonly [string, string])[] = [
  ...readdirSync("docs/diagnostics").flatMap((page) => {
    const text = readFileSync(`docs/diagnostics/${page}`, "utf8");
    const blocks = [...text.matchAll(/^```thrum wrong[^\n]*\n([\s\S]*?)^```$/gm)];
    return blocks.map(([, example], i) => [`${page} ${i + 1}`, example] as const);
  }),
  [
    "slips of units",
    "mass a = 450 lbf\nspring s between a and ground = 40\ninertia b = 3 kgm^2\nforce f on a\n    amplitude = 2 KN\n",
  ],
  [
    "slips of names",
    "mas a = 3 kg\nspring s between a and groud = 3 N/m\n    los_factor = 3 %\nexpect low = natural_frequenzy(1) <= 3 Hz\n",
  ],
  [
    "slips of signs",
    "let a = 3 × 4\r\nlet b = “x”\r\nx = 3 kg\r\nspring s between a and ground = 3 N/m\r\n    count 4\r\n",
  ],
];

describe.each(WRONG)("fixes of %s", (_, text) => {
  const view = viewOf(text, { judged: true });
  const fixes = fixesIn(view).filter(({ diagnostic, title }) =>
    diagnostic?.fixes?.some((fix) => fix.title === title),
  );

  it("each cures what it is for and brings no new error", () => {
    for (const { title, edits, diagnostic } of fixes) {
      const after = edited(text, edits);
      const now = judge(viewOf(after).model).diagnostics;
      const key = ({ code, message }: { code: string; message: string }) => `${code}: ${message}`;
      const before = said(view).map(key);
      const syntax = now.filter(({ code }) => code === "syntax").map(key);
      expect({ title, new: syntax.filter((each) => !before.includes(each)) }).toEqual({ title, new: [] });
      const cured =
        diagnostic &&
        !now.some((each) => key(each) === key(diagnostic) && each.span.start === diagnostic.span.start);
      expect({ title, cured }).toEqual({ title, cured: true });
      if (text.includes("\r\n")) expect(after.replaceAll("\r\n", "")).not.toContain("\n");
    }
  });

  it("the safe ones go together and leave no safe one behind for what they cured", () => {
    const edits = fixAll(view, said(view));
    const after = edited(text, edits);
    const safe = fixes.filter((fix) => fix.safe);
    expect(edits.length > 0).toBe(safe.length > 0);
    if (edits.length > 0) {
      expect(said(viewOf(after, { judged: true })).length).toBeLessThan(said(view).length);
    }
  });
});

describe("fixes", () => {
  it("keep a model's modes where they are safe", () => {
    const text = "mass a = 3 kg\nspring s between a and ground = 3 N/m\n    loss_factor 3 %\ncount = 4\n";
    const view = viewOf(text);
    const after = edited(text, fixAll(view, said(view)));
    expect(after).toBe(
      "thrum 1\nmass a = 3 kg\nspring s between a and ground = 3 N/m\n    loss_factor = 3 %\n    count = 4\n",
    );
    // sqrt(4 * 3 / 3) / (2 pi)
    expect(frequenciesOf(after)[0]).toBeCloseTo(1 / Math.PI, 12);
  });

  it("offer what touches the range alone", () => {
    const { text, offset } = cursorIn("mass a = 3|\nmass b = 4\n");
    const view = viewOf(text);
    const found = codeActions(view, { start: offset, end: offset }, said(view)).filter(
      ({ kind }) => kind === "quickfix",
    );
    expect(new Set(found.map(({ diagnostic }) => diagnostic?.code))).toEqual(new Set(["missing-unit"]));
  });

  it("give the kinds that are asked for, and what stands below them", () => {
    const { text, offset } = cursorIn("mass  a = 3| kg\nlet b = 3\n");
    const view = viewOf(text);
    const kinds = (only?: readonly string[]) => [
      ...new Set(
        codeActions(view, { start: offset, end: offset }, said(view), { only }).map(({ kind }) => kind),
      ),
    ];
    expect(kinds(["refactor"])).toEqual(["refactor.extract", "refactor.rewrite"]);
    expect(kinds(["refactor.extract"])).toEqual(["refactor.extract"]);
    expect(kinds(["source.tidy"])).toEqual(["source.tidy"]);
    expect(kinds(["quickfix", "refactor"])).not.toContain("source.tidy");
    expect(kinds()).toContain("source.sort");
  });

  it("take a number out that nothing uses, comments kept", () => {
    const text = "thrum 1\n> old\nlet a = 3 kg  # of 1998\n\nmass u = 3 kg\n";
    const view = viewOf(text);
    const action = fixesIn(view).find(({ title }) => title === "Take it out");
    expect(edited(text, action?.edits ?? [])).toBe("thrum 1\n# of 1998\n\nmass u = 3 kg\n");
  });

  it("accept a warning in the statement's note, and it is accepted", () => {
    const text =
      "thrum 1\r\nmass pump = 180 kg\r\nspring feet between pump and ground = 4.1 MN/m\r\n    loss_factor = 8 %\r\nforce imbalance on pump\r\n    unbalance = 4e-3 kg*m\r\n    speed = 1470 rpm\r\n";
    const view = viewOf(text, { judged: true });
    const action = fixesIn(view).find(({ title }) => title.includes("Accept `near-resonance`"));
    const after = edited(text, action?.edits ?? []);
    expect(after).toContain("> accept near-resonance: reason\r\nforce imbalance");
    const report = viewOf(after, { judged: true }).report;
    expect(report?.diagnostics.map(({ code }) => code)).not.toContain("near-resonance");
    expect(report?.accepted.map(({ reason }) => reason)).toEqual(["reason"]);
  });

  it("prefer the one safe cure", () => {
    const [fix] = fixesIn(viewOf("mass a = 3 kg\n"));
    expect([fix.title, fix.preferred, fix.safe]).toEqual(["Add `thrum 1`", true, true]);
  });
});

describe("every feature, on any text", () => {
  const run = (view: View, offset: number) => {
    const range = { start: offset, end: offset };
    codeActions(view, range, view.model.diagnostics);
    complete(view, offset, { explicit: true, files: ["a.thrum", "b.csv"] });
    definition(view, offset);
    references(view, offset, true);
    highlights(view, offset);
    prepareRename(view, offset);
    rename(view, offset, "other");
    signatureHelp(view, offset);
    for (const spans of selectionRanges(view, [offset])) {
      for (const { start, end } of spans) expect(start <= offset && offset <= end).toBe(true);
    }
    formatRange(view, range);
  };
  const whole = (view: View) => {
    documentSymbols(view);
    foldingRanges(view);
    semanticTokens(view);
  };

  it.each(readdirSync("examples").filter((file) => file.endsWith(".thrum")))(
    "holds at the offsets of %s",
    (file) => {
      const view = viewOf(readFileSync(`examples/${file}`, "utf8"));
      whole(view);
      for (let offset = 0; offset <= view.model.tree.text.length; offset += 61) run(view, offset);
    },
  );

  it("holds on prefixes, with other line endings and unusual signs", () => {
    const text = readFileSync("examples/gate-actuator.thrum", "utf8")
      .replaceAll("\n", "\r\n")
      .replace("title", "# µ°²𐐀\r\ntitle");
    for (let end = 0; end <= text.length; end += 173) {
      const view = viewOf(text.slice(0, end));
      whole(view);
      for (const offset of [end, Math.max(0, end - 1), end >> 1]) run(view, offset);
    }
  });

  it.each([
    "",
    "\r",
    "kit",
    "kit a(",
    "kit a(k between b and c\n  spring",
    "part p = (",
    "mass a = (((((",
    "let a = a\nlet b = c\nlet c = b",
    "expect e = peak(",
    "let x = 3 N/mm +/-\n",
    "ask sweep\n    of =\n        .velocity\n",
    "<<<<<<< a\nlet a = 1\n=======\nlet a = 2\n>>>>>>> b\n",
    'use "a.thrum\nuse "',
    "> accept\n> :\n",
    "let 𐐀 = 3 µ𐐀\nlet b = 𐐀 * °\n",
  ])("holds at every offset of %j", (text) => {
    const view = viewOf(text);
    whole(view);
    for (let offset = 0; offset <= text.length; offset++) run(view, offset);
  });
});
