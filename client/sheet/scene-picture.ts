import type { Scene, SceneItem, ScenePart } from "../../shared-core/index.ts";
import { svg } from "./dom.ts";
import { anchorMatrix, matrixText, type Pose, partMatrix } from "./sway.ts";

/** A scene on the page, with what it takes to move it. */
export class ScenePicture {
  readonly element: SVGSVGElement;
  /** One group an item, in the order of `scene.items`. */
  readonly groups: readonly SVGGElement[];
  readonly #moving: { readonly part: ScenePart; readonly path: SVGPathElement }[] = [];
  readonly #words: { readonly label: SceneItem["labels"][number]; readonly text: SVGTextElement }[] = [];
  readonly #reach: number | undefined;

  /** @param options.labels false: shapes only. `reach`: pixels that the largest value moves a symbol */
  constructor(scene: Scene, options: { readonly labels: boolean; readonly reach?: number }) {
    const { width, height } = scene;
    this.#reach = options.reach;
    this.groups = scene.items.map((item) => this.#group(item, options.labels));
    this.element = svg(
      "svg",
      { class: "scene", viewBox: `0 0 ${width} ${height}`, width, height, focusable: "false" },
      ...this.groups,
    );
  }

  pose(pose: Pose): void {
    for (const { part, path } of this.#moving) {
      const matrix = partMatrix(part, pose, this.#reach);
      if (matrix) path.setAttribute("transform", matrixText(matrix));
    }
    for (const { label, text } of this.#words) {
      const matrix = label.anchor && anchorMatrix(label.anchor, pose, this.#reach);
      if (matrix) text.setAttribute("transform", matrixText(matrix));
    }
  }

  /** Back to rest. */
  rest(): void {
    for (const { path } of this.#moving) path.removeAttribute("transform");
    for (const { text } of this.#words) text.removeAttribute("transform");
  }

  #group(item: SceneItem, labels: boolean): SVGGElement {
    const { x, y, width, height } = item.box;
    const hit = svg("rect", { class: "hit", x: x - 4, y: y - 4, width: width + 8, height: height + 8 });
    const paths = item.parts.map((part) => {
      const path = svg("path", { d: part.path, class: part.style });
      if (part.rides.on !== "rest") this.#moving.push({ part, path });
      return path;
    });
    const texts = (labels ? item.labels : []).map((label) => {
      const { x, y, align, role } = label;
      const text = svg("text", { x, y, "text-anchor": align, class: role }, label.text);
      if (label.anchor) this.#words.push({ label, text });
      return text;
    });
    // Blanks between its words, as a screen reader takes them.
    const words = texts.flatMap((text) => [" ", text]);
    return svg("g", { class: `item ${item.family}` }, hit, ...paths, ...words);
  }
}
