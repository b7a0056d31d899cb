import type { TableRow } from "../syntax/tree.ts";
import { describeQuantity } from "../units/describe.ts";
import type { Kind } from "../units/dimension.ts";
import { isFault } from "../units/fault.ts";
import { NUMBER, sameKind } from "../units/quantity.ts";
import { type UnitMeaning, unitOf } from "../units/unit-of.ts";
import { type Given, givenDetails, singleValue, wordOf } from "./details.ts";
import type { Draft } from "./draft.ts";
import type { FileContext } from "./lets.ts";
import { inSI } from "./literal.ts";
import type { LimitCurve } from "./model.ts";
import { type Described, nameSpan } from "./names.ts";
import { planNumber } from "./number.ts";
import type { PlannedLimit } from "./plan.ts";

type Points = readonly { readonly atHz: number; readonly value: number }[];

/** Understands a limit: one value, or points of frequency and value. */
export function planLimit(statement: Described, draft: Draft, file: FileContext): PlannedLimit | undefined {
  const { node, name } = statement;
  const inFile: Draft = file === draft.main ? draft : { ...draft, main: file, findings: file.findings };
  const { details, sound } = givenDetails(statement, inFile);
  if (name === undefined || !sound) return undefined;
  const word = (key: string): string | undefined => {
    const given = details.get(key);
    const content = given?.description.content;
    return given && content?.is === "word" ? wordOf(given, content.words, file.findings) : content?.is;
  };
  const [between, of, bands] = ["between_points", "of", "bands"].map(word);
  const shape = {
    name,
    betweenPoints: (between === "straight" ? "straight" : "log_log") as LimitCurve["betweenPoints"],
    of: (of === "rms" ? "rms" : "peak") as LimitCurve["of"],
    bands: (bands ?? "none") as LimitCurve["bands"],
  };
  const rows = details.get("rows");
  if (rows !== undefined && node.value !== undefined) {
    file.findings.say(
      "wrong-kind",
      rows.span,
      `\`${name}\` has one value behind \`=\`; \`rows\` would be a second limit`,
    );
    return undefined;
  }
  if (rows !== undefined) {
    const curve = pointsOf(rows, file);
    return curve && { name, resolve: () => ({ ...shape, points: curve.points, kind: curve.kind }) };
  }
  return singleLimit(statement, shape, inFile);
}

function singleLimit(
  statement: Described,
  shape: Omit<LimitCurve, "points" | "kind">,
  draft: Draft,
): PlannedLimit | undefined {
  const { node, name = "" } = statement;
  if (node.value === undefined) {
    draft.findings.say("missing-detail", nameSpan(node), `\`limit ${name}\` needs a value or rows`, {
      hint: `as in \`limit ${name} = 4.5 mm/s\`, or \`rows\` of frequency and value`,
    });
    return undefined;
  }
  const given: Given = {
    key: name,
    description: statement.description.details[0],
    items: node.value,
    span: nameSpan(node),
  };
  const value = singleValue(
    { ...given, description: { ...given.description, example: "4.5 mm/s" } },
    draft.findings,
  );
  const context = draft.lets.contextFor(draft.main);
  const number = value && planNumber(value, context, undefined, name);
  return number && { name, resolve: (put) => ({ ...shape, points: put.number(number), kind: number.kind }) };
}

/** Rows of frequency and value: rates ascending, two at one rate where the limit jumps; values of one kind. */
function pointsOf(rows: Given, file: FileContext): { points: Points; kind: Kind } | undefined {
  const points: { atHz: number; value: number }[] = [];
  let kind: Kind | undefined;
  for (const row of rows.table ?? []) {
    const [rate, value] = cellsOf(row, file) ?? [];
    if (rate === undefined || value === undefined) return undefined;
    if (!rate.kind.rate) {
      file.findings.say(
        "unit-mismatch",
        row.cells[0].span,
        `expected a rate such as Hz, found ${describeQuantity(rate)}`,
        {
          hint: "a row holds a frequency and the value there",
        },
      );
      return undefined;
    }
    if (kind !== undefined && !sameKind(kind, value.kind)) {
      file.findings.say(
        "unit-mismatch",
        row.cells[1].span,
        `the values of a limit are of one kind; the rows above hold ${describeQuantity({ ...kind, value: points[0].value })}, here stands ${describeQuantity(value)}`,
      );
      return undefined;
    }
    const [before, last] = [points.at(-2), points.at(-1)];
    const isThird = before?.atHz === rate.value && last?.atHz === rate.value;
    if (last !== undefined && (!(rate.value >= last.atHz) || isThird)) {
      file.findings.say(
        "wrong-kind",
        row.cells[0].span,
        `rows go up in frequency; ${rate.value} Hz does not come after ${last.atHz} Hz`,
        { hint: "two rows at one frequency make a jump" },
      );
      return undefined;
    }
    kind ??= value.kind;
    points.push({ atHz: rate.value, value: value.value });
  }
  if (kind === undefined) return undefined;
  return { points, kind };
}

interface Cell extends Kind {
  readonly value: number;
  readonly kind: Kind;
}

function cellsOf(row: TableRow, file: FileContext): Cell[] | undefined {
  if (row.cells.length !== 2) {
    const count = row.cells.length === 1 ? "1 number" : `${row.cells.length} numbers`;
    file.findings.say(
      "wrong-kind",
      row.span,
      `a row of a limit holds a frequency and a value, here stand ${count}`,
      {
        hint: "as in `8 Hz  4.5 mm/s`",
      },
    );
    return undefined;
  }
  const cells: Cell[] = [];
  for (const cell of row.cells) {
    const unit: UnitMeaning = { text: "", factor: 1, kind: NUMBER };
    const meaning = cell.unit === undefined ? unit : unitOf(cell.unit);
    if (isFault(meaning)) {
      const place =
        cell.unit?.factors[(meaning as { factorIndex?: number }).factorIndex ?? 0]?.span ?? cell.span;
      file.findings.say(meaning.code, place, meaning.message, { hint: meaning.hint });
      return undefined;
    }
    cells.push({ ...meaning.kind, kind: meaning.kind, value: inSI(cell.value, meaning) });
  }
  return cells;
}
