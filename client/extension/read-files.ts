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

/** Answers what the server cannot read by itself: files of virtual workspaces, and everything in a browser. */
export function answerFileRequests(client: BaseLanguageClient): void {
  client.onRequest<ReadFileResult, void>(
    READ_FILE,
    async ({ uri }: ReadFileParams): Promise<ReadFileResult> => {
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
