import { type CurvePanel, curveWords, formatNumber, type Scale } from "../../shared-core/index.ts";
import { html, svg } from "./dom.ts";
import { followGestures } from "./gestures.ts";
import type { Page } from "./page.ts";
import { axes, marks } from "./plot-axes.ts";
import { type CurveInk, dashOf, paintCurves } from "./plot-curves.ts";
import {
  type Geometry,
  geometryOf,
  MARGIN,
  type PanelData,
  type Part,
  panelY,
  partOf,
  prepared,
  valueAt,
  wholeX,
} from "./plot-layout.ts";
import { panned, WHOLE, zoomed } from "./plot-zoom.ts";
import { nearestTo } from "./pyramid.ts";
import { widthOf } from "./width.ts";

export interface PlotContent {
  readonly panels: readonly CurvePanel[];
  readonly description: string;
  readonly linearX: boolean;
  readonly linearY: boolean;
}

interface Laid {
  readonly geometry: Geometry;
  readonly x: Scale;
  readonly y: readonly Scale[];
}

/** Steps of the arrow keys across what is shown. */
const STEPS = 240;

/** Panels above one axis: canvas for the curves under SVG for everything that is text or a thin rule. */
export class Plot {
  readonly element: HTMLDivElement;
  readonly #page: Page;
  readonly #key: string;
  readonly #canvas = html("canvas", { "aria-hidden": "true" });
  readonly #layer = svg("svg", { "aria-hidden": "true", focusable: "false" });
  readonly #rules = svg("g");
  readonly #cursor = svg("g", { class: "cursor" });
  readonly #frame = svg("rect", { class: "frame" });
  readonly #stage: HTMLDivElement;
  readonly #legend = html("p", { class: "legend" });
  readonly #readout = html("p", { class: "readout number", "aria-hidden": "true" });
  #content: PlotContent = { panels: [], description: "", linearX: false, linearY: false };
  #data: readonly PanelData[] = [];
  #part: Part;
  #at: number | undefined;
  #laid: Laid | undefined;
  #inks = new Map<string, CurveInk>();
  #awaited = false;
  /** Told, not asked for: a question would have the page laid out for each plot. 0: not laid out yet. */
  #width = 0;

  constructor(page: Page, key: string) {
    this.#page = page;
    this.#key = key;
    this.#part = page.kept.zoom?.[key] ?? WHOLE;
    this.#layer.append(this.#rules, this.#frame, this.#cursor);
    this.#stage = html("div", {
      class: "stage",
      tabindex: 0,
      role: "application",
      "aria-roledescription": "plot",
    });
    this.#stage.append(this.#canvas, this.#layer);
    this.element = html("div", { class: "plot" }, this.#legend, this.#stage, this.#readout);
    this.#stage.addEventListener("keydown", (event) => this.#press(event));
    this.#followPointer();
    widthOf(this.#stage, (width) => {
      this.#width = width;
      this.#paint();
    });
  }

  get part(): Part {
    return this.#part;
  }

  update(content: PlotContent): void {
    const changed = content.panels !== this.#content.panels;
    this.#content = content;
    if (changed) this.#data = prepared(content.panels);
    this.#stage.setAttribute("aria-label", `${content.description} ${HELP}`);
    this.#fillLegend();
    this.#paint();
  }

  /** The theme is another one. */
  recolour(): void {
    this.#inks.clear();
    this.#repaint();
  }

  setPart(part: Part): void {
    this.#part = part;
    this.#page.keep({ zoom: { ...this.#page.kept.zoom, [this.#key]: part } });
    this.#repaint();
  }

  /** At most once a frame. */
  #repaint(): void {
    if (this.#awaited) return;
    this.#awaited = true;
    requestAnimationFrame(() => {
      this.#awaited = false;
      this.#paint();
    });
  }

  #paint(): void {
    const width = this.#width;
    if (width === 0 || this.#data.length === 0) return;
    const { linearX, linearY, panels } = this.#content;
    const geometry = geometryOf(panels, width);
    const x = partOf(wholeX(this.#data, linearX), this.#part);
    const y = this.#data.map((data) => panelY(data, x, linearY));
    this.#laid = { geometry, x, y };
    this.#paintRules(this.#laid);
    this.#paintCanvas(this.#laid);
    this.#paintCursor();
  }

  #paintRules({ geometry, x, y }: Laid): void {
    const { width, height } = geometry;
    for (const [name, value] of Object.entries({ width, height, viewBox: `0 0 ${width} ${height}` }))
      this.#layer.setAttribute(name, String(value));
    const parts = this.#data.flatMap(({ panel }, i) => {
      const of = { panel, box: geometry.panels[i], geometry, x, y: y[i], last: i === this.#data.length - 1 };
      return [...axes(of), ...marks(of)];
    });
    this.#rules.replaceChildren(...parts);
  }

  #paintCanvas({ geometry, x, y }: Laid): void {
    const { width, height } = geometry;
    const dense = devicePixelRatio || 1;
    const canvas = this.#canvas;
    const [across, down] = [Math.round(width * dense), Math.round(height * dense)];
    if (canvas.width !== across || canvas.height !== down) {
      [canvas.width, canvas.height] = [across, down];
      canvas.style.width = `${width}px`;
      canvas.style.height = `${height}px`;
    }
    const context = canvas.getContext("2d");
    if (context === null) return;
    context.setTransform(dense, 0, 0, dense, 0, 0);
    context.clearRect(0, 0, width, height);
    this.#data.forEach(({ curves, panel }, i) => {
      const wraps = panel.y.unit === "deg" && panel.y.to !== undefined;
      const place = { geometry, box: geometry.panels[i], x, y: y[i], wraps };
      paintCurves(context, curves, place, ({ curve }) => this.#ink(curve));
    });
  }

  #fillLegend(): void {
    const curves = this.#content.panels.flatMap((panel) => panel.curves);
    // What is shown first; what lies under it is painted before it.
    const rank = ({ role }: (typeof curves)[number]) =>
      Number(role === "written") + 2 * Number(role === "earlier");
    const entries = new Map(
      [...curves]
        .sort((a, b) => rank(a) - rank(b))
        .map((curve) => [`${curve.name} ${curve.role ?? ""}`, curve]),
    );
    const items = [...entries.values()].map((curve) => {
      const swatch = svg("svg", { class: "swatch", width: 30, height: 9, "aria-hidden": "true" });
      swatch.append(
        svg("path", {
          d: "M0,4.5H30",
          class: inkClass(curve),
          "stroke-dasharray": dashFor(curve) || undefined,
        }),
      );
      return html("span", {}, swatch, curveWords(curve));
    });
    this.#legend.replaceChildren(...items);
  }

  /** Colours stand in the style sheet only; the canvas reads them off the legend. */
  #ink(curve: CurvePanel["curves"][number]): CurveInk {
    const name = inkClass(curve);
    const known = this.#inks.get(name);
    if (known) return known;
    const sample = this.#legend.querySelector(`path[class="${name}"]`);
    const style = sample ? getComputedStyle(sample) : undefined;
    const ink = {
      colour: style?.stroke ?? "currentColor",
      width: Number.parseFloat(style?.strokeWidth ?? "1.5") || 1.5,
      dash: dashFor(curve),
    };
    this.#inks.set(name, ink);
    return ink;
  }

  #paintCursor(): void {
    const laid = this.#laid;
    const at = this.#at;
    if (laid === undefined || at === undefined || at < laid.x.from || at > laid.x.to) {
      this.#cursor.replaceChildren();
      if (at === undefined) this.#readout.textContent = "";
      return;
    }
    const { geometry, x, y } = laid;
    const across = geometry.left + x.place(at) * (geometry.right - geometry.left);
    const last = geometry.panels[geometry.panels.length - 1];
    const points = this.#data.flatMap(({ curves }, i) =>
      curves.flatMap(({ curve }) => {
        const value = curve.y[nearestTo(curve.x, at)];
        const share = y[i].place(value);
        if (!(share >= 0 && share <= 1)) return [];
        const box = geometry.panels[i];
        const d = marker(curve.style, across, box.top + (1 - share) * box.height);
        return [svg("path", { class: `point ${inkClass(curve)}`, d })];
      }),
    );
    this.#cursor.replaceChildren(
      svg("path", { class: "hair", d: `M${across},${MARGIN.top}V${last.top + last.height}` }),
      ...points,
    );
    this.#readout.textContent = this.#says(at);
  }

  /** What stands at a place of the axis, in one line. */
  #says(at: number): string {
    const [first] = this.#data;
    if (first === undefined) return "";
    const place = `${formatNumber(at)} ${first.panel.x.unit}`.trim();
    const values = this.#data.flatMap(({ panel, curves }) =>
      curves.map(({ curve }) => {
        const value = curve.y[nearestTo(curve.x, at)];
        return `${curveWords(curve)} ${Number.isFinite(value) ? `${formatNumber(value)} ${panel.y.unit}`.trim() : "no value"}`;
      }),
    );
    return [place, ...values].join(" · ");
  }

  #press(event: KeyboardEvent): void {
    const laid = this.#laid;
    if (laid === undefined || event.ctrlKey || event.metaKey || event.altKey) return;
    const { key, shiftKey } = event;
    const share = this.#at === undefined ? 0.5 : Math.max(0, Math.min(1, laid.x.place(this.#at)));
    if (key === "+" || key === "=") this.#look(zoomed(this.#part, share, 0.6));
    else if (key === "-") this.#look(zoomed(this.#part, share, 1 / 0.6));
    else if (key === "0" || key === "Escape") this.#look(WHOLE);
    else if (shiftKey && key === "ArrowRight") this.#look(panned(this.#part, 0.1));
    else if (shiftKey && key === "ArrowLeft") this.#look(panned(this.#part, -0.1));
    else if (key === "ArrowRight") this.#stand(this.#at === undefined ? 0.5 : share + 1 / STEPS);
    else if (key === "ArrowLeft") this.#stand(this.#at === undefined ? 0.5 : share - 1 / STEPS);
    else if (key === "PageUp" || key === "PageDown") this.#nextMark(key === "PageDown" ? 1 : -1);
    else if (key === "Home") this.#stand(0);
    else if (key === "End") this.#stand(1);
    else return;
    event.preventDefault();
  }

  #look(part: Part): void {
    this.setPart(part);
    const x = partOf(wholeX(this.#data, this.#content.linearX), part);
    const unit = this.#data[0]?.panel.x.unit ?? "";
    this.#page.announce(`${formatNumber(x.from)} to ${formatNumber(x.to)} ${unit}`.trim());
  }

  #stand(share: number): void {
    if (this.#laid === undefined) return;
    this.#at = valueAt(this.#laid.x, Math.max(0, Math.min(1, share)));
    this.#paintCursor();
    this.#page.announce(this.#says(this.#at));
  }

  /** To the next named point. */
  #nextMark(direction: 1 | -1): void {
    const places = this.#data.flatMap(({ panel }) => panel.marks.map(({ x }) => x)).sort((a, b) => a - b);
    const from = this.#at ?? (direction > 0 ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY);
    const ahead = places.filter((x) => (direction > 0 ? x > from * (1 + 1e-9) : x < from * (1 - 1e-9)));
    const next = direction > 0 ? ahead[0] : ahead[ahead.length - 1];
    if (next === undefined || this.#laid === undefined) return;
    this.#stand(this.#laid.x.place(next));
  }

  #followPointer(): void {
    const plot = this;
    followGestures(this.#stage, {
      get part() {
        return plot.#part;
      },
      setPart: (part) => this.setPart(part),
      shareAt: (clientX) => {
        const geometry = this.#laid?.geometry;
        if (geometry === undefined) return 0;
        const across = clientX - this.#stage.getBoundingClientRect().left;
        return (across - geometry.left) / (geometry.right - geometry.left);
      },
      point: (share) => {
        const inside = share !== undefined && share >= 0 && share <= 1 && this.#laid !== undefined;
        this.#at = inside && this.#laid ? valueAt(this.#laid.x, share) : undefined;
        this.#paintCursor();
      },
      frame: (range) => this.#showFrame(range),
    });
  }

  #showFrame(range: readonly [number, number] | undefined): void {
    const geometry = this.#laid?.geometry;
    this.#frame.classList.toggle("on", range !== undefined);
    if (range === undefined || geometry === undefined) return;
    const [a, b] = [Math.max(0, Math.min(...range)), Math.min(1, Math.max(...range))];
    const wide = geometry.right - geometry.left;
    const last = geometry.panels[geometry.panels.length - 1];
    const box = {
      x: geometry.left + a * wide,
      y: MARGIN.top,
      width: Math.max(0, b - a) * wide,
      height: last.top + last.height - MARGIN.top,
    };
    for (const [name, value] of Object.entries(box)) this.#frame.setAttribute(name, String(value));
  }
}

const HELP =
  "Arrow keys read out, Page up and Page down go to peaks, plus and minus zoom, Shift and arrow keys move, 0 shows all.";

const inkClass = ({ role, style }: CurvePanel["curves"][number]): string =>
  role === "limit"
    ? "ink-limit"
    : role === "written" || role === "earlier"
      ? `ink-${role} ink-${style % INKS}`
      : `ink-${style % INKS}`;

/** Colours in the style sheet. */
const INKS = 6;

const dashFor = ({ role, style }: CurvePanel["curves"][number]): string =>
  role === "limit" ? "1 4" : dashOf(style);

/** Circle, square, diamond, triangle: curves differ under the cursor without colour too. */
function marker(style: number, x: number, y: number): string {
  const shapes = [
    `M${x - 3.5},${y}a3.5,3.5 0 1 0 7,0a3.5,3.5 0 1 0 -7,0Z`,
    `M${x - 3.2},${y - 3.2}h6.4v6.4h-6.4Z`,
    `M${x},${y - 4.5}l4.5,4.5l-4.5,4.5l-4.5,-4.5Z`,
    `M${x},${y - 4.2}l4.2,7.4h-8.4Z`,
  ];
  return shapes[style % shapes.length];
}
