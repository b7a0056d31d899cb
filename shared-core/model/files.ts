import type { DiagnosticCode } from "../diagnostics/codes.ts";
import type { Span } from "../text/span.ts";
import type { Findings } from "./findings.ts";
import type { FileReader } from "./model.ts";

/** A path written in a file, as the reader takes it: relative to that file's folder, `.` and `..` taken out. */
export function resolvePath(from: string, written: string): string {
  const isAbsolute = written.startsWith("/") || /^[a-zA-Z][\w+.-]*:/.test(written);
  const parts = isAbsolute ? [] : from.split("/").slice(0, -1);
  for (const part of written.replaceAll("\\", "/").split("/")) {
    if (part === "..") {
      if (parts.length > 0 && parts[parts.length - 1] !== ".." && parts[parts.length - 1] !== "") parts.pop();
      else parts.push(part);
    } else if (part !== "." && (part !== "" || parts.length === 0)) {
      parts.push(part);
    }
  }
  return parts.join("/");
}

const CODES: Readonly<Record<"missing" | "outside" | "unreadable", DiagnosticCode>> = {
  missing: "file-missing",
  outside: "file-outside",
  unreadable: "file-unreadable",
};

/** The text of a file that is named at a place; says why it cannot be had. */
export function readFile(
  path: string,
  written: string,
  span: Span,
  reader: FileReader,
  findings: Findings,
): string | undefined {
  const content = reader.read(path);
  if (content.ok) return content.text;
  const detail = content.detail === "" ? "" : `: ${content.detail}`;
  const message = {
    missing: `there is no file \`${written}\`${path === written ? "" : `, looked for at \`${path}\``}`,
    outside: `\`${written}\` lies outside the workspace`,
    unreadable: `\`${written}\` cannot be read${detail}`,
  }[content.why];
  const hint = {
    missing: "paths are relative to the file they stand in",
    outside: "only files of the workspace are read, so that a model means the same on every machine",
    unreadable: undefined,
  }[content.why];
  findings.say(CODES[content.why], span, message, { hint });
  return undefined;
}
