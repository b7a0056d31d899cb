import {
  CSV,
  type CsvParams,
  PROTOCOL_VERSION,
  ROWS,
  type RowsParams,
  type RowsResult,
  rowsToStatements,
  SUMMARY,
  type Summary,
  type SummaryParams,
  WRITE_VALUE,
  type WriteValueParams,
  type WriteValueResult,
  writeValue,
} from "../../shared-core/index.ts";
import type { Serving } from "../serving.ts";
import { refusal } from "../wall.ts";

/** The requests beside the standard protocol, as protocol/requests.ts has them. They may be about closed models. */
export function registerOwnRequests(serving: Serving): void {
  const { connection, closed, schedule, guard } = serving;
  connection.onRequest<Summary | null, never>(
    SUMMARY,
    guard<SummaryParams, Summary | null>(SUMMARY, null, ({ uri }) =>
      closed.visit(uri, async (session) => {
        await schedule.settled(session);
        const { summary } = session;
        if (summary === undefined) throw refusal("there are no numbers yet");
        const { state: _state, ...rest } = summary;
        const version = session.hidden ? null : session.document.version;
        return { protocol: PROTOCOL_VERSION, uri: session.uri, version, ...rest };
      }),
    ),
  );
  connection.onRequest<string | null, never>(
    CSV,
    guard<CsvParams, string | null>(CSV, null, ({ uri, ask, case: of }) =>
      closed.visit(uri, async (session) => {
        await schedule.settled(session);
        const answer = await schedule.ask(session, "csv", ask, of);
        if (answer && "text" in answer) return answer.text;
        throw refusal(answer?.refused ?? "it could not be computed");
      }),
    ),
  );
  connection.onRequest<RowsResult, never>(
    ROWS,
    guard<RowsParams, RowsResult>(ROWS, UNREADABLE, async ({ uri, text }) => {
      const made = await closed.visit(uri, async (session): Promise<RowsResult> => {
        const rows = rowsToStatements(schedule.view(session), text);
        return "refused" in rows ? { text: null, refused: rows.refused } : rows;
      });
      return made ?? UNREADABLE;
    }),
  );
  connection.onRequest<WriteValueResult, never>(
    WRITE_VALUE,
    guard<WriteValueParams, WriteValueResult>(WRITE_VALUE, NOTHING, async ({ uri, name, value }) => {
      const result = await closed.visit(uri, async (session) => {
        const { model, lines } = schedule.current(session);
        const written = writeValue(model, name, value);
        if ("refused" in written) return { edits: [], refused: written.refused };
        return {
          edits: written.edits.map(({ span, text }) => ({ range: lines.range(span), newText: text })),
        };
      });
      return result ?? NOTHING;
    }),
  );
}

const UNREADABLE: RowsResult = { text: null, refused: "the model cannot be read" };
const NOTHING: WriteValueResult = { edits: [], refused: "the model cannot be read" };
