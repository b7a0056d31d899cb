import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type {
  CodeAction,
  CodeLens,
  CompletionItem,
  CompletionList,
  DocumentHighlight,
  DocumentLink,
  DocumentSymbol,
  FoldingRange,
  Hover,
  InlayHint,
  Location,
  Range,
  SelectionRange,
  SemanticTokens,
  SemanticTokensDelta,
  SignatureHelp,
  TextDocumentEdit,
  TextEdit,
  WorkspaceEdit,
} from "vscode-languageserver-protocol";
import { format } from "../../shared-core/index.ts";
import { TestClient, type TestDocument } from "./client.ts";

/**
 * One mass on two springs in parallel and a damper: 40 kg on 2 * 9 N/mm, so sqrt(18000/40)/(2 pi) = 3.376 Hz.
 * Characters outside ASCII and outside the basic plane stand in front of what is looked at on its line.
 */
const TEXT = `thrum 1
title "Winde am Kai µ ° ² 𐐀"

> 𐐀 weighed, µ and ² seen: the drum 𐐀 alone
> source: ticket 𐐀-12
let drum_mass = 40 kg +/- 3 %  # 𐐀 µ ° ²
let stiff = 9 N/mm

mass drum = drum_mass  # 𐐀
spring feet between drum and ground = stiff
    > 𐐀 two of them
    count = 2
damper oil between drum and ground = 80 N*s/m
force shake on drum
    amplitude = 10 N
    frequency = 5 Hz
ask modes
ask sweep 𐐀run
    of = drum.displacement
    by = shake
    from = 1 Hz
    to = 20 Hz
expect soft = natural_frequency(1) <= 5 Hz
`;

/** A name of letters outside the basic plane is a name like any other. */
const NAME = "𐐀run";

const TEXTS: readonly [name: string, text: string][] = [
  ["\\n", TEXT],
  ["\\r\\n", TEXT.replaceAll("\n", "\r\n")],
];

let client: TestClient;
beforeAll(async () => {
  client = await TestClient.start();
});
afterAll(async () => {
  expect(client.stderr).toBe("");
  expect(client.logged).toEqual([]);
  expect(await client.close()).toBe(0);
});

let count = 0;
const opened = (text: string): TestDocument => client.open(`features-${++count}.thrum`, text);

describe.each(TEXTS)("with lines that end in %s", (_, text) => {
  let document: TestDocument;
  beforeAll(async () => {
    document = opened(text);
    expect(await document.settled()).toEqual([]);
  });

  it("hovers over the name behind such characters", async () => {
    const hover = await document.ask<Hover>("textDocument/hover", document.at("drum_mass  # 𐐀", 3));
    expect(document.textIn(hover.range as Range)).toBe("drum_mass");
    expect(JSON.stringify(hover.contents)).toContain("40 kg");
    expect(JSON.stringify(hover.contents)).toContain("𐐀 weighed, µ and ² seen");
  });

  it("puts hints behind what they are about", async () => {
    const hints = await document.ask<InlayHint[]>("textDocument/inlayHint", undefined, { range: ALL });
    const behindAll = (label: string) =>
      hints
        .filter((each) => String(each.label).includes(label))
        .map(({ position }) => document.text.slice(0, document.offset(position)).split(/\r?\n/).at(-1));
    const behind = (label: string) => behindAll(label)[0];
    expect(behind("= 40 kg")).toBe("mass drum = drum_mass");
    expect(behind("3.376 Hz")).toBe("mass drum = drum_mass");
    // A lens says what is left; the hint says the value.
    expect(behindAll("3.376 Hz").at(-1)).toBe("expect soft = natural_frequency(1) <= 5 Hz");
  });

  it("places lenses from the text and says later what they say", async () => {
    const lenses = await document.ask<CodeLens[]>("textDocument/codeLens");
    expect(lenses.every((lens) => lens.command === undefined)).toBe(true);
    const resolved = await Promise.all(
      lenses.map((lens) => client.request<CodeLens>("codeLens/resolve", lens)),
    );
    const said = resolved.map(({ range, command }) => [document.textIn(range).split(" ")[0], command?.title]);
    expect(said).toEqual([
      ["ask", "show"],
      ["ask", "write CSV"],
      ["ask", "show"],
      ["ask", "write CSV"],
      ["expect", expect.stringMatching(/^holds, \d/)],
    ]);
    expect(resolved[3].command?.arguments).toEqual([document.uri, NAME]);
  });

  it("goes to where a name is defined and to every place that names it", async () => {
    const at = document.at("drum_mass  # 𐐀", 2);
    const found = await document.ask<Location[]>("textDocument/definition", at);
    expect(found.map(({ uri, range }) => [uri, range.start])).toEqual([
      [document.uri, document.at("drum_mass = 40")],
    ]);
    const all = await document.ask<Location[]>("textDocument/references", at, {
      context: { includeDeclaration: true },
    });
    expect(all.map(({ range }) => document.textIn(range))).toEqual(["drum_mass", "drum_mass"]);
    const marked = await document.ask<DocumentHighlight[]>("textDocument/documentHighlight", at);
    expect(marked.map(({ range, kind }) => [document.textIn(range), kind])).toEqual([
      ["drum_mass", 3],
      ["drum_mass", 2],
    ]);
  });

  it("renames, and says why it does not", async () => {
    const at = document.at(NAME, 3);
    const prepared = await document.ask<{ range: Range; placeholder: string }>(
      "textDocument/prepareRename",
      at,
    );
    expect(prepared.placeholder).toBe(NAME);
    expect(document.textIn(prepared.range)).toBe(NAME);
    const edit = await document.ask<WorkspaceEdit>("textDocument/rename", document.at("stiff ="), {
      newName: "softness",
    });
    const [{ textDocument, edits }] = edit.documentChanges as TextDocumentEdit[];
    expect(textDocument).toEqual({ uri: document.uri, version: document.version });
    expect(applied(document, edits as TextEdit[])).toBe(document.text.replaceAll("stiff", "softness"));
    const refused = document.ask("textDocument/rename", document.at("stiff ="), { newName: "drum" });
    await expect(refused).rejects.toThrow("`drum` is a mass already, in `features-");
    await expect(document.ask("textDocument/prepareRename", document.at("count"))).rejects.toThrow(
      "`count` is a detail of `spring`",
    );
  });

  it("outlines, folds, grows selections", async () => {
    const symbols = await document.ask<DocumentSymbol[]>("textDocument/documentSymbol");
    expect(symbols.map(({ name, selectionRange }) => [name, document.textIn(selectionRange)])).toContainEqual(
      [NAME, NAME],
    );
    const folds = await document.ask<FoldingRange[]>("textDocument/foldingRange");
    expect(folds.map(({ startLine, endLine }) => [startLine, endLine])).toContainEqual([
      document.at("ask sweep").line,
      document.at("to = 20 Hz").line,
    ]);
    const [selection] = await document.ask<SelectionRange[]>("textDocument/selectionRange", undefined, {
      positions: [document.at(NAME, 2)],
    });
    const grown = [];
    for (let at: SelectionRange | undefined = selection; at; at = at.parent)
      grown.push(document.textIn(at.range));
    expect(grown[0]).toBe(NAME);
    expect(grown.at(-1)).toBe(document.text);
  });

  it("colours whole texts, parts of them, and only what an edit changed", async () => {
    const own = opened(text);
    const whole = await own.ask<SemanticTokens>("textDocument/semanticTokens/full");
    const words = decoded(own, whole.data);
    const { legend } = client.result.capabilities.semanticTokensProvider as {
      legend: { tokenTypes: string[] };
    };
    const typeOf = (word: string) => legend.tokenTypes[words.find((each) => each.text === word)?.type ?? -1];
    expect([typeOf(NAME), typeOf("kg"), typeOf("stiff"), typeOf("feet")]).toEqual([
      "asks",
      "unit",
      "parameter",
      "joins",
    ]);
    const range = { start: own.at("spring feet"), end: own.at("damper oil") };
    const part = await own.ask<SemanticTokens>("textDocument/semanticTokens/range", undefined, { range });
    expect(part.data.length).toBeLessThan(whole.data.length);
    expect(decoded(own, part.data)).toContainEqual(words.find((each) => each.text === "feet"));
    own.edit("stiff = 9", "stiff = 𐐀9");
    const delta = await own.ask<SemanticTokensDelta>("textDocument/semanticTokens/full/delta", undefined, {
      previousResultId: whole.resultId,
    });
    const data = [...whole.data];
    for (const edit of delta.edits) data.splice(edit.start, edit.deleteCount, ...(edit.data ?? []));
    const anew = await own.ask<SemanticTokens>("textDocument/semanticTokens/full");
    expect(data).toEqual(anew.data);
    expect(delta.edits[0].data?.length ?? 0).toBeLessThan(anew.data.length);
  });

  it("formats the file, a range and several ranges as the command line does", async () => {
    const crooked = text.replaceAll(" = ", "=");
    const own = opened(crooked);
    const edits = await own.ask<TextEdit[]>("textDocument/formatting", undefined, { options: TABS });
    expect(applied(own, edits)).toBe(format(crooked));
    const lineOf = (piece: string) => ({ start: own.at(piece), end: own.at(piece, 3) });
    const range = lineOf("let stiff");
    const one = await own.ask<TextEdit[]>("textDocument/rangeFormatting", undefined, {
      range,
      options: TABS,
    });
    expect(applied(own, one)).toBe(crooked.replace("stiff=9", "stiff = 9"));
    const two = await own.ask<TextEdit[]>("textDocument/rangesFormatting", undefined, {
      ranges: [range, lineOf("mass drum")],
      options: TABS,
    });
    expect(applied(own, two)).toBe(
      crooked.replace("stiff=9", "stiff = 9").replace("drum=drum_mass", "drum = drum_mass"),
    );
  });

  it("completes units that fit, behind a number on such a line", async () => {
    const own = opened(text.replace("let stiff = 9 N/mm", "> 𐐀\nlet stiff = 9 N/m # 𐐀"));
    const list = await own.ask<CompletionList>("textDocument/completion", own.at("let stiff = 9 N/m", 17), {
      context: { triggerKind: 1 },
    });
    const units = list.items.map(({ label }) => label);
    expect(units).toContain("N/mm");
    for (const { textEdit } of list.items) {
      const { insert } = textEdit as { insert: Range };
      expect(own.textIn(insert)).toBe("N/m");
    }
  });

  it("offers quick fixes where the mistake stands", async () => {
    const own = opened(
      text.replace("let stiff = 9 N/mm", "let stiff = 9 N/mm  # 𐐀\nmass 𐐀extra = 4 lbf  # 𐐀"),
    );
    await own.settled();
    const said = own.diagnostics().find(({ code }) => code === "weight-as-mass");
    if (said === undefined) throw new Error(JSON.stringify(own.diagnostics()));
    expect(own.textIn(said.range)).toBe("lbf");
    expect(said.codeDescription?.href).toMatch(/^file:.*\/docs\/diagnostics\/weight-as-mass\.md$/);
    const actions = await own.ask<CodeAction[]>("textDocument/codeAction", undefined, {
      range: said.range,
      context: { diagnostics: [said], only: ["quickfix"] },
    });
    expect(actions.map(({ diagnostics }) => diagnostics?.[0].code)).toContain("weight-as-mass");
    const [first] = actions;
    const [{ edits }] = (first.edit?.documentChanges ?? []) as TextDocumentEdit[];
    const cured = opened(applied(own, edits as TextEdit[]));
    expect((await cured.settled()).map(({ code }) => code)).not.toContain("weight-as-mass");
    const { fixes } = said.data as { fixes: { edits: TextEdit[] }[] };
    expect(applied(own, fixes[0].edits)).toBe(cured.text);
  });
});

describe("half-typed text", () => {
  it.each([
    ["let x = 4 k", "kg"],
    ["mass drum = 4 kg\nspring k between dr", "drum"],
    ["mass drum = 4 kg\nask sweep\n    of = drum.", "displacement"],
    ["mass drum = 4 kg\nspring k between drum and ground = 1 N/m\n    lo", "loss_factor"],
    ["spr", "spring"],
    ["mass drum = 4 kg\nexpect a = natural_fr", "natural_frequency"],
  ])("%j is completed with %s", async (typed, wanted) => {
    const own = opened(`thrum 1\n# 𐐀\n${typed}`);
    const list = await own.ask<CompletionList>("textDocument/completion", own.position(own.text.length), {
      context: { triggerKind: 1 },
    });
    expect(list.items.map(({ label }) => label)).toContain(wanted);
    expect(list.items.every(({ preselect }) => !preselect)).toBe(true);
  });

  it("is completed from what fits so far where there is more than anybody reads, and asked again", async () => {
    const masses = Array.from({ length: 1200 }, (_, i) => `mass m${i} = 4 kg`).join("\n");
    const labels = async (typed: string) => {
      const own = opened(`thrum 1\n${masses}\nspring k between ${typed}`);
      const list = await own.ask<CompletionList>("textDocument/completion", own.position(own.text.length), {
        context: { triggerKind: 1 },
      });
      return { more: list.isIncomplete, labels: list.items.map(({ label }) => label) };
    };
    const many = await labels("m");
    expect([many.more, many.labels.length]).toEqual([true, 400]);
    const few = await labels("m117");
    expect(few.more).toBe(true);
    const all = Array.from({ length: 1200 }, (_, i) => `m${i}`);
    expect(few.labels.toSorted()).toEqual(all.filter((name) => /1.*1.*7/.test(name)).toSorted());
    const small = opened("thrum 1\nmass drum = 4 kg\nspring k between dr");
    const list = await small.ask<CompletionList>(
      "textDocument/completion",
      small.position(small.text.length),
      {
        context: { triggerKind: 1 },
      },
    );
    expect(list.isIncomplete).toBe(false);
  });

  it("gets signature help inside an open call", async () => {
    const own = opened("thrum 1\nlet 𐐀k = shaft(80 GPa, 40 mm, ");
    const help = await own.ask<SignatureHelp>("textDocument/signatureHelp", own.position(own.text.length));
    expect(help.signatures[0].label).toMatch(/^shaft\(G, diameter, length/);
    expect(help.activeParameter).toBe(2);
  });

  it("is coloured, outlined, folded and formatted without a word", async () => {
    const own = opened("thrum 1\nspring k between\n  lo\n> 𐐀\n\nmass = 4 (\nask sweep r\n of = a., b");
    for (const method of ["semanticTokens/full", "documentSymbol", "foldingRange", "codeLens"])
      expect(await own.ask(`textDocument/${method}`)).not.toBeNull();
    expect(await own.ask("textDocument/formatting", undefined, { options: TABS })).toEqual(expect.any(Array));
  });
});

describe("paths", () => {
  it("are links, and complete with the files there are", async () => {
    const own = opened('thrum 1\nuse "examples/ventilation-fan.thrum"\nuse "exa"\n');
    const links = await own.ask<DocumentLink[]>("textDocument/documentLink");
    expect(links.map(({ range, target }) => [own.textIn(range), target])).toEqual([
      ["examples/ventilation-fan.thrum", client.uri("examples/ventilation-fan.thrum")],
      ["exa", client.uri("exa")],
    ]);
    const at = own.at('"exa"', 4);
    const list = await own.ask<CompletionList>("textDocument/completion", at, {
      context: { triggerKind: 1 },
    });
    const files = list.items.map(({ label }: CompletionItem) => label);
    expect(files.some((label) => label.includes("pump-line.thrum"))).toBe(true);
  });
});

const ALL: Range = { start: { line: 0, character: 0 }, end: { line: 1000, character: 0 } };
const TABS = { tabSize: 8, insertSpaces: false };

function applied(document: TestDocument, edits: readonly TextEdit[]): string {
  const sorted = [...edits].sort((a, b) => document.offset(b.range.start) - document.offset(a.range.start));
  return sorted.reduce(
    (text, { range, newText }) =>
      text.slice(0, document.offset(range.start)) + newText + text.slice(document.offset(range.end)),
    document.text,
  );
}

function decoded(document: TestDocument, data: readonly number[]): { text: string; type: number }[] {
  const words = [];
  let [line, character] = [0, 0];
  for (let i = 0; i < data.length; i += 5) {
    const [down, right, length, type] = data.slice(i, i + 4);
    line += down;
    character = down === 0 ? character + right : right;
    const start = document.offset({ line, character });
    words.push({ text: document.text.slice(start, start + length), type });
  }
  return words;
}
