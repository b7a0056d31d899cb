import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";
import { judge, judgeAgain } from "../../shared-core/judgement/judge.ts";
import { sameMeaning } from "../../shared-core/judgement/same-meaning.ts";
import { finish } from "../../shared-core/judgement/steps.ts";
import type { Model } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { checkJson } from "../../shared-core/writing/check-json.ts";

const EXAMPLES = fileURLToPath(new URL("../../examples/", import.meta.url));
const modelOf = (text: string): Model =>
  understand("model.thrum", text, { read: () => ({ ok: false, why: "missing", detail: "" }) });

const TEXT = `thrum 1
> Weighed on site.
> accept near-resonance: passed at once
let m = 8 kg  # a comment
mass drum = m
spring feet between drum and ground = 5.4 N/mm
    count = 2
`;

describe("the meaning of a text", () => {
  const same = (edited: string) => sameMeaning(modelOf(TEXT).tree, modelOf(edited).tree);

  test.each([
    ["comments", TEXT.replace("# a comment", "# another one")],
    ["comment lines", TEXT.replace("mass", "# here\nmass")],
    ["notes", TEXT.replace("Weighed on site.", "source: ticket 0417")],
    ["blank lines and blanks", TEXT.replace("mass drum = m", "\n\nmass   drum =  m  ")],
    ["line endings", TEXT.replaceAll("\n", "\r\n")],
    ["nothing", TEXT],
  ])("does not rest on %s", (_, edited) => expect(same(edited)).toBe(true));

  test.each([
    ["a number", TEXT.replace("8 kg", "9 kg")],
    ["a name", TEXT.replaceAll("drum", "drun")],
    ["a statement more", `${TEXT}let spare = 1\n`],
    ["a statement less", TEXT.replace("    count = 2\n", "")],
    ["what stands under what", TEXT.replace("    count", "count")],
    ["what is accepted", TEXT.replace("accept near-resonance", "accept not-damped")],
    ["words that grow together", TEXT.replace("count = 2", "count = 2 2")],
  ])("rests on %s", (_, edited) => expect(same(edited)).toBe(false));
});

describe("judging a text that means the same", () => {
  test.each(readdirSync(EXAMPLES).filter((file) => file.endsWith(".thrum")))(
    "says of %s what judging it from the start says, and answers nothing anew",
    (file) => {
      const text = readFileSync(EXAMPLES + file, "utf8");
      const before = judge(modelOf(text));
      const edited = `${text.replace(/^let /m, "# moved by a line\nlet ")}\n# the end\n`;
      const model = modelOf(edited);
      expect(sameMeaning(model.tree, before.model.tree)).toBe(true);
      const again = finish(judgeAgain(model, before), () => false);
      const json = (report: typeof again) => checkJson([{ readable: true, path: file, report }]);
      expect(json(again)).toEqual(json(judge(modelOf(edited))));
      const answersOf = (report: typeof again) =>
        report.cases.flatMap(({ answers }) =>
          [...answers.values()].map((each) => (each.ok ? each.value : each.reason)),
        );
      const [mine, theirs] = [answersOf(again), answersOf(before)];
      expect(mine.length).toBeGreaterThan(0);
      for (const [i, answer] of mine.entries()) expect(answer).toBe(theirs[i]);
      // And again from there.
      const third = finish(judgeAgain(modelOf(`${edited}\n`), again), () => false);
      expect(answersOf(third)[0]).toBe(theirs[0]);
      expect(third.cases[0].instance.model).not.toBe(before.model);
    },
  );
});
