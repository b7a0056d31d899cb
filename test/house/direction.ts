import { dirname, join, normalize, relative } from "node:path/posix";
import { parse } from "es-module-lexer";

/** One line that brings in another file or package. */
export interface Import {
  readonly from: string;
  /** Path from the root for a file of the project, else the name as written. */
  readonly to: string;
  readonly own: boolean;
}

/** Folders of shared-core: each may import itself and those before it. */
const ORDER = [
  "text",
  "numerics",
  "diagnostics",
  "units",
  "syntax",
  "mechanics",
  "vocabulary",
  "records",
  "model",
  "answers",
  "judgement",
  "studies",
  "review",
  "drawing",
  "writing",
  "features",
  "protocol",
];

/** Libraries that the core may use: none of them touches a host. */
const CORE_LIBRARIES = ["mathjs", "valibot", "d3-array", "d3-format", "d3-scale", "d3-shape"];

/** `import("./x.ts").Name` in a type position, which a lexer of JavaScript does not list. */
const TYPE_IMPORT = /\bimport\(\s*["']([^"']+)["']\s*\)\s*\./g;

export function importsOf(file: string, text: string): Import[] {
  const names = parse(text)[0].map((entry) => ("specifier" in entry ? entry.specifier : undefined));
  for (const match of text.matchAll(TYPE_IMPORT)) names.push(match[1]);
  return [...new Set(names)].filter((name) => typeof name === "string").map((name) => target(file, name));
}

/** Why an import breaks the one direction; undefined when it does not. */
export function breach(line: Import): string | undefined {
  const from = placeOf(line.from);
  if (from.side === "free") return undefined;
  if (!line.own) return outside(line, from);
  const to = placeOf(line.to);
  const reason = from.side === "core" ? coreReason(from, to) : hostReason(line, from, to);
  return reason && `${line.from} imports ${line.to}: ${reason}`;
}

interface Place {
  /** `free`: tests, tools, settings. */
  readonly side: "core" | "server" | "client" | "free";
  /** Folder in shared-core/ or client/; "" for the facade and for the server. */
  readonly folder: string;
}

function placeOf(file: string): Place {
  const parts = file.split("/");
  if (parts[0] === "shared-core") return { side: "core", folder: parts.length > 2 ? parts[1] : "" };
  if (parts[0] === "server") return { side: "server", folder: "" };
  if (parts[0] === "client") return { side: "client", folder: parts[1] };
  return { side: "free", folder: "" };
}

function target(from: string, name: string): Import {
  if (!name.startsWith(".")) return { from, to: name, own: false };
  return { from, to: relative(".", normalize(join(dirname(from), name))), own: true };
}

function outside(line: Import, from: Place): string | undefined {
  if (from.side !== "core" || CORE_LIBRARIES.some((library) => isOrBelow(line.to, library))) return undefined;
  return `${line.from} imports ${line.to}: shared-core knows no host and only ${CORE_LIBRARIES.join(", ")}`;
}

function coreReason(from: Place, to: Place): string | undefined {
  if (to.side !== "core") return "shared-core imports nothing outside itself";
  if (from.folder === "") return undefined;
  if (to.folder === "") return "the facade is for other packages";
  if (!ORDER.includes(from.folder)) return `${from.folder}/ has no place in the order of folders`;
  if (from.folder !== "text" && from.folder !== "numerics")
    return ORDER.indexOf(to.folder) <= ORDER.indexOf(from.folder) ? undefined : "a later folder";
  return to.folder === from.folder ? undefined : `${from.folder}/ imports nothing`;
}

function hostReason(line: Import, from: Place, to: Place): string | undefined {
  if (to.side === "core")
    return line.to === "shared-core/index.ts" ? undefined : "only the facade, shared-core/index.ts";
  if (to.side === "free") return line.to === "package.json" ? undefined : "not part of a program";
  if (from.side === to.side && from.folder === to.folder) return undefined;
  // A bundle's main.ts composes programs: the terminal's `serve`, the extension's server in its own process.
  return line.from.endsWith("/main.ts") ? undefined : "programs do not import each other";
}

const isOrBelow = (name: string, library: string) => name === library || name.startsWith(`${library}/`);
