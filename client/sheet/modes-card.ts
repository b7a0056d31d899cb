import type { ModesCard, Scene } from "../../shared-core/index.ts";
import { html, svg, wordButton } from "./dom.ts";
import { ScenePicture } from "./scene-picture.ts";
import { canMove } from "./sway.ts";
import { TableBehind } from "./table.ts";

/** In the small drawings the largest value moves a symbol so far, in scene pixels; chosen by looking. */
const REACH = 34;
const BARS = { width: 200, height: 90 };

export interface ModesHost {
  /** Sets a motion going in the drawing at the top. */
  choose(id: string): void;
  saveCsv(): void;
}

/** Small drawings of the shapes with the shares of the strain energy. */
export class ModesCardView {
  readonly element: HTMLElement;
  readonly #host: ModesHost;
  readonly #list = html("ol", { class: "modes" });
  readonly #table = new TableBehind();
  /** Small drawings, kept while the system stands as it is: a moved number gives each another pose only. */
  #pictures = new Map<string, ScenePicture>();
  #layout = "";

  constructor(host: ModesHost) {
    this.#host = host;
    const csv = wordButton("save CSV", () => host.saveCsv());
    const under = html("div", { class: "under" }, this.#table.element, csv);
    this.element = html("div", { class: "card" }, this.#list, under);
  }

  update(card: ModesCard, scene: Scene): void {
    const layout = layoutKey(scene);
    if (layout !== this.#layout) this.#pictures = new Map();
    this.#layout = layout;
    const held = document.activeElement?.getAttribute("data-mode");
    this.#list.replaceChildren(...card.modes.map((mode) => this.#mode(mode, scene)));
    if (held) {
      const again = this.#list.querySelectorAll<HTMLElement>("[data-mode]");
      [...again].find((each) => each.dataset.mode === held)?.focus();
    }
    this.#table.update(card.table, card.title);
  }

  recolour(): void {}

  #shapePicture({ id, shape }: ModesCard["modes"][number], scene: Scene): SVGSVGElement {
    const picture = this.#pictures.get(id) ?? newPicture(scene);
    this.#pictures.set(id, picture);
    picture.pose(shape);
    return picture.element;
  }

  #mode(mode: ModesCard["modes"][number], scene: Scene): HTMLLIElement {
    const shape = canMove(scene) ? this.#shapePicture(mode, scene) : shapeBars(mode.shape);
    const show = wordButton(mode.label, () => this.#host.choose(mode.id), { "data-mode": mode.id });
    const energy = mode.energy.map(({ name, share, text }) =>
      html(
        "li",
        {},
        bar(share),
        html("span", { class: "name" }, name),
        html("span", { class: "number" }, text),
      ),
    );
    return html(
      "li",
      {},
      shape,
      html("p", { class: "label" }, show),
      html("p", { class: "quiet" }, mode.damping),
      html("ul", { class: "energy" }, ...energy),
    );
  }
}

/** Everything that is drawn and what moves it, without words and values. */
const layoutKey = ({ width, height, items }: Scene): string =>
  JSON.stringify([width, height, ...items.map(({ parts, family }) => [parts, family])]);

/** The shape over the system at rest. */
function newPicture(scene: Scene): ScenePicture {
  const picture = new ScenePicture(scene, { labels: false, reach: REACH });
  const rest = new ScenePicture(scene, { labels: false });
  for (const group of rest.groups) group.classList.add("ghost");
  picture.element.prepend(...rest.groups);
  picture.element.setAttribute("class", "scene shape");
  const [side, up] = [6, REACH];
  picture.element.setAttribute(
    "viewBox",
    `${-side} ${-up} ${scene.width + 2 * side} ${scene.height + 2 * up}`,
  );
  picture.element.removeAttribute("width");
  picture.element.removeAttribute("height");
  picture.element.setAttribute("aria-hidden", "true");
  return picture;
}

function shapeBars(shape: Float64Array): SVGSVGElement {
  const step = BARS.width / Math.max(1, shape.length);
  const [middle, half] = [BARS.height / 2, BARS.height / 2 - 4];
  const wide = Math.max(0.5, step * 0.7);
  const d = Array.from(
    shape,
    (value, i) =>
      `M${(i * step).toFixed(2)},${middle}v${(-half * value).toFixed(2)}h${wide.toFixed(2)}V${middle}Z`,
  ).join("");
  return svg(
    "svg",
    { class: "scene shape", viewBox: `0 0 ${BARS.width} ${BARS.height}`, "aria-hidden": "true" },
    svg("path", { class: "thin", d: `M0,${middle}H${BARS.width}` }),
    svg("path", { class: "bars", d }),
  );
}

const bar = (share: number): SVGSVGElement =>
  svg(
    "svg",
    { class: "share", viewBox: "0 0 60 8", width: 60, height: 8, "aria-hidden": "true" },
    svg("path", { class: "ground", d: "M0,4H60" }),
    svg("rect", { x: 0, y: 1, width: Math.max(0, Math.min(1, share)) * 60, height: 6 }),
  );
