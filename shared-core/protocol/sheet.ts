/**
 * What the response sheet, the client that holds it and the server say to each other. The client asks the server
 * for `SHEET` (requests.ts) with `SheetParams` and hands the packed content to the page as it is; the page unpacks
 * it. Each side reads what it gets with the readers below and drops what they do not know.
 */
import type { SheetContent } from "../features/sheet.ts";
import type { UnitSystem } from "../units/show.ts";
import { fromBase64, toBase64 } from "./packed-rows.ts";

export type { Ruler, RulerDrive, RulerLimit, RulerMode } from "../drawing/ruler.ts";
export type {
  Scene,
  SceneAnchor,
  SceneBox,
  SceneItem,
  SceneLabel,
  ScenePart,
  Sway,
} from "../drawing/scene.ts";
export type {
  Knob,
  LedgerRow,
  LedgerVerdict,
  ModesCard,
  PlotCard,
  ReasonCard,
  SheetCard,
  SheetContent,
  SheetEarlier,
  SheetMotion,
  SheetTable,
} from "../features/sheet.ts";

/** Raised whenever a message or the content changes its shape; a page of another version asks to be reloaded. */
export const SHEET_VERSION = 2;

/** Request `thrum/sheet`. */
export interface SheetParams {
  readonly uri: string;
  /** Default: as written. */
  readonly case?: string;
  /** Default: the setting. */
  readonly units?: UnitSystem;
  /** Moved knobs: name of a `let` to SI value, rates in Hz. */
  readonly knobs?: Readonly<Record<string, number>>;
  /** Id of the motion that is shown: of a history only the chosen one comes with its frames. */
  readonly motion?: string;
  /** The revision whose answer is drawn under today's; the client must answer `READ_FILE` for it. */
  readonly earlier?: { readonly revision: string; readonly label: string };
}

export interface SheetResult {
  /** Version of the document it belongs to. */
  readonly version: number | null;
  /** null: nothing can be said of this file, and `reason` says why. */
  readonly content: PackedContent | null;
  readonly reason?: string;
}

/** JSON text of a content in which long rows of numbers stand as base64. */
export type PackedContent = string;

/** To the page. */
export type ToSheet =
  | {
      readonly type: "content";
      readonly protocol: number;
      readonly uri: string;
      readonly version: number | null;
      readonly content: PackedContent;
    }
  /** What it shows is being computed anew, could not be, or is up to date. */
  | {
      readonly type: "state";
      readonly protocol: number;
      readonly state: "busy" | "failed" | "ready";
      readonly text: string;
    }
  /** Revisions of the model, the newest first; none: there is no source control. */
  | { readonly type: "revisions"; readonly protocol: number; readonly list: readonly SheetRevision[] }
  /** The cursor stands in these statements; none: nowhere. */
  | { readonly type: "highlight"; readonly protocol: number; readonly names: readonly string[] }
  /** Bring what the sheet shows of this statement into sight. */
  | { readonly type: "reveal"; readonly protocol: number; readonly name: string };

export interface SheetRevision {
  readonly id: string;
  /** `3 Nov 2026, softer mounts`. */
  readonly label: string;
}

/** From the page. */
export type FromSheet =
  /** It can take messages; also after a reload. */
  | { readonly type: "ready"; readonly protocol: number }
  /** Show the line of this statement. */
  | { readonly type: "reveal"; readonly protocol: number; readonly name: string }
  /** The pointer is over this statement; null: over none. */
  | { readonly type: "point"; readonly protocol: number; readonly name: string | null }
  /** Show another case, other units, moved knobs (all that are moved; SI, rates in Hz), an earlier revision under it. */
  | {
      readonly type: "show";
      readonly protocol: number;
      readonly case: string;
      readonly units: UnitSystem;
      readonly knobs: Readonly<Record<string, number>>;
      /** null: none. */
      readonly earlier: string | null;
      /** Id of the motion that is shown; null: none. */
      readonly motion: string | null;
    }
  /** Write the value of a `let` into the text. */
  | { readonly type: "write"; readonly protocol: number; readonly name: string; readonly value: number }
  /** Save an answer as CSV. */
  | { readonly type: "csv"; readonly protocol: number; readonly ask: string; readonly case: string }
  /** Save a picture; PNG data as base64. */
  | {
      readonly type: "picture";
      readonly protocol: number;
      readonly name: string;
      readonly format: "svg" | "png";
      readonly data: string;
    };

/**
 * Float64 rows as base64, each once however often it stands in the content; everything else as JSON. What is not
 * finite in plain numbers becomes null.
 */
export function packContent(content: SheetContent): PackedContent {
  const rows = new Map<Float64Array, number>();
  const body = JSON.stringify(content, (_, value: unknown) => {
    if (!(value instanceof Float64Array)) return value;
    const known = rows.get(value) ?? rows.size;
    rows.set(value, known);
    return { [PACKED]: known };
  });
  return JSON.stringify({ body, rows: [...rows.keys()].map(toBase64) });
}

/** The content again; throws on text that `packContent` did not make. */
export function unpackContent(packed: PackedContent): SheetContent {
  const { body, rows } = JSON.parse(packed) as { readonly body: string; readonly rows: readonly string[] };
  const unpacked = rows.map(fromBase64);
  return JSON.parse(body, (_, value: unknown) =>
    typeof value === "object" && value !== null && PACKED in value
      ? unpacked[Number(value[PACKED as keyof typeof value])]
      : value,
  ) as SheetContent;
}

/** A message to the page, or undefined for what is none. */
export function readToSheet(message: unknown): ToSheet | undefined {
  const it = record(message);
  if (it === undefined || typeof it.protocol !== "number") return undefined;
  const known =
    (it.type === "content" &&
      texts(it, "uri", "content") &&
      (it.version === null || typeof it.version === "number")) ||
    (it.type === "state" && texts(it, "state", "text") && STATES.has(it.state as string)) ||
    (it.type === "highlight" &&
      Array.isArray(it.names) &&
      it.names.every((name) => typeof name === "string")) ||
    (it.type === "revisions" && Array.isArray(it.list) && it.list.every(isRevision)) ||
    (it.type === "reveal" && texts(it, "name"));
  return known ? (message as ToSheet) : undefined;
}

/** A message from the page, or undefined for what is none. */
export function readFromSheet(message: unknown): FromSheet | undefined {
  const it = record(message);
  if (it === undefined || it.protocol !== SHEET_VERSION) return undefined;
  const known =
    it.type === "ready" ||
    (it.type === "reveal" && texts(it, "name")) ||
    (it.type === "point" && (it.name === null || texts(it, "name"))) ||
    (it.type === "show" &&
      texts(it, "case") &&
      UNITS.has(it.units as string) &&
      numbers(it.knobs) &&
      [it.earlier, it.motion].every((each) => each === null || typeof each === "string")) ||
    (it.type === "write" && texts(it, "name") && Number.isFinite(it.value)) ||
    (it.type === "csv" && texts(it, "ask", "case")) ||
    (it.type === "picture" && texts(it, "name", "data") && (it.format === "svg" || it.format === "png"));
  return known ? (message as FromSheet) : undefined;
}

const PACKED = "float64";
const STATES: ReadonlySet<string> = new Set(["busy", "failed", "ready"]);
const UNITS: ReadonlySet<string> = new Set(["as-written", "si", "inch"] satisfies UnitSystem[]);

function record(value: unknown): Readonly<Record<string, unknown>> | undefined {
  return typeof value === "object" && value !== null ? (value as Record<string, unknown>) : undefined;
}

function isRevision(value: unknown): boolean {
  const it = record(value);
  return it !== undefined && texts(it, "id", "label");
}

const texts = (of: Readonly<Record<string, unknown>>, ...keys: readonly string[]): boolean =>
  keys.every((key) => typeof of[key] === "string");

function numbers(value: unknown): boolean {
  const it = record(value);
  return it !== undefined && Object.values(it).every((each) => Number.isFinite(each));
}
