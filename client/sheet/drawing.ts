import type { Scene, SheetContent, SheetMotion } from "../../shared-core/index.ts";
import { CoordinateChart } from "./chart.ts";
import { html } from "./dom.ts";
import type { Page } from "./page.ts";
import { Player } from "./player.ts";
import { Roving } from "./roving.ts";
import { ScenePicture } from "./scene-picture.ts";
import { poseOf } from "./sway.ts";

/** The system, drawn from the source; or a chart of its coordinates where there are too many to draw. */
export class Drawing {
  readonly element: HTMLElement;
  readonly player: Player;
  readonly #page: Page;
  readonly #roving: Roving;
  readonly #wide: HTMLElement;
  readonly #says = html("p", { class: "readout" });
  #scene: Scene | undefined;
  #shown = "";
  #isPlaced = false;
  #picture: ScenePicture | undefined;
  readonly #chart: CoordinateChart;
  #still: Float64Array | undefined;
  /** Under the drawing while nothing is pointed at. */
  #words = "";
  #named = new Map<string, readonly SVGGElement[]>();
  #lit: ReadonlySet<string> = new Set();

  /** @param ask  for the frames of the motion that was chosen */
  constructor(page: Page, ask: () => void) {
    this.#page = page;
    this.#roving = new Roving({
      label: "The system",
      over: (key) => this.#over(key),
      pick: (key) => this.#pick(key),
    });
    this.#chart = new CoordinateChart(page, this.#roving, (name) => this.#reveal(name));
    this.player = new Player(page, {
      show: (pose) => this.#pose(pose),
      coordinates: () => this.#scene?.coordinates.length ?? 0,
      ask,
    });
    this.#wide = html("div", { class: "wide" }, this.#roving.element);
    this.element = html("div", { class: "drawing" }, this.#wide, this.#says, this.player.element);
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
      if (scene.kind === "chart") this.#drawChart(scene);
      else this.#drawSystem(scene);
      this.#toMiddle();
      this.highlight([...this.#lit]);
    }
    if (scene.kind === "chart") this.#showFirst(scene, motions);
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
    this.element.style.setProperty("--drawn", `${scene.width}px`);
    this.#picture = picture;
    this.#chart.hide();
    this.#still = undefined;
    this.#words = "";
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

  /** What is wider than the page begins in its middle, where the ground is; afterwards it stays where it was left. */
  #toMiddle(): void {
    if (this.#isPlaced) return;
    this.#isPlaced = true;
    requestAnimationFrame(() => {
      this.#wide.scrollLeft = (this.#wide.scrollWidth - this.#wide.clientWidth) / 2;
    });
  }

  #drawChart({ coordinates, description }: Scene): void {
    this.#picture = undefined;
    this.#named = new Map();
    this.#chart.show(coordinates, `${description} ${CHART_HELP}`);
  }

  /** At rest a chart would be empty: the first shape stands in it until somebody chooses. */
  #showFirst({ coordinates, description }: Scene, [first]: readonly SheetMotion[]): void {
    this.#still = first && poseOf(first, coordinates.length, 0);
    const hint = first === undefined ? "" : `At rest it shows ${first.label}.`;
    this.#words = `${description} ${hint}`.trim();
    this.#says.textContent = this.#words;
    this.#chart.pose(this.#still);
  }

  #pose(pose: Float64Array | undefined): void {
    this.#chart.pose(pose ?? this.#still);
    if (pose) this.#picture?.pose(pose);
    else this.#picture?.rest();
  }

  #over(key: string | null): void {
    const item = this.#scene?.items.find(({ name }) => name === key);
    const text = item?.says ?? (key === null ? this.#words : this.#chart.says(key));
    this.#says.textContent = text;
    if (key === null || item) this.#page.say({ type: "point", name: key });
  }

  #pick(key: string): void {
    if (this.#scene?.kind === "chart") this.#reveal(key);
    if (!this.#scene?.items.some(({ name }) => name === key)) return;
    this.#page.keep({ selected: key });
    this.highlight([key]);
    this.#page.say({ type: "reveal", name: key });
  }

  /** The line of the statement that a coordinate belongs to. */
  #reveal(coordinate: string): void {
    this.#page.say({ type: "reveal", name: coordinate.replace(/\..*$/, "") });
  }
}

/** A narrow page shrinks the drawing so far; then it scrolls, for words must stay readable. */
const LEAST_SIZE = 0.7;
/** Keys that a chart knows beside the arrows. */
const CHART_HELP = "Plus and minus zoom, Shift and arrow keys move, 0 shows all.";
