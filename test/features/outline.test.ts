import { describe, expect, it } from "vitest";
import { foldingRanges } from "../../shared-core/features/fold.ts";
import { formatDocument, formatRange, formatRanges } from "../../shared-core/features/format.ts";
import { documentLinks } from "../../shared-core/features/links.ts";
import { moveEdits } from "../../shared-core/features/move.ts";
import { selectionRanges } from "../../shared-core/features/select.ts";
import {
  type DocumentSymbol,
  documentSymbols,
  workspaceSymbols,
} from "../../shared-core/features/symbols.ts";
import { cursorIn, edited, viewOf } from "./views.ts";

describe("symbols", () => {
  const TEXT = `thrum 1
title "Pump"
> weighed
mass pump = 310 kg
kit foot(k) between above and below
    spring rubber between above and below = k
part left = foot(3 N/mm) between pump and ground
spring feet between pump and ground = 62 N/mm
force imbalance on pump
ask sweep run_up
ask modes
expect low = natural_frequency(1) <= 6 Hz
`;
  const line = ({ name, family, detail, children }: DocumentSymbol): string =>
    `${family} ${name}: ${detail}${children.length > 0 ? ` [${children.map(line).join("; ")}]` : ""}`;

  it("lists the statements with what they are, kits nested", () => {
    expect(documentSymbols(viewOf(TEXT)).map(line)).toEqual([
      "file Pump: ",
      "moves pump: 310 kg",
      "file foot: between above and below [joins rubber: between above and below, k]",
      "joins left: between pump and ground",
      "joins feet: between pump and ground, 62 N/mm",
      "drives imbalance: on pump",
      "asks run_up: sweep",
      "asks modes: ",
      "holds low: natural_frequency(1) <= 6 Hz",
    ]);
  });

  it("holds every name inside its span, and the children inside their parent", () => {
    const all = documentSymbols(viewOf(TEXT));
    const check = (each: DocumentSymbol, outer: { start: number; end: number }) => {
      expect(outer.start <= each.span.start && each.span.end <= outer.end).toBe(true);
      expect(each.span.start <= each.nameSpan.start && each.nameSpan.end <= each.span.end).toBe(true);
      for (const child of each.children) check(child, each.span);
    };
    for (const each of all) check(each, { start: 0, end: TEXT.length });
  });

  it("finds names of several models by their letters, the nearest first", () => {
    const models = [
      viewOf(TEXT).model,
      viewOf("mass crane_pump = 3 kg\nmass plumb = 1 kg\n", { file: "b.thrum" }).model,
    ];
    const found = workspaceSymbols(models, "pump").map(({ name, file }) => `${file} ${name}`);
    expect(found).toEqual(["pier/pump.thrum pump", "b.thrum crane_pump"]);
    expect(workspaceSymbols(models, "ru").map(({ name }) => name)).toEqual([
      "run_up",
      "foot.rubber",
      "crane_pump",
    ]);
    expect(workspaceSymbols(models, "zz")).toEqual([]);
  });
});

describe("folding", () => {
  it("folds statements, rows, notes, comments and used files", () => {
    const text = `thrum 1
use "a.thrum"
use "b.thrum"
# one
# two
> note
> source: x
limit zone
    of = rms
    rows =
        4 Hz 1 mm/s
        8 Hz 1 mm/s
mass a = 1 kg
kit foot between a and b
    spring s between a and b = 1 N/m
        loss_factor = 1 %
`;
    expect(foldingRanges(viewOf(text))).toEqual([
      { first: 1, last: 2, kind: "imports" },
      { first: 3, last: 4, kind: "comment" },
      { first: 5, last: 6, kind: "comment" },
      { first: 7, last: 11 },
      { first: 9, last: 11 },
      { first: 13, last: 15 },
      { first: 14, last: 15 },
    ]);
  });
});

describe("growing a selection", () => {
  const grown = (marked: string): string[] => {
    const { text, offset } = cursorIn(marked);
    return selectionRanges(viewOf(text), [offset])[0].map(({ start, end }) => text.slice(start, end));
  };

  it("goes from the word to the file", () => {
    expect(grown("thrum 1\n\n> so\nmass unit = 3 * (a + 2.5 k|g)\n    starts_at = 2 mm\n")).toEqual([
      "kg",
      "2.5 kg",
      "a + 2.5 kg",
      "(a + 2.5 kg)",
      "3 * (a + 2.5 kg)",
      "mass unit = 3 * (a + 2.5 kg)",
      "mass unit = 3 * (a + 2.5 kg)\n    starts_at = 2 mm",
      "> so\nmass unit = 3 * (a + 2.5 kg)\n    starts_at = 2 mm",
      "thrum 1\n\n> so\nmass unit = 3 * (a + 2.5 kg)\n    starts_at = 2 mm\n",
    ]);
  });

  it("grows inside details, paths and lists", () => {
    expect(grown("ask sweep\n    of = unit.velo|city, feet.force\n").slice(0, 5)).toEqual([
      "velocity",
      "unit.velocity",
      "unit.velocity, feet.force",
      "of = unit.velocity, feet.force",
      "ask sweep\n    of = unit.velocity, feet.force",
    ]);
    expect(grown("spring s between a and b = 1 N/m\n    damping_ratio = 5 %| at 2 Hz\n").slice(0, 4)).toEqual(
      ["%", "5 %", "5 % at 2 Hz", "damping_ratio = 5 % at 2 Hz"],
    );
  });
});

describe("links and moves", () => {
  const TEXT = `use "shared/numbers.thrum"
motion shake of floor
    record = "../data/quay.csv"
force push on unit
    density = "level.csv"
ask fit
    measured = "hammer.csv"
title "not/a/path.csv"
`;
  it("leads to used files and records", () => {
    const view = viewOf(TEXT);
    expect(
      documentLinks(view).map(({ span, file, kind }) => [TEXT.slice(span.start, span.end), file, kind]),
    ).toEqual([
      ["shared/numbers.thrum", "pier/shared/numbers.thrum", "model"],
      ["../data/quay.csv", "data/quay.csv", "record"],
      ["level.csv", "pier/level.csv", "record"],
      ["hammer.csv", "pier/hammer.csv", "record"],
    ]);
  });

  it.each<[string, { from: string; to: string }[], string[]]>([
    ["a used file", [{ from: "pier/shared/numbers.thrum", to: "pier/numbers.thrum" }], ["numbers.thrum"]],
    ["a folder of records", [{ from: "data", to: "measured/2024" }], ["../measured/2024/quay.csv"]],
    [
      "the model",
      [{ from: "pier/pump.thrum", to: "pump.thrum" }],
      ["pier/shared/numbers.thrum", "data/quay.csv", "pier/level.csv", "pier/hammer.csv"],
    ],
    ["model and files together", [{ from: "pier", to: "wharf/pier" }], ["../../data/quay.csv"]],
    ["something else", [{ from: "wharf", to: "quay" }], []],
  ])("keeps the paths when %s moves", (_, moves, written) => {
    expect(moveEdits(viewOf(TEXT), moves).map(({ text }) => text)).toEqual(written);
  });
});

describe("formatting", () => {
  const TEXT = "mass   unit=3 kg\n  weight  = off\nmass slab =  2 t\n\n\nlet a= 3 # x\n";
  it("formats the whole, and what is formatted stays", () => {
    const whole = edited(TEXT, formatDocument(viewOf(TEXT)));
    expect(whole).toBe("mass unit = 3 kg\n    weight = off\nmass slab = 2 t\n\nlet a = 3  # x\n");
    expect(formatDocument(viewOf(whole))).toEqual([]);
  });

  it("formats only the lines touched", () => {
    const at = TEXT.indexOf("mass slab");
    expect(edited(TEXT, formatRange(viewOf(TEXT), { start: at, end: at + 17 }))).toBe(
      TEXT.replace("slab =  2", "slab = 2"),
    );
    expect(formatRanges(viewOf(TEXT), [])).toEqual([]);
    const two = [TEXT.indexOf("unit"), TEXT.indexOf("# x")].map((start) => ({ start, end: start }));
    expect(edited(TEXT, formatRanges(viewOf(TEXT), two))).toBe(
      "mass unit = 3 kg\n  weight  = off\nmass slab =  2 t\n\n\nlet a = 3  # x\n",
    );
  });

  it("keeps the shape of a statement when one of its lines is indented anew", () => {
    const text = "limit zone\n  rows =\n    4 Hz 1 mm/s\n    8 Hz  1 mm/s\n";
    const at = text.indexOf("rows");
    expect(edited(text, formatRange(viewOf(text), { start: at, end: at }))).toBe(
      "limit zone\n    rows =\n        4 Hz 1 mm/s\n        8 Hz  1 mm/s\n",
    );
  });
});
