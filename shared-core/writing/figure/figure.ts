/** A picture as plain data: what to draw, not how. Values are in the units that the axes name. */
export interface Figure {
  readonly title: string;
  /** One sentence that says what is to be seen, for readers who do not see it. */
  readonly description: string;
  /** Drawn below each other; curves share the axis at the bottom. */
  readonly panels: readonly (CurvePanel | BarPanel)[];
}

export interface Axis {
  readonly label: string;
  /** Empty for a bare number. */
  readonly unit: string;
  readonly scale: "linear" | "log";
  /** Given ends; otherwise the data decide. */
  readonly from?: number;
  readonly to?: number;
  /** Values that carry a tick, where round ones are not the ones that matter (degrees). */
  readonly ticks?: readonly number[];
}

export interface CurvePanel {
  readonly kind: "curves";
  readonly x: Axis;
  readonly y: Axis;
  /** Height by comparison with the other panels. */
  readonly share: number;
  readonly curves: readonly Curve[];
  /** Points worth naming, as peaks. */
  readonly marks: readonly Mark[];
}

/** `x` ascending; what is not finite leaves a gap. */
export interface Curve {
  readonly name: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
  /** Which of the picture's line styles; curves of one quantity share it over the panels. */
  readonly style: number;
  /**
   * Default: an answer. `written`: of the model as it stands, under moved numbers. `earlier`: of an earlier revision.
   */
  readonly role?: "answer" | "written" | "earlier" | "limit";
}

/** What a legend calls a curve: its quantity, and which model it is of if that is not the shown one. */
export const curveWords = ({ name, role }: Pick<Curve, "name" | "role">): string =>
  role === "written" ? `${name}, as written` : role === "earlier" ? `${name}, earlier` : name;

export interface Mark {
  readonly x: number;
  readonly y: number;
  readonly label: string;
}

/** A bar for each name, to both sides of zero: a mode shape. */
export interface BarPanel {
  readonly kind: "bars";
  readonly title: string;
  readonly share: number;
  /** Values from -1 to 1. */
  readonly bars: readonly { readonly name: string; readonly value: number }[];
}

/** Colours of a picture. The default stands out from white and from black alike. */
export interface FigureTheme {
  readonly ink: string;
  readonly quiet: string;
  readonly grid: string;
  readonly curves: readonly string[];
}

/** Contrast of each colour at least 3 : 1 on white and on #1e1e1e (WCAG 2.2, 1.4.11). */
export const NEUTRAL: FigureTheme = {
  ink: "#7a7a7a",
  quiet: "#808080",
  grid: "#80808040",
  curves: ["#2f7fd0", "#c5622a", "#3d9150", "#a665c9", "#b5832a", "#c9528b"],
};

/** Dashes beside colours, so that curves differ without colour too. */
export const DASHES: readonly string[] = ["", "6 3", "2 2", "8 3 2 3", "4 2", "1 3"];
