import type { Ruler } from "../../shared-core/index.ts";
import { html, svg } from "./dom.ts";
import type { Page } from "./page.ts";
import { Roving, type RovingItem } from "./roving.ts";
import { widthOf } from "./width.ts";

const PAD = 24;
/** Height of the drop, and of a row of words, in pixels. */
const DROP = 46;
const ROW = 15;
/** A letter of the editor's font at the size of the ruler's words. */
const LETTER = 6.7;
/** Narrower drops could not be seen. */
const THINNEST = 5;

/** One log axis: modes hang from it, steady drives stand on it, limits cross it. */
export class RulerView {
  readonly element: HTMLElement;
  readonly #page: Page;
  readonly #roving: Roving;
  readonly #says = html("p", { class: "readout" });
  readonly #choose: (motion: string) => void;
  #ruler: Ruler | null = null;
  /** Told by the page, or this until it has been laid out. */
  #width = 640;

  constructor(page: Page, chooseMotion: (id: string) => void) {
    this.#page = page;
    this.#choose = chooseMotion;
    this.#roving = new Roving({
      label: "Frequencies",
      over: (key) => this.#over(key),
      pick: (key) => this.#pick(key),
    });
    this.element = html("div", { class: "ruler" }, this.#roving.element, this.#says);
    widthOf(this.element, (width) => {
      this.#width = width;
      this.#draw();
    });
  }

  get picture(): SVGSVGElement | null {
    return this.#roving.element.querySelector("svg");
  }

  update(ruler: Ruler | null): void {
    this.#ruler = ruler;
    this.#draw();
  }

  #draw(): void {
    const ruler = this.#ruler;
    if (ruler === null) return;
    const width = Math.max(280, this.#width);
    const to = (at: number) => PAD + at * (width - 2 * PAD);
    const above = rowsFor(
      [
        ...ruler.drives.map(({ id, from, to: end, label }) => ({ id, x: to((from + end) / 2), label })),
        ...ruler.limits.map(({ id, at, label }) => ({ id, x: to(at), label })),
      ],
      width,
    );
    const below = rowsFor(
      ruler.modes.map(({ id, at, label }) => ({ id, x: to(at), label })),
      width,
    );
    const axis = ROW * above.rows + 34;
    const height = axis + DROP + 22 + ROW * Math.max(0, below.rows - 1);
    const parts = new Parts({ to, axis, above, below });
    const items = [
      ...ruler.modes.map((mode) => parts.mode(mode)),
      ...ruler.drives.map((drive) => parts.drive(drive)),
      ...ruler.limits.map((limit) => parts.limit(limit)),
    ].sort((a, b) => a.x - b.x);
    const picture = svg(
      "svg",
      { class: "ruler-picture", width, height, viewBox: `0 0 ${width} ${height}` },
      ...ruler.modes.map((mode) => parts.band(mode)),
      ...ruler.earlier.map((mode) => parts.earlier(mode)),
      ...parts.scale(ruler, width),
      ...items.map(({ element }) => element),
      ...parts.numbers(ruler),
    );
    this.#roving.update(picture, items, ruler.description);
  }

  #over(key: string | null): void {
    const text = key === null ? "" : [this.#sayings().get(key) ?? "", ...this.#apart(key)].join(" · ");
    this.#says.textContent = text;
    if (document.activeElement === this.#roving.element) this.#page.announce(text);
    const drive =
      this.#ruler?.drives.find(({ id }) => id === key) ?? this.#ruler?.limits.find(({ id }) => id === key);
    this.#page.say({ type: "point", name: drive?.name ?? null });
  }

  #pick(key: string): void {
    const { drives = [], limits = [], modes = [] } = this.#ruler ?? {};
    if (modes.some(({ id }) => id === key)) this.#choose(key);
    const line = drives.find(({ id }) => id === key) ?? limits.find(({ id }) => id === key);
    if (line) this.#page.say({ type: "reveal", name: line.name });
  }

  #sayings(): Map<string, string> {
    const { drives = [], limits = [], modes = [] } = this.#ruler ?? {};
    return new Map([
      ...[...modes, ...drives].map(({ id, says }) => [id, says] as const),
      ...limits.map((limit) => [limit.id, limitWords(limit)] as const),
    ]);
  }

  /** How far its nearest neighbours are. */
  #apart(key: string): string[] {
    const named = new Map([
      ...(this.#ruler?.modes ?? []).map(({ id, number }) => [id, `mode ${number}`] as const),
      ...(this.#ruler?.drives ?? []).map(({ id, name, label, asked }) => [id, asked ? label : name] as const),
      ...(this.#ruler?.limits ?? []).map(({ id, name }) => [id, name] as const),
    ]);
    return (this.#ruler?.separations ?? [])
      .filter(({ a, b }) => a === key || b === key)
      .slice(0, 3)
      .map(({ a, b, text }) => `to ${named.get(a === key ? b : a) ?? ""}: ${text}`);
  }
}

const limitWords = ({ name, label, side, holds }: Ruler["limits"][number]): string =>
  `limit ${name}, stay ${side} ${label}${holds === null ? "" : holds ? ", holds" : ", fails"}`;

interface Rows {
  readonly rows: number;
  readonly rowOf: ReadonlyMap<string, number>;
  readonly xOf: ReadonlyMap<string, number>;
}

/** Words that would overlap stand in rows above each other; none leaves the picture. */
function rowsFor(words: readonly { id: string; x: number; label: string }[], width: number): Rows {
  const ends: number[] = [];
  const rowOf = new Map<string, number>();
  const xOf = new Map<string, number>();
  for (const { id, x, label } of [...words].sort((a, b) => a.x - b.x)) {
    const half = (LETTER * [...label].length) / 2 + 5;
    const middle = Math.max(half, Math.min(width - half, x));
    const free = ends.findIndex((end) => end <= middle - half);
    const row = free < 0 ? ends.length : free;
    ends[row] = middle + half;
    rowOf.set(id, row);
    xOf.set(id, middle);
  }
  return { rows: ends.length, rowOf, xOf };
}

type Item = RovingItem & { readonly x: number };

class Parts {
  readonly #to: (at: number) => number;
  readonly #axis: number;
  readonly #above: Rows;
  readonly #below: Rows;

  constructor(of: { to: (at: number) => number; axis: number; above: Rows; below: Rows }) {
    this.#to = of.to;
    this.#axis = of.axis;
    this.#above = of.above;
    this.#below = of.below;
  }

  /** Where a drive is too near to the mode. */
  band({ bandLow, bandHigh, danger }: Ruler["modes"][number]): SVGElement {
    const x = this.#to(bandLow);
    const width = Math.max(1, this.#to(bandHigh) - x);
    return svg("rect", { class: danger ? "band danger" : "band", x, y: this.#axis - 22, width, height: 22 });
  }

  scale({ ticks, unit }: Ruler, width: number): SVGElement[] {
    const axis = this.#axis;
    return [
      svg("path", { class: "axis", d: `M${PAD - 10},${axis}H${width - PAD + 10}` }),
      ...ticks.map(({ at, major }) =>
        svg("path", { class: "tick", d: `M${this.#to(at)},${axis}v${major ? -8 : -4}` }),
      ),
      svg("text", { class: "quiet", x: width, y: axis - 6, "text-anchor": "end" }, unit),
    ];
  }

  /** Over the drops, for they say where a drop hangs; where two would touch, the rounder one stands. */
  numbers({ ticks }: Ruler): SVGElement[] {
    const taken: { readonly from: number; readonly to: number }[] = [];
    const stands = ({ at, label }: Ruler["ticks"][number]) => {
      const half = (LETTER * label.length) / 2 + 2;
      const [from, to] = [this.#to(at) - half, this.#to(at) + half];
      if (label === "" || taken.some((other) => from < other.to && other.from < to)) return false;
      taken.push({ from, to });
      return true;
    };
    const order = [...ticks].sort((a, b) => Number(b.major) - Number(a.major));
    return order
      .filter(stands)
      .map(({ at, label }) =>
        svg("text", { class: "quiet", x: this.#to(at), y: this.#axis + 12, "text-anchor": "middle" }, label),
      );
  }

  /** Of an earlier revision: an empty drop behind today's. */
  earlier(mode: Ruler["earlier"][number]): SVGElement {
    return svg(
      "g",
      { class: "earlier" },
      svg("title", {}, mode.says),
      svg("path", { d: this.#drop(mode).d }),
    );
  }

  /** Hangs from a point of the axis, as wide at its belly as the half-power bandwidth. */
  #drop({ at, low, high }: Pick<Ruler["modes"][number], "at" | "low" | "high">) {
    const [x, top] = [this.#to(at), this.#axis];
    const half = Math.max(THINNEST, this.#to(high) - this.#to(low)) / 2;
    const round = Math.min(half, DROP / 3);
    const belly = top + DROP - round;
    const d = `M${x},${top}C${x},${top + DROP * 0.4} ${x - half},${belly - round} ${x - half},${belly}A${half},${round} 0 0 0 ${x + half},${belly}C${x + half},${belly - round} ${x},${top + DROP * 0.4} ${x},${top}Z`;
    return { x, top, half, belly, d };
  }

  mode(mode: Ruler["modes"][number]): Item {
    const { id, label, says, danger, number } = mode;
    const { x, top, half, belly, d } = this.#drop(mode);
    const y = top + DROP + 14 + ROW * (this.#below.rowOf.get(id) ?? 0);
    const words = svg("text", { x: this.#below.xOf.get(id) ?? x, y, "text-anchor": "middle" }, label);
    const element = svg(
      "g",
      { class: danger ? "mode danger" : "mode" },
      svg("rect", {
        class: "hit",
        x: x - Math.max(12, half),
        y: top,
        width: 2 * Math.max(12, half),
        height: DROP + 18,
      }),
      svg("path", { d }),
      svg(
        "text",
        { class: "in", x, y: belly + 3.5, "text-anchor": "middle" },
        half > 6 ? String(number) : "",
      ),
      " ",
      words,
    );
    return { key: id, element, says, x };
  }

  drive({ id, from, to, label, says, asked }: Ruler["drives"][number]): Item {
    const [left, right] = [this.#to(from), this.#to(to)];
    const middle = (left + right) / 2;
    const y = this.#wordsAt(id);
    const element = svg(
      "g",
      { class: asked ? "drive asked" : "drive" },
      svg("rect", {
        class: "hit",
        x: left - 8,
        y: y - 12,
        width: right - left + 16,
        height: this.#axis - y + 12,
      }),
      ...(right - left > 2
        ? [svg("rect", { class: "range", x: left, y: this.#axis - 14, width: right - left, height: 14 })]
        : []),
      svg("path", { d: `M${middle},${y + 3}V${this.#axis}${asked ? "" : "m-3.5,-7l3.5,7l3.5,-7"}` }),
      svg("text", { x: this.#above.xOf.get(id) ?? middle, y, "text-anchor": "middle" }, label),
    );
    return { key: id, element, says, x: middle };
  }

  /** A gate across the axis, its feet towards the side on which the mode must stay. */
  limit(limit: Ruler["limits"][number]): Item {
    const { id, at, side, label, holds } = limit;
    const x = this.#to(at);
    const y = this.#wordsAt(id);
    const foot = side === "above" ? 7 : -7;
    const element = svg(
      "g",
      { class: holds === false ? "limit danger" : "limit" },
      svg("rect", { class: "hit", x: x - 8, y: y - 12, width: 16, height: this.#axis + 14 - y + 12 }),
      svg("path", { d: `M${x + foot},${y + 4}H${x}V${this.#axis + 14}h${foot}` }),
      svg("text", { x: this.#above.xOf.get(id) ?? x, y, "text-anchor": "middle" }, label),
    );
    return { key: id, element, says: limitWords(limit), x };
  }

  #wordsAt(id: string): number {
    return 12 + ROW * (this.#above.rowOf.get(id) ?? 0);
  }
}
