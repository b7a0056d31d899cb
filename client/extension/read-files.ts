import * as vscode from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import {
  FIND_MODELS,
  type FindModelsParams,
  type FindModelsResult,
  READ_FILE,
  type ReadFileParams,
  type ReadFileResult,
} from "../../shared-core/index.ts";
import { textAt } from "./revisions.ts";

/** Answers what the server cannot read by itself: files of virtual workspaces, and everything in a browser. */
export function answerFileRequests(client: BaseLanguageClient): void {
  client.onRequest<ReadFileResult, void>(
    READ_FILE,
    async ({ uri, revision }: ReadFileParams): Promise<ReadFileResult> => {
      if (revision !== undefined) return readAt(vscode.Uri.parse(uri), revision);
      try {
        const bytes = await vscode.workspace.fs.readFile(vscode.Uri.parse(uri));
        return { text: new TextDecoder("utf-8").decode(bytes) };
      } catch (error) {
        const missing = error instanceof vscode.FileSystemError && error.code === "FileNotFound";
        return { why: missing ? "missing" : "unreadable", detail: String((error as Error).message ?? error) };
      }
    },
  );
  client.onRequest(FIND_MODELS, async ({ folder }: FindModelsParams): Promise<FindModelsResult> => {
    const pattern = new vscode.RelativePattern(vscode.Uri.parse(folder), "**/*.thrum");
    const found = await vscode.workspace.findFiles(pattern, "**/node_modules/**");
    return found.map((uri) => uri.toString());
  });
}

/** What is not in a revision and what cannot be read are one to source control: both are said in its words. */
async function readAt(uri: vscode.Uri, revision: string): Promise<ReadFileResult> {
  try {
    return { text: await textAt(uri, revision) };
  } catch (error) {
    return { why: "unreadable", detail: String((error as Error).message ?? error) };
  }
}
