import type { Connection } from "vscode-languageserver";
import { LineIndex, type View } from "../shared-core/index.ts";
import type { Client } from "./client.ts";
import type { ClosedModels } from "./closed.ts";
import type { ReadAt } from "./earlier.ts";
import type { Schedule } from "./schedule.ts";
import type { Session } from "./session.ts";
import type { Settings } from "./settings.ts";
import { outdated, type wall } from "./wall.ts";
import type { Workspace } from "./workspace.ts";

/** What every feature works with. */
export interface Serving {
  readonly connection: Connection;
  readonly client: Client;
  readonly workspace: Workspace;
  readonly schedule: Schedule;
  readonly closed: ClosedModels;
  readonly settingsOf: (of: { readonly uri: string }) => Settings;
  readonly guard: ReturnType<typeof wall>;
  /** undefined: the client reads no revisions. */
  readonly readAt: ReadAt | undefined;
  /** Where the pages of docs/ lie, ending in `/`. */
  readonly docs: string | undefined;
}

/** The open model that a request is about; undefined where the client asks about something else. */
export function sessionOf({ schedule }: Serving, { uri }: { readonly uri: string }): Session | undefined {
  return schedule.byUri(uri);
}

/** A view with the models around it, for what crosses files. */
export async function wideView({ schedule, closed }: Serving, session: Session): Promise<View> {
  const { serial } = session;
  const others = await closed.around(session);
  if (session.serial !== serial) throw outdated();
  return schedule.view(session, () => others);
}

/** Hands on what belongs to the text as it stands; anything else would be shown at the wrong places. */
export async function ofThisText<T>(session: Session, work: Promise<T>): Promise<T> {
  const { serial } = session;
  const found = await work;
  if (session.serial !== serial) throw outdated();
  return found;
}

/** URI and lines of a file that a model reads, as the client knows it. */
export function otherFile(
  { schedule, workspace }: Serving,
  session: Session,
  file: string,
): { readonly uri: string; readonly lines: LineIndex } | undefined {
  const { model, lines, reads } = schedule.current(session);
  if (file === session.file) return { uri: session.uri, lines };
  const uri = workspace.uriOf(session, file);
  const open = schedule.byUri(uri);
  if (open) return { uri: open.uri, lines: schedule.current(open).lines };
  const content = reads.get(file);
  if (content?.ok) return { uri, lines: new LineIndex(content.text) };
  return model.files.includes(file) ? { uri, lines: new LineIndex("") } : undefined;
}
