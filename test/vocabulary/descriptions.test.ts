import { describe, expect, test } from "vitest";
import type { Motion } from "../../shared-core/mechanics/builder.ts";
import { sameKind } from "../../shared-core/units/quantity.ts";
import type {
  DetailDescription,
  Measure,
  StatementDescription,
} from "../../shared-core/vocabulary/description.ts";
import { dimensionOf } from "../../shared-core/vocabulary/measures.ts";
import { ASKS, STATEMENTS } from "../../shared-core/vocabulary/registry.ts";
import { headText, kindOfNumber, kindsOf, read, withDetail } from "./written.ts";

const ALL: readonly StatementDescription[] = [...STATEMENTS, ...ASKS];
const titleOf = ({ keyword, variant }: StatementDescription): string => [keyword, variant].join(" ").trim();
const DETAILS = ALL.flatMap((statement) =>
  statement.details.map((detail) => ({ title: `${titleOf(statement)}: ${detail.key}`, statement, detail })),
);

/** In which motion the example of a detail is written. */
function motionOf(statement: StatementDescription, detail: DetailDescription): Motion {
  if (["inertia", "pendulum", "torque"].includes(statement.keyword) || detail.whenMotion?.includes("turning"))
    return "turning";
  return statement.keyword === "voltage" ? "charge" : "sliding";
}

describe("every statement", () => {
  test.each(ALL.map((statement) => ({ title: titleOf(statement), statement })))(
    "$title reads as its grammar has it",
    ({ statement }) => {
      const { tree, diagnostics } = read(`thrum 1\n${headText(statement)}\n`);
      expect(diagnostics.map(({ message }) => message)).toEqual([]);
      expect(tree.statements.map(({ keyword }) => keyword.text)).toEqual([statement.keyword]);
    },
  );

  test.each(ALL.map((statement) => ({ title: titleOf(statement), statement })))(
    "$title has words, text, an example that uses it, and a snippet",
    ({ statement }) => {
      expect(statement.says).toMatch(/^[A-Z].*\.$/);
      expect(statement.text.length).toBeGreaterThan(150);
      expect(statement.text).not.toMatch(/ {2}|\n\n\n| \n/);
      expect(statement.snippet).toMatch(/^\w+/);
      const { tree, diagnostics } = read(statement.example);
      expect(diagnostics.map(({ message }) => message)).toEqual([]);
      expect(tree.version?.number).toBe(1);
      const used = tree.statements.filter(({ keyword }) => keyword.text === statement.keyword);
      const kinds = used
        .map(({ slots }) => slots.kind)
        .flatMap((kind) => (kind?.kind === "name" ? kind.text : []));
      expect(used.length).toBeGreaterThan(0);
      if (statement.variant !== undefined) expect(kinds).toContain(statement.variant);
      expect(tree.statements.some(({ keyword }) => keyword.text === "expect")).toBe(true);
    },
  );

  test.each(
    ALL.filter(({ principal }) => principal).map((statement) => ({ title: titleOf(statement), statement })),
  )("$title: its principal is one of its details", ({ statement }) => {
    expect(statement.details.map(({ key }) => key)).toContain(statement.principal);
    expect(statement.grammar.value).toBe("optional");
    expect(statement.grammar.principal).toBe(statement.principal);
  });
});

describe("every detail", () => {
  test.each(DETAILS)("$title has an example that reads", ({ statement, detail }) => {
    const { tree, diagnostics } = read(withDetail(statement, detail));
    expect(diagnostics.map(({ message }) => message)).toEqual([]);
    const [node] = tree.statements[0].details;
    expect(node.key.text).toBe(detail.key);
    expect(node.broken).toBe(false);
    expect(detail.says).not.toMatch(/\.$/);
  });

  test.each(DETAILS.filter(({ detail }) => "measure" in detail.content && detail.content.is !== "law"))(
    "$title is of its measure",
    ({ statement, detail }) => {
      const [node] = read(withDetail(statement, detail)).tree.statements[0].details;
      const { measure } = detail.content as { readonly measure: Measure };
      const wanted = dimensionOf(measure, motionOf(statement, detail));
      const found = kindsOf(node.items);
      expect(found.length).toBeGreaterThan(0);
      for (const kind of found) if (wanted !== undefined) expect(sameKind(kind, wanted)).toBe(true);
      const { standard } = detail;
      if (standard === undefined || !/^\(?[\d.]/.test(standard)) return;
      const again = read(withDetail(statement, { ...detail, example: standard })).tree.statements[0]
        .details[0];
      const bareZero = standard === "0";
      for (const kind of kindsOf(again.items))
        if (wanted !== undefined) expect(bareZero || sameKind(kind, wanted), standard).toBe(true);
    },
  );

  test.each(DETAILS.filter(({ detail }) => detail.content.is === "table"))(
    "$title has a row that fits its columns",
    ({ statement, detail }) => {
      const [node] = read(withDetail(statement, detail)).tree.statements[0].details;
      if (detail.content.is !== "table") return;
      const { columns } = detail.content;
      const [row] = node.table ?? [];
      expect(row.cells.length).toBeLessThanOrEqual(columns.length);
      for (const [i, cell] of row.cells.entries()) {
        const wanted = dimensionOf(columns[i].measure, motionOf(statement, detail));
        if (wanted !== undefined) expect(sameKind(kindOfNumber(cell), wanted)).toBe(true);
      }
    },
  );

  test.each(DETAILS.filter(({ detail }) => detail.content.is === "word"))(
    "$title offers words",
    ({ detail }) => {
      if (detail.content.is !== "word") return;
      expect(new Set(detail.content.words).size).toBe(detail.content.words.length);
      if (detail.standard !== undefined) expect(detail.content.words).toContain(detail.standard);
    },
  );

  test("no statement has a detail twice", () => {
    for (const statement of ALL) {
      const keys = statement.details.map(({ key }) => key);
      expect(new Set(keys).size, titleOf(statement)).toBe(keys.length);
    }
  });
});
