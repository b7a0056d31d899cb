import { html } from "./dom.ts";

let sections = 0;

/** A part of the page under its own heading; the style sheet numbers them. */
export function section(
  title: string,
  ...body: readonly Node[]
): { readonly element: HTMLElement; readonly title: HTMLElement } {
  const id = `section${++sections}`;
  const heading = html("h2", { id }, title);
  return { element: html("section", { "aria-labelledby": id }, heading, ...body), title: heading };
}
