import type { Scene, SheetContent, SheetMotion } from "../../shared-core/index.ts";
import { html, svg } from "./dom.ts";
import type { Page } from "./page.ts";
import { Player } from "./player.ts";
import { Roving } from "./roving.ts";
import { ScenePicture } from "./scene-picture.ts";

/** The system, drawn from the source; or a chart of its coordinates where there are too many to draw. */
export class Drawing {
  readonly element: HTMLElement;
  readonly player: Player;
  readonly #page: Page;
  readonly #roving: Roving;
  readonly #says = html("p", { class: "readout" });
  #scene: Scene | undefined;
  #shown = "";
  #picture: ScenePicture | undefined;
  #bars: SVGPathElement | undefined;
  #named = new Map<string, readonly SVGGElement[]>();
  #lit: ReadonlySet<string> = new Set();

  constructor(page: Page) {
    this.#page = page;
    this.#roving = new Roving({
      label: "The system",
      over: (key) => this.#over(key),
      pick: (key) => this.#pick(key),
    });
    this.player = new Player(page, {
      show: (pose) => this.#pose(pose),
      coordinates: () => this.#scene?.coordinates.length ?? 0,
    });
    this.element = html(
      "div",
      { class: "drawing" },
      html("div", { class: "wide" }, this.#roving.element),
      this.#says,
      this.player.element,
    );
  }

  /** The picture as it is, for a copy of it. */
  get picture(): SVGSVGElement | null {
    return this.#roving.element.querySelector("svg");
  }

  update({ scene, motions }: SheetContent): void {
    const shown = JSON.stringify(scene);
    if (shown !== this.#shown) {
      this.#shown = shown;
      this.#scene = scene;
      if (scene.kind === "chart") this.#drawChart(scene, motions);
      else this.#drawSystem(scene);
      this.highlight([...this.#lit]);
    }
    this.player.update(motions);
  }

  /** Statements in which the cursor stands. */
  highlight(names: readonly string[]): void {
    this.#lit = new Set(names);
    for (const [name, groups] of this.#named) {
      for (const group of groups) group.classList.toggle("lit", this.#lit.has(name));
    }
  }

  #drawSystem(scene: Scene): void {
    const picture = new ScenePicture(scene, { labels: true });
    picture.element.style.maxWidth = `${scene.width}px`;
    picture.element.style.minWidth = `${LEAST_SIZE * scene.width}px`;
    this.#picture = picture;
    this.#bars = undefined;
    const named = new Map<string, SVGGElement[]>();
    const items = scene.items.flatMap((item, i) => {
      const element = picture.groups[i];
      if (item.keyword === "ground") return [];
      named.set(item.name, [...(named.get(item.name) ?? []), element]);
      return [{ key: item.name, element, says: item.says }];
    });
    this.#named = named;
    this.#roving.update(picture.element, items, scene.description);
  }

  #drawChart(scene: Scene, motions: readonly SheetMotion[]): void {
    this.#picture = undefined;
    this.#named = new Map();
    this.#bars = svg("path", { class: "bars" });
    const picture = svg(
      "svg",
      { class: "scene chart", viewBox: `0 0 ${CHART.width} ${CHART.height}` },
      svg("path", { class: "thin", d: `M0,${CHART.height / 2}H${CHART.width}` }),
      this.#bars,
    );
    const count = scene.coordinates.length;
    const hint = motions.length > 0 ? "Choose a motion to see it over the coordinates." : "";
    this.#says.textContent = `${scene.description} ${hint}`.trim();
    // Entries by coordinate: a reader without sight moves along the chart.
    const items = scene.coordinates.map((name, i) => {
      const x = (CHART.width * i) / count;
      const element = svg(
        "g",
        {},
        svg("rect", { class: "hit", x, y: 0, width: CHART.width / count, height: CHART.height }),
      );
      return { key: name, element, says: `coordinate ${i + 1}, ${name}` };
    });
    picture.append(...items.map(({ element }) => element));
    this.#roving.update(picture, items, scene.description);
  }

  #pose(pose: Float64Array | undefined): void {
    if (this.#bars) this.#bars.setAttribute("d", pose ? barPath(pose) : "");
    if (pose) this.#picture?.pose(pose);
    else this.#picture?.rest();
  }

  #over(key: string | null): void {
    const item = this.#scene?.items.find(({ name }) => name === key);
    const text = item?.says ?? (key === null ? "" : key);
    this.#says.textContent = text;
    if (key === null || item) this.#page.say({ type: "point", name: key });
  }

  #pick(key: string): void {
    if (!this.#scene?.items.some(({ name }) => name === key)) return;
    this.#page.keep({ selected: key });
    this.highlight([key]);
    this.#page.say({ type: "reveal", name: key });
  }
}

/** A narrow page shrinks the drawing so far; then it scrolls, for words must stay readable. */
const LEAST_SIZE = 0.75;
const CHART = { width: 800, height: 160 };

/** A bar a coordinate, to both sides of the middle. */
function barPath(pose: Float64Array): string {
  const step = CHART.width / Math.max(1, pose.length);
  const [middle, half, wide] = [CHART.height / 2, CHART.height / 2 - 6, Math.max(0.6, step * 0.7)];
  return Array.from(pose, (value, i) => {
    const x = (step * i + (step - wide) / 2).toFixed(2);
    return `M${x},${middle}v${(-half * value).toFixed(2)}h${wide.toFixed(2)}V${middle}Z`;
  }).join("");
}
