import { type FromSheet, SHEET_VERSION } from "../../shared-core/index.ts";

/** What survives a reload: small, for it is written behind; everything else comes again with the content. */
export interface Kept {
  /** The model; the panel is restored by it. */
  readonly uri?: string;
  readonly case?: string;
  readonly units?: "as-written" | "si" | "inch";
  readonly knobs?: Readonly<Record<string, number>>;
  /** Name of the chosen statement. */
  readonly selected?: string;
  readonly motion?: string;
  /** The revision under today's. */
  readonly earlier?: string;
  /** Shown part of each plot's axis, as shares of the whole. */
  readonly zoom?: Readonly<Record<string, readonly [number, number]>>;
  /** Scale and phase choices of each plot. */
  readonly views?: Readonly<Record<string, PlotView>>;
  readonly scroll?: number;
}

export interface PlotView {
  readonly linearX?: boolean;
  readonly linearY?: boolean;
  readonly continued?: boolean;
}

/** What the editor gives to a webview, as far as the page uses it. */
export interface EditorApi {
  postMessage(message: unknown): void;
  getState(): unknown;
  setState(state: unknown): void;
}

type WithoutVersion<T> = T extends unknown ? Omit<T, "protocol"> : never;

/** The page's one way out: messages to the editor, what is kept, and words for a screen reader. */
export class Page {
  readonly #api: EditorApi;
  readonly #live: HTMLElement;
  #kept: Kept;
  #writing: ReturnType<typeof setTimeout> | undefined;

  constructor(api: EditorApi, live: HTMLElement) {
    this.#api = api;
    this.#live = live;
    this.#kept = readKept(api.getState());
  }

  get kept(): Kept {
    return this.#kept;
  }

  keep(change: Partial<Kept>): void {
    this.#kept = { ...this.#kept, ...change };
    // The editor writes it to disk; a drag changes it many times a second.
    clearTimeout(this.#writing);
    this.#writing = setTimeout(() => this.#api.setState(this.#kept), KEEP_DELAY);
  }

  say(message: WithoutVersion<FromSheet>): void {
    this.#api.postMessage({ ...message, protocol: SHEET_VERSION });
  }

  /** Said politely by a screen reader. */
  announce(text: string): void {
    this.#live.textContent = text;
  }
}

const KEEP_DELAY = 150;

/** What was kept is data from outside: of each field only what has the right shape is taken. */
function readKept(state: unknown): Kept {
  if (typeof state !== "object" || state === null) return {};
  const it = state as Record<string, unknown>;
  const text = (value: unknown) => (typeof value === "string" ? value : undefined);
  const units = text(it.units);
  return {
    uri: text(it.uri),
    case: text(it.case),
    units: units === "si" || units === "inch" || units === "as-written" ? units : undefined,
    knobs: entries(it.knobs, (value) => Number.isFinite(value)) as Kept["knobs"],
    selected: text(it.selected),
    motion: text(it.motion),
    earlier: text(it.earlier),
    zoom: entries(it.zoom, isPart) as Kept["zoom"],
    views: entries(it.views, (value) => typeof value === "object" && value !== null) as Kept["views"],
    scroll: Number.isFinite(it.scroll) ? (it.scroll as number) : undefined,
  };
}

function entries(value: unknown, fits: (each: unknown) => boolean): Record<string, unknown> {
  if (typeof value !== "object" || value === null) return {};
  return Object.fromEntries(Object.entries(value).filter(([, each]) => fits(each)));
}

function isPart(value: unknown): boolean {
  if (!Array.isArray(value) || value.length !== 2) return false;
  const [from, to] = value;
  return 0 <= from && from < to && to <= 1;
}
