/** The server on Node: over standard input and output for any editor, over a channel of the extension. */
import { existsSync } from "node:fs";
import { resolve } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { createConnection, IPCMessageReader, IPCMessageWriter } from "vscode-languageserver/node";
import { statOf, workspaceReader } from "../client/terminal/workspace.ts";
import { version } from "../package.json";
import { serve } from "./connection.ts";
import { ThreadEngine } from "./engine-thread.ts";
import type { Disk } from "./host.ts";
import { errorText } from "./numbers.ts";
import { tidyWhenIdle } from "./tidy.ts";
import { warmUp } from "./warm.ts";

function start(): void {
  const overIpc = process.argv.includes("--node-ipc");
  // The library sends what is logged as messages; whatever else writes to standard output would break them.
  const connection = overIpc
    ? createConnection(new IPCMessageReader(process), new IPCMessageWriter(process))
    : createConnection(process.stdin, process.stdout);
  if (!overIpc) console.log = console.info = console.debug = (...said: unknown[]) => console.error(...said);
  // Every request has a wall of its own; what comes past them all is told, and the next request is answered.
  for (const event of ["uncaughtException", "unhandledRejection"] as const) {
    process.on(event, (error: unknown) => connection.console.error(`${event}\n${errorText(error)}`));
  }
  tidyWhenIdle();
  const docs = new URL("../../docs/", import.meta.url);
  serve(connection, {
    disk,
    version,
    docs: existsSync(fileURLToPath(docs)) ? docs.href : undefined,
    startEngine,
  });
}

/** With the first model that is open: a server that nobody needs stays small. */
function startEngine(): ThreadEngine {
  if (!warm) warmUp();
  warm = true;
  return new ThreadEngine(new URL("./thread.js", import.meta.url));
}

let warm = false;

const IGNORED = ["**/node_modules/**", "**/.git/**"];

/** Files of folders on this machine, read as the command line reads them. */
const disk: Disk = {
  reads: (folder) => pathOf(folder) !== undefined,
  reader: (folder, file) => workspaceReader(file, pathOf(folder) ?? "/"),
  stamp(folder, path) {
    const info = statOf(resolve(pathOf(folder) ?? "/", path));
    return info ? `${info.mtimeMs} ${info.size} ${info.ino}` : "";
  },
  async find(folder, endings) {
    const cwd = pathOf(folder);
    if (cwd === undefined) return [];
    const { glob } = await import("tinyglobby");
    const options = { cwd, absolute: true, onlyFiles: true, expandDirectories: false, ignore: IGNORED };
    const found = await glob(
      endings.map((ending) => `**/*.${ending}`),
      { ...options, followSymbolicLinks: false },
    );
    return found.sort().map((path) => pathToFileURL(path).href);
  },
};

function pathOf(uri: string): string | undefined {
  try {
    return fileURLToPath(uri);
  } catch {
    return undefined;
  }
}

start();
