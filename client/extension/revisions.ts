/** Revisions of a model, by the git extension that comes with the editor; where there is none, there are none. */
import * as vscode from "vscode";
import type { SheetRevision } from "../../shared-core/index.ts";

/** So many are offered, the newest first. */
const MOST = 40;

/** Only names of commits are handed on to a command line. */
const COMMIT = /^[0-9a-f]{7,64}$/;

/** What is used of the interface that the extension `vscode.git` offers as version 1. */
interface GitApi {
  getRepository(uri: vscode.Uri): GitRepository | null;
  openRepository?(root: vscode.Uri): Promise<GitRepository | null>;
}

interface GitRepository {
  log(options: { readonly maxEntries: number; readonly path: string }): Promise<readonly GitCommit[]>;
  show(ref: string, path: string): Promise<string>;
}

interface GitCommit {
  readonly hash: string;
  readonly message: string;
  readonly authorDate?: Date;
}

/** The newest first; none for what is not under version control. */
export async function revisionsOf(uri: vscode.Uri): Promise<readonly SheetRevision[]> {
  const repository = await repositoryOf(uri);
  if (repository === undefined) return [];
  try {
    const commits = await repository.log({ maxEntries: MOST, path: uri.fsPath });
    return commits.map(({ hash, message, authorDate }) => ({
      id: hash,
      label: labelOf(message, authorDate),
    }));
  } catch {
    // A folder without a commit yet.
    return [];
  }
}

/** The text of a file as it was; fails where it did not exist or there is no repository. */
export async function textAt(uri: vscode.Uri, revision: string): Promise<string> {
  const repository = await repositoryOf(uri);
  if (repository === undefined) throw new Error(vscode.l10n.t("it is not under version control"));
  if (!COMMIT.test(revision)) throw new Error(vscode.l10n.t("there is no such revision"));
  return repository.show(revision, uri.fsPath);
}

async function repositoryOf(uri: vscode.Uri): Promise<GitRepository | undefined> {
  const extension = vscode.extensions.getExtension<{ getAPI(version: 1): GitApi }>("vscode.git");
  if (extension === undefined || uri.scheme !== "file") return undefined;
  try {
    const git = (await extension.activate()).getAPI(1);
    const known = git.getRepository(uri);
    return known ?? (await git.openRepository?.(vscode.Uri.joinPath(uri, ".."))) ?? undefined;
  } catch {
    // Version control may be switched off in the settings.
    return undefined;
  }
}

/** `3 Nov 2026, softer mounts`. */
function labelOf(message: string, date: Date | undefined): string {
  const [subject] = message.trim().split("\n");
  const day = date?.toLocaleDateString(vscode.env.language, {
    day: "numeric",
    month: "short",
    year: "numeric",
  });
  return [day, subject].filter((part) => part !== undefined && part !== "").join(", ");
}
