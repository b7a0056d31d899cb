import type { SheetMotion } from "../../shared-core/index.ts";
import { Choices, html, wordButton } from "./dom.ts";
import type { Page } from "./page.ts";
import { poseOf } from "./sway.ts";

/** Cycles a second of a mode at speed 1; slow enough to follow with the eye. */
const CYCLES = 0.5;
const STILL = "";

export interface Stage {
  /** undefined: at rest. */
  show(pose: Float64Array | undefined): void;
  coordinates(): number;
  /** Frames of the chosen history are not here yet. */
  ask(): void;
}

/** Sets a drawing in motion: which motion, how fast, where in it. Nothing moves unless somebody asks. */
export class Player {
  readonly element: HTMLElement;
  readonly #page: Page;
  readonly #stage: Stage;
  readonly #motions: Choices<string>;
  readonly #play: HTMLButtonElement;
  readonly #speed: HTMLInputElement;
  readonly #place: HTMLInputElement;
  readonly #where = html("output", { class: "number" });
  readonly #controls: HTMLElement;
  #all: readonly SheetMotion[] = [];
  #motion: SheetMotion | undefined;
  #at = 0;
  #frame: number | undefined;
  #last = 0;
  #asked = false;
  /** Begins to move when its frames have come. */
  #waits = false;

  constructor(page: Page, stage: Stage) {
    this.#page = page;
    this.#stage = stage;
    this.#motions = new Choices("moving", (id) => this.choose(id, true));
    this.#play = wordButton("play", () => (this.playing ? this.pause() : this.play()), {
      class: "word play",
    });
    this.#speed = slider("speed of the motion", { min: -3, max: 3, step: 0.25, value: 0 });
    this.#place = slider("place in the motion", { min: 0, max: 1, step: 0.001, value: 0 });
    this.#place.addEventListener("input", () => {
      this.pause();
      this.#move(Number(this.#place.value));
    });
    this.#speed.addEventListener("input", () => this.#sayPlace());
    this.#controls = html(
      "span",
      { class: "controls" },
      this.#play,
      this.#place,
      this.#where,
      html("span", { class: "choice" }, html("label", { for: "speed" }, "speed"), this.#speed),
    );
    this.element = html("div", { class: "player" }, this.#motions.element, this.#controls);
  }

  get playing(): boolean {
    return this.#frame !== undefined;
  }

  update(motions: readonly SheetMotion[]): void {
    this.#all = motions;
    this.element.hidden = motions.length === 0;
    const known = motions.find(({ id }) => id === this.#page.kept.motion);
    this.#motion = known;
    this.#motions.update(
      [{ value: STILL, text: "nothing" }, ...motions.map(({ id, label }) => ({ value: id, text: label }))],
      known?.id ?? STILL,
    );
    this.#controls.hidden = known === undefined;
    if (known === undefined) this.pause();
    this.#move(this.#at);
    if (known === undefined || !isAwaited(known)) {
      this.#asked = false;
      if (this.#waits && known) this.play();
    } else this.#askOnce();
  }

  /** `starts`: it also begins to move, unless motion is unwelcome here; the extreme is shown then. */
  choose(id: string, starts: boolean): void {
    this.#page.keep({ motion: id });
    this.#at = 0;
    this.update(this.#all);
    if (this.#motion === undefined) return;
    this.#page.announce(this.#motion.label);
    this.#waits = false;
    if (isAwaited(this.#motion)) {
      this.#waits = starts && !reducedMotion();
      this.pause();
      this.#askOnce();
    } else if (starts && !reducedMotion()) this.play();
  }

  /** What has no frames however often it is asked for stays still. */
  #askOnce(): void {
    if (this.#asked) return;
    this.#asked = true;
    this.#stage.ask();
  }

  play(): void {
    if (this.#motion === undefined || isAwaited(this.#motion) || this.playing) return;
    this.#waits = false;
    this.#play.textContent = "pause";
    this.#last = performance.now();
    if (this.#motion.kind === "history" && this.#at >= 1) this.#at = 0;
    this.#frame = requestAnimationFrame((now) => this.#step(now));
  }

  pause(): void {
    if (this.#frame !== undefined) cancelAnimationFrame(this.#frame);
    this.#frame = undefined;
    this.#play.textContent = "play";
  }

  #step(now: number): void {
    const motion = this.#motion;
    if (motion === undefined) {
      this.pause();
      return;
    }
    const passed = Math.min(0.1, Math.max(0, (now - this.#last) / 1000)) * this.#factor();
    this.#last = now;
    const share = motion.kind === "mode" ? passed * CYCLES : passed / Math.max(1e-9, lengthOf(motion));
    this.#move((this.#at + share) % 1);
    this.#frame = requestAnimationFrame((next) => this.#step(next));
  }

  #move(at: number): void {
    this.#at = at;
    this.#place.value = String(at);
    this.#sayPlace();
    const shown = this.#motion && !isAwaited(this.#motion) ? this.#motion : undefined;
    this.#stage.show(shown && poseOf(shown, this.#stage.coordinates(), at));
  }

  #sayPlace(): void {
    const motion = this.#motion;
    if (motion === undefined) return;
    const where =
      motion.kind === "mode"
        ? `${Math.round(360 * this.#at)}°`
        : `${(this.#at * lengthOf(motion)).toFixed(3)} s`;
    this.#where.textContent = where;
    this.#place.setAttribute("aria-valuetext", where);
    this.#speed.setAttribute("aria-valuetext", `${this.#factor().toPrecision(2)} times`);
  }

  /** Speeds double and halve. */
  #factor(): number {
    return 2 ** Number(this.#speed.value);
  }
}

export const reducedMotion = (): boolean =>
  document.body.classList.contains("vscode-reduce-motion") ||
  matchMedia("(prefers-reduced-motion: reduce)").matches;

const isAwaited = (motion: SheetMotion): boolean => motion.kind === "history" && motion.frames === 0;

const lengthOf = ({ frames, stepS }: Extract<SheetMotion, { kind: "history" }>): number =>
  Math.max(0, frames - 1) * stepS;

function slider(label: string, attributes: Record<string, number>): HTMLInputElement {
  return html("input", { type: "range", id: label.split(" ")[0], "aria-label": label, ...attributes });
}
