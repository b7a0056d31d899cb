import { LineIndex } from "../../shared-core/index.ts";
import { otherFile, type Serving } from "../serving.ts";
import type { Session } from "../session.ts";

/** URI and lines of any file of the workspace, though the model does not read it. */
export async function lineIndexOf(
  serving: Serving,
  session: Session,
  file: string,
): Promise<{ readonly uri: string; readonly lines: LineIndex; readonly version: number | null } | undefined> {
  const { workspace, schedule, closed } = serving;
  const uri = workspace.uriOf(session, file);
  const open = schedule.byUri(uri);
  if (open) return { uri: open.uri, lines: schedule.current(open).lines, version: open.document.version };
  const near = otherFile(serving, session, file);
  if (near) return { ...near, version: null };
  const content = await closed.contentOf({ folder: session.folder, file });
  return content.ok ? { uri, lines: new LineIndex(content.text), version: null } : undefined;
}
