import { readFileSync, writeFileSync } from "node:fs";
import { resolve } from "node:path";
import { format } from "../../shared-core/index.ts";
import { type Call, EXIT } from "./call.ts";
import { reportUnmatched, type Source, select } from "./files.ts";
import type { Host } from "./host.ts";
import { attempt } from "./write.ts";

/** Brings files into the canonical layout, or with `--check` only says which are not. */
export async function run(call: Call): Promise<number> {
  const selection = await select(call);
  let status: number = reportUnmatched(selection, call.host) ? EXIT.cannotRun : EXIT.holds;
  for (const source of selection.sources) status = Math.max(status, formatOne(source, call));
  return status;
}

function formatOne(source: Source, call: Call): number {
  const { host } = call;
  if (!source.content.ok) {
    host.stderr.write(`thrum: ${source.path} cannot be read: ${source.content.detail}\n`);
    return EXIT.cannotRun;
  }
  const { text } = source.content;
  const formatted = format(text);
  if (call.has("check")) {
    if (formatted !== text) host.stdout.write(`${source.path}\n`);
    return formatted === text ? EXIT.holds : EXIT.fails;
  }
  if (source.standardInput) host.stdout.write(formatted);
  else if (formatted !== text) rewrite(source.path, formatted, host);
  return EXIT.holds;
}

const BYTE_ORDER_MARK = "\ufeff";

/** A byte order mark that was there stays there. */
function rewrite(path: string, text: string, host: Host): void {
  const full = resolve(host.cwd, path);
  const marked = readFileSync(full).subarray(0, 3).toString("utf8") === BYTE_ORDER_MARK;
  attempt(() => writeFileSync(full, marked ? BYTE_ORDER_MARK + text : text), path);
  host.stderr.write(`formatted ${path}\n`);
}
