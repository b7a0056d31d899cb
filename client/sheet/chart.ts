import { formatNumber } from "../../shared-core/index.ts";
import { svg } from "./dom.ts";
import { followGestures } from "./gestures.ts";
import type { Page } from "./page.ts";
import type { Part } from "./plot-layout.ts";
import { panned, WHOLE, zoomed } from "./plot-zoom.ts";
import type { Roving } from "./roving.ts";
import { widthOf } from "./width.ts";

const HEIGHT = 180;
/** Room for the names under the bars, and left and right of them, in pixels. */
const NAMES = 20;
const SIDE = 6;
/** A letter of a name, in pixels. */
const LETTER = 6.7;
/** Where the shown part is kept, among the zooms of the plots, whose names never hold a blank. */
const KEY = "the system";

/** A bar a coordinate, for systems too large to draw; zoomed and walked through like a plot. */
export class CoordinateChart {
  readonly #page: Page;
  readonly #roving: Roving;
  readonly #pick: (name: string) => void;
  readonly #bars = svg("path", { class: "bars" });
  readonly #frame = svg("rect", { class: "frame", y: 0, height: HEIGHT - NAMES });
  #names: readonly string[] = [];
  #description = "";
  #pose: ArrayLike<number> | undefined;
  #part: Part;
  #shown = false;
  /** Told by the page, or this until it has been laid out. */
  #width = 640;

  constructor(page: Page, roving: Roving, pick: (name: string) => void) {
    this.#page = page;
    this.#roving = roving;
    this.#pick = pick;
    this.#part = page.kept.zoom?.[KEY] ?? WHOLE;
    this.#follow();
    widthOf(roving.element, (width) => {
      this.#width = Math.max(240, width);
      this.#draw();
    });
  }

  show(names: readonly string[], description: string): void {
    this.#shown = true;
    this.#names = names;
    this.#description = description;
    this.#draw();
  }

  /** A drawing stands in its place. */
  hide(): void {
    this.#shown = false;
  }

  pose(pose: ArrayLike<number> | undefined): void {
    this.#pose = pose;
    if (this.#shown) this.#bars.setAttribute("d", this.#path());
  }

  /** `m12, 0.83 of the largest`. */
  says(name: string): string {
    const value = this.#pose?.[this.#names.indexOf(name)];
    return value === undefined ? name : `${name}, ${formatNumber(value, 2)} of the largest`;
  }

  /** Left edge of a bar, in pixels; fractions stand between bars. */
  #to(index: number): number {
    const [from, to] = this.#part;
    const share = index / Math.max(1, this.#names.length);
    return SIDE + ((share - from) / (to - from)) * (this.#width - 2 * SIDE);
  }

  #visible(): readonly [first: number, last: number] {
    const { length } = this.#names;
    return [Math.floor(this.#part[0] * length), Math.min(length, Math.ceil(this.#part[1] * length))];
  }

  #draw(): void {
    if (!this.#shown) return;
    const width = this.#width;
    const [first, last] = this.#visible();
    const step = this.#to(1) - this.#to(0);
    const names = this.#names.slice(first, last);
    const longest = Math.max(1, ...names.map((name) => [...name].length));
    const every = Math.max(1, Math.ceil((LETTER * longest + 10) / step));
    const items = names.map((name, i) => {
      const x = this.#to(first + i);
      const label = svg(
        "text",
        { class: "value", x: x + step / 2, y: HEIGHT - 5, "text-anchor": "middle" },
        name,
      );
      const element = svg(
        "g",
        { class: "item" },
        svg("rect", { class: "hit", x, y: 0, width: step, height: HEIGHT - NAMES }),
        ...((first + i) % every === 0 ? [label] : []),
      );
      return { key: name, element, says: `coordinate ${first + i + 1}, ${name}` };
    });
    const picture = svg(
      "svg",
      { class: "scene chart", width, height: HEIGHT, viewBox: `0 0 ${width} ${HEIGHT}` },
      svg("path", { class: "thin", d: `M0,${MIDDLE}H${width}` }),
      this.#bars,
      ...items.map(({ element }) => element),
      this.#frame,
    );
    this.#bars.setAttribute("d", this.#path());
    this.#roving.update(picture, items, this.#description);
  }

  /** To both sides of the middle. */
  #path(): string {
    const pose = this.#pose;
    if (pose === undefined) return "";
    const [first, last] = this.#visible();
    const step = this.#to(1) - this.#to(0);
    const wide = Math.max(0.6, step * 0.7);
    let path = "";
    for (let i = first; i < Math.min(last, pose.length); i++) {
      const x = this.#to(i) + (step - wide) / 2;
      path += `M${x.toFixed(2)},${MIDDLE}v${(-HALF * pose[i]).toFixed(2)}h${wide.toFixed(2)}V${MIDDLE}Z`;
    }
    return path;
  }

  #look(part: Part): void {
    this.#part = part;
    this.#page.keep({ zoom: { ...this.#page.kept.zoom, [KEY]: part } });
    this.#draw();
  }

  #nameAt(share: number): string | undefined {
    const [from, to] = this.#part;
    return this.#names[Math.floor((from + share * (to - from)) * this.#names.length)];
  }

  #follow(): void {
    const chart = this;
    const { element } = this.#roving;
    followGestures(
      element,
      {
        get part() {
          return chart.#part;
        },
        setPart: (part) => this.#look(part),
        shareAt: (clientX) =>
          (clientX - element.getBoundingClientRect().left - SIDE) / (this.#width - 2 * SIDE),
        point: () => undefined,
        frame: (range) => this.#showFrame(range),
        pick: (share) => {
          const name = this.#nameAt(share);
          if (name !== undefined) this.#pick(name);
        },
      },
      () => this.#shown,
    );
    element.addEventListener("keydown", (event) => this.#press(event));
  }

  #showFrame(range: readonly [number, number] | undefined): void {
    const [a, b] = range ?? [0, 0];
    const wide = this.#width - 2 * SIDE;
    this.#frame.setAttribute("x", String(SIDE + Math.max(0, Math.min(a, b)) * wide));
    this.#frame.setAttribute(
      "width",
      String(Math.max(0, Math.min(1, Math.max(a, b)) - Math.max(0, Math.min(a, b))) * wide),
    );
    this.#frame.classList.toggle("on", range !== undefined);
  }

  #press(event: KeyboardEvent): void {
    const { key, shiftKey } = event;
    if (!this.#shown || event.ctrlKey || event.metaKey || event.altKey) return;
    if (key === "+" || key === "=") this.#look(zoomed(this.#part, 0.5, 0.6));
    else if (key === "-") this.#look(zoomed(this.#part, 0.5, 1 / 0.6));
    else if (key === "0") this.#look(WHOLE);
    else if (shiftKey && (key === "ArrowRight" || key === "PageDown")) this.#look(panned(this.#part, 0.2));
    else if (shiftKey && (key === "ArrowLeft" || key === "PageUp")) this.#look(panned(this.#part, -0.2));
    else return;
    event.preventDefault();
    event.stopImmediatePropagation();
  }
}

const MIDDLE = (HEIGHT - NAMES) / 2;
const HALF = MIDDLE - 6;
