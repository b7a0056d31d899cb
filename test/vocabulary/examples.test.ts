import { expect, test } from "vitest";
import { judge } from "../../shared-core/judgement/judge.ts";
import type { FileReader } from "../../shared-core/model/model.ts";
import { understand } from "../../shared-core/model/understand.ts";
import type { StatementDescription } from "../../shared-core/vocabulary/description.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";

const EXAMPLES = [...STATEMENTS, ...ASKS].map((statement) => ({
  title: [statement.keyword, statement.variant].join(" ").trim(),
  statement,
}));

function report({ example, exampleFiles = {} }: StatementDescription) {
  const files: FileReader = {
    read: (path) => {
      const text = exampleFiles[path];
      return text === undefined ? { ok: false, why: "missing", detail: path } : { ok: true, text };
    },
  };
  return judge(understand("example.thrum", example, files));
}

test.each(EXAMPLES.filter(({ statement }) => !statement.notYet))(
  "the example of $title draws no caution and holds",
  ({ statement }) => {
    const { diagnostics, cases } = report(statement);
    const cautions = diagnostics.filter(({ severity }) => severity !== "hint");
    expect(cautions.map(({ code, message }) => `${code}: ${message}`)).toEqual([]);
    const verdicts = cases.flatMap((each) => each.verdicts);
    expect(verdicts.length).toBeGreaterThan(0);
    for (const { name, holds, reason } of verdicts) expect(holds, `${name}: ${reason}`).toBe(true);
  },
);

test.each(EXAMPLES.filter(({ statement }) => statement.notYet))(
  "the example of $title is understood, and says what is not computed yet",
  ({ statement }) => {
    const codes = report(statement).diagnostics.filter(({ severity }) => severity === "error");
    expect(codes.length).toBeGreaterThan(0);
    expect(codes.filter(({ code }) => code !== "not-yet-computed").map(({ message }) => message)).toEqual([]);
  },
);
