import fc from "fast-check";
import Papa from "papaparse";
import { describe, expect, it } from "vitest";
import { CsvReader, type CsvRow, LONGEST_ROW, recordNumber } from "../../shared-core/records/csv.ts";

function read(text: string, chunk = text.length || 1): CsvRow[] {
  const rows: CsvRow[] = [];
  const reader = new CsvReader((row) => rows.push(row));
  for (let at = 0; at < text.length; at += chunk) reader.push(text.slice(at, at + chunk));
  reader.end();
  return rows;
}

const fieldsOf = (text: string, chunk?: number) => read(text, chunk).map((row) => [...row.fields]);

describe("the reader of delimited text", () => {
  it.each([
    [
      "commas",
      "t,a\n0,1\n1,2\n",
      [
        ["t", "a"],
        ["0", "1"],
        ["1", "2"],
      ],
    ],
    [
      "semicolons with decimal commas",
      "t;a\n0,5;1,25\n",
      [
        ["t", "a"],
        ["0,5", "1,25"],
      ],
    ],
    [
      "tabs",
      "t\ta\r\n0\t1\r\n",
      [
        ["t", "a"],
        ["0", "1"],
      ],
    ],
    [
      "lone returns as line ends",
      "t,a\r0,1\r",
      [
        ["t", "a"],
        ["0", "1"],
      ],
    ],
    [
      "a byte order mark",
      "\ufefft,a\n0,1",
      [
        ["t", "a"],
        ["0", "1"],
      ],
    ],
    [
      "quotes",
      't,"a, in ""g"""\n0,"1"\n',
      [
        ["t", 'a, in "g"'],
        ["0", "1"],
      ],
    ],
    [
      "a line break inside quotes",
      't,"a\nb"\n0,1\n',
      [
        ["t", "a\nb"],
        ["0", "1"],
      ],
    ],
    [
      "blank and commented lines",
      "# logger 4\n\nt,a\n\n0,1\n# end\n",
      [
        ["t", "a"],
        ["0", "1"],
      ],
    ],
    [
      "a delimiter only inside the header's quotes",
      't,"a;b"\n0,1\n',
      [
        ["t", "a;b"],
        ["0", "1"],
      ],
    ],
    ["one column", "a\n1\n2\n", [["a"], ["1"], ["2"]]],
    [
      "empty fields",
      "a,b,c\n1,,\n",
      [
        ["a", "b", "c"],
        ["1", "", ""],
      ],
    ],
    ["nothing", "", []],
  ])("reads %s, in one piece and by single characters", (_, text, expected) => {
    expect(fieldsOf(text)).toEqual(expected);
    expect(fieldsOf(text, 1)).toEqual(expected);
  });

  it("counts lines and columns, through quoted line breaks and comments", () => {
    const rows = read('# x\nt,"a\nb"\n\n0, 12\n', 3);
    expect(rows.map((row) => [row.line, [...row.columns]])).toEqual([
      [2, [1, 3]],
      [5, [1, 4]],
    ]);
  });

  it("tears an open quote off instead of swallowing the file", () => {
    const text = `a,b\n1,"2\n${"3,4\n".repeat(LONGEST_ROW / 2)}`;
    expect(read(text, 1000).some((row) => row.torn)).toBe(true);
    expect(read('a,b\n1,"2').at(-1)).toMatchObject({ torn: true, line: 2 });
  });

  // papaparse is the oracle for what the fields of a dialect are.
  it("reads what papaparse reads, whatever the chunks", () => {
    const field = fc.string({ unit: fc.constantFrom("a", "1", ".", '"', " ", "\n", "é", "-"), maxLength: 6 });
    const table = fc
      .tuple(fc.integer({ min: 2, max: 4 }), fc.integer({ min: 2, max: 5 }))
      .chain(([columns, rows]) =>
        fc.array(fc.array(field, { minLength: columns, maxLength: columns }), {
          minLength: rows,
          maxLength: rows,
        }),
      );
    const delimiters = fc.constantFrom(",", ";", "\t");
    fc.assert(
      fc.property(
        table,
        delimiters,
        fc.constantFrom("\n", "\r\n"),
        fc.integer({ min: 1, max: 9 }),
        (rows, delimiter, newline, chunk) => {
          const trimmed = rows.map((row, i) =>
            row.map((text, j) => (i < 2 && j === 0 ? `x${text.trim()}` : text.trim())),
          );
          const text = Papa.unparse(trimmed, { delimiter, newline, quotes: true });
          const oracle = Papa.parse<string[]>(text, { delimiter, newline });
          expect(fieldsOf(text, chunk)).toEqual(oracle.data);
        },
      ),
      { numRuns: 300, seed: 11 },
    );
  });

  it("ends on any text, whatever the chunks, with the same rows", () => {
    const text = fc.string({
      unit: fc.constantFrom("1", ",", ";", "\t", '"', "\n", "\r", " ", "#", "\ufeff"),
      maxLength: 60,
    });
    fc.assert(
      fc.property(text, fc.integer({ min: 1, max: 7 }), (source, chunk) => {
        expect(read(source, chunk)).toEqual(read(source));
      }),
      { numRuns: 500, seed: 12 },
    );
  });
});

describe("a number of a record", () => {
  it.each([
    ["12", false, 12],
    ["-1.5e-3", false, -1.5e-3],
    [".5", false, 0.5],
    ["1,5", true, 1.5],
    ["-1,5E+2", true, -150],
    ["1,5", false, Number.NaN],
    ["nan", false, Number.NaN],
    ["inf", false, Number.NaN],
    ["0x10", false, Number.NaN],
    ["", false, Number.NaN],
    ["1.234,5", true, Number.NaN],
  ])("%s with decimal comma %s is %d", (text, comma, value) => {
    expect(recordNumber(text, comma)).toBe(value);
  });
});
