/**
 * Writes syntaxes/thrum.tmLanguage.json from the vocabulary and the unit table, so that a new statement or unit
 * is coloured where no server runs. Usage: node tools/make-grammar.mjs [--check]
 */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { loadCore } from "./load-core.mjs";
import { root } from "./root.mjs";

const target = join(root, "syntaxes", "thrum.tmLanguage.json");
const { ASKS, STATEMENTS } = await loadCore("shared-core/vocabulary/registry.ts");
const { UNIT_TABLE } = await loadCore("shared-core/units/table.ts");
const { PREFIXES } = await loadCore("shared-core/units/lookup.ts");

const text = `${JSON.stringify(grammar(), null, 2)}\n`;
if (process.argv.includes("--check")) {
  if (readFileSync(target, "utf8") !== text) {
    console.error("syntaxes/thrum.tmLanguage.json is not what tools/make-grammar.mjs writes");
    process.exit(1);
  }
} else {
  writeFileSync(target, text);
}

/** Scope of a statement's keyword by what it does in a model. */
function scopeOf(family) {
  const kinds = {
    file: "import",
    numbers: "let",
    moves: "moves",
    joins: "joins",
    drives: "drives",
    asks: "asks",
    holds: "holds",
  };
  return family === "file" ? "keyword.control.import.thrum" : `keyword.other.${kinds[family]}.thrum`;
}

function grammar() {
  const families = new Map();
  for (const { keyword, family } of STATEMENTS)
    families.set(family, [...(families.get(family) ?? []), keyword]);
  return {
    $schema: "https://json.schemastore.org/tmlanguage.json",
    name: "Thrum",
    scopeName: "source.thrum",
    fileTypes: ["thrum"],
    patterns: [
      { include: "#conflict" },
      { include: "#comment" },
      { include: "#note" },
      { include: "#version" },
      { include: "#question" },
      ...[...families.keys()].map((family) => ({ include: `#${family}` })),
      { include: "#detail" },
      { include: "#row" },
    ],
    repository: {
      conflict: { match: "^(?:<{7}|\\|{7}|={7}|>{7})(?: .*)?$", name: "invalid.illegal.conflict.thrum" },
      comment: {
        match: "(#).*$",
        name: "comment.line.number-sign.thrum",
        captures: { 1: { name: "punctuation.definition.comment.thrum" } },
      },
      note: {
        match: "^\\s*(>)(?:\\s*([\\p{L}_][\\p{L}\\p{N}_]*)(:)(?=\\s))?(.*)$",
        name: "comment.line.documentation.thrum",
        captures: {
          1: { name: "punctuation.definition.comment.thrum" },
          2: { name: "storage.type.class.tag.thrum" },
          3: { name: "punctuation.separator.tag.thrum" },
        },
      },
      version: {
        match: "^(thrum)[ \\t]+([0-9]+)\\b",
        captures: {
          1: { name: "keyword.control.import.thrum" },
          2: { name: "constant.numeric.integer.thrum" },
        },
      },
      question: {
        begin: `^(ask)[ \\t]+(${ASKS.map(({ variant }) => variant).join("|")})\\b(?:[ \\t]+([\\p{L}_][\\p{L}\\p{N}_]*))?`,
        beginCaptures: {
          1: { name: scopeOf("asks") },
          2: { name: "constant.other.choice.thrum" },
          3: { name: "entity.name.thrum" },
        },
        end: "$",
        patterns: [{ include: "#value" }],
      },
      ...Object.fromEntries(
        [...families].map(([family, keywords]) => [family, statement(scopeOf(family), keywords)]),
      ),
      detail: {
        begin: "^[ \\t]+([\\p{L}_][\\p{L}\\p{N}_]*)(?:(\\.)([\\p{L}_][\\p{L}\\p{N}_]*))?[ \\t]*(=)(?!=)",
        beginCaptures: {
          1: { name: "variable.other.property.thrum" },
          2: { name: "punctuation.accessor.thrum" },
          3: { name: "variable.other.property.thrum" },
          4: { name: "keyword.operator.assignment.thrum" },
        },
        end: "$",
        patterns: [{ include: "#value" }],
      },
      row: { begin: "^[ \\t]+(?=\\S)", end: "$", patterns: [{ include: "#value" }] },
      value: {
        patterns: [
          { include: "#comment" },
          { include: "#string" },
          { include: "#number" },
          { include: "#argument" },
          { include: "#words" },
          { include: "#function" },
          { include: "#constant" },
          { include: "#operator" },
          { include: "#path" },
        ],
      },
      string: {
        begin: '"',
        end: '"|$',
        name: "string.quoted.double.thrum",
        beginCaptures: { 0: { name: "punctuation.definition.string.begin.thrum" } },
        endCaptures: { 0: { name: "punctuation.definition.string.end.thrum" } },
      },
      number: {
        match: `(?<![\\p{L}\\p{N}_.])([0-9]+(?:\\.[0-9]+)?(?:[eE][+-]?[0-9]+)?)(?:[ \\t]*(${unitPattern()}))?(?![\\p{L}\\p{N}_])`,
        captures: { 1: { name: "constant.numeric.thrum" }, 2: { name: "keyword.other.unit.thrum" } },
      },
      words: {
        match: "\\b(between|and|on|of|at|in|from|to|as|within|or|not|if|normal|uniform|lognormal)\\b",
        name: "keyword.operator.word.thrum",
      },
      function: { match: "\\b([\\p{L}_][\\p{L}\\p{N}_]*)(?=\\()", name: "support.function.thrum" },
      argument: {
        match: "\\b([\\p{L}_][\\p{L}\\p{N}_]*)(:)",
        captures: {
          1: { name: "variable.parameter.thrum" },
          2: { name: "punctuation.separator.key-value.thrum" },
        },
      },
      constant: { match: "\\b(pi|e|ground)\\b", name: "constant.language.thrum" },
      operator: { match: "\\+/-|±|<=|>=|==|!=|[-+*/·^<>=]", name: "keyword.operator.thrum" },
      path: {
        match: "([\\p{L}_][\\p{L}\\p{N}_]*)((?:\\.[\\p{L}_][\\p{L}\\p{N}_]*)*)",
        captures: { 1: { name: "variable.other.thrum" }, 2: { name: "variable.other.member.thrum" } },
      },
    },
  };
}

/** A statement that starts in column 1, or indented in a kit where a name follows the keyword. */
function statement(scope, keywords) {
  const words = keywords.join("|");
  return {
    begin: `^(${words})\\b(?:[ \\t]+([\\p{L}_][\\p{L}\\p{N}_]*))?|^[ \\t]+(${words})[ \\t]+([\\p{L}_][\\p{L}\\p{N}_]*)(?=[ \\t]|$)`,
    beginCaptures: {
      1: { name: scope },
      2: { name: "entity.name.thrum" },
      3: { name: scope },
      4: { name: "entity.name.thrum" },
    },
    end: "$",
    patterns: [{ include: "#value" }],
  };
}

/** `kg*m^2`, `N/(m*s)`, `1/s`: as far as there is no blank and each factor is a unit. */
function unitPattern() {
  const escaped = (word) => word.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  const longest = (words) =>
    [...words]
      .sort((a, b) => b.length - a.length || (a < b ? -1 : 1))
      .map(escaped)
      .join("|");
  const names = new Set(UNIT_TABLE.filter((u) => !u.prefixes).map((u) => u.name));
  const si = new Set(UNIT_TABLE.filter((u) => u.prefixes).map((u) => u.name));
  const name = `(?:(?:${longest(names)}|(?:${longest(PREFIXES.keys())})?(?:${longest(si)}))(?![\\p{L}\\p{N}_]))`;
  const power = "(?:\\^-?[0-9]+)?";
  const group = `\\((?:${name}|1)${power}(?:[*·/](?:${name}|1)${power})*\\)${power}`;
  const factor = `(?:${name}${power}|${group})`;
  return `(?:${factor}|1(?=/))(?:[*·/](?:${factor}|1(?![0-9.])))*`;
}
