import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { instantiate } from "../../shared-core/model/instantiate.ts";
import { understand } from "../../shared-core/model/understand.ts";
import { readerOf } from "./check.ts";

const folder = fileURLToPath(new URL("../../examples/", import.meta.url));
const examples = readdirSync(folder)
  .filter((file) => file.endsWith(".thrum"))
  .map((file) => readFileSync(`${folder}${file}`, "utf8"));

/** Understands, puts numbers in, and looks at everything that is put in late. */
function through(text: string): void {
  const model = understand("model.thrum", text, readerOf());
  for (const diagnostic of model.diagnostics) {
    expect(diagnostic.message.endsWith(".")).toBe(false);
    expect(diagnostic.span.start).toBeGreaterThanOrEqual(0);
    expect(diagnostic.span.end).toBeLessThanOrEqual(text.length);
    expect(diagnostic.span.start).toBeLessThanOrEqual(diagnostic.span.end);
  }
  model.cases.forEach((_, index) => {
    const instance = instantiate(model, index);
    expect(instance.asks.length + instance.limits.size + instance.parameters.size).toBeGreaterThanOrEqual(0);
    if (!model.buildable || !instance.sound) return;
    const { elements, inertias } = instance.assembly;
    for (const { stiffness, damping } of elements) expect(Number.isFinite(stiffness + damping)).toBe(true);
    for (const { value } of inertias) expect(Number.isFinite(value)).toBe(true);
  });
}

describe("any text becomes a model", () => {
  it("every prefix of an example, at each end of a line and between", () => {
    for (const text of examples) {
      for (let end = 0; end < text.length; end += 97) through(text.slice(0, end));
    }
  });

  it("examples with lines lost, doubled and swapped, and with characters put in", () => {
    const junk = fc.constantFrom(
      "(",
      ")",
      "=",
      "-",
      "1e999",
      "0",
      " kg",
      "+/- ",
      " to ",
      "^",
      "/ 0",
      "let ",
      "\n",
      "\n    ",
      ".",
      ",",
      "unit",
      "3 Hz",
    );
    fc.assert(
      fc.property(
        fc.constantFrom(...examples),
        fc.array(fc.tuple(fc.nat(), junk), { minLength: 1, maxLength: 6 }),
        fc.array(fc.tuple(fc.nat(), fc.nat()), { maxLength: 3 }),
        (example, insertions, swaps) => {
          const lines = example.split("\n");
          for (const [a, b] of swaps) {
            const [i, k] = [a % lines.length, b % lines.length];
            [lines[i], lines[k]] = [lines[k], lines[i]];
          }
          let text = lines.join("\n");
          for (const [place, what] of insertions) {
            const at = place % (text.length + 1);
            text = text.slice(0, at) + what + text.slice(at);
          }
          through(text);
        },
      ),
      { numRuns: 120, seed: 7 },
    );
  });

  it("expressions of any shape", () => {
    const leaf = fc.constantFrom(
      "0",
      "2",
      "pi",
      "3 kg",
      "12 Hz",
      "n",
      "unknown",
      "t",
      "1/s",
      "4 1/s",
      "(1, 2)",
      "f()",
      "5 %",
    );
    const { expression } = fc.letrec<{ expression: string }>((tie) => ({
      expression: fc.oneof(
        { maxDepth: 5 },
        leaf,
        fc
          .tuple(
            tie("expression"),
            fc.constantFrom("+", "-", "*", "/", "^", "<", "and", "as"),
            tie("expression"),
          )
          .map(([a, operator, b]) => (operator === "as" ? `(${a}) as rad/s` : `${a} ${operator} (${b})`)),
        fc
          .tuple(
            fc.constantFrom("sqrt", "sin", "if", "min", "log", "peak", "shaft"),
            fc.array(tie("expression"), { maxLength: 3 }),
          )
          .map(([name, args]) => `${name}(${args.join(", ")})`),
      ),
    }));
    fc.assert(
      fc.property(expression, expression, (a, b) => {
        through(
          `thrum 1\nlet n = 3 Hz\nlet x = ${a}\nmass m = ${b}\nbind m = ${a}\nforce f on m\n    law = ${b}\nask sweep\n    of = ${a}\n    from = 1 Hz\n    to = ${b}\nexpect y = ${a} <= ${b}\n`,
        );
      }),
      { numRuns: 300, seed: 8 },
    );
  });

  it("long files of one mistake, in time that grows with their length", () => {
    const many = (line: (i: number) => string) => Array.from({ length: 1000 }, (_, i) => line(i)).join("\n");
    through(`thrum 1\nmass m = 1 kg\n${many((i) => `let x${i} = unknown${i}`)}`);
    through(`thrum 1\n${many(() => "mass m = 1 kg")}`);
    through(
      `thrum 1\nmass m = 1 kg\n${many((i) => `spring s${i} between m and ground\n    like = s${i + 1}`)}`,
    );
    through(`thrum 1\nmass m = 1 kg\n${many((i) => `let x${i} = 3`)}`);
    through(`thrum 1\n${many((i) => `junction j${i}\nbind j${i} = 2 * j${(i + 1) % 1000}`)}`);
    through(`thrum 1\nmass m = 1 kg\nmass n = 1 kg\n${many(() => "bind m = 2 * n")}`);
  });

  it("nesting as deep as the parser lets through, without repeated work", () => {
    const deep = (open: string, close: string, inner: string) => open.repeat(200) + inner + close.repeat(200);
    through(`thrum 1\nlet n = 3 Hz\nlet x = ${deep("(", " * 2)", "n")}\n`);
    through(`thrum 1\nlet n = 3 Hz\nlet x = ${deep("(2 * (", "))", "1 / n")}\n`);
    through(`thrum 1\nlet x = ${deep("sqrt(", ")", "3")}\n`);
    through(`thrum 1\nlet x = ${deep("-", "", "3")}\n`);
    through(`thrum 1\nlet n = 3 Hz\nlet x = 1${" + n * 2 / (3 - n / n)".repeat(150)}\n`);
  });
});
