import { SHEET, type SheetParams, type SheetResult } from "../../shared-core/index.ts";
import { EarlierModels } from "../earlier.ts";
import type { Serving } from "../serving.ts";

/** The content of the response sheet: with the numbers of the text as it stands, or the last ones marked as such. */
export function registerSheet({ connection, closed, schedule, workspace, guard, readAt }: Serving): void {
  const models = new EarlierModels(schedule, workspace, readAt);
  connection.onRequest<SheetResult, never>(
    SHEET,
    guard<SheetParams, SheetResult>("thrum/sheet", NOTHING, async (params, token) => {
      const { uri, units, earlier, ...choice } = params;
      const result = await closed.visit(uri, async (session): Promise<SheetResult> => {
        const reason = earlier && (await models.tell(session, earlier.revision));
        await schedule.begun(session);
        if (token.isCancellationRequested) return NOTHING;
        const version = session.hidden ? null : session.document.version;
        const content = await schedule.ask(
          session,
          "sheet",
          choice,
          units,
          earlier && { ...earlier, reason },
        );
        return content === undefined
          ? { version, content: null, reason: "the sheet could not be computed; the log says more" }
          : { version, content };
      });
      return result ?? NOTHING;
    }),
  );
}

const NOTHING: SheetResult = { version: null, content: null, reason: "the model cannot be read" };
