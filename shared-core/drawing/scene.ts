/**
 * A drawn system as plain data: shapes in pixels, y downwards, with what moves them. A painter turns it into SVG
 * or puts it on a page; it needs no knowledge of the model. Everything depends on names and joints only, so that
 * a changed number moves nothing.
 */
export interface Scene {
  /** `system`: trade symbols. `chart`: too many coordinates to draw; bars over the coordinates instead. */
  readonly kind: "system" | "chart";
  readonly width: number;
  readonly height: number;
  /** One sentence for readers who do not see it. */
  readonly description: string;
  /** Names in the order of `Mode.shape`: what an index in `Sway.coordinate` means. */
  readonly coordinates: readonly string[];
  /** In painting order. Empty in a chart. */
  readonly items: readonly SceneItem[];
}

/** One statement of the model as it stands in the picture. */
export interface SceneItem {
  /** Name of the statement; `ground` for ground. Several items may show one statement. */
  readonly name: string;
  /** `mass`, `spring`, ...; `ground`. */
  readonly keyword: string;
  /** Family of the statement, for colour and weight of line. */
  readonly family: "moves" | "joins" | "drives" | "ground";
  readonly parts: readonly ScenePart[];
  readonly labels: readonly SceneLabel[];
  /** What it covers without its labels, for pointing. */
  readonly box: SceneBox;
  /** `spring mounts, 4 × 26.5 N/mm, between unit and slab`. */
  readonly says: string;
}

/**
 * A path and what it hangs on. `rest`: stands still. `anchor`: moves (and turns about `about`) with `anchor`.
 * `stretch`: spans two anchors; the map that takes both anchors from rest to their moved places
 * (along the line between them, width kept) takes the path along.
 */
export interface ScenePart {
  /** SVG path data in scene pixels, at rest. */
  readonly path: string;
  /** `line`: outline only; `body`: filled with the ground colour and outlined; `solid`: filled; `thin`: a faint line; `dashed`. */
  readonly style: "line" | "body" | "solid" | "thin" | "dashed";
  readonly rides:
    | { readonly on: "rest" }
    | { readonly on: "anchor"; readonly anchor: SceneAnchor }
    | { readonly on: "stretch"; readonly from: SceneAnchor; readonly to: SceneAnchor };
}

/** A point of the picture that moves with coordinates; `sways` empty: it stands still. */
export interface SceneAnchor {
  readonly x: number;
  readonly y: number;
  readonly sways: readonly Sway[];
}

/**
 * What one coordinate does to a point: per unit of the coordinate it moves by (`dx`, `dy`) and what hangs on it
 * turns by `turn` (1: clockwise as seen) about (`aboutX`, `aboutY`).
 */
export interface Sway {
  /** Index in `Scene.coordinates`. */
  readonly coordinate: number;
  readonly dx: number;
  readonly dy: number;
  readonly turn: number;
  readonly aboutX: number;
  readonly aboutY: number;
}

export interface SceneLabel {
  readonly text: string;
  /** `name` in the ink of the text, `value` quieter. */
  readonly role: "name" | "value";
  /** Baseline. */
  readonly x: number;
  readonly y: number;
  readonly align: "start" | "middle" | "end";
  /** Room kept for it; the text is cut to fit. */
  readonly box: SceneBox;
  /** A label inside a body moves with it. */
  readonly anchor?: SceneAnchor;
}

export interface SceneBox {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}
