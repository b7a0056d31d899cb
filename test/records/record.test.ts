import { describe, expect, it } from "vitest";
import { readColumns, readHeader } from "../../shared-core/records/record.ts";

const time = { what: "time", column: 1 } as const;
const value = { what: "value", column: 2 } as const;

const problemsOf = (text: string, wishes = [time, value] as Parameters<typeof readColumns>[1]) =>
  readColumns(text, wishes, 0).problems.map((problem) => problem.message);

describe("columns of a record", () => {
  it("reads by name and by number, with and without a header", () => {
    const byName = readColumns("t,a,b\n0,1,2\n0.5,3,4\n", [
      { what: "time", column: "t" },
      { what: "value", column: "b" },
    ]);
    expect(byName.columns.map((column) => [...column])).toEqual([
      [0, 0.5],
      [2, 4],
    ]);
    expect(byName.header).toEqual(["t", "a", "b"]);
    const byNumber = readColumns("0;1,5\n0,5;-2\n", [time, value]);
    expect(byNumber.columns.map((column) => [...column])).toEqual([
      [0, 0.5],
      [1.5, -2],
    ]);
    expect(byNumber.problems).toEqual([]);
  });

  it.each([
    ["text", "t,a\n0,1\n1,x\n", 'line 3: "x" stands where a number was expected'],
    ["not a number", "t,a\n0,NaN\n1,2\n", 'line 2: "NaN" stands where a number was expected'],
    ["infinity", "t,a\n0,1\n1,inf\n", 'line 3: "inf" stands where a number was expected'],
    ["an overflow", "t,a\n0,1\n1,1e999\n", 'line 3: "1e999" stands where a number was expected'],
    ["a short row", "t,a\n0,1\n1\n", "line 3 has 1 field, the value was to be field 2"],
    ["an empty field", "t,a\n0,1\n1,\n", "line 3: the value is empty"],
    ["a time that stands still", "t,a\n0,1\n0,2\n", "line 3: time 0 does not come after 0"],
    ["a time that runs back", "t,a\n0,1\n2,2\n1,2\n", "line 4: time 1 does not come after 2"],
    ["an open quote", 't,a\n0,1\n1,"2\n', "line 3 opens a quote that is never closed"],
    ["an empty file", "", "holds no rows of numbers"],
    ["a header alone", "t,a\n", "holds no rows of numbers"],
  ])("tells %s with its line", (_, text, message) => {
    expect(problemsOf(text)).toEqual([message]);
  });

  it("tells five bad rows and then their count", () => {
    const messages = problemsOf(`t,a\n0,1\n${Array.from({ length: 9 }, (_, i) => `${i + 1},x\n`).join("")}`);
    expect(messages).toHaveLength(6);
    expect(messages[5]).toBe("4 more rows are not readable");
  });

  it("names the columns there are, and the one that was meant", () => {
    const reading = readColumns("time,acceleration\n0,1\n", [{ what: "value", column: "aceleration" }]);
    expect(reading.problems).toEqual([
      {
        message: 'has no column "aceleration" for the value; it has "time", "acceleration"',
        line: 1,
        nearest: "acceleration",
      },
    ]);
    expect(problemsOf("t,a\n0,1\n", [{ what: "value", column: 3 }])).toEqual([
      "has 2 columns, the value was to be column 3",
    ]);
    expect(problemsOf("0,1\n", [{ what: "value", column: "a" }])).toEqual([
      'has no header, so no column is called "a"',
    ]);
  });

  it("keeps more rows than its first buffer holds", () => {
    const text = Array.from({ length: 5000 }, (_, i) => `${i / 100},${i}`).join("\n");
    const reading = readColumns(text, [time, value], 0);
    expect(reading.columns[1]).toHaveLength(5000);
    expect(reading.columns[1][4999]).toBe(4999);
    expect(readHeader(text)).toBeUndefined();
  });
});
