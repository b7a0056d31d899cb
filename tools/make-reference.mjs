/**
 * Writes docs/reference/ from the vocabulary: a page a statement and a kind of ask, the functions, the units.
 * Usage: node tools/make-reference.mjs [--check]
 */
import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { loadCore } from "./load-core.mjs";
import { root } from "./root.mjs";

const folder = join(root, "docs", "reference");
const { STATEMENTS, ASKS } = await loadCore("shared-core/vocabulary/registry.ts");
const { FUNCTIONS, signature } = await loadCore("shared-core/vocabulary/functions.ts");
const { wordsOf } = await loadCore("shared-core/vocabulary/measures.ts");
const { formOf } = await loadCore("shared-core/syntax/heads.ts");
const { UNIT_TABLE } = await loadCore("shared-core/units/table.ts");
const { siUnit } = await loadCore("shared-core/units/show.ts");

const FAMILIES = [
  ["file", "The file"],
  ["numbers", "Numbers, assumptions, cases"],
  ["moves", "What can move"],
  ["joins", "What joins"],
  ["drives", "What drives"],
  ["asks", "What is asked"],
  ["holds", "What must hold"],
];

const pages = new Map();
const described = [...STATEMENTS.filter((statement) => statement.keyword !== "ask"), ...ASKS];
for (const statement of described) pages.set(`${idOf(statement)}.md`, statementPage(statement));
pages.set("functions.md", functionsPage());
pages.set("units.md", unitsPage());
pages.set("README.md", indexPage());

if (process.argv.includes("--check")) {
  const stale = [...pages].filter(([name, text]) => read(name) !== text).map(([name]) => name);
  const spare = readdirSync(folder).filter((name) => !pages.has(name));
  if (stale.length + spare.length > 0) {
    console.error(
      `docs/reference is not what tools/make-reference.mjs writes: ${[...stale, ...spare].join(", ")}`,
    );
    process.exit(1);
  }
} else {
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  for (const [name, text] of pages) writeFileSync(join(folder, name), text);
}

function read(name) {
  try {
    return readFileSync(join(folder, name), "utf8");
  } catch {
    return undefined;
  }
}

function idOf({ keyword, variant }) {
  return variant ? `${keyword}-${variant}` : keyword;
}

function titleOf({ keyword, variant }) {
  return variant ? `${keyword} ${variant}` : keyword;
}

function statementPage(statement) {
  const parts = [`# ${titleOf(statement)}`, statement.says];
  if (statement.notYet)
    parts.push("> This version reads and checks it and does not compute it yet (`not-yet-computed`).");
  parts.push(
    fence("text", formOf(statement.grammar).replace("KIND", statement.variant ?? "KIND")),
    statement.text,
  );
  if (statement.details.length > 0) parts.push("## Details", detailTable(statement));
  if (statement.quantities.length > 0) parts.push("## Quantities", quantityTable(statement));
  parts.push("## Example", fence("thrum", statement.example.trimEnd()));
  parts.push("[All statements](README.md) · [Rules of the language](../language.md)");
  return page(parts);
}

function detailTable({ details, principal }) {
  const rows = details.map((detail) => [
    detail.key === principal ? `**\`${detail.key}\`**` : `\`${detail.key}\``,
    cell(detail.says) + (detail.notYet ? " (not computed yet)" : ""),
    cell(contentOf(detail.content)),
    detail.standard === undefined ? "" : `\`${cell(detail.standard)}\``,
    `\`${cell(detail.example)}\``,
  ]);
  const note = principal === undefined ? "" : `\n\nThe bold one may stand in the head, behind \`=\`.`;
  return table(["detail", "says", "holds", "left out", "for example"], rows) + note;
}

function contentOf(content) {
  switch (content.is) {
    case "quantity":
      return wordsOf(content.measure) + (content.orRange ? ", or a range" : "");
    case "tuple":
      return `(${content.components.join(", ")}), each ${wordsOf(content.measure)}`;
    case "word":
    case "words":
      return content.words.join(", ");
    case "text":
      return content.file ? "a file, in quotes" : "a text in quotes";
    case "at":
      return `${wordsOf(content.measure)} at a rate`;
    case "law":
      return `an expression in ${content.variables.join(", ")}`;
    case "table":
      return `rows of ${content.columns.map(({ name }) => name).join(", ")}${content.orFile ? ", or a file" : ""}`;
    case "range":
      return "a range A to B";
    case "quantities":
      return "quantities";
    case "expressions":
      return "expressions";
    case "names":
      return `names${content.keywords ? ` of ${content.keywords.join(", ")}` : ""}`;
    case "changes":
      return "numbers to change, NAME from A to B";
    case "unit":
      return "a unit";
    case "tolerance":
      return "nominal, worst_case, or a share such as 99 %";
    default:
      return content.is;
  }
}

function quantityTable({ quantities }) {
  const rows = quantities.map(({ name, says, measure, whenMotion }) => [
    `\`.${name}\``,
    cell(says),
    cell(wordsOf(measure, whenMotion?.[0])),
  ]);
  return table(["quantity", "says", "is"], rows);
}

function functionsPage() {
  const groups = [
    ["math", "Numbers", "Everywhere in expressions. `if(condition, then, else)` chooses."],
    ["helper", "Helpers", "From handbook data to a number of the model."],
    ["answer", "Of answers", "In expectations; what they read is computed when needed."],
  ];
  const parts = ["# Functions"];
  for (const [group, title, says] of groups) {
    parts.push(`## ${title}`, says);
    for (const fn of FUNCTIONS.filter((each) => each.group === group)) parts.push(...functionEntry(fn));
  }
  return page(parts);
}

function functionEntry(fn) {
  const lines = [`### \`${signature(fn)}\``, fn.says + (fn.notYet ? " Not computed yet." : "")];
  if (fn.parameters.some(({ says }) => says)) {
    lines.push(fn.parameters.map(({ name, says }) => `- \`${name}\`: ${says}`).join("\n"));
  }
  const facts = [
    ["Formula", fn.formula],
    ["Holds", fn.validity],
    ["Source", fn.source],
  ].filter(([, text]) => text);
  if (facts.length > 0) lines.push(facts.map(([name, text]) => `${name}: ${text}`).join("  \n"));
  lines.push(`For example \`${fn.example}\`.`);
  return lines;
}

function unitsPage() {
  const rows = UNIT_TABLE.map((unit) => [
    `\`${unit.name}\``,
    unit.rate ? `${exact(unit.factor)} Hz` : inSi(unit),
    unit.prefixes ? "yes" : "",
  ]);
  return page([
    "# Units",
    "Factors are exact where the definition is exact (NIST SP 811, ISO 80000-3). SI names take the prefixes from `q` to `Q`, `u` or `µ` for micro. Other units are looked up when one is met.",
    table(["unit", "is", "prefixes"], rows),
  ]);
}

function inSi({ factor, dimension }) {
  const unit = siUnit({ dimension, rate: false });
  return unit === "1" ? exact(factor) : `${exact(factor)} ${unit}`;
}

function exact(factor) {
  return String(factor).replace(/e\+?/, "e");
}

function indexPage() {
  const parts = [
    "# Reference",
    "Written from the descriptions that the tool itself uses; every example runs as a test.",
  ];
  for (const [family, title] of FAMILIES) {
    const own = described.filter((statement) => statement.family === family);
    const rows = own.map((statement) => [
      `[\`${titleOf(statement)}\`](${idOf(statement)}.md)`,
      cell(statement.says) + (statement.notYet ? " *Not computed yet.*" : ""),
    ]);
    parts.push(`## ${title}`, table(["statement", "says"], rows));
  }
  parts.push(
    "[Functions](functions.md) · [Units](units.md) · [Messages](../diagnostics/) · [Rules of the language](../language.md)",
  );
  return page(parts);
}

function table(heads, rows) {
  const line = (cells) => `| ${cells.join(" | ")} |`;
  return [line(heads), line(heads.map(() => "---")), ...rows.map(line)].join("\n");
}

function cell(text) {
  return text.replaceAll("|", "\\|").replaceAll("\n", " ");
}

function fence(language, text) {
  return `\`\`\`${language}\n${text}\n\`\`\``;
}

function page(parts) {
  return `${parts.join("\n\n")}\n`;
}
