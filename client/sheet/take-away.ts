import { html, wordButton } from "./dom.ts";
import type { Page } from "./page.ts";
import { pngBlob, pngOf } from "./png.ts";

export interface Portable {
  /** File name without its ending. */
  readonly name: string;
  /** SVG text that stands alone; undefined while there is none. */
  readonly svg: () => string | undefined;
  /** Saves the answer as CSV. */
  readonly csv?: () => void;
}

/** Words under a picture that take it along: to the clipboard, or into a file by way of the editor. */
export class TakeAway {
  readonly element: HTMLDetailsElement;
  readonly #page: Page;
  readonly #of: Portable;
  readonly #done = html("span", { class: "quiet", role: "status" });

  constructor(page: Page, of: Portable) {
    this.#page = page;
    this.#of = of;
    const act = (text: string, run: () => Promise<string>) =>
      wordButton(
        text,
        () =>
          void run().then(
            (said) => this.#say(said),
            (error) => this.#say(reasonOf(error)),
          ),
      );
    this.element = html(
      "details",
      { class: "take" },
      html("summary", {}, "copy or save"),
      html(
        "span",
        { class: "acts" },
        act("copy SVG", () => this.#copySvg()),
        act("copy PNG", () => this.#copyPng()),
        act("save SVG", () => this.#saveSvg()),
        act("save PNG", () => this.#savePng()),
        ...(of.csv ? [wordButton("save CSV", of.csv)] : []),
        this.#done,
      ),
    );
  }

  #say(text: string): void {
    this.#done.textContent = text;
  }

  #svg(): string {
    const text = this.#of.svg();
    if (text === undefined) throw new Error("there is no picture yet");
    return text;
  }

  async #copySvg(): Promise<string> {
    await navigator.clipboard.writeText(this.#svg());
    return "copied";
  }

  async #copyPng(): Promise<string> {
    await navigator.clipboard.write([new ClipboardItem({ "image/png": pngBlob(await pngOf(this.#svg())) })]);
    return "copied";
  }

  async #saveSvg(): Promise<string> {
    this.#page.say({ type: "picture", name: this.#of.name, format: "svg", data: this.#svg() });
    return "";
  }

  async #savePng(): Promise<string> {
    const data = await pngOf(this.#svg());
    this.#page.say({ type: "picture", name: this.#of.name, format: "png", data });
    return "";
  }
}

const reasonOf = (error: unknown): string =>
  `not done: ${error instanceof Error ? error.message : String(error)}`;
