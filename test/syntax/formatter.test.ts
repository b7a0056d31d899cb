import { describe, expect, test } from "vitest";
import { format, formatBlocks, formatEdits } from "../../shared-core/syntax/formatter.ts";
import { applyEdits, LineIndex } from "../../shared-core/text/line-index.ts";
import { read, SAMPLE } from "./helpers.ts";

const formatted = (text: string): string => format(read(text).tree);

/** The line as it is laid out, alone in a file. */
const line = (text: string): string => formatted(`thrum 1\n${text}\n`).slice("thrum 1\n".length, -1);

describe("blanks in a line", () => {
  test.each([
    ["let   x=3kg", "let x = 3 kg"],
    ["let x = 3kg+/-10%normal", "let x = 3 kg +/- 10 % normal"],
    ["let x = 3 kg±1 kg within 1 kg   to 5 kg", "let x = 3 kg ± 1 kg within 1 kg to 5 kg"],
    ["let x = a+b-c", "let x = a + b - c"],
    ["let x = - a+ -b", "let x = -a + -b"],
    ["let x = a*b/c^2", "let x = a*b/c^2"],
    ["let x = a *b/ c ^2", "let x = a * b / c ^ 2"],
    ["let x = 12 Hz *t", "let x = 12 Hz * t"],
    ["let x = 12 Hz* t", "let x = 12 Hz * t"],
    ["let x = 12 Hz*t", "let x = 12 Hz*t"],
    ["let x = 3 m ^2", "let x = 3 m ^ 2"],
    ["let x = 5 1/s", "let x = 5 1/s"],
    ["let x = 5(m/s)^2", "let x = 5 (m/s)^2"],
    ["let x = ( 310,840 ,760 )kg*m^2", "let x = (310, 840, 760) kg*m^2"],
    ["let x = sin ( 2*pi*f ) * ( a+b )", "let x = sin(2*pi*f) * (a + b)"],
    ["let x = (k/m)as rad/s", "let x = (k/m) as rad/s"],
    ["let x = a . b .c", "let x = a.b.c"],
    ["let x = if(a<b and not(c>=d), 1,2)", "let x = if(a < b and not (c >= d), 1, 2)"],
    ["let x = 3 kg# why", "let x = 3 kg  # why"],
    ["let x = 3 kg   #why  ", "let x = 3 kg  #why"],
    ["let x\u00a0= 3\u202fkg\t", "let x = 3 kg"],
    ["let x = f(a,at :2 Hz)", "let x = f(a, at: 2 Hz)"],
    ["let x = 5%at 12Hz", "let x = 5 % at 12 Hz"],
    ["kit k (p,q)between a and b", "kit k(p, q) between a and b"],
    ["part p=k ( 3 N/m )between a and b", "part p = k(3 N/m) between a and b"],
    ["point p on b at( 0,1,2 )m", "point p on b at (0, 1, 2) m"],
    ['title   "a  b"', 'title "a  b"'],
    [">note", "> note"],
    [">  note  ", ">  note"],
    [">", ">"],
    ["#   comment  ", "#   comment"],
  ])("%s", (text, expected) => {
    expect(line(text)).toBe(expected);
    expect(line(expected)).toBe(expected);
  });
});

describe("lines", () => {
  test("indentation by four, rows one step deeper, kits one step more, blank lines at most one", () => {
    const ragged = `

thrum 1


  # about the slab
# at the left
> weighed
mass a=3kg
\t> first
 \t# of the detail
  starts_at=1mm

    # at the end
limit l
 rows=
   1Hz 2mm
     # of the row
   > seen
   2Hz,-3mm
kit k(p)between a and b
  > note
  spring s between a and b=p
     count=2


  damper d between a and b=1N*s/m`;
    expect(formatted(ragged)).toBe(`thrum 1

    # about the slab
# at the left
> weighed
mass a = 3 kg
    > first
    # of the detail
    starts_at = 1 mm

    # at the end
limit l
    rows =
        1 Hz  2 mm
        # of the row
        > seen
        2 Hz, -3 mm
kit k(p) between a and b
    > note
    spring s between a and b = p
        count = 2

    damper d between a and b = 1 N*s/m
`);
  });

  test("line endings and the byte order mark are kept, a final newline is added once", () => {
    expect(formatted("\ufeff\r\nthrum  1\r\n\r\n\r\nmass a=1kg")).toBe(
      "\ufeffthrum 1\r\n\r\nmass a = 1 kg\r\n",
    );
    expect(formatted("thrum 1\r\n\r\n  \r\n")).toBe("thrum 1\r\n");
    expect(formatted("thrum   1  # first\n")).toBe("thrum 1  # first\n");
    expect(formatted("")).toBe("");
    expect(formatted("\n \n")).toBe("");
  });

  test("the sample needs two changes", () => {
    const { tree } = read(SAMPLE);
    const edits = formatEdits(tree).map(({ span, text }) => [SAMPLE.slice(span.start, span.end), text]);
    expect(edits).toEqual([
      ["   ", "  "],
      ["   ", "  "],
    ]);
  });
});

describe("text that does not parse", () => {
  test("leaves its block as it is, and only that", () => {
    const text = "thrum 1\nmass  a=1kg\nspring  k between a and\n  count=2\n\n\nmass  b=1kg\n";
    expect(formatted(text)).toBe(
      "thrum 1\nmass a = 1 kg\nspring  k between a and\n  count=2\n\n\nmass b = 1 kg\n",
    );
  });

  test("a loose note does not part a kit into blocks", () => {
    const text =
      "thrum 1\nkit k(p) between a and b\n      mass m=1kg\n> loose\n   spring s between m and b=p\n   count=2\n";
    expect(formatted(text)).toBe(text);
  });

  test("a conflict is not touched, on either side", () => {
    const [ours, middle, theirs] = ["<", "=", ">"].map((sign) => sign.repeat(7));
    const text = `thrum 1\nmass  a=1kg\n${ours} x\nmass  b=1kg\n\n\n${middle}\nmass  b=2kg\n\n\n${theirs} y\nmass  c=1kg\n`;
    expect(formatted(text)).toBe(text.replace("mass  c=1kg", "mass c = 1 kg"));
  });

  test("a detail that is not known is laid out all the same", () => {
    expect(formatted("thrum 1\nmass a = 1 kg\n  nonesuch=3kg\n")).toBe(
      "thrum 1\nmass a = 1 kg\n    nonesuch = 3 kg\n",
    );
  });
});

describe("parts of a file", () => {
  const text = "thrum 1\nmass  a=1kg\n  starts_at=1mm\nmass  b=1kg\n";

  test("a range formats the whole statement it touches, and no other", () => {
    const { tree } = read(text);
    const index = new LineIndex(text);
    const at = (n: number) => applyEdits(text, formatEdits(tree, [index.lineSpan(n)]));
    expect(at(2)).toBe("thrum 1\nmass a = 1 kg\n    starts_at = 1 mm\nmass  b=1kg\n");
    expect(at(3)).toBe("thrum 1\nmass  a=1kg\n  starts_at=1mm\nmass b = 1 kg\n");
    expect(formatEdits(tree, [])).toEqual([]);
  });

  test("blocks cover the text in order", () => {
    const blocks = formatBlocks(read(SAMPLE).tree);
    expect(blocks[0].span.start).toBe(0);
    expect(blocks.at(-1)?.span.end).toBe(SAMPLE.length);
    for (let i = 1; i < blocks.length; i++) expect(blocks[i].span.start).toBe(blocks[i - 1].span.end + 1);
  });
});
