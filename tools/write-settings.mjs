/** Writes the table of settings in README.md from package.json. Usage: node tools/write-settings.mjs [--check] */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./root.mjs";

const target = join(root, "README.md");
const json = (file) => JSON.parse(readFileSync(join(root, file), "utf8"));
const texts = json("package.nls.json");
const { properties } = json("package.json").contributes.configuration;

const rows = Object.entries(properties).map(([key, { default: standard, description, enum: values }]) => {
  const choices = values ? ` ${values.map((value) => `\`${value}\``).join(", ")}` : "";
  return `| \`${key}\` | \`${standard}\` | ${texts[description.slice(1, -1)]}${choices} |`;
});
const table = ["| setting | default | |", "|---|---|---|", ...rows].join("\n");
const page = readFileSync(target, "utf8");
const text = page.replace(
  /(<!-- settings -->\n)[\s\S]*?(\n<!-- end of settings -->)/,
  (_, start, end) => `${start}${table}${end}`,
);

if (!text.includes(table)) throw new Error("README.md has no place for the settings");
if (!process.argv.includes("--check")) writeFileSync(target, text);
else if (text !== page) {
  console.error("README.md shows other settings than package.json: node tools/write-settings.mjs");
  process.exitCode = 1;
}
